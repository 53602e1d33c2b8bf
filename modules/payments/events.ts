import "server-only";
import { and, asc, eq, sql } from "drizzle-orm";
import { paymentRequests, payments, providerEvents, shops } from "@/db/schema";
import { withSecret, withShop, withSystem } from "@/db/scope";
import { now } from "@/modules/access/clock";
import { logFault } from "@/modules/access/fault";
import { leaveJob } from "@/modules/access/jobs";
import { isUuid } from "@/modules/kernel/id";
import type { Payout, ProviderEvent, ProviderFact } from "@/modules/outbound/payments/port";
import { paymentPort, systemContext } from "./provider";

/** How an event is kept: as it was understood, and the provider's own words beside it. */
export interface KeptEvent { readonly event: ProviderEvent; readonly raw: unknown }

export const UNKNOWN_PAGE = "Nobody here asked for this payment: its page was not made by this shop.";
export const UNKNOWN_PAYMENT = "The payment this is about is not in the books yet.";

/** The shop of a payment of the provider, through the one row that holds its number. */
export const shopOfPayment = (paymentIntent: string): Promise<string | null> => withSecret({ providerSession: paymentIntent }, async (tx) => {
  const [row] = await tx.select({ shopId: payments.shopId }).from(payments).where(eq(payments.providerPaymentId, paymentIntent));
  return row?.shopId ?? null;
});

const shopOfSession = (session: string): Promise<string | null> => withSecret({ providerSession: session }, async (tx) => {
  const [row] = await tx.select({ shopId: paymentRequests.shopId }).from(paymentRequests).where(eq(paymentRequests.providerSessionId, session));
  return row?.shopId ?? null;
});

/** A payout names no shop: a shop of its currency takes up the job and hands it on once the charges inside are known. */
async function carrierOf(payout: Payout): Promise<string | null> {
  const [row] = await withSystem("a payout names no shop", (tx) => tx.select({ id: shops.id }).from(shops).where(eq(shops.currency, payout.currency)).orderBy(asc(shops.createdAt)).limit(1));
  return row?.id ?? null;
}

/** Where an event belongs, by what we stored ourselves. */
async function placeOf(fact: ProviderFact): Promise<{ shopId: string | null; why: string }> {
  switch (fact.kind) {
    case "checkout": return { shopId: await shopOfSession(fact.session.id), why: UNKNOWN_PAGE };
    case "refunded": case "dispute": return { shopId: fact.paymentIntent ? await shopOfPayment(fact.paymentIntent) : null, why: UNKNOWN_PAYMENT };
    case "refund": return { shopId: fact.refund.paymentIntent ? await shopOfPayment(fact.refund.paymentIntent) : null, why: UNKNOWN_PAYMENT };
    case "payout": return { shopId: await carrierOf(fact.payout), why: "No shop here works in the currency of this payout." };
    case "other": return { shopId: null, why: "" };
  }
}

/** The shop named in our own note on the charge. It only says on whose list an unknown event is shown; nothing is booked by it. */
async function notedShop(raw: unknown): Promise<string | null> {
  const id = (raw as { data?: { object?: { metadata?: { shop?: unknown } } } } | null)?.data?.object?.metadata?.shop;
  if (typeof id !== "string" || !isUuid(id)) return null;
  const [row] = await withSystem("whose list an unknown event is shown on", (tx) => tx.select({ id: shops.id }).from(shops).where(eq(shops.id, id)));
  return row?.id ?? null;
}

/**
 * Keeps an event before anything is done with it, and leaves the work to the worker, in one transaction. Coming twice it
 * is counted, not repeated. An event nobody knows is set aside with a plain reason.
 */
export async function keepEvent(event: ProviderEvent, raw: unknown): Promise<void> {
  const body: KeptEvent = { event, raw };
  if (event.fact.kind === "other") {
    await withSystem("kinds we have no use for are kept, nothing else", (tx) => tx.insert(providerEvents)
      .values({ id: event.id, type: event.type, body, receivedAt: now(), doneAt: now() })
      .onConflictDoUpdate({ target: providerEvents.id, set: { timesSeen: sql`${providerEvents.timesSeen} + 1` } }));
    return;
  }
  const place = await placeOf(event.fact);
  if (!place.shopId) {
    const shopId = await notedShop(raw);
    await withSystem("an event nobody knows", (tx) => tx.insert(providerEvents)
      .values({ id: event.id, type: event.type, body, shopId, receivedAt: now(), parkedReason: place.why })
      .onConflictDoUpdate({ target: providerEvents.id, set: { timesSeen: sql`${providerEvents.timesSeen} + 1` } }));
    return;
  }
  const ctx = await systemContext(place.shopId);
  await withShop(ctx.shop.id, async (tx) => {
    const [row] = await tx.insert(providerEvents).values({ id: event.id, type: event.type, body, shopId: ctx.shop.id, receivedAt: ctx.now })
      .onConflictDoUpdate({ target: providerEvents.id, set: { timesSeen: sql`${providerEvents.timesSeen} + 1` } }).returning({ doneAt: providerEvents.doneAt, parked: providerEvents.parkedReason });
    if (row?.doneAt) return;
    // Set aside before, placed now: it is tried again under a new key.
    if (row?.parked) await tx.update(providerEvents).set({ parkedReason: null, shopId: ctx.shop.id }).where(eq(providerEvents.id, event.id));
    await leaveJob({ ...ctx, tx }, "payments.settleEvent", { eventId: event.id }, { dedupeKey: row?.parked ? `${event.id}:${ctx.now.getTime()}` : event.id });
  });
}

/**
 * The provider's webhook: taken only when the provider signed exactly these bytes a moment ago.
 * @returns the HTTP status to answer
 */
export async function receiveEvent(body: Uint8Array, signature: string | null): Promise<200 | 400 | 503> {
  const event = paymentPort().verifyEvent(body, signature);
  if (!event.ok) {
    if (event.refusal.code === "payment_event") logFault("webhook", new Error(event.refusal.message));
    return 400;
  }
  try {
    await keepEvent(event.value, JSON.parse(Buffer.from(body).toString("utf8")));
    return 200;
  } catch (error) {
    // The provider sends it again later; nothing was taken.
    logFault("webhook", error, { event: event.value.id });
    return 503;
  }
}

/** An event as kept, dates made dates again where they are used. Null when it is done. */
export async function openEvent(eventId: string): Promise<KeptEvent | null> {
  const [row] = await withSystem("an event to work on", (tx) => tx.select({ body: providerEvents.body, doneAt: providerEvents.doneAt }).from(providerEvents).where(eq(providerEvents.id, eventId)));
  return row && !row.doneAt ? (row.body as KeptEvent) : null;
}

export const setAside = (shopId: string, eventId: string, reason: string) => withShop(shopId, (tx) => tx.update(providerEvents)
  .set({ parkedReason: reason, shopId }).where(and(eq(providerEvents.id, eventId), sql`${providerEvents.doneAt} is null`)));
