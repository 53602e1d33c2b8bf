import { compareFractions, fraction, ratio, roundWhole, times } from "@/modules/kernel/fraction";
import { allocate, basisPointsOf, minor, sumMinor, type Minor } from "@/modules/kernel/money";
import { ok, refuse, type Result } from "@/modules/kernel/result";

export type LineKind = "labor" | "part" | "outside" | "supplies" | "freight" | "core" | "discount" | "note";

export const TAX_BASES = ["invoice", "line"] as const;
/** Tax rounded once per rate group of the document, or line by line. A shop setting, stored with the document. */
export type TaxBasis = (typeof TAX_BASES)[number];

/** How a tax code is treated on the tax date. The shop's own decision; not tax advice. */
export interface TaxTreatment {
  /** Group letter: `S` taxed, `E` exempt, `Z` zero rated … Lines of one letter and rate form one group. */
  readonly category: string;
  /** Percent as decimal text, `"7.35"`. */
  readonly percent: string;
}

export interface TotalsLine {
  readonly kind: LineKind;
  /** Amount without tax, already rounded to the minor unit. Discounts are negative. */
  readonly amountMinor: Minor;
  readonly taxCode: string;
}

export interface TotalsInput {
  readonly lines: readonly TotalsLine[];
  /** Discount on labor in basis points of gross labor; it lowers the tax base of the labor lines. */
  readonly laborDiscountBp: number;
  /** Shop supplies = min(percent of gross labor, cap), as a line of its own. */
  readonly supplies: { readonly percentBp: number; readonly capMinor: Minor; readonly taxCode: string } | null;
  readonly taxes: Readonly<Record<string, TaxTreatment>>;
  readonly taxBasis: TaxBasis;
}

export interface TaxGroup {
  readonly category: string;
  readonly percent: string;
  readonly baseMinor: Minor;
  readonly taxMinor: Minor;
}

export interface DocumentTotals {
  readonly laborMinor: Minor;
  readonly laborDiscountMinor: Minor;
  readonly laborNetMinor: Minor;
  readonly partsMinor: Minor;
  readonly suppliesMinor: Minor;
  readonly freightMinor: Minor;
  readonly outsideMinor: Minor;
  readonly coreMinor: Minor;
  /** All discounts as a positive sum: on labor and by line. */
  readonly discountMinor: Minor;
  /** Without tax, after discounts. */
  readonly netMinor: Minor;
  /** Part of the net that bears tax above 0 %. */
  readonly taxableMinor: Minor;
  readonly baseByCode: Readonly<Record<string, Minor>>;
  readonly groups: readonly TaxGroup[];
  readonly taxMinor: Minor;
  readonly totalMinor: Minor;
  readonly taxBasis: TaxBasis;
}

/**
 * Totals of an estimate, an invoice or (with negative amounts) a credit note.
 * Tax of a group = base * percent, half-up on the absolute value to the minor unit; once per group on the invoice
 * basis, once per line on the line basis.
 * Refuses `TAX_CODE_UNKNOWN` naming the line, `PERCENT_OUT_OF_RANGE`, `DISCOUNT_SIGN` for a discount above 0.
 * Source: EN 16931 BR-CO-10, -14, -15, -17 for the sums; R.I. Gen. Laws 44-18.1-25 (item or invoice basis, rounding).
 */
export function documentTotals(input: TotalsInput): Result<DocumentTotals> {
  const wrong = checkInput(input);
  if (wrong) return wrong;
  const sumOf = (kind: LineKind) => sumMinor(input.lines.filter((l) => l.kind === kind).map((l) => l.amountMinor));
  const laborMinor = sumOf("labor");
  const laborDiscountMinor = basisPointsOf(laborMinor, input.laborDiscountBp);
  const suppliesLine = suppliesOf(laborMinor, input);
  const taxed = [...discounted(input.lines, laborDiscountMinor), ...suppliesLine];
  const groups = groupTax(taxed, input);
  const baseByCode: Record<string, Minor> = {};
  for (const l of taxed) baseByCode[l.taxCode] = minor((baseByCode[l.taxCode] ?? 0) + l.amountMinor);
  const netMinor = sumMinor(taxed.map((l) => l.amountMinor));
  const taxMinor = sumMinor(groups.map((g) => g.taxMinor));
  return ok({
    laborMinor,
    laborDiscountMinor,
    laborNetMinor: minor(laborMinor - laborDiscountMinor),
    partsMinor: sumOf("part"),
    suppliesMinor: sumMinor([sumOf("supplies"), ...suppliesLine.map((l) => l.amountMinor)]),
    freightMinor: sumOf("freight"),
    outsideMinor: sumOf("outside"),
    coreMinor: sumOf("core"),
    discountMinor: minor(laborDiscountMinor - sumOf("discount")),
    netMinor,
    taxableMinor: sumMinor(groups.filter((g) => isAboveZero(g.percent)).map((g) => g.baseMinor)),
    baseByCode,
    groups,
    taxMinor,
    totalMinor: minor(netMinor + taxMinor),
    taxBasis: input.taxBasis,
  });
}

/** Tax on one base, rounded half-up on the absolute value. `percent` is decimal text. */
const taxOn = (baseMinor: Minor, percent: string): Minor =>
  minor(roundWhole(times(ratio(baseMinor, 100), fraction(percent))));

/** Takes tax out of a price that includes it: net = gross * 100 / (100 + percent), tax = the rest. */
export function taxOutOf(grossMinor: Minor, percent: string): { readonly netMinor: Minor; readonly taxMinor: Minor } {
  const f = fraction(percent);
  const netMinor = minor(roundWhole(ratio(BigInt(grossMinor) * 100n * f.den, 100n * f.den + f.num)));
  return { netMinor, taxMinor: minor(grossMinor - netMinor) };
}

const isAboveZero = (percent: string) => compareFractions(fraction(percent), fraction("0")) > 0;
const isPercent = (bp: number) => Number.isInteger(bp) && bp >= 0 && bp <= 10_000;

function checkInput(input: TotalsInput) {
  if (!isPercent(input.laborDiscountBp)) return refuse("PERCENT_OUT_OF_RANGE", "A discount is 0 to 100 %.", { field: "laborDiscount" });
  if (input.supplies && (!isPercent(input.supplies.percentBp) || input.supplies.capMinor < 0)) {
    return refuse("PERCENT_OUT_OF_RANGE", "Shop supplies are 0 to 100 % of labor, with a cap of 0 or more.", { field: "supplies" });
  }
  const codes = [...input.lines.map((l, i) => [l.taxCode, `lines.${i}.taxCode`]), ...(input.supplies ? [[input.supplies.taxCode, "supplies"]] : [])];
  for (const [code = "", field] of codes) {
    const treatment = Object.hasOwn(input.taxes, code) ? input.taxes[code] : undefined;
    if (!treatment) return refuse("TAX_CODE_UNKNOWN", code === "" ? "This line has no tax code. Choose one." : `There is no tax code ${code} on this date. Choose one from the list.`, { field });
    if (!/^\d{1,2}(\.\d+)?$|^100$/.test(treatment.percent)) return refuse("PERCENT_OUT_OF_RANGE", `The rate of ${code} is not a percent from 0 to 100.`, { field });
  }
  // A credit note turns every sign, so a discount may be positive only where the sales are negative.
  const sales = input.lines.reduce((sum, l) => sum + (l.kind === "discount" ? 0 : l.amountMinor), 0);
  const bad = input.lines.findIndex((l) => l.kind === "discount" && l.amountMinor !== 0 && l.amountMinor > 0 === sales >= 0);
  return bad === -1 ? null : refuse("DISCOUNT_SIGN", "A discount lowers the sum: type it with a minus.", { field: `lines.${bad}.amount` });
}

function suppliesOf(laborMinor: Minor, { supplies }: TotalsInput): TotalsLine[] {
  if (!supplies) return [];
  const share = basisPointsOf(laborMinor, supplies.percentBp);
  const amount = Math.sign(share) * Math.min(Math.abs(share), supplies.capMinor);
  return amount === 0 ? [] : [{ kind: "supplies", amountMinor: minor(amount), taxCode: supplies.taxCode }];
}

/** Lines with the labor discount spread over the labor lines by largest remainder. */
function discounted(lines: readonly TotalsLine[], discountMinor: Minor): TotalsLine[] {
  if (discountMinor === 0) return [...lines];
  const shares = allocate(discountMinor, lines.map((l) => (l.kind === "labor" ? Math.abs(l.amountMinor) : 0)));
  return lines.map((l, i) => ({ ...l, amountMinor: minor(l.amountMinor - (shares[i] ?? 0)) }));
}

function groupTax(lines: readonly TotalsLine[], input: TotalsInput): TaxGroup[] {
  const groups = new Map<string, { treatment: TaxTreatment; bases: number[] }>();
  for (const line of lines) {
    const treatment = input.taxes[line.taxCode];
    if (!treatment || line.amountMinor === 0) continue;
    const f = fraction(treatment.percent);
    // 7.5 and 7.50 are one rate: key by value, not by text.
    const key = `${treatment.category} ${roundWhole(times(f, ratio(1_000_000, 1)))}`;
    const group = groups.get(key) ?? { treatment, bases: [] };
    group.bases.push(line.amountMinor);
    groups.set(key, group);
  }
  return [...groups.values()].map(({ treatment, bases }) => {
    const baseMinor = sumMinor(bases);
    const taxMinor =
      input.taxBasis === "invoice"
        ? taxOn(baseMinor, treatment.percent)
        : sumMinor(bases.map((b) => taxOn(minor(b), treatment.percent)));
    return { category: treatment.category, percent: treatment.percent, baseMinor, taxMinor };
  });
}
