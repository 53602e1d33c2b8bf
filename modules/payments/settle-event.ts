import "server-only";
import { and, eq } from "drizzle-orm";
import { paymentRequests, providerEvents } from "@/db/schema";
import { withShop } from "@/db/scope";
import type { ShopContext, TxContext } from "@/modules/access/context";
import { leaveJob } from "@/modules/access/jobs";
import { money } from "@/modules/kernel/format";
import { ok, refuse, type Result } from "@/modules/kernel/result";
import type { CheckoutSession, ProviderFact } from "@/modules/outbound/payments/port";
import { bookPayment } from "./book-payment";
import { disputeSeen } from "./dispute-ledger";
import { openEvent, setAside, UNKNOWN_PAGE } from "./events";
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

async function settleFact(ctx: TxContext, type: string, eventId: string, fact: ProviderFact): Promise<Settled> {
  switch (fact.kind) {
    case "checkout": return settleCheckout(ctx, type, fact.session);
    case "refunded": return refundTotalSeen(ctx, fact);
    case "refund": return refundSeen(ctx, fact.refund);
    case "dispute": return disputeSeen(ctx, fact);
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
