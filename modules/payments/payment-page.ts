import "server-only";
import { randomUUID } from "node:crypto";
import { and, desc, eq, gt, inArray, isNotNull, sql } from "drizzle-orm";
import { customers, invoices, links, paymentRequests, workOrders } from "@/db/schema";
import { withShop } from "@/db/scope";
import { inShop, type ShopContext, type TxContext } from "@/modules/access/context";
import { leaveJob } from "@/modules/access/jobs";
import { linkAddress, linkFor } from "@/modules/access/link";
import { openOf } from "@/modules/books/domain/open-sum";
import { minor, type Minor } from "@/modules/kernel/money";
import { ok, refuse, type Result } from "@/modules/kernel/result";
import { PaymentFailure } from "@/modules/outbound/payments/port";
import { depositOf } from "@/modules/work-orders/queries/deposit";
import { paymentPort } from "./provider";

export type PayFor = { readonly purpose: "deposit"; readonly workOrderId: string } | { readonly purpose: "invoice"; readonly invoiceId: string };

interface Due { customerId: string; workOrderId: string | null; estimateId: string | null; invoiceId: string | null; number: string; amountMinor: Minor }

/** What is due now, from the facts; never an amount that somebody sent. */
async function dueFor(ctx: ShopContext, what: PayFor): Promise<Due | null> {
  return inShop(ctx, async (tx) => {
    if (what.purpose === "deposit") {
      const [order] = await tx.select({ number: workOrders.number }).from(workOrders).where(and(eq(workOrders.shopId, ctx.shop.id), eq(workOrders.id, what.workOrderId)));
      const deposit = await depositOf({ ...ctx, tx }, what.workOrderId);
      if (!order || !deposit) return null;
      const [issued] = await tx.select({ id: invoices.id }).from(invoices).where(and(
        eq(invoices.shopId, ctx.shop.id), eq(invoices.workOrderId, what.workOrderId), eq(invoices.kind, "invoice"), eq(invoices.state, "issued"))).limit(1);
      return { customerId: deposit.customerId, workOrderId: what.workOrderId, estimateId: deposit.estimateId, invoiceId: null, number: order.number, amountMinor: minor(issued ? 0 : deposit.openMinor) };
    }
    const [i] = await tx.select().from(invoices).where(and(
      eq(invoices.shopId, ctx.shop.id), eq(invoices.id, what.invoiceId), eq(invoices.kind, "invoice"), eq(invoices.state, "issued")));
    return i ? { customerId: i.customerId, workOrderId: i.workOrderId, estimateId: null, invoiceId: i.id, number: i.number ?? "", amountMinor: openOf(i) } : null;
  });
}

/** A page stands so long at the provider; a little under its limit of 24 hours. */
const PAGE_HOURS = 23;
const MINUTE = 60_000;

export interface AskedPayment { requestId: string; amountMinor: number; url: string | null }

/**
 * Asks for the sum that is open now: one standing request for one matter and sum. The page itself is made by a job (or by
 * the caller after the transaction, with the same key, so that both make the same page).
 * Refuses `NOTHING_DUE` when it is paid already.
 */
export async function askForPayment(ctx: TxContext, what: PayFor): Promise<Result<AskedPayment>> {
  const { tx, shop } = ctx;
  const subject = what.purpose === "deposit" ? what.workOrderId : what.invoiceId;
  await tx.execute(sql`select pg_advisory_xact_lock(hashtextextended(${`pay:${shop.id}:${subject}`}, 3))`);
  const due = await dueFor(ctx, what);
  if (!due) return refuse("NOT_FOUND", "There is nothing to pay here.");
  if (due.amountMinor <= 0) return refuse("NOTHING_DUE", what.purpose === "deposit" ? "The deposit is paid already. Thank you." : "This invoice is paid already. Thank you.");
  const matter = what.purpose === "deposit"
    ? and(eq(paymentRequests.workOrderId, what.workOrderId), eq(paymentRequests.purpose, "deposit")) : and(eq(paymentRequests.invoiceId, what.invoiceId), eq(paymentRequests.purpose, "invoice"));
  const standing = await tx.select().from(paymentRequests).where(and(
    eq(paymentRequests.shopId, shop.id), matter, inArray(paymentRequests.state, ["new", "ready"]), gt(paymentRequests.expiresAt, new Date(ctx.now.getTime() + 35 * MINUTE)),
  )).orderBy(desc(paymentRequests.createdAt));
  const same = standing.find((r) => r.amountMinor === due.amountMinor);
  if (same) return ok({ requestId: same.id, amountMinor: same.amountMinor, url: same.url });
  const stale = standing.map((r) => r.id);
  if (stale.length) await tx.update(paymentRequests).set({ state: "replaced" }).where(and(eq(paymentRequests.shopId, shop.id), inArray(paymentRequests.id, stale)));
  const requestId = randomUUID();
  await tx.insert(paymentRequests).values({
    shopId: shop.id, id: requestId, purpose: what.purpose, customerId: due.customerId, workOrderId: due.workOrderId, estimateId: due.estimateId, invoiceId: due.invoiceId,
    amountMinor: due.amountMinor, currency: shop.currency, expiresAt: new Date(ctx.now.getTime() + PAGE_HOURS * 60 * MINUTE),
  });
  await leaveJob(ctx, "payments.openPage", { requestId }, { dedupeKey: requestId });
  return ok({ requestId, amountMinor: due.amountMinor, url: null });
}

/** Where the customer comes back to: the link they came from, or the matter's standing link. */
async function backTo(ctx: ShopContext, r: typeof paymentRequests.$inferSelect): Promise<string> {
  if (ctx.actor.kind === "customer") return linkAddress(ctx.actor.linkId);
  return withShop(ctx.shop.id, async (tx) => {
    const subjectId = r.invoiceId ?? r.estimateId ?? r.id;
    const [standing] = r.workOrderId ? await tx.select({ id: links.id }).from(links).where(and(
      eq(links.shopId, ctx.shop.id), eq(links.workOrderId, r.workOrderId), eq(links.purpose, r.invoiceId ? "invoice" : "estimate"), gt(links.expiresAt, ctx.now))).orderBy(desc(links.createdAt)).limit(1) : [];
    return standing ? linkAddress(standing.id) : linkFor({ ...ctx, tx }, { purpose: r.invoiceId ? "invoice" : "estimate", subjectId, customerId: r.customerId, workOrderId: r.workOrderId });
  });
}

/**
 * Makes the provider's page of a request and keeps its address. Safe to run twice and by two at once: the key is made
 * from the request, so the provider gives the same page. Never called inside a transaction.
 * @throws PaymentFailure when the provider does not answer
 */
export async function openPaymentPage(ctx: ShopContext, requestId: string, patience: "short" | "long" = "long"): Promise<string | null> {
  const at = and(eq(paymentRequests.shopId, ctx.shop.id), eq(paymentRequests.id, requestId));
  const found = await withShop(ctx.shop.id, async (tx) => {
    const [r] = await tx.select().from(paymentRequests).where(at);
    if (!r) return null;
    const [c] = await tx.select({ email: customers.email }).from(customers).where(and(eq(customers.shopId, ctx.shop.id), eq(customers.id, r.customerId)));
    const [i] = r.invoiceId ? await tx.select({ number: invoices.number }).from(invoices).where(and(eq(invoices.shopId, ctx.shop.id), eq(invoices.id, r.invoiceId))) : [];
    const [o] = r.workOrderId ? await tx.select({ number: workOrders.number }).from(workOrders).where(and(eq(workOrders.shopId, ctx.shop.id), eq(workOrders.id, r.workOrderId))) : [];
    return { r, email: c?.email ?? null, what: i?.number ? `Invoice ${i.number}` : `Deposit, order ${o?.number ?? ""}` };
  });
  if (!found) return null;
  const { r } = found;
  if (r.state === "ready") return r.url;
  if (r.state !== "new" || !r.expiresAt) return null;
  if (r.expiresAt.getTime() < ctx.now.getTime() + 31 * MINUTE) {
    await withShop(ctx.shop.id, (tx) => tx.update(paymentRequests).set({ state: "expired" }).where(and(at, eq(paymentRequests.state, "new"))));
    return null;
  }
  const back = await backTo(ctx, r);
  const port = paymentPort(patience);
  const session = await port.createCheckoutSession({
    amountMinor: r.amountMinor, currency: r.currency, description: `${ctx.shop.name}: ${found.what}`, reference: r.id, metadata: { shop: ctx.shop.id, request: r.id },
    successUrl: `${back}?paid=1`, cancelUrl: back, ...(found.email ? { customerEmail: found.email } : {}), idempotencyKey: `vk-pay-${r.id}`, expiresAt: r.expiresAt,
  });
  await withShop(ctx.shop.id, (tx) => tx.update(paymentRequests).set({ state: "ready", providerSessionId: session.id, url: session.url }).where(and(at, eq(paymentRequests.state, "new"))));
  await closeReplaced(ctx, r);
  return session.url;
}

/** Pages for a sum that is not open any more are shut at the provider, as far as it can be reached. */
async function closeReplaced(ctx: ShopContext, r: typeof paymentRequests.$inferSelect): Promise<void> {
  const old = await withShop(ctx.shop.id, (tx) => tx.select({ id: paymentRequests.id, session: paymentRequests.providerSessionId }).from(paymentRequests).where(and(
    eq(paymentRequests.shopId, ctx.shop.id), eq(paymentRequests.state, "replaced"), isNotNull(paymentRequests.providerSessionId),
    r.invoiceId ? eq(paymentRequests.invoiceId, r.invoiceId) : r.workOrderId ? eq(paymentRequests.workOrderId, r.workOrderId) : eq(paymentRequests.id, r.id))));
  for (const page of old) {
    try {
      if (page.session) await paymentPort().expireSession(page.session);
    } catch (error) {
      // Paid in this very moment, or out of reach: paying it is caught as an overpayment.
      if (!(error instanceof PaymentFailure)) throw error;
    }
  }
}
