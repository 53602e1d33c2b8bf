import { describe, expect, it } from "vitest";
import { instantOf, localMinute } from "@/modules/kernel/instant";
import { cureMinutesLeft, cureReadyAt } from "./cure";

const ZONE = "America/Denver";

describe("epoxy cure", () => {
  it("24 h over the night the clocks go forward end at 12:30, not 11:30", () => {
    const ready = cureReadyAt(instantOf("2026-03-07T11:30", ZONE), 24 * 60);
    expect(localMinute(ready, ZONE)).toBe("2026-03-08T12:30");
    expect(ready.toISOString()).toBe("2026-03-08T18:30:00.000Z");
  });

  it.each([["18:30:00", 0], ["18:29:59", 1], ["17:30:00", 60], ["19:00:00", 0]])("at %s there are %i minutes left", (t, left) => {
    expect(cureMinutesLeft(new Date("2026-03-08T18:30:00Z"), new Date(`2026-03-08T${t}Z`))).toBe(left);
  });
});
