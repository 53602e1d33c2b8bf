import fc from "fast-check";
import { describe, expect, it } from "vitest";
import { allocate, minor } from "@/modules/kernel/money";
import { pieces } from "@/modules/kernel/quantity";
import { landReceipt } from "./landed-freight";

const line = (valueMinor: number, qty = 1, weightGrams = 0) => ({ valueMinor: minor(valueMinor), qtyMilli: pieces(qty), weightGrams });

describe("landed freight", () => {
  // Figures: docs/hero-job.md, PO-2026-0231.
  it("spreads 15.00 over 132.00 and 78.00 as 9.43 and 5.57", () => {
    expect(landReceipt([line(13_200, 6), line(7800, 10)], minor(1500))).toEqual([
      { freightMinor: 943, landedMinor: 14_143 },
      { freightMinor: 557, landedMinor: 8357 },
    ]);
  });

  it("can go by weight or by quantity", () => {
    const lines = [line(13_200, 6, 100), line(7800, 10, 300)];
    expect(landReceipt(lines, minor(1000), "weight").map((l) => l.freightMinor)).toEqual([250, 750]);
    expect(landReceipt(lines, minor(1600), "quantity").map((l) => l.freightMinor)).toEqual([600, 1000]);
  });

  it("falls back to quantity when nothing has a value or a weight", () => {
    expect(landReceipt([line(0, 3), line(0, 1)], minor(400)).map((l) => l.freightMinor)).toEqual([300, 100]);
    expect(landReceipt([line(100, 3), line(100, 1)], minor(400), "weight").map((l) => l.freightMinor)).toEqual([300, 100]);
  });

  it("shares of any total over any weights add up to the total, each within one unit of its fair part", () => {
    fc.assert(
      fc.property(
        fc.integer({ min: -1_000_000, max: 1_000_000 }),
        fc.array(fc.integer({ min: 0, max: 100_000 }), { minLength: 1, maxLength: 12 }),
        (total, weights) => {
          const shares = allocate(total, weights);
          expect(shares.reduce((a, b) => a + b, 0)).toBe(total);
          const sum = weights.reduce((a, b) => a + b, 0);
          if (sum > 0) shares.forEach((s, i) => expect(Math.abs(s - (total * (weights[i] ?? 0)) / sum)).toBeLessThan(1));
        },
      ),
    );
  });
});
