import { sql } from "drizzle-orm";
import { bigint, index, integer, jsonb, pgTable, primaryKey, text, unique, uniqueIndex, uuid } from "drizzle-orm/pg-core";
import { createdAt, id, instant, shopId } from "./columns";
import { shops } from "./shops";

/** One row per acknowledged command: a repeat with the same request id gets the first answer. */
export const commandLog = pgTable("command_log", {
  shopId: shopId().references(() => shops.id),
  requestId: uuid("request_id").notNull(),
  command: text("command").notNull(),
  actor: text("actor").notNull(),
  inputHash: text("input_hash").notNull(),
  reply: jsonb("reply").notNull(),
  createdAt: createdAt(),
}, (t) => [primaryKey({ columns: [t.shopId, t.requestId] })]);

/** Insert-only; each row's hash covers the one before, so a change or a hole shows. */
export const auditLog = pgTable("audit_log", {
  shopId: shopId().references(() => shops.id),
  seq: bigint("seq", { mode: "number" }).notNull(),
  at: instant("at").notNull(),
  actor: text("actor").notNull(),
  actorName: text("actor_name").notNull(),
  command: text("command").notNull(),
  requestId: uuid("request_id"),
  subjectKind: text("subject_kind"),
  subjectId: text("subject_id"),
  note: text("note").notNull().default(""),
  detail: jsonb("detail").notNull(),
  prevHash: text("prev_hash").notNull(),
  hash: text("hash").notNull(),
}, (t) => [primaryKey({ columns: [t.shopId, t.seq] }), index("audit_subject").on(t.shopId, t.subjectKind, t.subjectId)]);

/** Work that can wait, written with the fact that causes it. Leased, so a killed worker's job is taken up again. */
export const jobs = pgTable("jobs", {
  shopId: shopId().references(() => shops.id),
  id: id(),
  task: text("task").notNull(),
  payload: jsonb("payload").notNull(),
  dedupeKey: text("dedupe_key"),
  runAt: instant("run_at").notNull().defaultNow(),
  leaseUntil: instant("lease_until"),
  tries: integer("tries").notNull().default(0),
  lastError: text("last_error"),
  doneAt: instant("done_at"),
  parkedAt: instant("parked_at"),
  createdAt: createdAt(),
}, (t) => [
  primaryKey({ columns: [t.shopId, t.id] }),
  uniqueIndex("jobs_dedupe").on(t.shopId, t.task, t.dedupeKey).where(sql`dedupe_key is not null`),
  index("jobs_ready").on(t.runAt).where(sql`done_at is null and parked_at is null`),
]);

/** Mail the shop sent or is sending; what a customer was sent can always be read again. */
export const mailMessages = pgTable("mail_messages", {
  shopId: shopId().references(() => shops.id),
  id: id(),
  kind: text("kind").notNull(),
  toAddress: text("to_address").notNull(),
  toName: text("to_name").notNull().default(""),
  subject: text("subject").notNull(),
  bodyText: text("body_text").notNull(),
  bodyHtml: text("body_html").notNull(),
  attachmentFileIds: uuid("attachment_file_ids").array().notNull().default(sql`'{}'::uuid[]`),
  workOrderId: uuid("work_order_id"),
  subjectKind: text("subject_kind"),
  subjectId: uuid("subject_id"),
  state: text("state").notNull().default("queued"),
  error: text("error"),
  sentAt: instant("sent_at"),
  queuedBy: text("queued_by").notNull().default(""),
  at: instant("at").notNull(),
  createdAt: createdAt(),
}, (t) => [primaryKey({ columns: [t.shopId, t.id] }), index("mail_subject").on(t.shopId, t.subjectKind, t.subjectId)]);

/** What a customer may open: one matter, one purpose. Only the hash of the token is kept. */
export const links = pgTable("links", {
  shopId: shopId().references(() => shops.id),
  id: id(),
  tokenHash: text("token_hash").notNull().unique(),
  purpose: text("purpose").notNull(),
  customerId: uuid("customer_id").notNull(),
  workOrderId: uuid("work_order_id"),
  subjectId: uuid("subject_id").notNull(),
  expiresAt: instant("expires_at").notNull(),
  revokedAt: instant("revoked_at"),
  firstOpenedAt: instant("first_opened_at"),
  lastOpenedAt: instant("last_opened_at"),
  createdAt: createdAt(),
}, (t) => [primaryKey({ columns: [t.shopId, t.id] }), index("links_subject").on(t.shopId, t.subjectId)]);

/** Raw signed events of the payment provider, kept before anything is done with them. */
export const providerEvents = pgTable("provider_events", {
  id: text("id").primaryKey(),
  type: text("type").notNull(),
  body: jsonb("body").notNull(),
  shopId: uuid("shop_ref"),
  receivedAt: instant("received_at").notNull().defaultNow(),
  timesSeen: integer("times_seen").notNull().default(1),
  doneAt: instant("done_at"),
  parkedReason: text("parked_reason"),
});

/** Counts of tries by key (sign-in, links, PIN), in fixed windows. */
export const rateLimits = pgTable("rate_limits", {
  key: text("key").notNull(),
  windowStart: instant("window_start").notNull(),
  hits: integer("hits").notNull().default(1),
}, (t) => [primaryKey({ columns: [t.key, t.windowStart] })]);

export const appliedSteps = pgTable("applied_steps", {
  name: text("name").primaryKey(),
  appliedAt: createdAt(),
}, (t) => [unique().on(t.name)]);
