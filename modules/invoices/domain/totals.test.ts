import { describe, expect, it } from "vitest";
import { minor } from "@/modules/kernel/money";
import { documentTotals, type TotalsInput, type TotalsLine } from "@/modules/books/domain/document-totals";
import { checkCredit, checkWithinApproved, en16931Totals, invoiceTotals } from "./totals";

const line = (kind: TotalsLine["kind"], amount: number, taxCode: string): TotalsLine => ({ kind, amountMinor: minor(amount), taxCode });
const hero: TotalsInput = {
  lines: [line("labor", 203_400, "no"), line("part", 55_400, "yes"), line("freight", 4200, "no")],
  laborDiscountBp: 500,
  supplies: { percentBp: 400, capMinor: minor(6000), taxCode: "yes" },
  taxes: { no: { category: "E", percent: "0" }, yes: { category: "S", percent: "7.35" } },
  taxBasis: "invoice",
};

describe("invoice totals", () => {
  // docs/hero-job.md
  it("open sum of the hero invoice is 1,910.33 after the deposit of 723.10", () => {
    expect(invoiceTotals(hero, minor(72_310))).toMatchObject({
      ok: true, value: { totalMinor: 263_343, depositAppliedMinor: 72_310, depositSurplusMinor: 0, balanceMinor: 191_033 },
    });
  });

  it("a deposit bigger than the invoice leaves a surplus, not a negative balance", () => {
    expect(invoiceTotals({ ...hero, lines: [line("labor", 9500, "no")], laborDiscountBp: 0, supplies: null }, minor(72_310))).toMatchObject({
      ok: true, value: { depositAppliedMinor: 9500, depositSurplusMinor: 62_810, balanceMinor: 0 },
    });
  });

  it("passes a refusal of the lines on", () => {
    expect(invoiceTotals({ ...hero, taxes: {} }, minor(0))).toMatchObject({ ok: false, refusal: { code: "TAX_CODE_UNKNOWN" } });
  });
});

describe("EN 16931 totals", () => {
  const vat = (lines: TotalsLine[], more: Partial<TotalsInput> = {}) => {
    const t = documentTotals({ lines, laborDiscountBp: 0, supplies: null, taxBasis: "invoice", taxes: { a: { category: "S", percent: "6" }, b: { category: "S", percent: "21" } }, ...more });
    if (!t.ok) throw new Error(t.refusal.code);
    return t.value;
  };

  // CEN/TC 434 example: two rates.
  it("sums a published example", () => {
    expect(en16931Totals(vat([line("part", 18_323, "a"), line("part", 4637, "b")]), minor(0), minor(0))).toMatchObject({
      ok: true, value: { lineSumMinor: 22_960, withoutVatMinor: 22_960, vatMinor: 2073, withVatMinor: 25_033, payableMinor: 25_033 },
    });
  });

  it("shows discounts as allowances, freight and supplies as charges, and what was prepaid", () => {
    const t = vat([line("labor", 48_000, "b"), line("part", 21_235, "b"), line("freight", 1850, "b"), line("discount", -1000, "b")]);
    expect(en16931Totals(t, minor(10_000), minor(-2))).toEqual({
      ok: true,
      value: {
        lineSumMinor: 69_235, allowancesMinor: 1000, chargesMinor: 1850, withoutVatMinor: 70_085, vatMinor: 14_718,
        withVatMinor: 84_803, prepaidMinor: 10_000, roundingMinor: -2, payableMinor: 74_801,
      },
    });
    expect(t.netMinor).toBe(70_085);
  });

  it("refuses a document rounded line by line", () => {
    expect(en16931Totals(vat([line("part", 100, "a")], { taxBasis: "line" }), minor(0), minor(0))).toMatchObject({ ok: false, refusal: { code: "LINE_BASIS_NOT_VAT" } });
  });
});

describe("limits of a bill and of a credit note", () => {
  it.each([[100, 100, true], [99, 100, true], [101, 100, false]])("bills %i of %i approved: %s", (billed, approved, fits) => {
    expect(checkWithinApproved(minor(billed), minor(approved)).ok).toBe(fits);
  });
  it.each([[10_000, 0, 10_000, null], [10_000, 4000, 6001, "CREDIT_EXCEEDS_INVOICE"], [10_000, 0, 0, "CREDIT_NOT_POSITIVE"]])(
    "of %i with %i credited, %i more: %s", (invoiceTotal, credited, wanted, code) => {
      const r = checkCredit({ invoiceTotalMinor: minor(invoiceTotal), creditedMinor: minor(credited), wantedMinor: minor(wanted) });
      expect(r.ok ? null : r.refusal.code).toBe(code);
    },
  );
});
