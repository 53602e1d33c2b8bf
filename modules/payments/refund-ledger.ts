import "server-only";
import { randomUUID } from "node:crypto";
import { and, asc, eq } from "drizzle-orm";
import { customers, payments, refunds } from "@/db/schema";
import type { TxContext } from "@/modules/access/context";
import { moneyReceived, moneyReturned } from "@/modules/books/domain/posting-receipt";
import { openDateFrom, postEntry } from "@/modules/books/post";
import { queueMail } from "@/modules/documents/mail";
import { money } from "@/modules/kernel/format";
import { localDate } from "@/modules/kernel/instant";
import { minor, ZERO } from "@/modules/kernel/money";
import { ok, refuse, type Result } from "@/modules/kernel/result";
import type { ProviderFact, Refund } from "@/modules/outbound/payments/port";
import { METHOD_WORDS, WAY_OF_METHOD, type PaymentMethod } from "./domain/payment-words";
import { UNKNOWN_PAYMENT } from "./events";
import { lockPayment, moveBack, takenFrom, type Payment } from "./payment-parts";

type RefundRow = typeof refunds.$inferSelect;
type Booked = Result<{ booked: boolean }>;

/** Books a refund that has happened: money out, and what it was taken from. Once for one refund. */
export async function bookRefund(ctx: TxContext, p: Payment, r: RefundRow): Promise<Booked> {
  const { tx, shop } = ctx;
  const { parts, invoiceId } = await takenFrom(ctx, p, r.amountMinor);
  if (parts.missingMinor > 0) return refuse("NOTHING_TO_REFUND", "What this payment paid for has been used or given back already.");
  const posted = await postEntry(ctx, {
    date: await openDateFrom(ctx, localDate(ctx.now, shop.zone)), text: `Refund of ${p.receiptNumber}, ${METHOD_WORDS[p.method as PaymentMethod]}: ${r.reason}`.slice(0, 240),
    rule: "refunded", sourceKind: "refund", sourceId: r.id, workOrderId: p.workOrderId, customerId: p.customerId,
    lines: moneyReturned({ ...parts, way: WAY_OF_METHOD[p.method as PaymentMethod] }),
  });
  if (!posted.ok) return posted;
  await moveBack(ctx, p, parts, invoiceId, -1);
  await tx.update(refunds).set({ state: "done" }).where(and(eq(refunds.shopId, shop.id), eq(refunds.id, r.id)));
  const [c] = await tx.select({ name: customers.name, email: customers.email }).from(customers).where(and(eq(customers.shopId, shop.id), eq(customers.id, p.customerId)));
  if (c?.email) {
    await queueMail(ctx, {
      kind: "refund", to: c.email, toName: c.name, subject: `${money(r.amountMinor, shop)} paid back on receipt ${p.receiptNumber}`,
      paragraphs: [`We paid ${money(r.amountMinor, shop)} of receipt ${p.receiptNumber} back the way it came (${METHOD_WORDS[p.method as PaymentMethod]}). Reason: ${r.reason}`], workOrderId: p.workOrderId, about: { kind: "payment", id: p.id },
    });
  }
  return ok({ booked: true });
}

/** A refund that was booked and then failed at the bank: the booking is turned round. */
async function refundFailed(ctx: TxContext, p: Payment, r: RefundRow): Promise<Booked> {
  const { tx, shop } = ctx;
  if (r.state === "done") {
    // What it was taken from is settled anew by a person: until then the money is the customer's credit.
    const parts = { depositMinor: ZERO, receivableMinor: ZERO, creditMinor: minor(r.amountMinor) };
    const posted = await postEntry(ctx, {
      date: await openDateFrom(ctx, localDate(ctx.now, shop.zone)), text: `Refund of ${p.receiptNumber} did not arrive`, rule: "refundFailed", sourceKind: "refund", sourceId: r.id,
      workOrderId: p.workOrderId, customerId: p.customerId,
      lines: moneyReceived({ ...parts, way: WAY_OF_METHOD[p.method as PaymentMethod] }),
    });
    if (!posted.ok) return posted;
    await moveBack(ctx, p, parts, null, 1);
  }
  await tx.update(refunds).set({ state: "failed" }).where(and(eq(refunds.shopId, shop.id), eq(refunds.id, r.id)));
  return ok({ booked: true });
}

const sameUnnamed = (seen: Refund, states: readonly string[]) => (r: RefundRow): boolean => r.providerRefundId === null && r.amountMinor === seen.amountMinor && states.includes(r.state);

/** `refund.*`: the provider tells how one refund stands. */
export async function refundSeen(ctx: TxContext, seen: Refund): Promise<Booked> {
  const p = seen.paymentIntent ? await lockPayment(ctx, eq(payments.providerPaymentId, seen.paymentIntent)) : undefined;
  if (!p) return refuse("UNKNOWN_PAYMENT", UNKNOWN_PAYMENT);
  const all = await ctx.tx.select().from(refunds).where(and(eq(refunds.shopId, ctx.shop.id), eq(refunds.paymentId, p.id)));
  // One made at the provider's own pages gets its number here, once `charge.refunded` has made its row.
  const r = all.find((x) => x.providerRefundId === seen.id) ?? all.find(sameUnnamed(seen, ["accepted", "sent"])) ?? all.find(sameUnnamed(seen, ["done"]));
  const isOff = seen.status === "failed" || seen.status === "canceled";
  if (!r) return isOff ? refuse("UNKNOWN_REFUND", `A refund of ${money(seen.amountMinor, ctx.shop)} on receipt ${p.receiptNumber} did not arrive, and no refund of that sum is in the books. Compare the payment with the provider's records.`) : ok({ booked: false });
  if (r.providerRefundId === null) await ctx.tx.update(refunds).set({ providerRefundId: seen.id }).where(and(eq(refunds.shopId, ctx.shop.id), eq(refunds.id, r.id)));
  if (seen.status === "succeeded") return r.state === "done" || r.state === "failed" ? ok({ booked: false }) : bookRefund(ctx, p, r);
  if (isOff) return r.state === "failed" ? ok({ booked: false }) : refundFailed(ctx, p, r);
  return ok({ booked: false });
}

/** `charge.refunded`: the sum given back so far. What is not explained by our own refunds was made at the provider. */
export async function refundTotalSeen(ctx: TxContext, fact: Extract<ProviderFact, { kind: "refunded" }>): Promise<Booked> {
  const p = fact.paymentIntent ? await lockPayment(ctx, eq(payments.providerPaymentId, fact.paymentIntent)) : undefined;
  if (!p) return refuse("UNKNOWN_PAYMENT", UNKNOWN_PAYMENT);
  if (fact.currency !== ctx.shop.currency) return refuse("CURRENCY_DIFFERS", `A refund in ${fact.currency} cannot be booked in ${ctx.shop.currency}.`);
  const all = await ctx.tx.select().from(refunds).where(and(eq(refunds.shopId, ctx.shop.id), eq(refunds.paymentId, p.id))).orderBy(asc(refunds.at));
  // Refunds only: what a dispute took back is not in the provider's sum.
  let rest = fact.refundedMinor - all.filter((r) => r.state === "done").reduce((sum, r) => sum + r.amountMinor, 0);
  let booked = false;
  for (const r of all.filter((x) => x.state === "accepted" || x.state === "sent")) {
    if (r.amountMinor > rest) continue;
    const fresh = await lockPayment(ctx, eq(payments.id, p.id));
    const done = await bookRefund(ctx, fresh ?? p, r);
    if (!done.ok) return done;
    rest -= r.amountMinor;
    booked = true;
  }
  if (rest <= 0) return ok({ booked });
  const [made] = await ctx.tx.insert(refunds).values({ shopId: ctx.shop.id, id: randomUUID(), paymentId: p.id, amountMinor: rest, reason: "Made at the payment provider", state: "sent", at: ctx.now }).returning();
  const fresh = await lockPayment(ctx, eq(payments.id, p.id));
  return made ? bookRefund(ctx, fresh ?? p, made) : ok({ booked });
}
