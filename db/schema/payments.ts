import { sql } from "drizzle-orm";
import { foreignKey, index, integer, pgTable, primaryKey, text, unique, uniqueIndex, uuid } from "drizzle-orm/pg-core";
import { businessDate, createdAt, id, instant, minorUnits, shopId, version } from "./columns";
import { customers } from "./customers";
import { shops } from "./shops";

/** One hosted payment page for one open sum. Looked up by our own stored session id, never by metadata. */
export const paymentRequests = pgTable("payment_requests", {
  shopId: shopId(),
  id: id(),
  purpose: text("purpose").notNull(),
  customerId: uuid("customer_id").notNull(),
  workOrderId: uuid("work_order_id"),
  estimateId: uuid("estimate_id"),
  invoiceId: uuid("invoice_id"),
  amountMinor: minorUnits("amount_minor").notNull(),
  currency: text("currency").notNull(),
  state: text("state").notNull().default("new"),
  providerSessionId: text("provider_session_id"),
  url: text("url"),
  expiresAt: instant("expires_at"),
  paidAt: instant("paid_at"),
  createdAt: createdAt(),
}, (t) => [
  primaryKey({ columns: [t.shopId, t.id] }),
  uniqueIndex("payment_requests_session").on(t.providerSessionId).where(sql`provider_session_id is not null`),
  foreignKey({ columns: [t.shopId, t.customerId], foreignColumns: [customers.shopId, customers.id] }),
]);

export const payments = pgTable("payments", {
  shopId: shopId(),
  id: id(),
  receiptNumber: text("receipt_number").notNull(),
  customerId: uuid("customer_id").notNull(),
  workOrderId: uuid("work_order_id"),
  estimateId: uuid("estimate_id"),
  invoiceId: uuid("invoice_id"),
  purpose: text("purpose").notNull(),
  method: text("method").notNull(),
  amountMinor: minorUnits("amount_minor").notNull(),
  /** Part already set against an invoice (deposits) or kept as credit. */
  appliedMinor: minorUnits("applied_minor").notNull().default(0),
  refundedMinor: minorUnits("refunded_minor").notNull().default(0),
  providerPaymentId: text("provider_payment_id"),
  providerChargeId: text("provider_charge_id"),
  paymentRequestId: uuid("payment_request_id"),
  note: text("note").notNull().default(""),
  receivedAt: instant("received_at").notNull(),
  takenBy: uuid("taken_by"),
  createdAt: createdAt(),
}, (t) => [
  primaryKey({ columns: [t.shopId, t.id] }),
  unique("payments_receipt").on(t.shopId, t.receiptNumber),
  uniqueIndex("payments_provider").on(t.shopId, t.providerPaymentId).where(sql`provider_payment_id is not null`),
  foreignKey({ columns: [t.shopId, t.customerId], foreignColumns: [customers.shopId, customers.id] }),
  index("payments_invoice").on(t.shopId, t.invoiceId),
  index("payments_provider_id").on(t.providerPaymentId),
]);

export const refunds = pgTable("refunds", {
  shopId: shopId(),
  id: id(),
  paymentId: uuid("payment_id").notNull(),
  amountMinor: minorUnits("amount_minor").notNull(),
  reason: text("reason").notNull(),
  providerRefundId: text("provider_refund_id"),
  state: text("state").notNull().default("asked"),
  askedBy: uuid("asked_by"),
  acceptedBy: uuid("accepted_by"),
  at: instant("at").notNull(),
}, (t) => [
  primaryKey({ columns: [t.shopId, t.id] }),
  foreignKey({ columns: [t.shopId, t.paymentId], foreignColumns: [payments.shopId, payments.id] }),
]);

export const payouts = pgTable("payouts", {
  shopId: shopId().references(() => shops.id),
  id: id(),
  providerPayoutId: text("provider_payout_id").notNull(),
  amountMinor: minorUnits("amount_minor").notNull(),
  arrivesOn: businessDate("arrives_on").notNull(),
  state: text("state").notNull(),
  bankLineId: uuid("bank_line_id"),
  createdAt: createdAt(),
}, (t) => [primaryKey({ columns: [t.shopId, t.id] }), unique("payouts_provider").on(t.shopId, t.providerPayoutId)]);

export const payoutItems = pgTable("payout_items", {
  shopId: shopId(),
  id: id(),
  payoutId: uuid("payout_id").notNull(),
  providerTransactionId: text("provider_transaction_id").notNull(),
  kind: text("kind").notNull(),
  sourceId: text("source_id").notNull().default(""),
  paymentId: uuid("payment_id"),
  grossMinor: minorUnits("gross_minor").notNull(),
  feeMinor: minorUnits("fee_minor").notNull(),
  netMinor: minorUnits("net_minor").notNull(),
}, (t) => [
  primaryKey({ columns: [t.shopId, t.id] }),
  unique("payout_items_transaction").on(t.shopId, t.providerTransactionId),
  foreignKey({ columns: [t.shopId, t.payoutId], foreignColumns: [payouts.shopId, payouts.id] }),
]);

export const bankFiles = pgTable("bank_files", {
  shopId: shopId().references(() => shops.id),
  id: id(),
  name: text("name").notNull(),
  sha256: text("sha256").notNull(),
  openingMinor: minorUnits("opening_minor"),
  closingMinor: minorUnits("closing_minor"),
  lineCount: integer("line_count").notNull(),
  at: instant("at").notNull(),
  personId: uuid("person_id"),
}, (t) => [primaryKey({ columns: [t.shopId, t.id] }), unique("bank_files_once").on(t.shopId, t.sha256)]);

export const bankLines = pgTable("bank_lines", {
  shopId: shopId(),
  id: id(),
  bankFileId: uuid("bank_file_id").notNull(),
  lineKey: text("line_key").notNull(),
  date: businessDate("date").notNull(),
  text: text("text").notNull(),
  amountMinor: minorUnits("amount_minor").notNull(),
  matchedKind: text("matched_kind"),
  matchedId: uuid("matched_id"),
  matchedAt: instant("matched_at"),
  matchedBy: uuid("matched_by"),
  version: version(),
}, (t) => [
  primaryKey({ columns: [t.shopId, t.id] }),
  unique("bank_lines_key").on(t.shopId, t.lineKey),
  foreignKey({ columns: [t.shopId, t.bankFileId], foreignColumns: [bankFiles.shopId, bankFiles.id] }),
]);
