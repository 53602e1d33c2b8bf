import "server-only";
import { sendQueuedMail } from "@/modules/documents/mail";
import { makeEstimatePaper } from "@/modules/work-orders/commands/estimate-paper";
import { makeOrderPaper } from "@/modules/purchasing/paper-job";
import { makeInvoicePaper } from "@/modules/invoices/paper";
import { sendRefund } from "@/modules/payments/commands";
import { openPaymentPage } from "@/modules/payments/payment-page";
import { takePayout, type PayoutFact } from "@/modules/payments/payouts";
import { reconcile } from "@/modules/payments/reconcile";
import { settleEvent } from "@/modules/payments/settle-event";
import type { Task } from "@/modules/access/jobs";
import type { Handler } from "./queue";

const text = (payload: Record<string, unknown>, key: string): string => {
  const value = payload[key];
  if (typeof value !== "string") throw new Error(`job without ${key}`);
  return value;
};

const whole = (payload: Record<string, unknown>, key: string): number => {
  const value = payload[key];
  if (typeof value !== "number" || !Number.isSafeInteger(value)) throw new Error(`job without ${key}`);
  return value;
};

/** What each task does. Every one is safe to run twice. */
export const handlers: Partial<Record<Task, Handler>> = {
  "mail.send": (ctx, payload) => sendQueuedMail(ctx, text(payload, "mailId")),
  "estimates.paper": (ctx, payload) => makeEstimatePaper(ctx, text(payload, "estimateId")),
  "purchasing.paper": (ctx, payload) => makeOrderPaper(ctx, { purchaseOrderId: text(payload, "purchaseOrderId"), revision: whole(payload, "revision"), mail: payload.mail === true }),
  "invoices.paper": (ctx, payload) => makeInvoicePaper(ctx, text(payload, "invoiceId"), payload.send === true),
  "payments.openPage": async (ctx, payload) => void (await openPaymentPage(ctx, text(payload, "requestId"))),
  "payments.settleEvent": (ctx, payload) => settleEvent(ctx, text(payload, "eventId")),
  "payments.reconcile": async () => void (await reconcile()),
  "payments.refund": (ctx, payload) => sendRefund(ctx, text(payload, "refundId")),
  "payments.payout": (ctx, payload) => takePayout(ctx, payload.payout as PayoutFact, typeof payload.eventId === "string" ? payload.eventId : null),
};
