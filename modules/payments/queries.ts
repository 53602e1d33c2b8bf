import "server-only";
import { and, asc, desc, eq, isNotNull, isNull } from "drizzle-orm";
import { customers, payments, providerEvents, refunds } from "@/db/schema";
import { ableTo, inShop, mustBeAble, type ShopContext } from "@/modules/access/context";
import { personIdOf } from "@/modules/access/context";
import type { KeptEvent } from "./events";

export interface SetAsideRow { id: string; type: string; reason: string; receivedAt: string; timesSeen: number; amountMinor: number | null; currency: string | null; reference: string | null }

/** Messages of the payment provider that could not be booked, each with its reason. */
export async function findSetAside(ctx: ShopContext): Promise<SetAsideRow[]> {
  mustBeAble(ctx, "books.see");
  const rows = await inShop(ctx, (tx) => tx.select().from(providerEvents).where(and(eq(providerEvents.shopId, ctx.shop.id), isNotNull(providerEvents.parkedReason), isNull(providerEvents.doneAt))).orderBy(desc(providerEvents.receivedAt)).limit(100));
  return rows.map((r) => {
    const { fact } = (r.body as KeptEvent).event;
    const sum = fact.kind === "checkout" ? fact.session : fact.kind === "refund" ? fact.refund : fact.kind === "payout" ? fact.payout : fact.kind === "dispute" ? fact : null;
    return {
      id: r.id, type: r.type, reason: r.parkedReason ?? "", receivedAt: r.receivedAt.toISOString(), timesSeen: r.timesSeen, amountMinor: sum?.amountMinor ?? (fact.kind === "refunded" ? fact.refundedMinor : null), currency: sum?.currency ?? null,
      reference: fact.kind === "checkout" ? fact.session.id : fact.kind === "payout" ? fact.payout.id : fact.kind === "other" ? null : fact.kind === "refund" ? fact.refund.paymentIntent : fact.paymentIntent,
    };
  });
}

export interface PaymentView { id: string; receiptNumber: string; method: string; purpose: string; amountMinor: number; refundedMinor: number; receivedAt: string; note: string; refunds: { id: string; amountMinor: number; reason: string; state: string; mine: boolean }[] }

/** Money taken for an invoice or its order, oldest first. */
export async function paymentsFor(ctx: ShopContext, of: { invoiceId: string; workOrderId: string | null }): Promise<PaymentView[]> {
  mustBeAble(ctx, "books.see");
  const me = personIdOf(ctx);
  return inShop(ctx, async (tx) => {
    const rows = await tx.select().from(payments).where(and(eq(payments.shopId, ctx.shop.id), of.workOrderId ? eq(payments.workOrderId, of.workOrderId) : eq(payments.invoiceId, of.invoiceId))).orderBy(asc(payments.receivedAt));
    const back = await tx.select().from(refunds).where(eq(refunds.shopId, ctx.shop.id));
    return rows.filter((p) => p.purpose === "deposit" || p.invoiceId === of.invoiceId || p.invoiceId === null).map((p) => ({
      id: p.id, receiptNumber: p.receiptNumber, method: p.method, purpose: p.purpose, amountMinor: p.amountMinor, refundedMinor: p.refundedMinor, receivedAt: p.receivedAt.toISOString(), note: p.note,
      refunds: back.filter((r) => r.paymentId === p.id).map((r) => ({ id: r.id, amountMinor: r.amountMinor, reason: r.reason, state: r.state, mine: r.askedBy !== null && r.askedBy === me })),
    }));
  });
}

export interface WaitingRefund { id: string; customer: string; receiptNumber: string; amountMinor: number; reason: string; mine: boolean }

/** Refunds that wait for a second person. */
export async function findWaitingRefunds(ctx: ShopContext): Promise<WaitingRefund[]> {
  if (!ableTo(ctx, "refund")) return [];
  const me = personIdOf(ctx);
  const rows = await inShop(ctx, (tx) => tx.select({ r: refunds, receipt: payments.receiptNumber, customer: customers.name }).from(refunds)
    .innerJoin(payments, and(eq(payments.shopId, refunds.shopId), eq(payments.id, refunds.paymentId)))
    .innerJoin(customers, and(eq(customers.shopId, payments.shopId), eq(customers.id, payments.customerId)))
    .where(and(eq(refunds.shopId, ctx.shop.id), eq(refunds.state, "asked"))).orderBy(asc(refunds.at)));
  return rows.map(({ r, receipt, customer }) => ({ id: r.id, customer, receiptNumber: receipt, amountMinor: r.amountMinor, reason: r.reason, mine: r.askedBy === me }));
}
