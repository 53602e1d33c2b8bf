import { foreignKey, index, integer, pgTable, primaryKey, text, unique, uuid } from "drizzle-orm/pg-core";
import { businessDate, createdAt, id, instant, minorUnits, shopId, thousandths, version } from "./columns";
import { parts, suppliers } from "./stock";

export const purchaseOrders = pgTable("purchase_orders", {
  shopId: shopId(),
  id: id(),
  number: text("number"),
  supplierId: uuid("supplier_id").notNull(),
  /** draft | sent | cancelled; how far it has come in is read from its lines. */
  state: text("state").notNull().default("draft"),
  revision: integer("revision").notNull().default(1),
  neededBy: businessDate("needed_by"),
  expectedOn: businessDate("expected_on"),
  notes: text("notes").notNull().default(""),
  orderedAt: instant("ordered_at"),
  orderedBy: uuid("ordered_by"),
  pdfFileId: uuid("pdf_file_id"),
  version: version(),
  createdAt: createdAt(),
}, (t) => [
  primaryKey({ columns: [t.shopId, t.id] }),
  unique("purchase_orders_number").on(t.shopId, t.number),
  foreignKey({ columns: [t.shopId, t.supplierId], foreignColumns: [suppliers.shopId, suppliers.id] }),
  index("purchase_orders_created").on(t.shopId, t.createdAt),
]);

export const purchaseOrderLines = pgTable("purchase_order_lines", {
  shopId: shopId(),
  id: id(),
  purchaseOrderId: uuid("purchase_order_id").notNull(),
  lineNo: integer("line_no").notNull(),
  partId: uuid("part_id").notNull(),
  supplierNumber: text("supplier_number").notNull().default(""),
  qtyMilli: thousandths("qty_milli").notNull(),
  unitPriceMinor: minorUnits("unit_price_minor").notNull(),
  receivedMilli: thousandths("received_milli").notNull().default(0),
  workOrderId: uuid("work_order_id"),
}, (t) => [
  primaryKey({ columns: [t.shopId, t.id] }),
  unique("purchase_order_lines_no").on(t.shopId, t.purchaseOrderId, t.lineNo),
  foreignKey({ columns: [t.shopId, t.purchaseOrderId], foreignColumns: [purchaseOrders.shopId, purchaseOrders.id] }),
  foreignKey({ columns: [t.shopId, t.partId], foreignColumns: [parts.shopId, parts.id] }),
]);

export const receipts = pgTable("receipts", {
  shopId: shopId(),
  id: id(),
  number: text("number").notNull(),
  purchaseOrderId: uuid("purchase_order_id").notNull(),
  receivedAt: instant("received_at").notNull(),
  freightMinor: minorUnits("freight_minor").notNull(),
  deliveryNote: text("delivery_note").notNull().default(""),
  personId: uuid("person_id"),
}, (t) => [
  primaryKey({ columns: [t.shopId, t.id] }),
  unique("receipts_number").on(t.shopId, t.number),
  foreignKey({ columns: [t.shopId, t.purchaseOrderId], foreignColumns: [purchaseOrders.shopId, purchaseOrders.id] }),
]);

export const receiptLines = pgTable("receipt_lines", {
  shopId: shopId(),
  id: id(),
  receiptId: uuid("receipt_id").notNull(),
  purchaseOrderLineId: uuid("purchase_order_line_id").notNull(),
  qtyMilli: thousandths("qty_milli").notNull(),
  priceValueMinor: minorUnits("price_value_minor").notNull(),
  freightShareMinor: minorUnits("freight_share_minor").notNull(),
  lotCode: text("lot_code"),
  expiresOn: businessDate("expires_on"),
}, (t) => [
  primaryKey({ columns: [t.shopId, t.id] }),
  foreignKey({ columns: [t.shopId, t.receiptId], foreignColumns: [receipts.shopId, receipts.id] }),
  foreignKey({ columns: [t.shopId, t.purchaseOrderLineId], foreignColumns: [purchaseOrderLines.shopId, purchaseOrderLines.id] }),
]);
