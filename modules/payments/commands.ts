import "server-only";
import { randomUUID } from "node:crypto";
import { and, arrayOverlaps, eq, inArray, isNull, ne, sql } from "drizzle-orm";
import { invoices, payments, payoutItems, people, providerEvents, refunds } from "@/db/schema";
import { withShop } from "@/db/scope";
import { defineCommand } from "@/modules/access/command";
import { personIdOf, type ShopContext, type TxContext } from "@/modules/access/context";
import { leaveJob } from "@/modules/access/jobs";
import { rolesFor } from "@/modules/access/roles";
import { openOf } from "@/modules/books/domain/open-sum";
import { money } from "@/modules/kernel/format";
import { minor } from "@/modules/kernel/money";
import { ok, refuse, type Result } from "@/modules/kernel/result";
import { PaymentFailure } from "@/modules/outbound/payments/port";
import { depositOf } from "@/modules/work-orders/queries/deposit";
import { bookPayment } from "./book-payment";
import { isUnusuallyLarge } from "./domain/allocation";
import { answerRefundInput, askPaymentInput, askRefundInput, closeEventInput, eventInput, explainItemInput, startPaymentInput, takePaymentInput } from "./input";
import { askForPayment, type AskedPayment, type PayFor } from "./payment-page";
import { bookPayout } from "./payouts";
import { paymentPort } from "./provider";
import { disputedOf, lockPayment } from "./payment-parts";
import { bookRefund } from "./refund-ledger";

/** Cash, a check or a transfer taken by a person. The first unusual look is asked about; yes books it. */
export const takePayment = defineCommand({
  name: "payments.take",
  act: "payment.take",
  input: takePaymentInput,
  async run(ctx, input) {
    const target = input.invoiceId ? { invoiceId: input.invoiceId } : { workOrderId: input.workOrderId ?? "" };
    if (!input.confirmed) {
      const question = await unusual(ctx, target, input);
      if (question) return question;
    }
    return bookPayment(ctx, { for: target, method: input.method, amountMinor: input.amount, receivedAt: ctx.now, note: input.note });
  },
  subject: (_, value) => ({ kind: "payment", id: value.id }),
});

async function unusual(ctx: TxContext, target: { invoiceId: string } | { workOrderId: string }, input: { amount: number; method: string; note: string }) {
  const { tx, shop } = ctx;
  const [i] = "invoiceId" in target ? await tx.select().from(invoices).where(and(eq(invoices.shopId, shop.id), eq(invoices.id, target.invoiceId))) : [];
  const open = i ? openOf(i) : "workOrderId" in target ? minor((await depositOf(ctx, target.workOrderId))?.openMinor ?? 0) : minor(0);
  if (isUnusuallyLarge(minor(input.amount), open)) {
    return refuse("ASK_LARGE", `${money(input.amount, shop)} is more than ten times the open ${money(open, shop)}. Press again if it is so.`, { field: "amount" });
  }
  if (input.method === "cheque" && input.note) {
    const [twin] = await tx.select({ receipt: payments.receiptNumber }).from(payments).where(and(eq(payments.shopId, shop.id), eq(payments.method, "cheque"), eq(payments.note, input.note), ne(payments.purpose, "undone"))).limit(1);
    if (twin) return refuse("ASK_CHEQUE", `That check number stands on receipt ${twin.receipt} already. Press again if this is another check.`, { field: "note" });
  }
  return null;
}

/** A person of the shop asks for an invoice's open sum: the page is made and its address can be sent. */
export const askInvoicePayment = defineCommand({
  name: "payments.ask",
  act: "payment.take",
  input: askPaymentInput,
  run: (ctx, input) => askForPayment(ctx, { purpose: "invoice", invoiceId: input.invoiceId }),
  subject: (input) => ({ kind: "invoice", id: input.invoiceId }),
});

/** What a customer's link lets them pay: the deposit of its order, or its invoice. Never anything they send. */
async function payForOf(ctx: TxContext): Promise<PayFor | null> {
  if (ctx.actor.kind !== "customer") return null;
  if (ctx.actor.purpose === "invoice") return { purpose: "invoice", invoiceId: ctx.actor.subjectId };
  if (ctx.actor.purpose !== "estimate") return null;
  const { rows } = await ctx.tx.execute<{ work_order_id: string }>(sql`select work_order_id from links where shop_id = ${ctx.shop.id} and id = ${ctx.actor.linkId} and work_order_id is not null`);
  return rows[0] ? { purpose: "deposit", workOrderId: rows[0].work_order_id } : null;
}

export const startPayment = defineCommand({
  name: "payments.start",
  act: "customer.pay",
  input: startPaymentInput,
  async run(ctx): Promise<Result<AskedPayment>> {
    const what = await payForOf(ctx);
    return what ? askForPayment(ctx, what) : refuse("NOT_FOUND", "There is nothing to pay here.");
  },
  subject: (_, value) => ({ kind: "payment-request", id: value.requestId }),
});

/** Is anybody else here who could say yes to a refund? In a shop of one the act is allowed and marked. */
async function hasSecondPerson(ctx: TxContext): Promise<boolean> {
  const me = personIdOf(ctx);
  const rows = await ctx.tx.select({ id: people.id }).from(people).where(and(
    eq(people.shopId, ctx.shop.id), isNull(people.leftAt), arrayOverlaps(people.roles, [...rolesFor("refund")]), me ? ne(people.id, me) : undefined)).limit(1);
  return rows.length > 0;
}

export const askRefund = defineCommand({
  name: "refunds.ask",
  act: "refund",
  input: askRefundInput,
  async run(ctx, input) {
    const p = await lockPayment(ctx, eq(payments.id, input.paymentId));
    if (!p || p.purpose === "undone") return refuse("NOT_FOUND", "This payment is not here.");
    const waiting = await ctx.tx.select({ amountMinor: refunds.amountMinor }).from(refunds).where(and(eq(refunds.shopId, ctx.shop.id), eq(refunds.paymentId, p.id), inArray(refunds.state, ["asked", "accepted", "sent"])));
    const left = p.amountMinor - p.refundedMinor - waiting.reduce((a, r) => a + r.amountMinor, 0);
    const disputed = await disputedOf(ctx, p);
    if (input.amount > left && disputed > 0) return refuse("DISPUTED", `The customer's bank took ${money(disputed, ctx.shop)} of this payment back in a dispute. At most ${money(left, ctx.shop)} of it can still be given back.`, { field: "amount", data: { leftMinor: left } });
    if (input.amount > left) return refuse("REFUND_EXCEEDS_PAYMENT", `At most ${money(left, ctx.shop)} of this payment can still be given back.`, { field: "amount", data: { leftMinor: left } });
    const id = randomUUID();
    await ctx.tx.insert(refunds).values({ shopId: ctx.shop.id, id, paymentId: p.id, amountMinor: input.amount, reason: input.reason, state: "asked", askedBy: personIdOf(ctx), at: ctx.now });
    return ok({ id, amountMinor: input.amount });
  },
  subject: (_, value) => ({ kind: "refund", id: value.id }),
});

/** Accepted by another person than the one who asked; cash and transfers are booked at once, cards go to the provider. */
export const answerRefund = defineCommand({
  name: "refunds.answer",
  act: "refund",
  input: answerRefundInput,
  async run(ctx, input) {
    const at = and(eq(refunds.shopId, ctx.shop.id), eq(refunds.id, input.refundId));
    const [r] = await ctx.tx.select().from(refunds).where(at).for("update");
    if (!r) return refuse("NOT_FOUND", "This refund is not here.");
    if (r.state !== "asked") return refuse("ALREADY_ANSWERED", "This refund was answered already.");
    const me = personIdOf(ctx);
    if (!input.accept) {
      await ctx.tx.update(refunds).set({ state: "declined", acceptedBy: me }).where(at);
      return ok({ id: r.id, state: "declined", alone: false });
    }
    const alone = r.askedBy === me;
    if (alone && (await hasSecondPerson(ctx))) return refuse("SECOND_PERSON", "Somebody else has to accept a refund you asked for.");
    await ctx.tx.update(refunds).set({ state: "accepted", acceptedBy: me }).where(at);
    const p = await lockPayment(ctx, eq(payments.id, r.paymentId));
    if (!p) return refuse("NOT_FOUND", "This payment is not here.");
    if (p.method === "card" && p.providerPaymentId) {
      await leaveJob(ctx, "payments.refund", { refundId: r.id }, { dedupeKey: r.id });
      return ok({ id: r.id, state: "accepted", alone });
    }
    const done = await bookRefund(ctx, p, { ...r, state: "accepted" });
    return done.ok ? ok({ id: r.id, state: "done", alone }) : done;
  },
  subject: (input) => ({ kind: "refund", id: input.refundId }),
});

/** Job: sends an accepted refund to the provider under a key made from it, and books it once the provider says it is done. */
export async function sendRefund(ctx: ShopContext, refundId: string): Promise<void> {
  const at = and(eq(refunds.shopId, ctx.shop.id), eq(refunds.id, refundId));
  const found = await withShop(ctx.shop.id, async (tx) => {
    const [row] = await tx.select({ r: refunds, intent: payments.providerPaymentId }).from(refunds)
      .innerJoin(payments, and(eq(payments.shopId, refunds.shopId), eq(payments.id, refunds.paymentId))).where(at);
    return row;
  });
  if (!found?.intent || !["accepted", "sent"].includes(found.r.state)) return;
  let answer;
  try {
    answer = await paymentPort().refund({ paymentIntent: found.intent, amountMinor: found.r.amountMinor, idempotencyKey: `vk-refund-${refundId}`, metadata: { shop: ctx.shop.id, refund: refundId } });
  } catch (error) {
    if (!(error instanceof PaymentFailure) || error.retry) throw error;
    // The provider says no for good: nothing was given back.
    await withShop(ctx.shop.id, (tx) => tx.update(refunds).set({ state: "failed", reason: `${found.r.reason} (${error.message})`.slice(0, 500) }).where(and(at, ne(refunds.state, "done"))));
    return;
  }
  await withShop(ctx.shop.id, async (tx) => {
    const inner = { ...ctx, tx };
    const p = await lockPayment(inner, eq(payments.id, found.r.paymentId));
    const [r] = await tx.select().from(refunds).where(at).for("update");
    if (!p || !r || r.state === "done" || r.state === "failed") return;
    if (answer.status === "failed" || answer.status === "canceled") await tx.update(refunds).set({ state: "failed", providerRefundId: answer.id }).where(at);
    else {
      await tx.update(refunds).set({ state: "sent", providerRefundId: answer.id }).where(at);
      if (answer.status === "succeeded") {
        const booked = await bookRefund(inner, p, r);
        if (!booked.ok) throw new Error(booked.refusal.message);
      }
    }
  });
}

/** Tries an event again that was set aside. */
export const retryEvent = defineCommand({
  name: "payments.retry-event",
  act: "bank.match",
  input: eventInput,
  async run(ctx, input) {
    const at = and(eq(providerEvents.id, input.eventId), eq(providerEvents.shopId, ctx.shop.id), isNull(providerEvents.doneAt));
    const [row] = await ctx.tx.update(providerEvents).set({ parkedReason: null }).where(at).returning({ id: providerEvents.id });
    if (!row) return refuse("NOT_FOUND", "This message is not waiting any more.");
    await leaveJob(ctx, "payments.settleEvent", { eventId: input.eventId }, { dedupeKey: `${input.eventId}:${ctx.now.getTime()}` });
    return ok({ eventId: input.eventId });
  },
  subject: (input) => ({ kind: "provider-event", id: input.eventId }),
});

/** Looked at by a person and settled otherwise: it leaves the list, the reason stays in the trail. */
export const closeEvent = defineCommand({
  name: "payments.close-event",
  act: "bank.match",
  input: closeEventInput,
  async run(ctx, input) {
    const [row] = await ctx.tx.update(providerEvents).set({ doneAt: ctx.now }).where(and(eq(providerEvents.id, input.eventId), eq(providerEvents.shopId, ctx.shop.id), isNull(providerEvents.doneAt))).returning({ id: providerEvents.id });
    return row ? ok({ eventId: row.id }) : refuse("NOT_FOUND", "This message is not waiting any more.");
  },
  subject: (input) => ({ kind: "provider-event", id: input.eventId }),
});

/** A charge in a payout that did not come through a page of ours (a card terminal): a person says which invoice it paid. */
export const explainPayoutItem = defineCommand({
  name: "payouts.explain",
  act: "bank.match",
  input: explainItemInput,
  async run(ctx, input) {
    const at = and(eq(payoutItems.shopId, ctx.shop.id), eq(payoutItems.id, input.itemId));
    const [item] = await ctx.tx.select().from(payoutItems).where(at).for("update");
    if (!item) return refuse("NOT_FOUND", "This part of the payout is not here.");
    if (item.paymentId) return refuse("EXPLAINED", "This part leads to a payment already.");
    if (item.grossMinor <= 0) return refuse("NOT_A_CHARGE", "Only a charge can pay an invoice.");
    const booked = await bookPayment(ctx, { for: { invoiceId: input.invoiceId }, method: "card", amountMinor: item.grossMinor, receivedAt: ctx.now, providerPaymentId: item.sourceId || item.providerTransactionId, note: "Card terminal" });
    if (!booked.ok) return booked;
    await ctx.tx.update(payoutItems).set({ paymentId: booked.value.id }).where(at);
    // What was told about this charge before it was known here, such as a refund, is looked at again.
    await leaveJob(ctx, "payments.reconcile", {}, { dedupeKey: `explained:${item.id}` });
    const payout = await bookPayout(ctx, item.payoutId);
    return payout.ok ? ok({ paymentId: booked.value.id, receiptNumber: booked.value.receiptNumber, booked: payout.value.booked }) : payout;
  },
  subject: (_, value) => ({ kind: "payment", id: value.paymentId }),
});
