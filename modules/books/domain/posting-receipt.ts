import { minor, type Minor } from "@/modules/kernel/money";
import { credit, debit, entryOf, mirror, type EntryLine } from "./entry";
import type { MoneyWay } from "./posting-sales";

const ACCOUNT_OF_WAY = { card: "1020", bank: "1010", cash: "1000" } as const;

/** What one sum of money did: held as deposit, taken off the receivable, kept as the customer's credit. Each 0 or more. */
export interface MoneyParts {
  readonly depositMinor: Minor;
  readonly receivableMinor: Minor;
  readonly creditMinor: Minor;
}

/** Money in: Dr clearing, bank or drawer / Cr customer deposits, receivable, customer credits. */
export const moneyReceived = (p: MoneyParts & { readonly way: MoneyWay }): EntryLine[] =>
  entryOf(
    debit(ACCOUNT_OF_WAY[p.way], p.depositMinor + p.receivableMinor + p.creditMinor),
    credit("2100", p.depositMinor),
    credit("1100", p.receivableMinor),
    credit("2110", p.creditMinor),
  );

/**
 * Where a refund is taken from: first the credit, then a deposit not yet used, then the payment itself, which opens the
 * receivable again. `wantedMinor` above all three together leaves the rest in `missingMinor`.
 */
export function refundParts(p: { readonly wantedMinor: number; readonly creditMinor: number; readonly depositMinor: number; readonly paidMinor: number }): MoneyParts & { readonly missingMinor: Minor } {
  const creditMinor = minor(Math.max(0, Math.min(p.wantedMinor, p.creditMinor)));
  const depositMinor = minor(Math.max(0, Math.min(p.wantedMinor - creditMinor, p.depositMinor)));
  const receivableMinor = minor(Math.max(0, Math.min(p.wantedMinor - creditMinor - depositMinor, p.paidMinor)));
  return { creditMinor, depositMinor, receivableMinor, missingMinor: minor(p.wantedMinor - creditMinor - depositMinor - receivableMinor) };
}

/**
 * Where money goes that comes back after a dispute is won: to the invoice as far as it is open, to the deposit it was
 * taken from, the rest is the customer's credit.
 */
export function restoredParts(p: { readonly amountMinor: number; readonly openMinor: number; readonly depositMinor: number }): MoneyParts {
  const receivableMinor = minor(Math.max(0, Math.min(p.amountMinor, p.openMinor)));
  const depositMinor = minor(Math.max(0, Math.min(p.amountMinor - receivableMinor, p.depositMinor)));
  return { receivableMinor, depositMinor, creditMinor: minor(p.amountMinor - receivableMinor - depositMinor) };
}

/** Money back the way it came: the receipt turned round. */
export const moneyReturned = (p: MoneyParts & { readonly way: MoneyWay }): EntryLine[] =>
  mirror(moneyReceived(p));

/**
 * One line of a payout reaching the bank: gross leaves clearing, the fee is kept by the provider.
 * Dr bank, fees / Cr card clearing; a refund inside a payout has negative amounts.
 */
export const payoutLine = (p: { readonly grossMinor: number; readonly feeMinor: number; readonly isDispute: boolean }): EntryLine[] =>
  entryOf(debit("1010", p.grossMinor - p.feeMinor), debit(p.isDispute ? "6150" : "6100", p.feeMinor), credit("1020", p.grossMinor));
