import { z } from "@/modules/kernel/zod";
import { PaymentFailure, type BalanceTransaction, type CheckoutSession, type Payout, type ProviderEvent, type ProviderFact, type Refund } from "./port";

/** The provider's answers are outside data: nothing in them is used before it has been checked here. */
const amount = z.int();
const seconds = z.int().min(0).transform((s) => new Date(s * 1000));
const currency = z.string().regex(/^[A-Za-z]{3}$/).transform((c) => c.toUpperCase());
const id = z.string().min(1).max(255);
const metadata = z.record(z.string().max(40), z.string().max(500)).nullish().transform((m) => m ?? {});
/** An id, or the object itself when it was asked to be expanded. */
const reference = z.union([id, z.object({ id })]).nullish().transform((r) => (r == null ? null : typeof r === "string" ? r : r.id));

const session = z
  .object({
    id,
    object: z.literal("checkout.session"),
    url: z.url({ protocol: /^https?$/ }).nullable(),
    status: z.enum(["open", "complete", "expired"]),
    payment_status: z.enum(["paid", "unpaid", "no_payment_required"]),
    amount_total: amount,
    currency,
    client_reference_id: z.string().max(200).nullable(),
    payment_intent: reference,
    metadata,
    expires_at: seconds,
  })
  .transform((s): CheckoutSession => ({
    id: s.id, url: s.url, status: s.status, paymentStatus: s.payment_status, amountMinor: s.amount_total, currency: s.currency,
    reference: s.client_reference_id, paymentIntent: s.payment_intent, metadata: s.metadata, expiresAt: s.expires_at,
  }));

const refund = z
  .object({
    id,
    object: z.literal("refund"),
    status: z.enum(["pending", "requires_action", "succeeded", "failed", "canceled"]),
    amount,
    currency,
    payment_intent: reference,
  })
  .transform((r): Refund => ({ id: r.id, status: r.status, amountMinor: r.amount, currency: r.currency, paymentIntent: r.payment_intent }));

const payout = z
  .object({
    id,
    object: z.literal("payout"),
    status: z.enum(["pending", "in_transit", "paid", "failed", "canceled"]),
    amount,
    currency,
    arrival_date: seconds,
    created: seconds,
  })
  .transform((p): Payout => ({
    id: p.id, status: p.status, amountMinor: p.amount, currency: p.currency,
    arrivalDate: p.arrival_date.toISOString().slice(0, 10), createdAt: p.created,
  }));

const source = z.union([id, z.object({ id, payment_intent: reference })]).nullish();

const balanceTransaction = z
  .object({
    id,
    object: z.literal("balance_transaction"),
    type: z.string(),
    amount,
    fee: amount,
    net: amount,
    currency,
    source,
    created: seconds,
  })
  .refine((t) => t.amount - t.fee === t.net, "net is not gross less fee")
  .transform((t): BalanceTransaction => ({
    id: t.id, kind: t.type, grossMinor: t.amount, feeMinor: t.fee, netMinor: t.net, currency: t.currency,
    source: t.source == null ? null : typeof t.source === "string" ? t.source : t.source.id,
    paymentIntent: t.source == null || typeof t.source === "string" ? null : t.source.payment_intent,
    createdAt: t.created,
  }));

const charge = z.object({ id, object: z.literal("charge"), amount_refunded: amount, currency, payment_intent: reference });
const dispute = z.object({
  id, object: z.literal("dispute"), status: z.string(), amount, currency, payment_intent: reference, evidence_details: z.object({ due_by: seconds.nullish() }).nullish(),
});

const envelope = z.object({
  id,
  object: z.literal("event"),
  type: z.string().min(1).max(100),
  created: seconds,
  livemode: z.boolean(),
  data: z.object({ object: z.looseObject({ object: z.string() }) }),
});

function parsed<T>(schema: z.ZodType<T>, value: unknown, what: string): T {
  const result = schema.safeParse(value);
  if (result.success) return result.data;
  const where = result.error.issues.map((i) => `${i.path.join(".") || "whole"}: ${i.message}`).join("; ");
  throw new PaymentFailure("answer", `The payment provider's ${what} is not as promised (${where}).`, null, { cause: result.error });
}

export const readSession = (value: unknown): CheckoutSession => parsed(session, value, "checkout session");
export const readRefund = (value: unknown): Refund => parsed(refund, value, "refund");
export const readPayout = (value: unknown): Payout => parsed(payout, value, "payout");
export const readBalanceTransaction = (value: unknown): BalanceTransaction => parsed(balanceTransaction, value, "balance line");

function factOf(type: string, object: unknown): ProviderFact {
  if (type.startsWith("checkout.session.")) return { kind: "checkout", session: readSession(object) };
  if (type === "charge.refunded") {
    const c = parsed(charge, object, "charge");
    return { kind: "refunded", paymentIntent: c.payment_intent, refundedMinor: c.amount_refunded, currency: c.currency };
  }
  if (type.startsWith("charge.dispute.")) {
    const d = parsed(dispute, object, "dispute");
    return { kind: "dispute", id: d.id, paymentIntent: d.payment_intent, status: d.status, amountMinor: d.amount, currency: d.currency, evidenceBy: d.evidence_details?.due_by ?? null };
  }
  if (type.startsWith("refund.")) return { kind: "refund", refund: readRefund(object) };
  if (type.startsWith("payout.") && type !== "payout.reconciliation_completed") return { kind: "payout", payout: readPayout(object) };
  return { kind: "other" };
}

/** @throws PaymentFailure of kind `answer` */
export function readEvent(value: unknown): ProviderEvent {
  const e = parsed(envelope, value, "event");
  return { id: e.id, type: e.type, createdAt: e.created, live: e.livemode, fact: factOf(e.type, e.data.object) };
}
