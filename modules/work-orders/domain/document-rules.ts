import { documentTotals, TAX_BASES, type DocumentTotals, type LineKind, type TaxBasis } from "@/modules/books/domain/document-totals";
import { minor } from "@/modules/kernel/money";
import type { Result } from "@/modules/kernel/result";

/** The shop's money rules as they stood when a document was made; frozen with it. Not tax advice. */
export interface DocumentRules {
  readonly taxMode: "sales" | "vat";
  readonly taxName: string;
  readonly taxRateText: string;
  readonly taxBasis: TaxBasis;
  readonly laborTaxable: boolean;
  readonly partsTaxable: boolean;
  readonly suppliesTaxable: boolean;
  readonly freightTaxable: boolean;
  readonly suppliesBasisPoints: number;
  readonly suppliesCapMinor: number | null;
  /** Number of the certificate that takes the tax off, if one is valid on the tax date. */
  readonly exemptBy: string | null;
}

export interface RuleSettings {
  taxMode: string; taxName: string; taxRateText: string; taxBasis: string; laborTaxable: boolean; partsTaxable: boolean; suppliesTaxable: boolean;
  freightTaxable: boolean; suppliesBasisPoints: number; suppliesCapMinor: number | null;
}

/** Rules of a document from the shop's settings and the certificate valid on its tax date. */
export function rulesFrom(s: RuleSettings, exemptBy: string | null): DocumentRules {
  return {
    taxMode: s.taxMode === "vat" ? "vat" : "sales", taxName: s.taxName, taxRateText: s.taxRateText,
    taxBasis: TAX_BASES.find((b) => b === s.taxBasis) ?? "invoice",
    laborTaxable: s.laborTaxable, partsTaxable: s.partsTaxable, suppliesTaxable: s.suppliesTaxable, freightTaxable: s.freightTaxable,
    suppliesBasisPoints: s.suppliesBasisPoints, suppliesCapMinor: s.suppliesCapMinor, exemptBy,
  };
}

/** A supplies cap that never bites, for shops without one: larger than any document may be. */
const NO_CAP = 1_000_000_000_00;
const TAXED = "S";
const UNTAXED = "N";

/** Tax code of a kind of line under these rules. */
export function taxCodeOf(kind: LineKind, r: DocumentRules): string {
  if (r.exemptBy !== null) return UNTAXED;
  const taxed =
    kind === "labor" || kind === "outside" ? r.laborTaxable
    : kind === "part" || kind === "core" ? r.partsTaxable
    : kind === "supplies" ? r.suppliesTaxable
    : kind === "freight" ? r.freightTaxable
    : kind === "discount" ? r.laborTaxable
    : false;
  return taxed ? TAXED : UNTAXED;
}

/**
 * Totals of an estimate (or any document made of such lines) under the shop's rules: the same arithmetic as an invoice.
 * `amountMinor` of each line is already rounded. Freight is a line of its own.
 */
export function totalsUnder(
  rules: DocumentRules,
  doc: { readonly lines: readonly { readonly kind: LineKind; readonly amountMinor: number }[]; readonly laborDiscountBp: number; readonly freightMinor: number },
): Result<DocumentTotals> {
  const lines = [...doc.lines, ...(doc.freightMinor === 0 ? [] : [{ kind: "freight" as const, amountMinor: doc.freightMinor }])];
  return documentTotals({
    lines: lines.map((l) => ({ kind: l.kind, amountMinor: minor(l.amountMinor), taxCode: taxCodeOf(l.kind, rules) })),
    laborDiscountBp: doc.laborDiscountBp,
    supplies: rules.suppliesBasisPoints === 0 ? null : { percentBp: rules.suppliesBasisPoints, capMinor: minor(rules.suppliesCapMinor ?? NO_CAP), taxCode: taxCodeOf("supplies", rules) },
    taxes: { [TAXED]: { category: TAXED, percent: rules.taxRateText }, [UNTAXED]: { category: rules.exemptBy === null ? "Z" : "E", percent: "0" } },
    taxBasis: rules.taxBasis,
  });
}
