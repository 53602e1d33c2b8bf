import { describe, expect, it } from "vitest";
import { pieces } from "@/modules/kernel/quantity";
import { expiryAfterOpening, lotBlock, pickFirstExpired } from "./first-expired";

const lot = (name: string, expiry: string | null, grams: number) => ({ lot: name, expiry, availableMilli: pieces(grams) });
const lots = [lot("E-2604", "2026-10-31", 900), lot("E-2511", "2026-02-28", 400), lot("E-2602", "2026-08-31", 30)];

describe("first expired, first out", () => {
  it("takes 30 g of E-2602 and 12 g of E-2604 and never offers the expired lot", () => {
    expect(pickFirstExpired({ lots, needMilli: pieces(42), today: "2026-03-07", daysLeftMin: 0 })).toEqual({
      picks: [{ lot: "E-2602", qtyMilli: 30_000 }, { lot: "E-2604", qtyMilli: 12_000 }],
      blocked: [{ lot: "E-2511", why: "expired" }],
      shortMilli: 0,
    });
  });

  it("says what is short when the good lots do not cover the need", () => {
    expect(pickFirstExpired({ lots, needMilli: pieces(1000), today: "2026-03-07", daysLeftMin: 0 }).shortMilli).toBe(70_000);
  });

  it.each([
    ["2026-03-07", 0, null],
    ["2026-03-06", 0, "expired"],
    ["2026-03-17", 10, null],
    ["2026-03-16", 10, "too few days left"],
    [null, 365, null],
  ])("a lot good to %s with %i days needed on 7 March: %s", (expiry, days, why) => {
    expect(lotBlock(lot("L", expiry, 1), "2026-03-07", days)).toBe(why);
  });

  it("blocks a recalled lot and leaves a lot without a date for last", () => {
    const r = pickFirstExpired({
      lots: [lot("none", null, 5), { ...lot("bad", "2027-01-01", 5), isRecalled: true }, lot("dated", "2027-01-01", 5)],
      needMilli: pieces(6), today: "2026-03-07", daysLeftMin: 0,
    });
    expect(r.picks.map((p) => p.lot)).toEqual(["dated", "none"]);
    expect(r.blocked).toEqual([{ lot: "bad", why: "recalled" }]);
  });

  it("an opened kit is good to the earlier of both dates", () => {
    expect(expiryAfterOpening("2026-08-31", "2026-03-07", 30)).toBe("2026-04-06");
    expect(expiryAfterOpening("2026-03-20", "2026-03-07", 30)).toBe("2026-03-20");
    expect(expiryAfterOpening(null, "2026-03-07", 30)).toBe("2026-04-06");
  });
});
