import "server-only";
import { and, asc, eq, inArray, like, or, sql } from "drizzle-orm";
import { invoices, journalEntries, journalLines, payments, refunds } from "@/db/schema";
import type { TxContext } from "@/modules/access/context";
import { creditOf, depositHeld } from "@/modules/books/balances";
import { refundParts, type MoneyParts } from "@/modules/books/domain/posting-receipt";
import type { Minor } from "@/modules/kernel/money";

export type Payment = typeof payments.$inferSelect;

export const lockPayment = async (ctx: TxContext, by: ReturnType<typeof eq>): Promise<Payment | undefined> =>
  (await ctx.tx.select().from(payments).where(and(eq(payments.shopId, ctx.shop.id), by)).for("update"))[0];

/** Entries of a dispute are named by the payment they are about, so that they lead back to it. */
export const disputeSource = (paymentId: string, disputeId: string): string => `${paymentId}:${disputeId}`;

/** The part of a payment that stands as the customer's credit: what it was booked as, less and plus what went back and came again. */
async function creditedBy(ctx: TxContext, paymentId: string): Promise<number> {
  const back = ctx.tx.select({ id: sql<string>`${refunds.id}::text` }).from(refunds).where(and(eq(refunds.shopId, ctx.shop.id), eq(refunds.paymentId, paymentId)));
  const [row] = await ctx.tx.select({ sum: sql<string>`coalesce(-sum(${journalLines.amountMinor}), 0)` }).from(journalLines)
    .innerJoin(journalEntries, and(eq(journalEntries.shopId, journalLines.shopId), eq(journalEntries.id, journalLines.entryId)))
    .where(and(eq(journalLines.shopId, ctx.shop.id), eq(journalLines.accountCode, "2110"), or(
      and(eq(journalEntries.sourceKind, "payment"), eq(journalEntries.sourceId, paymentId)),
      and(eq(journalEntries.sourceKind, "refund"), inArray(journalEntries.sourceId, back)),
      and(eq(journalEntries.sourceKind, "dispute"), like(journalEntries.sourceId, disputeSource(paymentId, "%"))),
    )));
  return Number(row?.sum ?? 0);
}

/** The issued invoice a payment stands on, locked: its own, or the order's first one, which took the deposit. */
export async function invoiceBehind(ctx: TxContext, p: Payment): Promise<typeof invoices.$inferSelect | undefined> {
  const whose = p.invoiceId ? eq(invoices.id, p.invoiceId) : p.workOrderId ? eq(invoices.workOrderId, p.workOrderId) : null;
  if (!whose) return undefined;
  return (await ctx.tx.select().from(invoices).where(and(eq(invoices.shopId, ctx.shop.id), whose, eq(invoices.kind, "invoice"), eq(invoices.state, "issued"))).orderBy(asc(invoices.issuedAt)).limit(1).for("update"))[0];
}

/** What a sum that leaves a payment again is taken from, and the invoice it opens. */
export async function takenFrom(ctx: TxContext, p: Payment, amountMinor: number): Promise<{ parts: MoneyParts & { missingMinor: Minor }; invoiceId: string | null }> {
  const creditMinor = Math.min(await creditOf(ctx, p.customerId), await creditedBy(ctx, p.id));
  const depositMinor = p.workOrderId && p.purpose === "deposit" ? await depositHeld(ctx, p.workOrderId) : 0;
  const invoice = await invoiceBehind(ctx, p);
  return { parts: refundParts({ wantedMinor: amountMinor, creditMinor, depositMinor, paidMinor: invoice ? p.amountMinor : 0 }), invoiceId: invoice?.id ?? null };
}

/** Money of a payment that left again (-1) or came back (1), on the payment and on the invoice it stands on. */
export async function moveBack(ctx: TxContext, p: Payment, parts: MoneyParts, invoiceId: string | null, sign: 1 | -1): Promise<void> {
  const { tx, shop } = ctx;
  if (invoiceId && parts.receivableMinor > 0) {
    await tx.update(invoices).set({ paidMinor: sql`${invoices.paidMinor} + ${sign * parts.receivableMinor}` }).where(and(eq(invoices.shopId, shop.id), eq(invoices.id, invoiceId)));
  }
  const sum = parts.depositMinor + parts.receivableMinor + parts.creditMinor;
  await tx.update(payments).set({
    refundedMinor: sql`${payments.refundedMinor} - ${sign * sum}`, appliedMinor: sql`greatest(0, ${payments.appliedMinor} + ${sign * (parts.receivableMinor + parts.creditMinor)})`,
  }).where(and(eq(payments.shopId, shop.id), eq(payments.id, p.id)));
}

/** What the customer's bank holds of a payment through disputes: all that left it and was no refund. */
export async function disputedOf(ctx: TxContext, p: Payment): Promise<number> {
  const [row] = await ctx.tx.select({ sum: sql<string>`coalesce(sum(${refunds.amountMinor}), 0)` }).from(refunds).where(and(eq(refunds.shopId, ctx.shop.id), eq(refunds.paymentId, p.id), eq(refunds.state, "done")));
  return p.refundedMinor - Number(row?.sum ?? 0);
}
