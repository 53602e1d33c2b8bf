import { type Minor } from "@/modules/kernel/money";
import { type AccountCode } from "./accounts";
import { credit, debit, entryOf, mirror, type EntryLine } from "./entry";

/** Goods in at landed value, the bill still to come. Dr parts stock / Cr goods received not invoiced. */
export const goodsReceived = (p: { readonly landedMinor: Minor }): EntryLine[] =>
  entryOf(debit("1200", p.landedMinor), credit("2050", p.landedMinor));

/**
 * The supplier's bill for a receipt: the received value is cleared, a price difference goes to stock and variance.
 * Dr goods received not invoiced, stock, variance / Cr payable.
 */
export const supplierBilled = (p: {
  readonly receivedMinor: Minor;
  readonly toStockMinor: Minor;
  readonly toVarianceMinor: Minor;
}): EntryLine[] =>
  entryOf(
    debit("2050", p.receivedMinor),
    debit("1200", p.toStockMinor),
    debit("5050", p.toVarianceMinor),
    credit("2000", p.receivedMinor + p.toStockMinor + p.toVarianceMinor),
  );

/** What parts are taken for: a customer's work order, a warranty job, the shop's own development, or the scrap bin. */
export const ISSUE_PURPOSES = ["work order", "warranty", "development", "scrap"] as const;
export type IssuePurpose = (typeof ISSUE_PURPOSES)[number];
const ACCOUNT_OF_PURPOSE = {
  "work order": "1250",
  warranty: "5300",
  development: "5500",
  scrap: "5400",
} as const satisfies Record<IssuePurpose, AccountCode>;

/** Dr work in process (or the expense of the purpose) / Cr parts stock. */
export const partsIssued = (p: { readonly costMinor: Minor; readonly purpose?: IssuePurpose }): EntryLine[] =>
  entryOf(debit(ACCOUNT_OF_PURPOSE[p.purpose ?? "work order"], p.costMinor), credit("1200", p.costMinor));

/** Unused parts back at the cost they left at: the issue, turned round. */
export const partsReturned = (p: { readonly costMinor: Minor; readonly purpose?: IssuePurpose }): EntryLine[] =>
  mirror(partsIssued(p));

/** Parts of an invoiced job become its cost. Dr cost of parts / Cr work in process. */
export const costOfParts = (p: { readonly costMinor: Minor }): EntryLine[] =>
  entryOf(debit("5000", p.costMinor), credit("1250", p.costMinor));

/** Dr freight out / Cr payable. */
export const carrierBill = (p: { readonly amountMinor: Minor }): EntryLine[] =>
  entryOf(debit("5200", p.amountMinor), credit("2000", p.amountMinor));

/** An outside service's bill. Dr outside service cost / Cr payable. */
export const outsideBill = (p: { readonly amountMinor: Minor }): EntryLine[] =>
  entryOf(debit("5100", p.amountMinor), credit("2000", p.amountMinor));

/** Paying what is owed. Dr payable / Cr bank. */
export const billPaid = (p: { readonly amountMinor: Minor }): EntryLine[] =>
  entryOf(debit("2000", p.amountMinor), credit("1010", p.amountMinor));

/** Found less (negative) or more (positive) than the ledger says. Dr/Cr parts stock against count differences. */
export const countDifference = (p: { readonly differenceMinor: Minor }): EntryLine[] =>
  entryOf(debit("1200", p.differenceMinor), credit("5400", p.differenceMinor));

/** Stock a shop begins with. Dr parts stock / Cr equity. */
export const openingStock = (p: { readonly valueMinor: Minor }): EntryLine[] =>
  entryOf(debit("1200", p.valueMinor), credit("3000", p.valueMinor));
