import { describe, expect, it } from "vitest";
import { openOf } from "./open-sum";

/* Figures of docs/hero-job.md: an invoice of 2,633.43 with a deposit of 723.10. */
describe("open sum of an invoice", () => {
  const sums = { totalMinor: 263_343, depositAppliedMinor: 72_310, paidMinor: 0, creditedMinor: 0 };
  it("is the total less the deposit, payments and credit notes", () => {
    expect(openOf(sums)).toBe(191_033);
    expect(openOf({ ...sums, paidMinor: 100_000 })).toBe(91_033);
    expect(openOf({ ...sums, paidMinor: 191_033 })).toBe(0);
    expect(openOf({ ...sums, paidMinor: 91_033, creditedMinor: 100_000 })).toBe(0);
  });
  it("is open again by what went back of a used deposit", () => expect(openOf({ ...sums, paidMinor: 191_033 - 72_310 })).toBe(72_310));
});
