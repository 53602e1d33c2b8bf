import "server-only";
import { randomUUID } from "node:crypto";
import { and, asc, eq, sql } from "drizzle-orm";
import { customers, invoices, payments, workOrders } from "@/db/schema";
import { personIdOf, type TxContext } from "@/modules/access/context";
import { takeYearNumber } from "@/modules/access/numbers";
import { moneyReceived } from "@/modules/books/domain/posting-receipt";
import { openDateFrom, postEntry } from "@/modules/books/post";
import { queueMail } from "@/modules/documents/mail";
import { openOf } from "@/modules/books/domain/open-sum";
import { dateTimeZone, money } from "@/modules/kernel/format";
import { localDate } from "@/modules/kernel/instant";
import { minor, ZERO, type Minor } from "@/modules/kernel/money";
import { ok, refuse, type Result } from "@/modules/kernel/result";
import { depositOf } from "@/modules/work-orders/queries/deposit";
import { METHOD_WORDS, WAY_OF_METHOD, type PaymentMethod } from "./domain/payment-words";

export interface NewPayment {
  readonly for: { readonly invoiceId: string } | { readonly workOrderId: string };
  readonly method: PaymentMethod;
  readonly amountMinor: number;
  readonly receivedAt: Date;
  /** What makes it one of a kind: the provider's payment, or the bank line. A repeat gets the first payment back. */
  readonly providerPaymentId?: string | null;
  readonly paymentRequestId?: string | null;
  readonly note?: string;
  readonly silent?: boolean;
}
export interface BookedPayment { id: string; receiptNumber: string; depositMinor: number; receivableMinor: number; creditMinor: number; openMinor: number }

interface Target { customerId: string; workOrderId: string | null; invoiceId: string | null; estimateId: string | null; number: string; depositDue: Minor; invoiceOpen: Minor }

/** What the money can be set against, locked so that two payments at once see each other. */
async function targetOf(ctx: TxContext, of: NewPayment["for"]): Promise<Target | null> {
  const { tx, shop } = ctx;
  let invoiceId = "invoiceId" in of ? of.invoiceId : null;
  if ("workOrderId" in of) {
    const [order] = await tx.select({ number: workOrders.number, customerId: workOrders.customerId }).from(workOrders)
      .where(and(eq(workOrders.shopId, shop.id), eq(workOrders.id, of.workOrderId))).for("update");
    if (!order) return null;
    // A deposit that comes after the invoice pays the invoice.
    const issued = await tx.select().from(invoices).where(and(
      eq(invoices.shopId, shop.id), eq(invoices.workOrderId, of.workOrderId), eq(invoices.kind, "invoice"), eq(invoices.state, "issued"))).orderBy(asc(invoices.issuedOn));
    const open = issued.find((i) => openOf(i) > 0);
    if (!open) {
      const deposit = await depositOf(ctx, of.workOrderId);
      // Once invoiced, the deposit has been used: nothing is due under that name any more.
      const due = issued.length > 0 ? ZERO : minor(deposit?.openMinor ?? 0);
      return { customerId: order.customerId, workOrderId: of.workOrderId, invoiceId: null, estimateId: deposit?.estimateId ?? null, number: order.number, depositDue: due, invoiceOpen: ZERO };
    }
    invoiceId = open.id;
  }
  if (!invoiceId) return null;
  const [row] = await tx.select().from(invoices).where(and(eq(invoices.shopId, shop.id), eq(invoices.id, invoiceId), eq(invoices.kind, "invoice"), eq(invoices.state, "issued"))).for("update");
  return row ? { customerId: row.customerId, workOrderId: row.workOrderId, invoiceId: row.id, estimateId: null, number: row.number ?? "", depositDue: ZERO, invoiceOpen: openOf(row) } : null;
}

/**
 * Books money that came in: against the deposit due or the invoice's open sum; what is over becomes the customer's
 * credit, never a second deposit. Takes a receipt number, posts the entry, mails the receipt.
 */
export async function bookPayment(ctx: TxContext, p: NewPayment): Promise<Result<BookedPayment>> {
  const { tx, shop } = ctx;
  if (!Number.isSafeInteger(p.amountMinor) || p.amountMinor <= 0) return refuse("AMOUNT_NOT_POSITIVE", "A payment is more than 0.", { field: "amount" });
  const target = await targetOf(ctx, p.for);
  if (!target) return refuse("NOT_FOUND", "There is no such order or issued invoice to pay.");
  if (p.providerPaymentId) {
    const [before] = await tx.select().from(payments).where(and(eq(payments.shopId, shop.id), eq(payments.providerPaymentId, p.providerPaymentId)));
    if (before) return ok({ id: before.id, receiptNumber: before.receiptNumber, depositMinor: 0, receivableMinor: 0, creditMinor: 0, openMinor: target.invoiceOpen });
  }
  const depositMinor = minor(Math.min(p.amountMinor, target.depositDue));
  const receivableMinor = minor(Math.min(p.amountMinor - depositMinor, target.invoiceOpen));
  const creditMinor = minor(p.amountMinor - depositMinor - receivableMinor);
  const id = randomUUID();
  const day = localDate(p.receivedAt, shop.zone);
  const receiptNumber = await takeYearNumber(ctx, "RC", day.slice(0, 4), 5);
  await tx.insert(payments).values({
    shopId: shop.id, id, receiptNumber, customerId: target.customerId, workOrderId: target.workOrderId, invoiceId: target.invoiceId, estimateId: target.estimateId,
    purpose: depositMinor > 0 ? "deposit" : receivableMinor > 0 ? "invoice" : "credit", method: p.method, amountMinor: p.amountMinor, appliedMinor: receivableMinor + creditMinor,
    providerPaymentId: p.providerPaymentId ?? null, paymentRequestId: p.paymentRequestId ?? null, note: p.note ?? "", receivedAt: p.receivedAt, takenBy: personIdOf(ctx),
  });
  if (target.invoiceId && receivableMinor > 0) {
    await tx.update(invoices).set({ paidMinor: sql`${invoices.paidMinor} + ${receivableMinor}` }).where(and(eq(invoices.shopId, shop.id), eq(invoices.id, target.invoiceId)));
  }
  const what = depositMinor > 0 ? `Deposit on ${target.number}` : receivableMinor > 0 ? `Payment of ${target.number}` : `Credit, ${target.number}`;
  const posted = await postEntry(ctx, {
    date: await openDateFrom(ctx, day), text: `${what}, ${METHOD_WORDS[p.method]}, ${receiptNumber}`, rule: depositMinor > 0 ? "depositReceived" : "paymentReceived",
    sourceKind: "payment", sourceId: id, workOrderId: target.workOrderId, customerId: target.customerId,
    lines: moneyReceived({ way: WAY_OF_METHOD[p.method], depositMinor, receivableMinor, creditMinor }),
  });
  if (!posted.ok) return posted;
  const openMinor = minor(target.invoiceOpen - receivableMinor);
  if (!p.silent) await mailReceipt(ctx, { id, receiptNumber, what, target, p, creditMinor, openMinor });
  return ok({ id, receiptNumber, depositMinor, receivableMinor, creditMinor, openMinor });
}

async function mailReceipt(
  ctx: TxContext, r: { id: string; receiptNumber: string; what: string; target: Target; p: NewPayment; creditMinor: Minor; openMinor: Minor },
): Promise<void> {
  const [c] = await ctx.tx.select({ name: customers.name, email: customers.email }).from(customers).where(and(eq(customers.shopId, ctx.shop.id), eq(customers.id, r.target.customerId)));
  if (!c?.email) return;
  const sum = money(r.p.amountMinor, ctx.shop);
  await queueMail(ctx, {
    kind: r.what.startsWith("Deposit") ? "deposit-receipt" : "receipt", to: c.email, toName: c.name, subject: `Receipt ${r.receiptNumber}: ${sum}, ${r.what.charAt(0).toLowerCase()}${r.what.slice(1)}`,
    paragraphs: [
      `Receipt ${r.receiptNumber}\n${sum} received by ${METHOD_WORDS[r.p.method]} on ${dateTimeZone(r.p.receivedAt, ctx.shop)}.\nFor: ${r.what}.`,
      ...(r.creditMinor > 0 ? [`${money(r.creditMinor, ctx.shop)} of it was more than is due. We keep it as your credit: it is taken off your next invoice, or paid back when you ask.`] : []),
      ...(r.target.invoiceId ? [r.openMinor > 0 ? `Still open on ${r.target.number}: ${money(r.openMinor, ctx.shop)}.` : `${r.target.number} is paid in full. Thank you.`] : ["It is taken off your invoice. Thank you."]),
    ],
    workOrderId: r.target.workOrderId, about: { kind: "payment", id: r.id },
  });
}
