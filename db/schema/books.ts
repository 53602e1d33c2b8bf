import { sql } from "drizzle-orm";
import { bigint, boolean, check, foreignKey, index, integer, pgTable, primaryKey, text, unique, uuid } from "drizzle-orm/pg-core";
import { businessDate, createdAt, id, instant, minorUnits, shopId } from "./columns";
import { shops } from "./shops";

export const accounts = pgTable("accounts", {
  shopId: shopId().references(() => shops.id),
  code: text("code").notNull(),
  name: text("name").notNull(),
  kind: text("kind").notNull(),
  active: boolean("active").notNull().default(true),
}, (t) => [primaryKey({ columns: [t.shopId, t.code] })]);

/** Insert-only. A deferred constraint refuses an entry whose lines do not sum to zero. */
export const journalEntries = pgTable("journal_entries", {
  shopId: shopId().references(() => shops.id),
  id: id(),
  number: bigint("number", { mode: "number" }).notNull(),
  date: businessDate("date").notNull(),
  text: text("text").notNull(),
  rule: text("rule").notNull(),
  sourceKind: text("source_kind").notNull(),
  sourceId: text("source_id").notNull(),
  workOrderId: uuid("work_order_id"),
  customerId: uuid("customer_id"),
  reversalOf: uuid("reversal_of"),
  at: instant("at").notNull(),
  personId: uuid("person_id"),
  createdAt: createdAt(),
}, (t) => [
  primaryKey({ columns: [t.shopId, t.id] }),
  unique("journal_entries_number").on(t.shopId, t.number),
  unique("journal_entries_once").on(t.shopId, t.rule, t.sourceKind, t.sourceId),
  index("journal_entries_date").on(t.shopId, t.date),
  index("journal_entries_work_order").on(t.shopId, t.workOrderId),
]);

export const journalLines = pgTable("journal_lines", {
  shopId: shopId(),
  entryId: uuid("entry_id").notNull(),
  lineNo: integer("line_no").notNull(),
  accountCode: text("account_code").notNull(),
  /** Debit positive, credit negative. */
  amountMinor: minorUnits("amount_minor").notNull(),
}, (t) => [
  primaryKey({ columns: [t.shopId, t.entryId, t.lineNo] }),
  foreignKey({ columns: [t.shopId, t.entryId], foreignColumns: [journalEntries.shopId, journalEntries.id] }),
  foreignKey({ columns: [t.shopId, t.accountCode], foreignColumns: [accounts.shopId, accounts.code] }),
  check("journal_line_not_zero", sql`amount_minor <> 0`),
  index("journal_lines_account").on(t.shopId, t.accountCode),
]);

export const periods = pgTable("periods", {
  shopId: shopId().references(() => shops.id),
  month: text("month").notNull(),
  closedAt: instant("closed_at"),
  closedBy: uuid("closed_by"),
}, (t) => [primaryKey({ columns: [t.shopId, t.month] })]);
