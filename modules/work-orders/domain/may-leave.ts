import type { Terms } from "@/modules/customers/domain/terms";

export interface OrderMoney {
  readonly agreedMinor: number;
  /** Total of issued invoices less credit notes. */
  readonly invoicedMinor: number;
  readonly invoices: number;
  /** Deposits held and not yet applied. */
  readonly depositHeldMinor: number;
  /** Open on issued invoices. */
  readonly openMinor: number;
}

/** Still to pay on an order: what is open on invoices, or before the first one the agreed sum less the deposit held. */
export const leftToPay = (m: OrderMoney): number => (m.invoices > 0 ? m.openMinor : Math.max(0, m.agreedMinor - m.depositHeldMinor));

/**
 * May a piece leave? Null when it may; else the sum that stands in the way. Customers with terms may take it once the
 * invoice is issued; the rest pay first.
 */
export function owedBeforeLeaving(m: OrderMoney, terms: Terms): number | null {
  const left = leftToPay(m);
  if (left <= 0) return null;
  return terms !== "receipt" && m.invoices > 0 ? null : left;
}
