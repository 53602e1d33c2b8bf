import "server-only";
import { and, eq, sql } from "drizzle-orm";
import { invoices, paymentRequests, payments, providerEvents } from "@/db/schema";
import { withShop } from "@/db/scope";
import type { ShopContext, TxContext } from "@/modules/access/context";
import { leaveJob } from "@/modules/access/jobs";
import { disputeOpened, disputeWon } from "@/modules/books/domain/posting-sales";
import { openDateFrom, postEntry } from "@/modules/books/post";
import { money } from "@/modules/kernel/format";
import { localDate } from "@/modules/kernel/instant";
import { minor, ZERO } from "@/modules/kernel/money";
import { ok, refuse, type Result } from "@/modules/kernel/result";
import type { CheckoutSession, ProviderFact } from "@/modules/outbound/payments/port";
import { bookPayment } from "./book-payment";
import { openEvent, setAside, UNKNOWN_PAGE, UNKNOWN_PAYMENT } from "./events";
import { refundSeen, refundTotalSeen } from "./refund-ledger";

/** What an event led to; a refusal sets it aside with its sentence. */
type Settled = Result<{ booked: boolean }>;
const nothing = ok({ booked: false });

/** A paid page: looked up by the session we stored, amount and currency compared, booked once. */
async function settleCheckout(ctx: TxContext, type: string, session: CheckoutSession): Promise<Settled> {
  const { tx, shop } = ctx;
  const at = and(eq(paymentRequests.shopId, shop.id), eq(paymentRequests.providerSessionId, session.id));
  const [request] = await tx.select().from(paymentRequests).where(at).for("update");
  if (!request) return refuse("UNKNOWN_PAGE", UNKNOWN_PAGE);
  if (request.state === "paid") return nothing;
  if (type === "checkout.session.expired") {
    if (request.state === "ready") await tx.update(paymentRequests).set({ state: "expired" }).where(at);
    return nothing;
  }
  // Done at the page is not yet paid: slow ways to pay report later.
  if (session.paymentStatus !== "paid") return nothing;
  if (session.currency !== request.currency || session.amountMinor !== request.amountMinor) {
    const said = `${session.currency} ${money(session.amountMinor, { ...shop, currency: session.currency })}`;
    return refuse("AMOUNT_DIFFERS", `The provider says ${said} was paid; we asked for ${request.currency} ${money(request.amountMinor, shop)}. Nothing was booked. Look at it in the provider's own records first.`);
  }
  if (!session.paymentIntent) return refuse("NO_PAYMENT", "The provider names no payment behind this page. Nothing was booked.");
  const target = request.invoiceId ? { invoiceId: request.invoiceId } : request.workOrderId ? { workOrderId: request.workOrderId } : null;
  if (!target) return refuse("NO_TARGET", "This request belongs to no order and no invoice.");
  const booked = await bookPayment(ctx, { for: target, method: "card", amountMinor: session.amountMinor, receivedAt: ctx.now, providerPaymentId: session.paymentIntent, paymentRequestId: request.id });
  if (!booked.ok) return booked;
  await tx.update(paymentRequests).set({ state: "paid", paidAt: ctx.now }).where(at);
  return ok({ booked: true });
}

/** A disputed charge: the money leaves clearing and the receivable is open again; a dispute won brings it back. */
async function settleDispute(ctx: TxContext, d: Extract<ProviderFact, { kind: "dispute" }>): Promise<Settled> {
  const { tx, shop } = ctx;
  const [p] = d.paymentIntent ? await tx.select().from(payments).where(and(eq(payments.shopId, shop.id), eq(payments.providerPaymentId, d.paymentIntent))).for("update") : [];
  if (!p) return refuse("UNKNOWN_PAYMENT", UNKNOWN_PAYMENT);
  const entry = {
    date: await openDateFrom(ctx, localDate(ctx.now, shop.zone)), sourceKind: "dispute", sourceId: d.id, workOrderId: p.workOrderId, customerId: p.customerId,
  };
  const change = async (rule: string, text: string, lines: ReturnType<typeof disputeOpened>, sign: 1 | -1): Promise<Settled> => {
    const before = await tx.execute(sql`select 1 from journal_entries where shop_id = ${shop.id} and rule = ${rule} and source_kind = 'dispute' and source_id = ${d.id}`);
    if (before.rows.length) return nothing;
    const posted = await postEntry(ctx, { ...entry, rule, text, lines });
    if (!posted.ok) return posted;
    if (p.invoiceId) await tx.update(invoices).set({ paidMinor: sql`${invoices.paidMinor} + ${sign * d.amountMinor}` }).where(and(eq(invoices.shopId, shop.id), eq(invoices.id, p.invoiceId)));
    return ok({ booked: true });
  };
  const opened = await change("disputeOpened", `Charge of ${p.receiptNumber} disputed`, disputeOpened({ amountMinor: minor(d.amountMinor), feeMinor: ZERO }), -1);
  if (!opened.ok || d.status !== "won") return opened;
  return change("disputeWon", `Dispute of ${p.receiptNumber} won`, disputeWon({ amountMinor: minor(d.amountMinor) }), 1);
}

async function settleFact(ctx: TxContext, type: string, eventId: string, fact: ProviderFact): Promise<Settled> {
  switch (fact.kind) {
    case "checkout": return settleCheckout(ctx, type, fact.session);
    case "refunded": return refundTotalSeen(ctx, fact);
    case "refund": return refundSeen(ctx, fact.refund);
    case "dispute": return settleDispute(ctx, fact);
    case "payout": {
      if (fact.payout.status === "paid") await leaveJob(ctx, "payments.payout", { payout: fact.payout, eventId });
      return nothing;
    }
    case "other": return nothing;
  }
}

/**
 * Job: works on one kept event, all in one transaction with the mark that it is done, so that a killed worker leaves
 * either both or neither. Twice, late or out of order it has its one effect; what cannot be booked is set aside with a
 * reason a person can act on.
 */
export async function settleEvent(ctx: ShopContext, eventId: string): Promise<void> {
  const kept = await openEvent(eventId);
  if (!kept) return;
  class NotBooked extends Error { constructor(readonly reason: string) { super(reason); } }
  try {
    await withShop(ctx.shop.id, async (tx) => {
      const [lock] = await tx.select({ doneAt: providerEvents.doneAt }).from(providerEvents).where(eq(providerEvents.id, eventId)).for("update");
      if (!lock || lock.doneAt) return;
      const result = await settleFact({ ...ctx, tx }, kept.event.type, eventId, kept.event.fact);
      if (!result.ok) throw new NotBooked(result.refusal.message);
      await tx.update(providerEvents).set({ doneAt: ctx.now, parkedReason: null, shopId: ctx.shop.id }).where(eq(providerEvents.id, eventId));
    });
  } catch (error) {
    if (!(error instanceof NotBooked)) throw error;
    await setAside(ctx.shop.id, eventId, error.reason);
  }
}
