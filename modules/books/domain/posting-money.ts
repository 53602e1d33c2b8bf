import { type Minor } from "@/modules/kernel/money";
import { credit, debit, entryOf, type EntryLine } from "./entry";

/**
 * A payout reaches the bank: what was in clearing (charges less refunds and disputes already booked there) less the
 * fees. Dr bank, payment fees / Cr card clearing.
 */
export const payoutSettled = (p: { readonly clearedMinor: Minor; readonly feesMinor: Minor }): EntryLine[] =>
  entryOf(debit("1010", p.clearedMinor - p.feesMinor), debit("6100", p.feesMinor), credit("1020", p.clearedMinor));

/** Cash taken to the bank. Dr bank / Cr drawer. */
export const cashBanked = (p: { readonly amountMinor: Minor }): EntryLine[] =>
  entryOf(debit("1010", p.amountMinor), credit("1000", p.amountMinor));

/** Drawer counted less expected: below 0 when money is missing. Dr/Cr drawer against cash over and short. */
export const drawerDifference = (p: { readonly countedMinor: Minor; readonly expectedMinor: Minor }): EntryLine[] =>
  entryOf(debit("1000", p.countedMinor - p.expectedMinor), debit("6300", p.expectedMinor - p.countedMinor));
