import { sql } from "drizzle-orm";
import { foreignKey, index, integer, jsonb, pgTable, primaryKey, text, unique, uniqueIndex, uuid, boolean } from "drizzle-orm/pg-core";
import { businessDate, createdAt, id, instant, minorUnits, shopId, thousandths, version } from "./columns";
import { customers } from "./customers";
import { workOrders } from "./work-orders";

export const invoices = pgTable("invoices", {
  shopId: shopId(),
  id: id(),
  /** Taken in the transaction that issues; a draft has none. */
  number: text("number"),
  kind: text("kind").notNull().default("invoice"),
  workOrderId: uuid("work_order_id"),
  customerId: uuid("customer_id").notNull(),
  state: text("state").notNull().default("draft"),
  issuedOn: businessDate("issued_on"),
  supplyOn: businessDate("supply_on"),
  dueOn: businessDate("due_on"),
  issuedAt: instant("issued_at"),
  issuedBy: uuid("issued_by"),
  terms: text("terms").notNull(),
  totalMinor: minorUnits("total_minor").notNull().default(0),
  depositAppliedMinor: minorUnits("deposit_applied_minor").notNull().default(0),
  paidMinor: minorUnits("paid_minor").notNull().default(0),
  creditedMinor: minorUnits("credited_minor").notNull().default(0),
  reference: text("reference"),
  /** Everything printed, frozen at issue, with the rule set used. */
  snapshot: jsonb("snapshot"),
  pdfFileId: uuid("pdf_file_id"),
  creditsInvoiceId: uuid("credits_invoice_id"),
  creditReason: text("credit_reason"),
  sentAt: instant("sent_at"),
  version: version(),
  createdAt: createdAt(),
}, (t) => [
  primaryKey({ columns: [t.shopId, t.id] }),
  uniqueIndex("invoices_number").on(t.shopId, t.number).where(sql`number is not null`),
  unique("invoices_reference").on(t.shopId, t.reference),
  foreignKey({ columns: [t.shopId, t.customerId], foreignColumns: [customers.shopId, customers.id] }),
  foreignKey({ columns: [t.shopId, t.workOrderId], foreignColumns: [workOrders.shopId, workOrders.id] }),
  index("invoices_customer").on(t.shopId, t.customerId),
]);

export const invoiceLines = pgTable("invoice_lines", {
  shopId: shopId(),
  id: id(),
  invoiceId: uuid("invoice_id").notNull(),
  lineNo: integer("line_no").notNull(),
  kind: text("kind").notNull(),
  pieceTag: text("piece_tag").notNull().default(""),
  description: text("description").notNull(),
  qtyMilli: thousandths("qty_milli").notNull(),
  unit: text("unit").notNull().default(""),
  unitPriceMinor: minorUnits("unit_price_minor").notNull(),
  amountMinor: minorUnits("amount_minor").notNull(),
  bookMinutes: integer("book_minutes").notNull().default(0),
  actualMinutes: integer("actual_minutes").notNull().default(0),
  taxable: boolean("taxable").notNull().default(false),
  sourceKind: text("source_kind").notNull().default(""),
  sourceId: uuid("source_id"),
}, (t) => [
  primaryKey({ columns: [t.shopId, t.id] }),
  unique("invoice_lines_no").on(t.shopId, t.invoiceId, t.lineNo),
  foreignKey({ columns: [t.shopId, t.invoiceId], foreignColumns: [invoices.shopId, invoices.id] }),
]);
