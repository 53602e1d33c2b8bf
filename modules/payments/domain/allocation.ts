import { minor, type Minor } from "@/modules/kernel/money";
import { ok, refuse, type Result } from "@/modules/kernel/result";

export interface OpenDocument {
  readonly documentId: string;
  /** `YYYY-MM-DD`. */
  readonly due: string;
  readonly openMinor: Minor;
}

export interface Allocation {
  readonly applied: readonly { readonly documentId: string; readonly amountMinor: Minor }[];
  /** More than everything open: becomes a customer credit. */
  readonly creditMinor: Minor;
}

/**
 * Spreads a payment over open documents: those the payer named first, in that order, then the oldest due date.
 * Refuses `AMOUNT_NOT_POSITIVE`, `DOCUMENT_NOT_OPEN` for a named one that is not open.
 */
export function allocatePayment(amountMinor: Minor, open: readonly OpenDocument[], named: readonly string[] = []): Result<Allocation> {
  if (amountMinor <= 0) return refuse("AMOUNT_NOT_POSITIVE", "A payment is more than 0.", { field: "amount" });
  const owed = open.filter((d) => d.openMinor > 0);
  const missing = named.findIndex((id) => !owed.some((d) => d.documentId === id));
  if (missing !== -1) return refuse("DOCUMENT_NOT_OPEN", "This document is not open any more. Choose an open one.", { field: `named.${missing}` });
  const rank = (d: OpenDocument) => (named.includes(d.documentId) ? named.indexOf(d.documentId) : named.length);
  const queue = owed.map((d, i) => ({ d, i })).sort((a, b) => rank(a.d) - rank(b.d) || a.d.due.localeCompare(b.d.due) || a.i - b.i);
  let left: number = amountMinor;
  const applied: { documentId: string; amountMinor: Minor }[] = [];
  for (const { d } of queue) {
    const part = Math.min(left, d.openMinor);
    if (part <= 0) break;
    applied.push({ documentId: d.documentId, amountMinor: minor(part) });
    left -= part;
  }
  return ok({ applied, creditMinor: minor(left) });
}

/** Ten times the open sum is asked about before it is booked: a slipped decimal point, as a rule. */
export const isUnusuallyLarge = (amountMinor: Minor, openMinor: Minor): boolean => openMinor > 0 && amountMinor > 10 * openMinor;
