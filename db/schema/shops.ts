import { sql } from "drizzle-orm";
import {
  bigint, boolean, foreignKey, index, integer, jsonb, pgTable, primaryKey, text, unique, uniqueIndex, uuid,
} from "drizzle-orm/pg-core";
import { createdAt, id, instant, minorUnits, businessDate, shopId, version } from "./columns";

/** Public facts of a shop. No secrets: it is readable before a shop is known. */
export const shops = pgTable("shops", {
  id: uuid("id").primaryKey(),
  slug: text("slug").notNull().unique(),
  name: text("name").notNull(),
  zone: text("zone").notNull(),
  currency: text("currency").notNull(),
  locale: text("locale").notNull(),
  createdAt: createdAt(),
});

export const shopSettings = pgTable("shop_settings", {
  shopId: shopId().references(() => shops.id),
  address: text("address").notNull().default(""),
  phone: text("phone").notNull().default(""),
  email: text("email").notNull().default(""),
  taxNumber: text("tax_number").notNull().default(""),
  /** "sales": tax on taxable lines; "vat": every line carries it. A setting, not a statement of law. */
  taxMode: text("tax_mode").notNull().default("sales"),
  taxName: text("tax_name").notNull().default("Sales tax"),
  taxRateText: text("tax_rate_text").notNull().default("0"),
  taxBasis: text("tax_basis").notNull().default("invoice"),
  laborTaxable: boolean("labor_taxable").notNull().default(false),
  partsTaxable: boolean("parts_taxable").notNull().default(true),
  suppliesTaxable: boolean("supplies_taxable").notNull().default(true),
  freightTaxable: boolean("freight_taxable").notNull().default(false),
  taxDecidedBy: text("tax_decided_by").notNull().default(""),
  suppliesBasisPoints: integer("supplies_basis_points").notNull().default(0),
  suppliesCapMinor: minorUnits("supplies_cap_minor"),
  depositBasisPoints: integer("deposit_basis_points").notNull().default(0),
  burdenBasisPoints: integer("burden_basis_points").notNull().default(0),
  billRateMinor: minorUnits("bill_rate_minor").notNull().default(0),
  estimateValidDays: integer("estimate_valid_days").notNull().default(30),
  benchCheckHours: integer("bench_check_hours").notNull().default(8),
  nominalPressureInH2O: integer("nominal_pressure_inh2o").notNull().default(28),
  /** Engine speed and power estimates beside the curve of a head; never on an invoice. */
  showFlowEstimates: boolean("show_flow_estimates").notNull().default(false),
  /** Limits of the checks of the flow room that the owner set; what is not named is the product's. */
  flowLimits: jsonb("flow_limits").notNull().default(sql`'{}'::jsonb`),
  writeOffLimitMinor: minorUnits("write_off_limit_minor").notNull().default(100),
  workweekStartDay: integer("workweek_start_day").notNull().default(1),
  invoiceWords: text("invoice_words").notNull().default(""),
  /** Two to four capital letters that begin the shop's payment references. */
  referencePrefix: text("reference_prefix").notNull().default("VK"),
  version: version(),
}, (t) => [primaryKey({ columns: [t.shopId] })]);

export const users = pgTable("users", {
  id: uuid("id").primaryKey(),
  email: text("email").notNull().unique(),
  name: text("name").notNull(),
  passwordHash: text("password_hash").notNull(),
  failedTries: integer("failed_tries").notNull().default(0),
  lockedUntil: instant("locked_until"),
  disabledAt: instant("disabled_at"),
  createdAt: createdAt(),
});

/** One signed-in browser. The signed cookie carries only its id; ending the row ends the session. */
export const sessions = pgTable("sessions", {
  id: uuid("id").primaryKey(),
  userId: uuid("user_id").notNull().references(() => users.id),
  userAgent: text("user_agent").notNull().default(""),
  lastSeenAt: instant("last_seen_at").notNull().defaultNow(),
  expiresAt: instant("expires_at").notNull(),
  revokedAt: instant("revoked_at"),
  createdAt: createdAt(),
}, (t) => [index("sessions_user").on(t.userId)]);

export const people = pgTable("people", {
  shopId: shopId().references(() => shops.id),
  id: id(),
  userId: uuid("user_id").references(() => users.id),
  name: text("name").notNull(),
  shortName: text("short_name").notNull(),
  email: text("email"),
  roles: text("roles").array().notNull(),
  skills: text("skills").array().notNull().default(sql`'{}'::text[]`),
  payClass: text("pay_class").notNull().default("hourly"),
  badgeCode: text("badge_code"),
  pinHash: text("pin_hash"),
  pinFailedTries: integer("pin_failed_tries").notNull().default(0),
  pinLockedUntil: instant("pin_locked_until"),
  leftAt: instant("left_at"),
  version: version(),
  createdAt: createdAt(),
}, (t) => [
  primaryKey({ columns: [t.shopId, t.id] }),
  uniqueIndex("people_badge").on(t.shopId, t.badgeCode).where(sql`badge_code is not null`),
  uniqueIndex("people_user").on(t.shopId, t.userId).where(sql`user_id is not null`),
  index("people_by_user").on(t.userId),
]);

export const payRates = pgTable("pay_rates", {
  shopId: shopId(),
  id: id(),
  personId: uuid("person_id").notNull(),
  validFrom: businessDate("valid_from").notNull(),
  rateMinor: minorUnits("rate_minor").notNull(),
  createdAt: createdAt(),
}, (t) => [
  primaryKey({ columns: [t.shopId, t.id] }),
  foreignKey({ columns: [t.shopId, t.personId], foreignColumns: [people.shopId, people.id] }),
  unique("pay_rates_from").on(t.shopId, t.personId, t.validFrom),
]);

/** A shop tablet, enrolled once; its token opens the clock of one shop and nothing else. */
export const devices = pgTable("devices", {
  shopId: shopId().references(() => shops.id),
  id: id(),
  name: text("name").notNull(),
  kind: text("kind").notNull().default("clock"),
  enrolCodeHash: text("enrol_code_hash"),
  enrolCodeExpiresAt: instant("enrol_code_expires_at"),
  tokenHash: text("token_hash"),
  enrolledBy: uuid("enrolled_by"),
  lastSeenAt: instant("last_seen_at"),
  revokedAt: instant("revoked_at"),
  createdAt: createdAt(),
}, (t) => [
  primaryKey({ columns: [t.shopId, t.id] }),
  uniqueIndex("devices_token").on(t.tokenHash).where(sql`token_hash is not null`),
  uniqueIndex("devices_enrol").on(t.enrolCodeHash).where(sql`enrol_code_hash is not null`),
]);

/** Gap-free number series; taken inside the transaction that issues. */
export const counters = pgTable("counters", {
  shopId: shopId().references(() => shops.id),
  series: text("series").notNull(),
  next: bigint("next", { mode: "number" }).notNull().default(1),
}, (t) => [primaryKey({ columns: [t.shopId, t.series] })]);

/** Uploaded and made files; the bytes are behind the file port. Written only after the bytes are safe. */
export const files = pgTable("files", {
  shopId: shopId().references(() => shops.id),
  id: id(),
  kind: text("kind").notNull(),
  storageKey: text("storage_key").notNull(),
  thumbKey: text("thumb_key"),
  name: text("name").notNull(),
  mime: text("mime").notNull(),
  sizeBytes: integer("size_bytes").notNull(),
  sha256: text("sha256").notNull(),
  subjectKind: text("subject_kind").notNull(),
  subjectId: uuid("subject_id").notNull(),
  note: text("note").notNull().default(""),
  uploadedBy: uuid("uploaded_by"),
  at: instant("at").notNull(),
  createdAt: createdAt(),
}, (t) => [
  primaryKey({ columns: [t.shopId, t.id] }),
  unique("files_key").on(t.shopId, t.storageKey),
  index("files_subject").on(t.shopId, t.subjectKind, t.subjectId),
]);

export type ShopSettings = typeof shopSettings.$inferSelect;
