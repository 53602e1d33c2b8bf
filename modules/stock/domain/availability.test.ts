import { describe, expect, it } from "vitest";
import { pieces } from "@/modules/kernel/quantity";
import { availableMilli, shareReservations } from "./availability";

describe("availability", () => {
  it.each([
    [10, 4, 0, 0, 6000],
    [10, 4, 3, 2, 1000],
    [2, 4, 0, 0, -2000],
  ])("on hand %i, reserved %i, expired %i, blocked %i", (onHand, reserved, expired, blocked, available) => {
    expect(availableMilli({
      onHandMilli: pieces(onHand), reservedMilli: pieces(reserved), expiredMilli: pieces(expired), blockedMilli: pieces(blocked),
    })).toBe(available);
  });

  it("gives the last springs to the earlier promise and tells the other what is short", () => {
    const wish = (workOrderId: string, promise: string | null) => ({ workOrderId, promise, needMilli: pieces(4) });
    expect(shareReservations(pieces(6), [wish("none", null), wish("later", "2026-03-20"), wish("sooner", "2026-03-13")])).toEqual([
      { workOrderId: "none", reservedMilli: 0, shortMilli: 4000 },
      { workOrderId: "later", reservedMilli: 2000, shortMilli: 2000 },
      { workOrderId: "sooner", reservedMilli: 4000, shortMilli: 0 },
    ]);
  });

  it("keeps the earlier row first on the same promise, and shares nothing of nothing", () => {
    const wish = (workOrderId: string) => ({ workOrderId, promise: "2026-03-13", needMilli: pieces(4) });
    expect(shareReservations(pieces(4), [wish("a"), wish("b")]).map((s) => s.reservedMilli)).toEqual([4000, 0]);
    expect(shareReservations(pieces(-1), [wish("a")])).toMatchObject([{ reservedMilli: 0, shortMilli: 4000 }]);
  });
});
