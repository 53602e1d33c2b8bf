import { sql } from "drizzle-orm";
import { bigint, boolean, check, foreignKey, index, integer, pgTable, primaryKey, text, unique, uniqueIndex, uuid } from "drizzle-orm/pg-core";
import { businessDate, createdAt, id, instant, minorUnits, shopId, thousandths, version } from "./columns";
import { shops } from "./shops";

export const suppliers = pgTable("suppliers", {
  shopId: shopId().references(() => shops.id),
  id: id(),
  name: text("name").notNull(),
  email: text("email").notNull().default(""),
  phone: text("phone").notNull().default(""),
  address: text("address").notNull().default(""),
  terms: text("terms").notNull().default("net_30"),
  leadDays: integer("lead_days"),
  active: boolean("active").notNull().default(true),
  version: version(),
  createdAt: createdAt(),
}, (t) => [primaryKey({ columns: [t.shopId, t.id] }), unique("suppliers_name").on(t.shopId, t.name)]);

export const parts = pgTable("parts", {
  shopId: shopId().references(() => shops.id),
  id: id(),
  sku: text("sku").notNull(),
  description: text("description").notNull(),
  descriptionKey: text("description_key").notNull(),
  partClass: text("part_class").notNull(),
  families: text("families").array().notNull().default(sql`'{}'::text[]`),
  position: text("position").notNull().default(""),
  stockUnit: text("stock_unit").notNull().default("each"),
  bin: text("bin").notNull().default(""),
  salePriceMinor: minorUnits("sale_price_minor").notNull(),
  isKit: boolean("is_kit").notNull().default(false),
  lotTracked: boolean("lot_tracked").notNull().default(false),
  reorderPointMilli: thousandths("reorder_point_milli"),
  orderQtyMilli: thousandths("order_qty_milli"),
  preferredSupplierId: uuid("preferred_supplier_id"),
  supplierNumber: text("supplier_number").notNull().default(""),
  lastPriceMinor: minorUnits("last_price_minor"),
  materialNote: text("material_note").notNull().default(""),
  hazard: text("hazard").notNull().default(""),
  active: boolean("active").notNull().default(true),
  version: version(),
  createdAt: createdAt(),
}, (t) => [
  primaryKey({ columns: [t.shopId, t.id] }),
  unique("parts_sku").on(t.shopId, t.sku),
  foreignKey({ columns: [t.shopId, t.preferredSupplierId], foreignColumns: [suppliers.shopId, suppliers.id] }),
]);

export const kitLines = pgTable("kit_lines", {
  shopId: shopId(),
  kitPartId: uuid("kit_part_id").notNull(),
  partId: uuid("part_id").notNull(),
  qtyMilli: thousandths("qty_milli").notNull(),
}, (t) => [
  primaryKey({ columns: [t.shopId, t.kitPartId, t.partId] }),
  foreignKey({ columns: [t.shopId, t.kitPartId], foreignColumns: [parts.shopId, parts.id] }),
  foreignKey({ columns: [t.shopId, t.partId], foreignColumns: [parts.shopId, parts.id] }),
]);

/** Kept by the trigger on stock_movements and by nothing else, but for the reserved quantity. */
export const stockBalances = pgTable("stock_balances", {
  shopId: shopId(),
  partId: uuid("part_id").notNull(),
  onHandMilli: thousandths("on_hand_milli").notNull().default(0),
  valueMinor: minorUnits("value_minor").notNull().default(0),
  reservedMilli: thousandths("reserved_milli").notNull().default(0),
}, (t) => [
  primaryKey({ columns: [t.shopId, t.partId] }),
  foreignKey({ columns: [t.shopId, t.partId], foreignColumns: [parts.shopId, parts.id] }),
  check("stock_not_below_zero", sql`on_hand_milli >= 0`),
  check("stock_value_not_below_zero", sql`value_minor >= 0`),
  check("reserved_not_below_zero", sql`reserved_milli >= 0`),
]);

export const lots = pgTable("lots", {
  shopId: shopId(),
  id: id(),
  partId: uuid("part_id").notNull(),
  code: text("code").notNull(),
  expiresOn: businessDate("expires_on"),
  onHandMilli: thousandths("on_hand_milli").notNull().default(0),
  createdAt: createdAt(),
}, (t) => [
  primaryKey({ columns: [t.shopId, t.id] }),
  unique("lots_code").on(t.shopId, t.partId, t.code),
  foreignKey({ columns: [t.shopId, t.partId], foreignColumns: [parts.shopId, parts.id] }),
  check("lot_not_below_zero", sql`on_hand_milli >= 0`),
]);

/** Insert-only ledger of the shelf. A mistake is reversed by a row. */
export const stockMovements = pgTable("stock_movements", {
  shopId: shopId(),
  id: id(),
  seq: bigint("seq", { mode: "number" }).generatedAlwaysAsIdentity(),
  partId: uuid("part_id").notNull(),
  lotId: uuid("lot_id"),
  qtyMilli: thousandths("qty_milli").notNull(),
  valueMinor: minorUnits("value_minor").notNull(),
  kind: text("kind").notNull(),
  workOrderId: uuid("work_order_id"),
  workOrderPartId: uuid("work_order_part_id"),
  receiptLineId: uuid("receipt_line_id"),
  reversesId: uuid("reverses_id"),
  reason: text("reason").notNull().default(""),
  at: instant("at").notNull(),
  personId: uuid("person_id"),
  createdAt: createdAt(),
}, (t) => [
  primaryKey({ columns: [t.shopId, t.id] }),
  foreignKey({ columns: [t.shopId, t.partId], foreignColumns: [parts.shopId, parts.id] }),
  foreignKey({ columns: [t.shopId, t.lotId], foreignColumns: [lots.shopId, lots.id] }),
  uniqueIndex("movement_reversed_once").on(t.shopId, t.reversesId).where(sql`reverses_id is not null`),
  index("movements_part").on(t.shopId, t.partId, t.seq),
  index("movements_work_order").on(t.shopId, t.workOrderId),
]);
