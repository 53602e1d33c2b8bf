import "server-only";
import { randomUUID } from "node:crypto";
import { and, asc, eq, inArray, sql } from "drizzle-orm";
import { customers, invoices, journalEntries, journalLines, payments, refunds } from "@/db/schema";
import type { TxContext } from "@/modules/access/context";
import { creditOf, depositHeld } from "@/modules/books/balances";
import { moneyReceived, moneyReturned, refundParts } from "@/modules/books/domain/posting-receipt";
import { openDateFrom, postEntry } from "@/modules/books/post";
import { queueMail } from "@/modules/documents/mail";
import { money } from "@/modules/kernel/format";
import { localDate } from "@/modules/kernel/instant";
import { minor, ZERO } from "@/modules/kernel/money";
import { ok, refuse, type Result } from "@/modules/kernel/result";
import type { ProviderFact, Refund } from "@/modules/outbound/payments/port";
import { METHOD_WORDS, WAY_OF_METHOD, type PaymentMethod } from "./domain/payment-words";
import { UNKNOWN_PAYMENT } from "./events";

type Payment = typeof payments.$inferSelect;
type RefundRow = typeof refunds.$inferSelect;
type Booked = Result<{ booked: boolean }>;

export const lockPayment = async (ctx: TxContext, by: ReturnType<typeof eq>): Promise<Payment | undefined> =>
  (await ctx.tx.select().from(payments).where(and(eq(payments.shopId, ctx.shop.id), by)).for("update"))[0];

/** The part of a payment that became the customer's credit when it was booked. */
async function creditedBy(ctx: TxContext, paymentId: string): Promise<number> {
  const [row] = await ctx.tx.select({ sum: sql<string>`coalesce(-sum(${journalLines.amountMinor}), 0)` }).from(journalLines)
    .innerJoin(journalEntries, and(eq(journalEntries.shopId, journalLines.shopId), eq(journalEntries.id, journalLines.entryId)))
    .where(and(eq(journalLines.shopId, ctx.shop.id), eq(journalLines.accountCode, "2110"), eq(journalEntries.sourceKind, "payment"), eq(journalEntries.sourceId, paymentId)));
  return Number(row?.sum ?? 0);
}

/** Books a refund that has happened: money out, and what it was taken from. Once for one refund. */
export async function bookRefund(ctx: TxContext, p: Payment, r: RefundRow): Promise<Booked> {
  const { tx, shop } = ctx;
  const credit = Math.min(await creditOf(ctx, p.customerId), await creditedBy(ctx, p.id));
  const deposit = p.workOrderId && p.purpose === "deposit" ? await depositHeld(ctx, p.workOrderId) : ZERO;
  // A deposit that was used stands on the order's invoice; giving it back opens that invoice again.
  const whose = p.invoiceId ? eq(invoices.id, p.invoiceId) : p.workOrderId ? eq(invoices.workOrderId, p.workOrderId) : null;
  const [invoice] = whose ? await tx.select().from(invoices).where(and(eq(invoices.shopId, shop.id), whose, eq(invoices.kind, "invoice"), eq(invoices.state, "issued"))).orderBy(asc(invoices.issuedAt)).limit(1).for("update") : [];
  const parts = refundParts({ wantedMinor: r.amountMinor, creditMinor: credit, depositMinor: deposit, paidMinor: invoice ? p.amountMinor : 0 });
  if (parts.missingMinor > 0) return refuse("NOTHING_TO_REFUND", "What this payment paid for has been used or given back already.");
  const posted = await postEntry(ctx, {
    date: await openDateFrom(ctx, localDate(ctx.now, shop.zone)), text: `Refund of ${p.receiptNumber}, ${METHOD_WORDS[p.method as PaymentMethod]}: ${r.reason}`.slice(0, 240),
    rule: "refunded", sourceKind: "refund", sourceId: r.id, workOrderId: p.workOrderId, customerId: p.customerId,
    lines: moneyReturned({ ...parts, way: WAY_OF_METHOD[p.method as PaymentMethod] }),
  });
  if (!posted.ok) return posted;
  if (invoice && parts.receivableMinor > 0) await tx.update(invoices).set({ paidMinor: sql`${invoices.paidMinor} - ${parts.receivableMinor}` }).where(and(eq(invoices.shopId, shop.id), eq(invoices.id, invoice.id)));
  await tx.update(payments).set({ refundedMinor: sql`${payments.refundedMinor} + ${r.amountMinor}`, appliedMinor: sql`greatest(0, ${payments.appliedMinor} - ${parts.receivableMinor + parts.creditMinor})` })
    .where(and(eq(payments.shopId, shop.id), eq(payments.id, p.id)));
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
    const posted = await postEntry(ctx, {
      date: await openDateFrom(ctx, localDate(ctx.now, shop.zone)), text: `Refund of ${p.receiptNumber} did not arrive`, rule: "refundFailed", sourceKind: "refund", sourceId: r.id,
      workOrderId: p.workOrderId, customerId: p.customerId,
      // What it was taken from is settled anew by a person: until then the money is the customer's credit.
      lines: moneyReceived({ way: WAY_OF_METHOD[p.method as PaymentMethod], depositMinor: ZERO, receivableMinor: ZERO, creditMinor: minor(r.amountMinor) }),
    });
    if (!posted.ok) return posted;
    await tx.update(payments).set({ refundedMinor: sql`${payments.refundedMinor} - ${r.amountMinor}` }).where(and(eq(payments.shopId, shop.id), eq(payments.id, p.id)));
  }
  await tx.update(refunds).set({ state: "failed" }).where(and(eq(refunds.shopId, shop.id), eq(refunds.id, r.id)));
  return ok({ booked: true });
}

/** `refund.*`: the provider tells how one refund stands. */
export async function refundSeen(ctx: TxContext, seen: Refund): Promise<Booked> {
  const p = seen.paymentIntent ? await lockPayment(ctx, eq(payments.providerPaymentId, seen.paymentIntent)) : undefined;
  if (!p) return refuse("UNKNOWN_PAYMENT", UNKNOWN_PAYMENT);
  const all = await ctx.tx.select().from(refunds).where(and(eq(refunds.shopId, ctx.shop.id), eq(refunds.paymentId, p.id)));
  const r = all.find((x) => x.providerRefundId === seen.id) ?? all.find((x) => x.providerRefundId === null && x.amountMinor === seen.amountMinor && ["accepted", "sent"].includes(x.state));
  // Made at the provider's own pages: `charge.refunded` brings the total and makes the row.
  if (!r) return ok({ booked: false });
  if (r.providerRefundId === null) await ctx.tx.update(refunds).set({ providerRefundId: seen.id }).where(and(eq(refunds.shopId, ctx.shop.id), eq(refunds.id, r.id)));
  if (seen.status === "succeeded") return r.state === "done" ? ok({ booked: false }) : bookRefund(ctx, p, r);
  if (seen.status === "failed" || seen.status === "canceled") return r.state === "failed" ? ok({ booked: false }) : refundFailed(ctx, p, r);
  return ok({ booked: false });
}

/** `charge.refunded`: the sum given back so far. What is not explained by our own refunds was made at the provider. */
export async function refundTotalSeen(ctx: TxContext, fact: Extract<ProviderFact, { kind: "refunded" }>): Promise<Booked> {
  const p = fact.paymentIntent ? await lockPayment(ctx, eq(payments.providerPaymentId, fact.paymentIntent)) : undefined;
  if (!p) return refuse("UNKNOWN_PAYMENT", UNKNOWN_PAYMENT);
  if (fact.currency !== ctx.shop.currency) return refuse("CURRENCY_DIFFERS", `A refund in ${fact.currency} cannot be booked in ${ctx.shop.currency}.`);
  let rest = fact.refundedMinor - p.refundedMinor;
  const waiting = await ctx.tx.select().from(refunds).where(and(eq(refunds.shopId, ctx.shop.id), eq(refunds.paymentId, p.id), inArray(refunds.state, ["accepted", "sent"]))).orderBy(asc(refunds.at));
  let booked = false;
  for (const r of waiting) {
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
