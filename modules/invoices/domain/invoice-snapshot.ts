import type { DocumentTotals } from "@/modules/books/domain/document-totals";
import type { DocumentRules } from "@/modules/work-orders/domain/document-rules";
import type { PieceGain } from "./gain-block";

/** The rules an issued document was made by; a later change of the arithmetic gets another name. */
export const RULE_SET = "2026-1";

export type InvoiceState = "draft" | "issued" | "dropped";
export type InvoiceKind = "invoice" | "credit";
export type InvoiceLineKind = "labor" | "part" | "outside" | "freight" | "supplies" | "discount" | "core" | "note";

export interface InvoiceLine {
  readonly id: string;
  readonly lineNo: number;
  readonly kind: InvoiceLineKind;
  readonly pieceTag: string;
  readonly description: string;
  readonly qtyMilli: number;
  readonly unitPriceMinor: number;
  readonly amountMinor: number;
  readonly bookMinutes: number;
  readonly actualMinutes: number;
}

export interface InvoicePiece {
  readonly tag: string;
  readonly family: string;
  readonly castingNumber: string;
  readonly serial: string;
  readonly released: boolean;
  readonly gain: PieceGain;
}

/** Everything an invoice or a credit note prints; frozen at issue with the rules it was made by. */
export interface InvoiceSnapshot {
  readonly kind: InvoiceKind;
  readonly ruleSet: string;
  /** Null while a draft. */
  readonly number: string | null;
  readonly date: string;
  readonly supplyOn: string;
  readonly dueOn: string;
  readonly terms: string;
  readonly currency: string;
  readonly locale: string;
  readonly zone: string;
  readonly shop: { readonly name: string; readonly address: string; readonly phone: string; readonly email: string; readonly taxNumber: string };
  readonly customer: { readonly name: string; readonly address: string; readonly email: string; readonly taxNumber: string };
  readonly customerReference: string;
  readonly orderNumber: string;
  readonly pieces: readonly InvoicePiece[];
  readonly lines: readonly InvoiceLine[];
  readonly laborDiscountBp: number;
  readonly rules: DocumentRules;
  readonly totals: DocumentTotals;
  readonly deposit: { readonly appliedMinor: number; readonly on: string | null };
  readonly balanceMinor: number;
  /** Compact creditor reference; null for drafts and credit notes. */
  readonly reference: string | null;
  readonly approvals: readonly { readonly version: number; readonly totalMinor: number; readonly name: string; readonly on: string; readonly via: string }[];
  readonly refused: readonly { readonly words: string; readonly on: string }[];
  readonly words: string;
  readonly credits: { readonly number: string; readonly reason: string } | null;
}
