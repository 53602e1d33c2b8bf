import { describe, expect, it } from "vitest";
import { minor, sumMinor } from "@/modules/kernel/money";
import { moneyReceived, moneyReturned, payoutLine, refundParts, restoredParts } from "./posting-receipt";

const at = (lines: readonly { account: string; amountMinor: number }[]) => Object.fromEntries(lines.map((l) => [l.account, l.amountMinor]));

describe("money in and out", () => {
  // Figures of docs/hero-job.md: deposit 723.10, payout of it 703.33 after a fee of 19.77.
  it("holds a deposit as a debt to the customer", () => {
    expect(at(moneyReceived({ way: "card", depositMinor: minor(72310), receivableMinor: minor(0), creditMinor: minor(0) }))).toEqual({ 1020: 72310, 2100: -72310 });
  });
  it("turns what is over into the customer's credit: 512.00 on an invoice of 500.00", () => {
    expect(at(moneyReceived({ way: "bank", depositMinor: minor(0), receivableMinor: minor(50000), creditMinor: minor(1200) }))).toEqual({ 1010: 51200, 1100: -50000, 2110: -1200 });
  });
  it("takes a payout line out of clearing, fee apart", () => {
    expect(at(payoutLine({ grossMinor: 72310, feeMinor: 1977, isDispute: false }))).toEqual({ 1010: 70333, 6100: 1977, 1020: -72310 });
    expect(at(payoutLine({ grossMinor: -8500, feeMinor: 0, isDispute: false }))).toEqual({ 1010: -8500, 1020: 8500 });
  });
  it("takes a refund from credit first, then deposit, then the payment", () => {
    expect(refundParts({ wantedMinor: 10000, creditMinor: 1200, depositMinor: 3000, paidMinor: 50000 })).toEqual({ creditMinor: 1200, depositMinor: 3000, receivableMinor: 5800, missingMinor: 0 });
    expect(refundParts({ wantedMinor: 100, creditMinor: 0, depositMinor: 0, paidMinor: 60 }).missingMinor).toBe(40);
  });
  // The demo's disputed charge of 330.00 with a fee of 15.00, which the payout that holds it keeps back.
  it("a disputed charge opens the receivable again, its fee is an expense of its own", () => {
    const taken = moneyReturned({ ...refundParts({ wantedMinor: 33_000, creditMinor: 0, depositMinor: 0, paidMinor: 33_000 }), way: "card" });
    const kept = payoutLine({ grossMinor: -33_000, feeMinor: 1500, isDispute: true });
    expect(at(taken)).toEqual({ 1020: -33_000, 1100: 33_000 });
    expect(at(kept)).toEqual({ 1010: -34_500, 6150: 1500, 1020: 33_000 });
  });
  it("money that comes back pays what is open now, then the deposit it was taken from; the rest is credit", () => {
    expect(restoredParts({ amountMinor: 33_000, openMinor: 33_000, depositMinor: 0 })).toEqual({ receivableMinor: 33_000, depositMinor: 0, creditMinor: 0 });
    expect(restoredParts({ amountMinor: 33_000, openMinor: 10_000, depositMinor: 0 })).toEqual({ receivableMinor: 10_000, depositMinor: 0, creditMinor: 23_000 });
    expect(restoredParts({ amountMinor: 33_000, openMinor: 0, depositMinor: 33_000 })).toEqual({ receivableMinor: 0, depositMinor: 33_000, creditMinor: 0 });
    expect(restoredParts({ amountMinor: 100, openMinor: -500, depositMinor: 0 })).toEqual({ receivableMinor: 0, depositMinor: 0, creditMinor: 100 });
  });
  it("sums to zero whatever the parts", () => {
    const parts = { depositMinor: minor(1), receivableMinor: minor(20), creditMinor: minor(300) };
    expect(sumMinor([...moneyReceived({ ...parts, way: "cash" }), ...moneyReturned({ ...parts, way: "cash" })].map((l) => l.amountMinor))).toBe(0);
    expect(sumMinor(moneyReceived({ ...parts, way: "cash" }).map((l) => l.amountMinor))).toBe(0);
  });
});
