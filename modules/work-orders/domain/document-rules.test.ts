import { describe, expect, it } from "vitest";
import { must } from "@/tests/support/shop";
import { rulesFrom, totalsUnder, type RuleSettings } from "./document-rules";

const settings: RuleSettings = {
  taxMode: "sales", taxName: "Pell County tax", taxRateText: "7.35", taxBasis: "invoice", laborTaxable: false, partsTaxable: true, suppliesTaxable: true,
  freightTaxable: false, suppliesBasisPoints: 400, suppliesCapMinor: 6000,
};
const hero = (labor: number, parts: number) => ({
  lines: [{ kind: "labor" as const, amountMinor: labor }, { kind: "part" as const, amountMinor: parts }], laborDiscountBp: 500, freightMinor: 4200,
});

// Figures: docs/hero-job.md, estimate versions 1 and 2; the rest by hand.
describe("totals under the shop's rules", () => {
  it.each([
    [195_000, 42_050, { laborDiscountMinor: 9750, suppliesMinor: 6000, freightMinor: 4200, taxMinor: 3532, totalMinor: 241_032 }],
    [203_400, 55_400, { laborDiscountMinor: 10_170, suppliesMinor: 6000, taxableMinor: 61_400, taxMinor: 4513, totalMinor: 263_343 }],
  ])("labor %i and parts %i come to the figures of the hero job", (labor, parts, figures) => {
    expect(must(totalsUnder(rulesFrom(settings, null), hero(labor, parts)))).toMatchObject(figures);
  });
  it("charges no tax under a valid certificate", () => {
    const t = must(totalsUnder(rulesFrom(settings, "RC-1"), hero(195_000, 42_050)));
    expect(t).toMatchObject({ taxMinor: 0, totalMinor: 241_032 - 3532 });
    expect(t.groups[0]?.category).toBe("E");
  });
  it("taxes every line under VAT: 480.00 + 212.35 + 18.50 at 21 % is 860.13", () => {
    const vat = rulesFrom({ ...settings, taxMode: "vat", taxRateText: "21", laborTaxable: true, freightTaxable: true, suppliesBasisPoints: 0, suppliesCapMinor: null }, null);
    const t = must(totalsUnder(vat, { lines: [{ kind: "labor", amountMinor: 48_000 }, { kind: "part", amountMinor: 21_235 }], laborDiscountBp: 0, freightMinor: 1850 }));
    expect(t).toMatchObject({ netMinor: 71_085, taxMinor: 14_928, totalMinor: 86_013 });
  });
  it("takes the whole percentage for supplies where no cap is set", () => {
    expect(must(totalsUnder(rulesFrom({ ...settings, suppliesCapMinor: null }, null), hero(195_000, 0))).suppliesMinor).toBe(7800);
  });
});
