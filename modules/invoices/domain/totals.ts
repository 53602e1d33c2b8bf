import { minor, type Minor } from "@/modules/kernel/money";
import { ok, refuse, type Result } from "@/modules/kernel/result";
import { applyDeposit } from "@/modules/books/domain/deposit-due";
import { documentTotals, type DocumentTotals, type TotalsInput } from "@/modules/books/domain/document-totals";

export interface InvoiceTotals extends DocumentTotals {
  readonly depositAppliedMinor: Minor;
  /** Held deposit the invoice did not need: becomes a customer credit. */
  readonly depositSurplusMinor: Minor;
  /** Still to pay. */
  readonly balanceMinor: Minor;
}

/** Totals of an invoice with the deposit held for its work order. Refuses as `documentTotals` does. */
export function invoiceTotals(input: TotalsInput, depositHeldMinor: Minor): Result<InvoiceTotals> {
  const t = documentTotals(input);
  if (!t.ok) return t;
  const d = applyDeposit(t.value.totalMinor, depositHeldMinor);
  return ok({ ...t.value, depositAppliedMinor: d.appliedMinor, depositSurplusMinor: d.surplusMinor, balanceMinor: d.openMinor });
}

/** The document level amounts of a European e-invoice, named by their business terms. */
export interface En16931Totals {
  /** BT-106 sum of line net amounts. */
  readonly lineSumMinor: Minor;
  /** BT-107 allowances (discounts) on document level. */
  readonly allowancesMinor: Minor;
  /** BT-108 charges (freight, supplies) on document level. */
  readonly chargesMinor: Minor;
  /** BT-109 = BT-106 - BT-107 + BT-108. */
  readonly withoutVatMinor: Minor;
  /** BT-110 = sum of the group taxes. */
  readonly vatMinor: Minor;
  /** BT-112 = BT-109 + BT-110. */
  readonly withVatMinor: Minor;
  /** BT-113 */
  readonly prepaidMinor: Minor;
  /** BT-114 */
  readonly roundingMinor: Minor;
  /** BT-115 = BT-112 - BT-113 + BT-114. */
  readonly payableMinor: Minor;
}

/**
 * The same totals as EN 16931 wants them. Refuses `LINE_BASIS_NOT_VAT` when tax was rounded line by line: under the
 * standard it is rounded once per category and rate.
 * Source: EN 16931-1 BR-CO-10, -13, -14, -15, -16, -17.
 */
export function en16931Totals(t: DocumentTotals, prepaidMinor: Minor, roundingMinor: Minor): Result<En16931Totals> {
  if (t.taxBasis !== "invoice") {
    return refuse("LINE_BASIS_NOT_VAT", "An e-invoice rounds tax once per rate. Set the tax basis to invoice.", { field: "taxBasis" });
  }
  const lineSumMinor = minor(t.laborMinor + t.partsMinor + t.outsideMinor + t.coreMinor);
  const chargesMinor = minor(t.suppliesMinor + t.freightMinor);
  const withoutVatMinor = minor(lineSumMinor - t.discountMinor + chargesMinor);
  const withVatMinor = minor(withoutVatMinor + t.taxMinor);
  return ok({
    lineSumMinor,
    allowancesMinor: t.discountMinor,
    chargesMinor,
    withoutVatMinor,
    vatMinor: t.taxMinor,
    withVatMinor,
    prepaidMinor,
    roundingMinor,
    payableMinor: minor(withVatMinor - prepaidMinor + roundingMinor),
  });
}

/**
 * A bill may pass what was approved only by freight at cost and by tax; anything more needs a new approval.
 * Both sums are without freight and tax. Refuses `OVER_APPROVED` with the difference.
 */
export function checkWithinApproved(billedNetMinor: Minor, approvedNetMinor: Minor): Result<Minor> {
  const over = billedNetMinor - approvedNetMinor;
  return over > 0
    ? refuse("OVER_APPROVED", "This bills more than the customer approved. Send the difference for approval first.", { field: "lines", data: { overMinor: over } })
    : ok(billedNetMinor);
}

/**
 * What may still be credited of an invoice. Refuses `CREDIT_NOT_POSITIVE`, and `CREDIT_EXCEEDS_INVOICE` with what is left.
 */
export function checkCredit(p: { readonly invoiceTotalMinor: Minor; readonly creditedMinor: Minor; readonly wantedMinor: Minor }): Result<Minor> {
  const left = p.invoiceTotalMinor - p.creditedMinor;
  if (p.wantedMinor <= 0) return refuse("CREDIT_NOT_POSITIVE", "A credit note is for more than 0.", { field: "amount" });
  return p.wantedMinor > left
    ? refuse("CREDIT_EXCEEDS_INVOICE", "A credit note cannot exceed what is left of the invoice.", { field: "amount", data: { leftMinor: left } })
    : ok(p.wantedMinor);
}
