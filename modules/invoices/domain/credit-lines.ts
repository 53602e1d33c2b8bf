import type { InvoiceLine, InvoiceSnapshot } from "./invoice-snapshot";
import { minor, type Minor } from "@/modules/kernel/money";
import { ok, refuse, type Result } from "@/modules/kernel/result";
import { mirrorTotals } from "./mirror-totals";
import { documentTotals, type DocumentTotals } from "@/modules/books/domain/document-totals";
import { taxCodeOf } from "@/modules/work-orders/domain/document-rules";

/**
 * Lines and totals of a credit note, signs turned. All of an invoice mirrors it exactly; some lines are credited with
 * their share of the labor discount and the tax of their day, without shop supplies.
 * Refuses `LINE_UNKNOWN`, `CREDIT_EXCEEDS_LINE`.
 */
export function creditLines(
  s: InvoiceSnapshot, wanted: readonly { readonly lineId: string; readonly amount: number }[] | null,
): Result<{ lines: InvoiceLine[]; totals: DocumentTotals }> {
  if (wanted === null) {
    return ok({
      lines: s.lines.map((l) => ({ ...l, unitPriceMinor: -l.unitPriceMinor || 0, amountMinor: -l.amountMinor || 0 })),
      totals: mirrorTotals(s.totals),
    });
  }
  const lines: InvoiceLine[] = [];
  for (const [i, w] of wanted.entries()) {
    const line = s.lines.find((l) => l.id === w.lineId);
    if (!line) return refuse("LINE_UNKNOWN", "This line is not on the invoice.", { field: `lines.${i}.amount` });
    if (w.amount > line.amountMinor) return refuse("CREDIT_EXCEEDS_LINE", "More than the line itself cannot be credited.", { field: `lines.${i}.amount`, data: { leftMinor: line.amountMinor } });
    const whole = w.amount === line.amountMinor;
    lines.push({ ...line, lineNo: i + 1, qtyMilli: whole ? line.qtyMilli : 1000, unitPriceMinor: whole ? -line.unitPriceMinor : -w.amount, amountMinor: -w.amount });
  }
  const { rules } = s;
  const totals = documentTotals({
    lines: lines.map((l) => ({ kind: l.kind, amountMinor: minor(l.amountMinor), taxCode: taxCodeOf(l.kind, rules) })),
    laborDiscountBp: s.laborDiscountBp, supplies: null,
    taxes: { S: { category: "S", percent: rules.taxRateText }, N: { category: rules.exemptBy === null ? "Z" : "E", percent: "0" } }, taxBasis: rules.taxBasis,
  });
  return totals.ok ? ok({ lines, totals: totals.value }) : totals;
}

/** What a credit note takes back, as a positive sum. */
export const creditedSum = (t: DocumentTotals): Minor => minor(0 - t.totalMinor);
