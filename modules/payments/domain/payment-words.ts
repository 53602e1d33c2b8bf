import type { MoneyWay } from "@/modules/books/domain/posting-sales";

export const PAYMENT_METHODS = ["card", "cash", "cheque", "transfer"] as const;
export type PaymentMethod = (typeof PAYMENT_METHODS)[number];
export const METHOD_WORDS: Record<PaymentMethod, string> = { card: "card", cash: "cash", cheque: "check", transfer: "bank transfer" };
/** Which account the money came into. */
export const WAY_OF_METHOD: Record<PaymentMethod, MoneyWay> = { card: "card", cash: "cash", cheque: "bank", transfer: "bank" };

/** What a payment was for once it was booked. `credit`: nothing was due. `undone`: a bank match taken back. */
export type PaymentPurpose = "deposit" | "invoice" | "credit" | "undone";

export type RequestState = "new" | "ready" | "paid" | "expired" | "replaced";
export type RefundState = "asked" | "accepted" | "sent" | "done" | "failed" | "declined";
