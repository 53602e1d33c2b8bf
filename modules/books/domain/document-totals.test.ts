import fc from "fast-check";
import { describe, expect, it } from "vitest";
import { minor } from "@/modules/kernel/money";
import { documentTotals, taxOutOf, type LineKind, type TaxTreatment, type TotalsInput } from "./document-totals";

const taxes: Record<string, TaxTreatment> = {
  none: { category: "E", percent: "0" }, county: { category: "S", percent: "7.35" },
  low: { category: "S", percent: "6" }, high: { category: "S", percent: "21" }, same: { category: "S", percent: "21.00" },
};
const line = (kind: LineKind, amount: number, taxCode: string) => ({ kind, amountMinor: minor(amount), taxCode });
const base: TotalsInput = { lines: [], laborDiscountBp: 0, supplies: null, taxes, taxBasis: "invoice" };
const totals = (more: Partial<TotalsInput>) => {
  const r = documentTotals({ ...base, ...more });
  if (!r.ok) throw new Error(`${r.refusal.code} ${r.refusal.field ?? ""}`);
  return r.value;
};
const hero = (labor: number, parts: number): Partial<TotalsInput> => ({
  lines: [line("labor", labor, "none"), line("part", parts, "county"), line("freight", 4200, "none")],
  laborDiscountBp: 500, supplies: { percentBp: 400, capMinor: minor(6000), taxCode: "county" },
});

describe("document totals", () => {
  // Figures: docs/hero-job.md.
  it("estimate of the hero job", () => {
    expect(totals(hero(195_000, 42_050))).toMatchObject({
      laborMinor: 195_000, laborDiscountMinor: 9750, laborNetMinor: 185_250, partsMinor: 42_050, suppliesMinor: 6000,
      freightMinor: 4200, taxableMinor: 48_050, taxMinor: 3532, totalMinor: 241_032,
    });
  });

  it("invoice of the hero job", () => {
    expect(totals(hero(203_400, 55_400))).toMatchObject({
      laborDiscountMinor: 10_170, taxableMinor: 61_400, taxMinor: 4513, totalMinor: 263_343, netMinor: 258_830,
      baseByCode: { none: 197_430, county: 61_400 },
    });
  });

  it("batch of six with a discount as its own line: 3,947.00 untaxed", () => {
    expect(totals({
      lines: [...Array.from({ length: 5 }, () => line("labor", 64_000, "none")), line("labor", 9500, "none"), line("discount", -9600, "none"), line("part", 59_200, "none"), line("freight", 9600, "none")],
      supplies: { percentBp: 400, capMinor: minor(6000), taxCode: "none" },
    })).toMatchObject({ laborMinor: 329_500, discountMinor: 9600, suppliesMinor: 6000, taxMinor: 0, totalMinor: 394_700 });
  });

  // EN 16931 example of CEN/TC 434 with two rates; then the second shop of the demo at 21 %.
  it.each([
    [[line("part", 18_323, "low"), line("part", 4637, "high")], [1099, 974], 25_033],
    [[line("labor", 48_000, "high"), line("part", 21_235, "same"), line("freight", 1850, "high")], [14_928], 86_013],
  ])("VAT per rate group, rounded once", (lines, groupTax, totalMinor) => {
    const t = totals({ lines });
    expect(t.groups.map((g) => g.taxMinor)).toEqual(groupTax);
    expect(t.totalMinor).toBe(totalMinor);
  });

  it("the line basis and the invoice basis differ, and the document remembers which", () => {
    const lines = Array.from({ length: 3 }, () => line("part", 105, "t"));
    const with825 = { lines, taxes: { t: { category: "S", percent: "8.25" } } };
    expect(totals({ ...with825, taxBasis: "line" })).toMatchObject({ taxMinor: 27, taxBasis: "line" });
    expect(totals({ ...with825, taxBasis: "invoice" })).toMatchObject({ taxMinor: 26, taxBasis: "invoice" });
  });

  it("supplies below the cap are the percentage, and there are none without labor", () => {
    expect(totals({ ...hero(100_000, 0) }).suppliesMinor).toBe(4000);
    expect(totals({ ...hero(0, 10_000) }).suppliesMinor).toBe(0);
  });

  it("spreads a labor discount over labor of different tax codes to the cent", () => {
    const t = totals({ lines: [line("labor", 3333, "county"), line("labor", 3333, "none"), line("labor", 3334, "none")], laborDiscountBp: 1000 });
    expect(t.laborDiscountMinor).toBe(1000);
    expect(t.baseByCode).toEqual({ county: 3000, none: 6000 });
  });

  it.each<[Partial<TotalsInput>, string, string]>([
    [{ lines: [line("part", 1, "")] }, "TAX_CODE_UNKNOWN", "lines.0.taxCode"],
    [{ lines: [line("part", 1, "none"), line("part", 1, "toString")] }, "TAX_CODE_UNKNOWN", "lines.1.taxCode"],
    [{ supplies: { percentBp: 400, capMinor: minor(1), taxCode: "x" } }, "TAX_CODE_UNKNOWN", "supplies"],
    [{ supplies: { percentBp: -1, capMinor: minor(1), taxCode: "none" } }, "PERCENT_OUT_OF_RANGE", "supplies"],
    [{ laborDiscountBp: 10_001 }, "PERCENT_OUT_OF_RANGE", "laborDiscount"],
    [{ lines: [line("part", 1, "t")], taxes: { t: { category: "S", percent: "-3" } } }, "PERCENT_OUT_OF_RANGE", "lines.0.taxCode"],
    [{ lines: [line("part", 100, "none"), line("discount", 5, "none")] }, "DISCOUNT_SIGN", "lines.1.amount"],
  ])("refuses %o", (more, code, field) => {
    expect(documentTotals({ ...base, ...more })).toMatchObject({ ok: false, refusal: { code, field } });
  });

  it.each([[12_100, "21", 10_000, 2100], [1000, "7.35", 932, 68], [-12_100, "21", -10_000, -2100], [0, "21", 0, 0]])(
    "takes tax out of %i at %s %%: net %i, tax %i", (gross, percent, netMinor, taxMinor) =>
      expect(taxOutOf(minor(gross), percent)).toEqual({ netMinor, taxMinor }),
  );

  it("a credit note of the whole invoice mirrors every figure", () => {
    const amounts = fc.array(fc.tuple(fc.constantFrom<LineKind>("labor", "part", "freight"), fc.integer({ min: 0, max: 1_000_000 }), fc.constantFrom("none", "county", "low", "high")), { minLength: 1, maxLength: 8 });
    fc.assert(fc.property(amounts, fc.integer({ min: 0, max: 10_000 }), fc.constantFrom("invoice" as const, "line" as const), (rows, laborDiscountBp, taxBasis) => {
      const doc = (sign: number) => totals({ lines: rows.map(([k, a, c]) => line(k, sign * a, c)), laborDiscountBp, taxBasis, supplies: { percentBp: 400, capMinor: minor(6000), taxCode: "county" } });
      const [invoice, note] = [doc(1), doc(-1)];
      expect(invoice.totalMinor + note.totalMinor).toBe(0);
      expect(invoice.taxMinor + note.taxMinor).toBe(0);
      expect(invoice.netMinor).toBe(invoice.laborMinor + invoice.partsMinor + invoice.suppliesMinor + invoice.freightMinor - invoice.discountMinor);
      expect(invoice.groups.reduce((s, g) => s + g.baseMinor, 0)).toBe(invoice.netMinor);
    }));
  });
});
