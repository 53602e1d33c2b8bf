import { sql } from "drizzle-orm";
import { boolean, foreignKey, index, integer, jsonb, pgTable, primaryKey, text, unique, uniqueIndex, uuid } from "drizzle-orm/pg-core";
import { businessDate, createdAt, id, instant, minorUnits, shopId, thousandths, version } from "./columns";
import { customers } from "./customers";
import { people, shops } from "./shops";
import { parts } from "./stock";

/** The priced menu. Edits make a new price for new estimates; agreed lines keep theirs. */
export const menuOperations = pgTable("menu_operations", {
  shopId: shopId().references(() => shops.id),
  id: id(),
  code: text("code").notNull(),
  name: text("name").notNull(),
  customerWords: text("customer_words").notNull().default(""),
  /** One of the eight stations of the floor. */
  station: text("station").notNull(),
  skill: text("skill").notNull(),
  sequence: integer("sequence").notNull(),
  bookMinutes: integer("book_minutes").notNull(),
  priceMinor: minorUnits("price_minor").notNull(),
  billing: text("billing").notNull().default("fixed"),
  needsBefore: text("needs_before").array().notNull().default(sql`'{}'::text[]`),
  mustRecord: text("must_record").notNull().default(""),
  hazards: text("hazards").array().notNull().default(sql`'{}'::text[]`),
  active: boolean("active").notNull().default(true),
  version: version(),
  createdAt: createdAt(),
}, (t) => [primaryKey({ columns: [t.shopId, t.id] }), unique("menu_operations_code").on(t.shopId, t.code)]);

export const workOrders = pgTable("work_orders", {
  shopId: shopId().references(() => shops.id),
  id: id(),
  number: text("number").notNull(),
  customerId: uuid("customer_id").notNull(),
  customerReference: text("customer_reference").notNull().default(""),
  wants: text("wants").notNull().default(""),
  use: text("use").notNull().default("road"),
  promisedOn: businessDate("promised_on"),
  laborDiscountBasisPoints: integer("labor_discount_basis_points").notNull().default(0),
  openedAt: instant("opened_at").notNull(),
  openedBy: uuid("opened_by"),
  /** The estimate version that stands agreed, if any. */
  agreedEstimateId: uuid("agreed_estimate_id"),
  closedAt: instant("closed_at"),
  cancelledAt: instant("cancelled_at"),
  cancelReason: text("cancel_reason"),
  notes: text("notes").notNull().default(""),
  version: version(),
  createdAt: createdAt(),
}, (t) => [
  primaryKey({ columns: [t.shopId, t.id] }),
  unique("work_orders_number").on(t.shopId, t.number),
  foreignKey({ columns: [t.shopId, t.customerId], foreignColumns: [customers.shopId, customers.id] }),
  index("work_orders_customer").on(t.shopId, t.customerId),
  index("work_orders_opened").on(t.shopId, t.openedAt),
]);

export const promises = pgTable("promises", {
  shopId: shopId(),
  id: id(),
  workOrderId: uuid("work_order_id").notNull(),
  promisedOn: businessDate("promised_on").notNull(),
  reason: text("reason").notNull(),
  at: instant("at").notNull(),
  personId: uuid("person_id"),
}, (t) => [
  primaryKey({ columns: [t.shopId, t.id] }),
  foreignKey({ columns: [t.shopId, t.workOrderId], foreignColumns: [workOrders.shopId, workOrders.id] }),
]);

/** One physical head (or cylinder, or bare casting). Its tag number is given when it is booked in. */
export const workPieces = pgTable("pieces", {
  shopId: shopId(),
  id: id(),
  workOrderId: uuid("work_order_id").notNull(),
  pieceNo: integer("piece_no").notNull(),
  tag: text("tag"),
  ownerKind: text("owner_kind").notNull().default("customer"),
  family: text("family").notNull(),
  description: text("description").notNull().default(""),
  castingNumber: text("casting_number").notNull().default(""),
  serial: text("serial").notNull().default(""),
  declaredValueMinor: minorUnits("declared_value_minor"),
  seatMaterial: text("seat_material").notNull().default("unknown"),
  place: text("place").notNull().default(""),
  bookedInAt: instant("booked_in_at"),
  releasedAt: instant("released_at"),
  releasedBy: uuid("released_by"),
  handedOverAt: instant("handed_over_at"),
  handedOverTo: text("handed_over_to"),
  stoppedAt: instant("stopped_at"),
  stopReason: text("stop_reason"),
  version: version(),
  createdAt: createdAt(),
}, (t) => [
  primaryKey({ columns: [t.shopId, t.id] }),
  unique("pieces_number").on(t.shopId, t.workOrderId, t.pieceNo),
  uniqueIndex("pieces_tag").on(t.shopId, t.tag).where(sql`tag is not null`),
  foreignKey({ columns: [t.shopId, t.workOrderId], foreignColumns: [workOrders.shopId, workOrders.id] }),
]);

/** What came out of the parcel, who looked, what was missing or damaged. */
export const receivingChecks = pgTable("receiving_checks", {
  shopId: shopId(),
  id: id(),
  pieceId: uuid("piece_id").notNull(),
  at: instant("at").notNull(),
  personId: uuid("person_id"),
  parcelCondition: text("parcel_condition").notNull(),
  /** `{ "valves": 4, "springs": 4, … }` as counted. */
  counts: jsonb("counts").notNull(),
  missing: text("missing").notNull().default(""),
  damage: text("damage").notNull().default(""),
  notes: text("notes").notNull().default(""),
}, (t) => [
  primaryKey({ columns: [t.shopId, t.id] }),
  foreignKey({ columns: [t.shopId, t.pieceId], foreignColumns: [workPieces.shopId, workPieces.id] }),
]);

export const estimates = pgTable("estimates", {
  shopId: shopId(),
  id: id(),
  workOrderId: uuid("work_order_id").notNull(),
  /** 1, 2, 3 …; a sent version is fixed, a change makes the next one. */
  estimateNo: integer("estimate_no").notNull(),
  state: text("state").notNull().default("draft"),
  validUntil: businessDate("valid_until"),
  sentAt: instant("sent_at"),
  sentTo: text("sent_to"),
  openedAt: instant("opened_at"),
  laborDiscountBasisPoints: integer("labor_discount_basis_points").notNull().default(0),
  freightMinor: minorUnits("freight_minor").notNull().default(0),
  exclusions: text("exclusions").notNull().default(""),
  message: text("message").notNull().default(""),
  estimatedReadyOn: businessDate("estimated_ready_on"),
  depositBasisPoints: integer("deposit_basis_points").notNull().default(0),
  /** Totals and rule set as sent; empty while a draft. */
  snapshot: jsonb("snapshot"),
  documentHash: text("document_hash"),
  pdfFileId: uuid("pdf_file_id"),
  version: version(),
  createdAt: createdAt(),
}, (t) => [
  primaryKey({ columns: [t.shopId, t.id] }),
  unique("estimates_number").on(t.shopId, t.workOrderId, t.estimateNo),
  foreignKey({ columns: [t.shopId, t.workOrderId], foreignColumns: [workOrders.shopId, workOrders.id] }),
]);

export const estimateLines = pgTable("estimate_lines", {
  shopId: shopId(),
  id: id(),
  estimateId: uuid("estimate_id").notNull(),
  lineNo: integer("line_no").notNull(),
  /** labor | part | text */
  kind: text("kind").notNull(),
  pieceId: uuid("piece_id"),
  operationCode: text("operation_code"),
  partId: uuid("part_id"),
  description: text("description").notNull(),
  qtyMilli: thousandths("qty_milli").notNull(),
  unitPriceMinor: minorUnits("unit_price_minor").notNull(),
  amountMinor: minorUnits("amount_minor").notNull(),
  bookMinutes: integer("book_minutes").notNull().default(0),
  findingId: uuid("finding_id"),
}, (t) => [
  primaryKey({ columns: [t.shopId, t.id] }),
  unique("estimate_lines_no").on(t.shopId, t.estimateId, t.lineNo),
  foreignKey({ columns: [t.shopId, t.estimateId], foreignColumns: [estimates.shopId, estimates.id] }),
  foreignKey({ columns: [t.shopId, t.pieceId], foreignColumns: [workPieces.shopId, workPieces.id] }),
  foreignKey({ columns: [t.shopId, t.partId], foreignColumns: [parts.shopId, parts.id] }),
]);

/** The customer's yes or no: who, when, which version, in which words. Insert-only. */
export const approvals = pgTable("approvals", {
  shopId: shopId(),
  id: id(),
  estimateId: uuid("estimate_id").notNull(),
  answer: text("answer").notNull(),
  /** link | phone | counter */
  via: text("via").notNull(),
  name: text("name").notNull(),
  at: instant("at").notNull(),
  ip: text("ip").notNull().default(""),
  agent: text("agent").notNull().default(""),
  phoneNumber: text("phone_number").notNull().default(""),
  takenBy: uuid("taken_by"),
  documentHash: text("document_hash").notNull(),
  words: text("words").notNull(),
  totalMinor: minorUnits("total_minor").notNull(),
}, (t) => [
  primaryKey({ columns: [t.shopId, t.id] }),
  unique("approvals_one_answer").on(t.shopId, t.estimateId),
  foreignKey({ columns: [t.shopId, t.estimateId], foreignColumns: [estimates.shopId, estimates.id] }),
]);

/** An agreed operation on one piece. Started and done are facts; its state is read from them. */
export const operations = pgTable("operations", {
  shopId: shopId(),
  id: id(),
  workOrderId: uuid("work_order_id").notNull(),
  pieceId: uuid("piece_id").notNull(),
  sequence: integer("sequence").notNull(),
  code: text("code").notNull(),
  name: text("name").notNull(),
  station: text("station").notNull(),
  skill: text("skill").notNull(),
  qtyMilli: thousandths("qty_milli").notNull(),
  bookMinutes: integer("book_minutes").notNull(),
  priceMinor: minorUnits("price_minor").notNull(),
  estimateLineId: uuid("estimate_line_id"),
  needsBefore: text("needs_before").array().notNull().default(sql`'{}'::text[]`),
  hazards: text("hazards").array().notNull().default(sql`'{}'::text[]`),
  benchNote: text("bench_note").notNull().default(""),
  startedAt: instant("started_at"),
  doneAt: instant("done_at"),
  doneBy: uuid("done_by"),
  /** Work on this operation may not start before: cure over, for one. */
  notBefore: instant("not_before"),
  notBeforeReason: text("not_before_reason"),
  skippedAt: instant("skipped_at"),
  skipReason: text("skip_reason"),
  removedAt: instant("removed_at"),
  version: version(),
  createdAt: createdAt(),
}, (t) => [
  primaryKey({ columns: [t.shopId, t.id] }),
  foreignKey({ columns: [t.shopId, t.workOrderId], foreignColumns: [workOrders.shopId, workOrders.id] }),
  foreignKey({ columns: [t.shopId, t.pieceId], foreignColumns: [workPieces.shopId, workPieces.id] }),
  index("operations_piece").on(t.shopId, t.pieceId, t.sequence),
]);

/** Epoxy as mixed: lots and grams are issued from stock; the cure clock starts at mixing. */
export const epoxyFills = pgTable("epoxy_fills", {
  shopId: shopId(),
  id: id(),
  pieceId: uuid("piece_id").notNull(),
  operationId: uuid("operation_id").notNull(),
  port: text("port").notNull(),
  gramsInPortMilli: thousandths("grams_in_port_milli").notNull(),
  gramsWasteMilli: thousandths("grams_waste_milli").notNull(),
  ratioText: text("ratio_text").notNull(),
  surfacePrepared: boolean("surface_prepared").notNull(),
  mixedAt: instant("mixed_at").notNull(),
  cureMinutes: integer("cure_minutes").notNull(),
  readyAt: instant("ready_at").notNull(),
  personId: uuid("person_id"),
  at: instant("at").notNull(),
}, (t) => [
  primaryKey({ columns: [t.shopId, t.id] }),
  foreignKey({ columns: [t.shopId, t.pieceId], foreignColumns: [workPieces.shopId, workPieces.id] }),
]);

/** Parts the job needs, kits already opened into their parts. Issued quantity follows the stock movements. */
export const workOrderParts = pgTable("work_order_parts", {
  shopId: shopId(),
  id: id(),
  workOrderId: uuid("work_order_id").notNull(),
  pieceId: uuid("piece_id"),
  partId: uuid("part_id").notNull(),
  neededMilli: thousandths("needed_milli").notNull(),
  reservedMilli: thousandths("reserved_milli").notNull().default(0),
  issuedMilli: thousandths("issued_milli").notNull().default(0),
  issuedValueMinor: minorUnits("issued_value_minor").notNull().default(0),
  estimateLineId: uuid("estimate_line_id"),
  removedAt: instant("removed_at"),
  version: version(),
}, (t) => [
  primaryKey({ columns: [t.shopId, t.id] }),
  foreignKey({ columns: [t.shopId, t.workOrderId], foreignColumns: [workOrders.shopId, workOrders.id] }),
  foreignKey({ columns: [t.shopId, t.partId], foreignColumns: [parts.shopId, parts.id] }),
  index("work_order_parts_part").on(t.shopId, t.partId),
]);

export const findings = pgTable("findings", {
  shopId: shopId(),
  id: id(),
  pieceId: uuid("piece_id").notNull(),
  workOrderId: uuid("work_order_id").notNull(),
  words: text("words").notNull(),
  position: text("position").notNull().default(""),
  foundAt: instant("found_at").notNull(),
  foundBy: uuid("found_by"),
  goOnMeanwhile: boolean("go_on_meanwhile").notNull().default(true),
  /** The estimate version that asks for it, and the answer through that version. */
  estimateId: uuid("estimate_id"),
  withdrawnAt: instant("withdrawn_at"),
  version: version(),
}, (t) => [
  primaryKey({ columns: [t.shopId, t.id] }),
  foreignKey({ columns: [t.shopId, t.pieceId], foreignColumns: [workPieces.shopId, workPieces.id] }),
  foreignKey({ columns: [t.shopId, t.workOrderId], foreignColumns: [workOrders.shopId, workOrders.id] }),
]);

export const holds = pgTable("holds", {
  shopId: shopId(),
  id: id(),
  pieceId: uuid("piece_id").notNull(),
  reason: text("reason").notNull(),
  words: text("words").notNull().default(""),
  since: instant("since").notNull(),
  setBy: uuid("set_by"),
  endedAt: instant("ended_at"),
  endedBy: uuid("ended_by"),
}, (t) => [
  primaryKey({ columns: [t.shopId, t.id] }),
  foreignKey({ columns: [t.shopId, t.pieceId], foreignColumns: [workPieces.shopId, workPieces.id] }),
]);

/** Final inspection, released or refused. Insert-only. */
export const inspections = pgTable("inspections", {
  shopId: shopId(),
  id: id(),
  pieceId: uuid("piece_id").notNull(),
  at: instant("at").notNull(),
  personId: uuid("person_id").notNull(),
  checklist: jsonb("checklist").notNull(),
  outcome: text("outcome").notNull(),
  reason: text("reason").notNull().default(""),
  alone: boolean("alone").notNull().default(false),
}, (t) => [
  primaryKey({ columns: [t.shopId, t.id] }),
  foreignKey({ columns: [t.shopId, t.pieceId], foreignColumns: [workPieces.shopId, workPieces.id] }),
  foreignKey({ columns: [t.shopId, t.personId], foreignColumns: [people.shopId, people.id] }),
]);

export const shipments = pgTable("shipments", {
  shopId: shopId(),
  id: id(),
  workOrderId: uuid("work_order_id").notNull(),
  carrier: text("carrier").notNull(),
  service: text("service").notNull().default(""),
  tracking: text("tracking").notNull().default(""),
  insuredMinor: minorUnits("insured_minor"),
  costMinor: minorUnits("cost_minor").notNull(),
  at: instant("at").notNull(),
  personId: uuid("person_id"),
}, (t) => [
  primaryKey({ columns: [t.shopId, t.id] }),
  foreignKey({ columns: [t.shopId, t.workOrderId], foreignColumns: [workOrders.shopId, workOrders.id] }),
]);
/** A caution shown for a job and step, dismissed once by a named person. */
export const cautionsSeen = pgTable("cautions_seen", {
  shopId: shopId(),
  id: id(),
  workOrderId: uuid("work_order_id").notNull(),
  hazard: text("hazard").notNull(),
  step: text("step").notNull(),
  personId: uuid("person_id").notNull(),
  at: instant("at").notNull(),
}, (t) => [
  primaryKey({ columns: [t.shopId, t.id] }),
  unique("cautions_once").on(t.shopId, t.workOrderId, t.hazard, t.step, t.personId),
  foreignKey({ columns: [t.shopId, t.workOrderId], foreignColumns: [workOrders.shopId, workOrders.id] }),
]);
