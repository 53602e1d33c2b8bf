import fc from "fast-check";
import { describe, expect, it } from "vitest";
import { minor } from "@/modules/kernel/money";
import { allocatePayment, isUnusuallyLarge } from "./allocation";

const doc = (documentId: string, due: string, open: number) => ({ documentId, due, openMinor: minor(open) });
const open = [doc("b", "2026-02-01", 5000), doc("a", "2026-01-01", 3000), doc("c", "2026-03-01", 2000)];

describe("allocation of a payment", () => {
  it.each([
    [4000, [], [["a", 3000], ["b", 1000]], 0],
    [4000, ["c"], [["c", 2000], ["a", 2000]], 0],
    [10_500, [], [["a", 3000], ["b", 5000], ["c", 2000]], 500],
    [5000, ["b", "c"], [["b", 5000]], 0],
  ])("%i naming %o", (amount, named, applied, credit) => {
    expect(allocatePayment(minor(amount), open, named)).toEqual({
      ok: true, value: { applied: applied.map(([documentId, amountMinor]) => ({ documentId, amountMinor })), creditMinor: credit },
    });
  });

  it("512.00 on an invoice of 500.00 leaves a credit of 12.00", () => {
    expect(allocatePayment(minor(51_200), [doc("x", "2026-01-01", 50_000)])).toMatchObject({ ok: true, value: { creditMinor: 1200 } });
  });

  it("refuses nothing, and a named document that is not open", () => {
    expect(allocatePayment(minor(0), open)).toMatchObject({ refusal: { code: "AMOUNT_NOT_POSITIVE" } });
    expect(allocatePayment(minor(1), [...open, doc("paid", "2026-01-01", 0)], ["a", "paid"])).toMatchObject({ refusal: { code: "DOCUMENT_NOT_OPEN", field: "named.1" } });
  });

  it("loses no cent and never over-pays a document", () => {
    const docs = fc.array(fc.tuple(fc.integer({ min: 0, max: 100_000 }), fc.constantFrom("2026-01-01", "2026-02-01")), { maxLength: 8 });
    fc.assert(fc.property(fc.integer({ min: 1, max: 500_000 }), docs, (amount, rows) => {
      const all = rows.map(([o, due], i) => doc(`d${i}`, due, o));
      const r = allocatePayment(minor(amount), all);
      if (!r.ok) throw new Error(r.refusal.code);
      expect(r.value.applied.reduce((s, a) => s + a.amountMinor, 0) + r.value.creditMinor).toBe(amount);
      for (const a of r.value.applied) expect(a.amountMinor).toBeLessThanOrEqual(all.find((d) => d.documentId === a.documentId)?.openMinor ?? -1);
    }));
  });

  it("asks about more than ten times the open sum", () => {
    expect([isUnusuallyLarge(minor(5001), minor(500)), isUnusuallyLarge(minor(5000), minor(500)), isUnusuallyLarge(minor(5000), minor(0))]).toEqual([true, false, false]);
  });
});
