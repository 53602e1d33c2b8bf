import { type Minor } from "@/modules/kernel/money";
import { type AccountCode } from "./accounts";
import { type DocumentTotals } from "./document-totals";
import { credit, debit, entryOf, mirror, type EntryLine } from "./entry";

/** Where money comes in or goes out. */
export const MONEY_WAYS = ["card", "bank", "cash"] as const;
export type MoneyWay = (typeof MONEY_WAYS)[number];

const ACCOUNT_OF_WAY = { card: "1020", bank: "1010", cash: "1000" } as const satisfies Record<MoneyWay, AccountCode>;

/** A deposit is a debt to the customer until the invoice takes it. Dr clearing, bank or drawer / Cr customer deposits. */
export const depositReceived = (p: { readonly amountMinor: Minor; readonly way: MoneyWay }): EntryLine[] =>
  entryOf(debit(ACCOUNT_OF_WAY[p.way], p.amountMinor), credit("2100", p.amountMinor));

/**
 * An issued invoice: Dr receivable and discounts / Cr income at gross and tax. An invoice of 0.00 (warranty) has no
 * lines and posts nothing.
 */
export const invoiceIssued = (t: DocumentTotals): EntryLine[] =>
  entryOf(
    debit("1100", t.totalMinor),
    debit("4900", t.discountMinor),
    credit("4000", t.laborMinor),
    credit("4100", t.partsMinor),
    credit("4150", t.suppliesMinor),
    credit("4200", t.freightMinor),
    credit("4300", t.outsideMinor),
    credit("4400", t.coreMinor),
    credit("2200", t.taxMinor),
  );

/** A credit note turns the signs of what it takes back. */
export const creditNote = (invoiceLines: readonly EntryLine[]): EntryLine[] => mirror(invoiceLines);

/** Dr customer deposits / Cr receivable. */
export const depositApplied = (p: { readonly amountMinor: Minor }): EntryLine[] =>
  entryOf(debit("2100", p.amountMinor), credit("1100", p.amountMinor));

/** Dr clearing, bank or drawer / Cr receivable. */
export const paymentReceived = (p: { readonly amountMinor: Minor; readonly way: MoneyWay }): EntryLine[] =>
  entryOf(debit(ACCOUNT_OF_WAY[p.way], p.amountMinor), credit("1100", p.amountMinor));

/** What was paid over the open sum moves from receivable to the customer's credit. Dr receivable / Cr customer credits. */
export const overpaymentCredited = (p: { readonly amountMinor: Minor }): EntryLine[] =>
  entryOf(debit("1100", p.amountMinor), credit("2110", p.amountMinor));

/** A credit used on a later invoice. Dr customer credits / Cr receivable. */
export const creditUsed = (p: { readonly amountMinor: Minor }): EntryLine[] =>
  entryOf(debit("2110", p.amountMinor), credit("1100", p.amountMinor));

/** What a refund gives back: an unused deposit, a credit, or a payment (reopening the receivable). */
export const REFUND_SOURCES = ["deposit", "credit", "payment"] as const;
export type RefundSource = (typeof REFUND_SOURCES)[number];
const ACCOUNT_OF_SOURCE = { deposit: "2100", credit: "2110", payment: "1100" } as const satisfies Record<RefundSource, AccountCode>;

/** Money back the way it came. The fee of the first charge is not returned. */
export const refunded = (p: { readonly amountMinor: Minor; readonly way: MoneyWay; readonly from: RefundSource }): EntryLine[] =>
  entryOf(debit(ACCOUNT_OF_SOURCE[p.from], p.amountMinor), credit(ACCOUNT_OF_WAY[p.way], p.amountMinor));

/** A balance nobody will pay. Dr bad debt / Cr receivable. */
export const writtenOff = (p: { readonly amountMinor: Minor }): EntryLine[] =>
  entryOf(debit("6200", p.amountMinor), credit("1100", p.amountMinor));
