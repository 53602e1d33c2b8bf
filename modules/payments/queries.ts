import "server-only";
import { and, asc, desc, eq, inArray, isNotNull, isNull, like } from "drizzle-orm";
import { customers, invoices, payments, providerEvents, refunds } from "@/db/schema";
import { ableTo, inShop, mustBeAble, personIdOf, type ShopContext } from "@/modules/access/context";
import { furthestPhase, phaseOfDispute, type DisputePhase } from "./domain/dispute";
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

export interface PaymentView { id: string; receiptNumber: string; method: string; purpose: string; amountMinor: number; refundedMinor: number; receivedAt: string; note: string; refunds: { id: string; amountMinor: number; reason: string; state: string; mine: boolean }[]; disputes: { id: string; amountMinor: number; phase: DisputePhase; evidenceBy: string | null }[] }

/** Money taken for an invoice or its order, oldest first. */
export async function paymentsFor(ctx: ShopContext, of: { invoiceId: string; workOrderId: string | null }): Promise<PaymentView[]> {
  mustBeAble(ctx, "books.see");
  const me = personIdOf(ctx);
  return inShop(ctx, async (tx) => {
    const rows = await tx.select().from(payments).where(and(eq(payments.shopId, ctx.shop.id), of.workOrderId ? eq(payments.workOrderId, of.workOrderId) : eq(payments.invoiceId, of.invoiceId))).orderBy(asc(payments.receivedAt));
    const ids = rows.map((p) => p.id);
    const back = ids.length ? await tx.select().from(refunds).where(and(eq(refunds.shopId, ctx.shop.id), inArray(refunds.paymentId, ids))) : [];
    const disputed = rows.some((p) => p.method === "card") ? await findDisputes({ ...ctx, tx }) : [];
    return rows.filter((p) => p.purpose === "deposit" || p.invoiceId === of.invoiceId || p.invoiceId === null).map((p) => ({
      id: p.id, receiptNumber: p.receiptNumber, method: p.method, purpose: p.purpose, amountMinor: p.amountMinor, refundedMinor: p.refundedMinor, receivedAt: p.receivedAt.toISOString(), note: p.note,
      refunds: back.filter((r) => r.paymentId === p.id).map((r) => ({ id: r.id, amountMinor: r.amountMinor, reason: r.reason, state: r.state, mine: r.askedBy !== null && r.askedBy === me })),
      disputes: disputed.filter((d) => d.paymentId === p.id).map((d) => ({ id: d.id, amountMinor: d.amountMinor, phase: d.phase, evidenceBy: d.evidenceBy })),
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

export interface DisputeView {
  id: string; paymentId: string; receiptNumber: string; customer: string; invoice: { id: string; number: string } | null; amountMinor: number; phase: DisputePhase;
  /** When it was first told of here; until when it may be answered. */
  since: string; evidenceBy: string | null;
}

/** Card charges that customers' banks question or took back, newest first, each as it stands by all that the provider told. */
export async function findDisputes(ctx: ShopContext): Promise<DisputeView[]> {
  mustBeAble(ctx, "books.see");
  return inShop(ctx, async (tx) => {
    const told = await tx.select({ body: providerEvents.body, at: providerEvents.receivedAt }).from(providerEvents)
      .where(and(eq(providerEvents.shopId, ctx.shop.id), like(providerEvents.type, "charge.dispute.%"))).orderBy(asc(providerEvents.receivedAt));
    const facts = told.flatMap(({ body, at }) => { const { fact } = (body as KeptEvent).event; return fact.kind === "dispute" ? [{ fact, at }] : []; });
    const intents = [...new Set(facts.flatMap((f) => f.fact.paymentIntent ?? []))];
    if (intents.length === 0) return [];
    const rows = await tx.select({ p: payments, customer: customers.name, invoiceId: invoices.id, number: invoices.number }).from(payments)
      .innerJoin(customers, and(eq(customers.shopId, payments.shopId), eq(customers.id, payments.customerId)))
      .leftJoin(invoices, and(eq(invoices.shopId, payments.shopId), eq(invoices.id, payments.invoiceId)))
      .where(and(eq(payments.shopId, ctx.shop.id), inArray(payments.providerPaymentId, intents)));
    const paid = new Map(rows.map((r) => [r.p.providerPaymentId, r]));
    return [...new Set(facts.map((f) => f.fact.id))].reverse().flatMap((id): DisputeView[] => {
      const own = facts.filter((f) => f.fact.id === id);
      const [first] = own;
      const row = first ? paid.get(first.fact.paymentIntent) : undefined;
      const phase = furthestPhase(own.flatMap((f) => phaseOfDispute(f.fact.status) ?? []));
      if (!first || !row || !phase) return [];
      // Dates of a kept event are text.
      const evidenceBy = own.flatMap((f) => (f.fact.evidenceBy ? [String(f.fact.evidenceBy)] : [])).at(-1) ?? null;
      return [{
        id, paymentId: row.p.id, receiptNumber: row.p.receiptNumber, customer: row.customer, invoice: row.invoiceId ? { id: row.invoiceId, number: row.number ?? "" } : null,
        amountMinor: first.fact.amountMinor, phase, since: first.at.toISOString(), evidenceBy: phase === "taken" || phase === "inquiry" ? evidenceBy : null,
      }];
    });
  });
}
