import { sql } from "drizzle-orm";
import { bigint, boolean, foreignKey, index, pgTable, primaryKey, text, uuid, uniqueIndex } from "drizzle-orm/pg-core";
import { createdAt, id, instant, shopId, timeRange, version } from "./columns";
import { people } from "./shops";
import { operations } from "./work-orders";

/** What was pressed, when, where. Insert-only; kept for ever within retention. */
export const punches = pgTable("punches", {
  shopId: shopId(),
  id: id(),
  seq: bigint("seq", { mode: "number" }).generatedAlwaysAsIdentity(),
  personId: uuid("person_id").notNull(),
  kind: text("kind").notNull(),
  at: instant("at").notNull(),
  /** The tablet's own clock, kept beside the server's. */
  deviceAt: instant("device_at"),
  receivedAt: instant("received_at").notNull(),
  source: text("source").notNull(),
  deviceId: uuid("device_id"),
  operationId: uuid("operation_id"),
  indirectCode: text("indirect_code"),
  flag: text("flag"),
  note: text("note").notNull().default(""),
  createdAt: createdAt(),
}, (t) => [
  primaryKey({ columns: [t.shopId, t.id] }),
  foreignKey({ columns: [t.shopId, t.personId], foreignColumns: [people.shopId, people.id] }),
  index("punches_person").on(t.shopId, t.personId, t.at),
]);

/** Intervals folded from punches. One open interval a person and clock; none may overlap. */
export const timeEntries = pgTable("time_entries", {
  shopId: shopId(),
  id: id(),
  personId: uuid("person_id").notNull(),
  /** door | bench */
  clock: text("clock").notNull(),
  operationId: uuid("operation_id"),
  workOrderId: uuid("work_order_id"),
  pieceId: uuid("piece_id"),
  indirectCode: text("indirect_code"),
  startedAt: instant("started_at").notNull(),
  endedAt: instant("ended_at"),
  during: timeRange("during").generatedAlwaysAs(sql`tstzrange(started_at, ended_at, '[)')`),
  source: text("source").notNull(),
  rework: boolean("rework").notNull().default(false),
  /** A correction puts a new row in place of this one; both stay readable. */
  replacedById: uuid("replaced_by_id"),
  voidedAt: instant("voided_at"),
  reason: text("reason").notNull().default(""),
  enteredBy: uuid("entered_by"),
  acceptedBy: uuid("accepted_by"),
  version: version(),
  createdAt: createdAt(),
}, (t) => [
  primaryKey({ columns: [t.shopId, t.id] }),
  foreignKey({ columns: [t.shopId, t.personId], foreignColumns: [people.shopId, people.id] }),
  foreignKey({ columns: [t.shopId, t.operationId], foreignColumns: [operations.shopId, operations.id] }),
  uniqueIndex("time_one_open").on(t.shopId, t.personId, t.clock).where(sql`ended_at is null and voided_at is null`),
  index("time_entries_operation").on(t.shopId, t.operationId),
  index("time_entries_started").on(t.shopId, t.startedAt),
]);

export const correctionRequests = pgTable("correction_requests", {
  shopId: shopId(),
  id: id(),
  personId: uuid("person_id").notNull(),
  timeEntryId: uuid("time_entry_id"),
  clock: text("clock").notNull(),
  operationId: uuid("operation_id"),
  indirectCode: text("indirect_code"),
  startedAt: instant("started_at").notNull(),
  endedAt: instant("ended_at").notNull(),
  reason: text("reason").notNull(),
  askedAt: instant("asked_at").notNull(),
  answer: text("answer"),
  answeredBy: uuid("answered_by"),
  answeredAt: instant("answered_at"),
}, (t) => [
  primaryKey({ columns: [t.shopId, t.id] }),
  foreignKey({ columns: [t.shopId, t.personId], foreignColumns: [people.shopId, people.id] }),
]);
