import { documentNumbersIn } from "@/modules/books/domain/document-number";
import { creditorReferencesIn, readCreditorReference } from "@/modules/invoices/domain/creditor-reference";
import { type Minor } from "@/modules/kernel/money";

/** A booked line of a bank statement. Money in is positive. */
export interface BankLine {
  readonly amountMinor: Minor;
  readonly text: string;
  /** The structured creditor reference, when the bank passes one on. */
  readonly reference: string | null;
}

export interface PayableDocument {
  readonly documentId: string;
  /** As printed, `INV-2026-00318`. */
  readonly number: string;
  /** Compact creditor reference. */
  readonly reference: string;
  readonly openMinor: Minor;
}

export type OfferReason = "reference, other amount" | "document number in the text" | "same amount only";

export type BankMatch =
  /** The only kind that may be booked without a person. */
  | { readonly kind: "matched"; readonly documentId: string }
  | { readonly kind: "offered"; readonly why: OfferReason; readonly documentIds: readonly string[]; readonly differenceMinor: number | null }
  | { readonly kind: "unknown" };

/**
 * Finds what a bank line pays, in this order: a valid creditor reference that is open with the same amount is matched;
 * reference with another amount, document number in the text, and equal amount are only offered. Nothing is booked by
 * itself without a reference. Two different references in one line are offered, never matched.
 */
export function matchBankLine(line: BankLine, documents: readonly PayableDocument[]): BankMatch {
  if (line.amountMinor <= 0) return { kind: "unknown" };
  const open = documents.filter((d) => d.openMinor > 0);
  const structured = line.reference === null ? null : readCreditorReference(line.reference);
  const references = structured ? [structured] : creditorReferencesIn(line.text);
  const byReference = open.filter((d) => references.includes(d.reference));
  const [only] = byReference;
  if (only && byReference.length === 1 && references.length === 1 && only.openMinor === line.amountMinor) {
    return { kind: "matched", documentId: only.documentId };
  }
  if (only) return offer("reference, other amount", byReference, line);
  const numbers = documentNumbersIn(line.text);
  const byNumber = open.filter((d) => numbers.includes(d.number));
  if (byNumber.length > 0) return offer("document number in the text", byNumber, line);
  const byAmount = open.filter((d) => d.openMinor === line.amountMinor);
  return byAmount.length > 0 ? offer("same amount only", byAmount, line) : { kind: "unknown" };
}

/** `differenceMinor`: paid less the open sum of all offered, null when the offers are alternatives. */
const offer = (why: OfferReason, documents: readonly PayableDocument[], line: BankLine): BankMatch => ({
  kind: "offered",
  why,
  documentIds: documents.map((d) => d.documentId),
  differenceMinor:
    why === "same amount only" && documents.length > 1
      ? null
      : line.amountMinor - documents.reduce((sum, d) => sum + d.openMinor, 0),
});
