import { describe, expect, it } from "vitest";
import { minor } from "@/modules/kernel/money";
import { chargeFee, checkPayout, payoutSum } from "./payout";

const FEES = { percent: "2.7", fixedMinor: minor(25) };
const charge = (amount: number) => ({ amountMinor: minor(amount), feeMinor: chargeFee(minor(amount), FEES) });
const none = { refundsMinor: [], disputesMinor: [], adjustmentsMinor: [] };

describe("payout", () => {
  // docs/hero-job.md: 2.7 % + 0.25 a charge.
  it.each([[191_033, 5183], [41_250, 1139], [72_310, 1977], [0, 25]])("fee of %i is %i", (amount, fee) => {
    expect(chargeFee(minor(amount), FEES)).toBe(fee);
  });

  it("two charges and a refund come to the bank line of 2,174.61", () => {
    const parts = { ...none, charges: [charge(191_033), charge(41_250)], refundsMinor: [minor(8500)] };
    expect(payoutSum(parts)).toEqual({ chargesMinor: 232_283, feesMinor: 6322, clearedMinor: 223_783, payoutMinor: 217_461 });
    expect(checkPayout(parts, minor(217_461)).ok).toBe(true);
    expect(checkPayout(parts, minor(217_460))).toMatchObject({ ok: false, refusal: { code: "PAYOUT_DIFFERS", data: { differenceMinor: 1 } } });
  });

  it("a dispute and its fee can make a payout negative", () => {
    expect(payoutSum({ ...none, charges: [charge(10_000)], disputesMinor: [minor(33_000)], adjustmentsMinor: [minor(-1500)] }).payoutMinor).toBe(10_000 - 295 - 33_000 - 1500);
  });
});
