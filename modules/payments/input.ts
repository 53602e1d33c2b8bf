import { z } from "@/modules/kernel/zod";
import { holdsCardNumber } from "@/modules/kernel/card-number";
import { parseMinor } from "@/modules/kernel/money";
import { PAYMENT_METHODS } from "./domain/payment-words";

const CARD = "This looks like a card number. Card numbers are never written down here; take cards at the payment page.";
const words = (max: number) => z.string().trim().max(max, `At most ${max} characters.`).refine((s) => !holdsCardNumber(s), CARD);

/** An amount as typed, more than 0, at most two decimals; refused, never rounded. */
const amountText = z.string().trim().transform((text, ctx) => {
  const value = parseMinor(text);
  if (value === null) {
    ctx.addIssue({ code: "custom", message: "Type an amount such as 1,910.33, with at most two decimals." });
    return z.NEVER;
  }
  if (value <= 0) ctx.addIssue({ code: "custom", message: "Type an amount above 0." });
  return value;
});

/** Money taken at the counter, against an invoice or as deposit of an order. */
export const takePaymentInput = z.strictObject({
  invoiceId: z.uuid().nullish(),
  workOrderId: z.uuid().nullish(),
  method: z.enum(PAYMENT_METHODS).exclude(["card"], "Cards are taken at the payment page, by link."),
  amount: amountText,
  /** Check number, name of the bank. */
  note: words(120).default(""),
  /** Yes to the question about a large sum or a check number used before. */
  confirmed: z.boolean().default(false),
}).refine((i) => Boolean(i.invoiceId) !== Boolean(i.workOrderId), { error: "Choose the invoice or the order that is paid.", path: ["invoiceId"] });

export const startPaymentInput = z.strictObject({});
export const askPaymentInput = z.strictObject({ invoiceId: z.uuid() });

export const askRefundInput = z.strictObject({ paymentId: z.uuid(), amount: amountText, reason: words(240).min(3, "Say why, in a few words.") });
export const answerRefundInput = z.strictObject({ refundId: z.uuid(), accept: z.boolean() });
export const eventInput = z.strictObject({ eventId: z.string().min(1).max(255) });
export const closeEventInput = eventInput.extend({ reason: words(240).min(3, "Say what was found, in a few words.") });
export const explainItemInput = z.strictObject({ itemId: z.uuid(), invoiceId: z.uuid() });
