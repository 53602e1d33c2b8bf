import "server-only";
import { randomUUID } from "node:crypto";
import { and, eq, inArray } from "drizzle-orm";
import { payments, payoutItems, payouts, providerEvents } from "@/db/schema";
import { withShop, withSystem } from "@/db/scope";
import type { ShopContext, TxContext } from "@/modules/access/context";
import { leaveJob } from "@/modules/access/jobs";
import { payoutLine } from "@/modules/books/domain/posting-receipt";
import { openDateFrom, postEntry } from "@/modules/books/post";
import { sumMinor } from "@/modules/kernel/money";
import { ok, type Result } from "@/modules/kernel/result";
import type { BalanceTransaction, Payout } from "@/modules/outbound/payments/port";
import { setAside, shopOfPayment } from "./events";
import { paymentPort, systemContext } from "./provider";

/** Kinds that must lead back to a payment of ours before a payout is explained. */
const NEEDS_PAYMENT = new Set(["charge", "payment", "refund", "payment_refund"]);
/** A payout as it travels in a job: dates are text there. */
export type PayoutFact = Pick<Payout, "id" | "amountMinor" | "currency" | "arrivalDate">;

export const needsPayment = (kind: string): boolean => NEEDS_PAYMENT.has(kind);

/** Posts the lines of a payout when each is explained: one entry a line, so that fees stand with their order. Safe to repeat. */
export async function bookPayout(ctx: TxContext, payoutId: string): Promise<Result<{ booked: boolean }>> {
  const { tx, shop } = ctx;
  const at = and(eq(payouts.shopId, shop.id), eq(payouts.id, payoutId));
  const [payout] = await tx.select().from(payouts).where(at).for("update");
  if (!payout || payout.state === "booked") return ok({ booked: payout?.state === "booked" });
  const items = await tx.select().from(payoutItems).where(and(eq(payoutItems.shopId, shop.id), eq(payoutItems.payoutId, payoutId)));
  const unexplained = items.some((i) => needsPayment(i.kind) && !i.paymentId);
  if (unexplained || sumMinor(items.map((i) => i.netMinor)) !== payout.amountMinor) return ok({ booked: false });
  const paid = new Map((items.some((i) => i.paymentId) ? await tx.select().from(payments).where(and(eq(payments.shopId, shop.id), inArray(payments.id, items.flatMap((i) => i.paymentId ?? [])))) : []).map((p) => [p.id, p]));
  const date = await openDateFrom(ctx, payout.arrivesOn);
  for (const i of items) {
    const p = i.paymentId ? paid.get(i.paymentId) : undefined;
    const lines = payoutLine({ grossMinor: i.grossMinor, feeMinor: i.feeMinor, isDispute: i.kind === "adjustment" });
    if (lines.length === 0) continue;
    const posted = await postEntry(ctx, {
      date, text: `Payout ${payout.providerPayoutId}: ${i.kind}${p ? ` ${p.receiptNumber}` : ""}`, rule: "payoutSettled", sourceKind: "payout-item", sourceId: i.id,
      workOrderId: p?.workOrderId ?? null, customerId: p?.customerId ?? null, lines,
    });
    if (!posted.ok) return posted;
  }
  await tx.update(payouts).set({ state: "booked" }).where(at);
  return ok({ booked: true });
}

/** Keeps a payout with its parts, each led back to our payment where there is one, and books it when all is explained. */
async function recordPayout(ctx: TxContext, fact: PayoutFact, lines: readonly BalanceTransaction[]): Promise<Result<{ booked: boolean }>> {
  const { tx, shop } = ctx;
  await tx.insert(payouts).values({ shopId: shop.id, id: randomUUID(), providerPayoutId: fact.id, amountMinor: fact.amountMinor, arrivesOn: fact.arrivalDate, state: "open" })
    .onConflictDoNothing({ target: [payouts.shopId, payouts.providerPayoutId] });
  const [payout] = await tx.select({ id: payouts.id, state: payouts.state }).from(payouts).where(and(eq(payouts.shopId, shop.id), eq(payouts.providerPayoutId, fact.id))).for("update");
  if (!payout || payout.state === "booked") return ok({ booked: true });
  const intents = lines.flatMap((l) => l.paymentIntent ?? []);
  const known = intents.length ? await tx.select({ id: payments.id, intent: payments.providerPaymentId }).from(payments).where(and(eq(payments.shopId, shop.id), inArray(payments.providerPaymentId, intents))) : [];
  const idOf = new Map(known.map((k) => [k.intent, k.id]));
  for (const l of lines) {
    const paymentId = l.paymentIntent ? (idOf.get(l.paymentIntent) ?? null) : null;
    await tx.insert(payoutItems).values({
      shopId: shop.id, id: randomUUID(), payoutId: payout.id, providerTransactionId: l.id, kind: l.kind, sourceId: l.paymentIntent ?? l.source ?? "", paymentId,
      grossMinor: l.grossMinor, feeMinor: l.feeMinor, netMinor: l.netMinor,
    }).onConflictDoUpdate({ target: [payoutItems.shopId, payoutItems.providerTransactionId], set: { paymentId } });
  }
  return bookPayout(ctx, payout.id);
}

/**
 * Job: asks the provider what a payout is made of and books it in the shop its charges belong to. The shop that carries the
 * job may be another one; then the job is handed on. A payout that mixes shops, or holds nothing known, is set aside.
 */
export async function takePayout(ctx: ShopContext, fact: PayoutFact, eventId: string | null): Promise<void> {
  const lines = await paymentPort().balanceTransactionsOf(fact.id);
  const owners = new Set<string>();
  for (const l of lines) {
    const owner = l.paymentIntent ? await shopOfPayment(l.paymentIntent) : null;
    if (owner) owners.add(owner);
  }
  const [owner] = owners;
  if (owners.size !== 1 || !owner) {
    const reason = owners.size > 1 ? "This payout holds charges of more than one shop; it cannot be booked in one of them." : "None of the charges in this payout is in the books yet.";
    if (eventId) await withSystem("a payout that belongs to no one shop", (tx) => tx.update(providerEvents).set({ doneAt: null, parkedReason: reason, shopId: null }).where(eq(providerEvents.id, eventId)));
    return;
  }
  if (owner !== ctx.shop.id) {
    const there = await systemContext(owner);
    await withShop(owner, (tx) => leaveJob({ ...there, tx }, "payments.payout", { payout: { ...fact }, eventId }));
    return;
  }
  const booked = await withShop(owner, (tx) => recordPayout({ ...ctx, tx }, fact, lines));
  if (!booked.ok && eventId) await setAside(owner, eventId, booked.refusal.message);
}
