import { sql } from "drizzle-orm";
import { boolean, doublePrecision, foreignKey, index, integer, jsonb, pgTable, primaryKey, text, unique, uniqueIndex, uuid } from "drizzle-orm/pg-core";
import { businessDate, createdAt, id, instant, shopId, version } from "./columns";
import { people, shops } from "./shops";
import { workPieces } from "./work-orders";

export const benches = pgTable("benches", {
  shopId: shopId().references(() => shops.id),
  id: id(),
  name: text("name").notNull(),
  /** series_orifice | absolute_meter */
  kind: text("kind").notNull().default("series_orifice"),
  /** direct | percent_linear | orifice_head */
  scale: text("scale").notNull().default("direct"),
  /** [{ label, fullScaleCfm, fullScaleHead? }] */
  ranges: jsonb("ranges").notNull().default(sql`'[]'::jsonb`),
  waterUnit: text("water_unit").notNull().default("conventional"),
  nominalPressuresInH2O: doublePrecision("nominal_pressures_inh2o").array().notNull().default(sql`'{28}'::float8[]`),
  maxFlowCfm: doublePrecision("max_flow_cfm").notNull().default(600),
  pressureUncertaintyInH2O: doublePrecision("pressure_uncertainty_inh2o"),
  readingUncertaintyCfm: doublePrecision("reading_uncertainty_cfm"),
  altitudeM: doublePrecision("altitude_m"),
  active: boolean("active").notNull().default(true),
  version: version(),
  createdAt: createdAt(),
}, (t) => [primaryKey({ columns: [t.shopId, t.id] }), unique("benches_name").on(t.shopId, t.name)]);

export const checkPlates = pgTable("check_plates", {
  shopId: shopId().references(() => shops.id),
  id: id(),
  serial: text("serial").notNull(),
  referenceFlowCfm: doublePrecision("reference_flow_cfm").notNull(),
  atPressureInH2O: doublePrecision("at_pressure_inh2o").notNull(),
  certificate: text("certificate").notNull().default(""),
  dueOn: businessDate("due_on"),
  active: boolean("active").notNull().default(true),
  version: version(),
  createdAt: createdAt(),
}, (t) => [primaryKey({ columns: [t.shopId, t.id] }), unique("check_plates_serial").on(t.shopId, t.serial)]);

/** Bench factor with its dated history; a test keeps the factor of its day. Insert-only. */
export const benchChecks = pgTable("bench_checks", {
  shopId: shopId(),
  id: id(),
  benchId: uuid("bench_id").notNull(),
  at: instant("at").notNull(),
  personId: uuid("person_id"),
  /** [{ plateId, serial, referenceCfm, indicatedText, indicatedCfm }] */
  plateReadings: jsonb("plate_readings").notNull(),
  factor: doublePrecision("factor").notNull(),
  maxResidualPercent: doublePrecision("max_residual_percent").notNull(),
  driftPercent: doublePrecision("drift_percent"),
  flags: text("flags").array().notNull().default(sql`'{}'::text[]`),
  note: text("note").notNull().default(""),
  /** Why a doubtful check was kept, or why an earlier one is put out of use. */
  reason: text("reason"),
  /** The earlier check of this bench that this row puts out of use. Such a row is itself no check. */
  strikes: uuid("strikes"),
}, (t) => [
  primaryKey({ columns: [t.shopId, t.id] }),
  foreignKey({ columns: [t.shopId, t.benchId], foreignColumns: [benches.shopId, benches.id] }),
  foreignKey({ columns: [t.shopId, t.strikes], foreignColumns: [t.shopId, t.id] }),
  uniqueIndex("bench_check_struck_once").on(t.shopId, t.strikes).where(sql`strikes is not null`),
  index("bench_checks_at").on(t.shopId, t.benchId, t.at),
]);

export const fixtures = pgTable("fixtures", {
  shopId: shopId().references(() => shops.id),
  id: id(),
  name: text("name").notNull(),
  boreMm: doublePrecision("bore_mm").notNull(),
  lengthMm: doublePrecision("length_mm"),
  headPattern: text("head_pattern").notNull().default(""),
  plate: text("plate").notNull().default(""),
  active: boolean("active").notNull().default(true),
  version: version(),
  createdAt: createdAt(),
}, (t) => [primaryKey({ columns: [t.shopId, t.id] }), unique("fixtures_name").on(t.shopId, t.name)]);

export const liftDevices = pgTable("lift_devices", {
  shopId: shopId().references(() => shops.id),
  id: id(),
  name: text("name").notNull(),
  resolutionMm: doublePrecision("resolution_mm").notNull(),
  uncertaintyMm: doublePrecision("uncertainty_mm"),
  active: boolean("active").notNull().default(true),
  version: version(),
  createdAt: createdAt(),
}, (t) => [primaryKey({ columns: [t.shopId, t.id] }), unique("lift_devices_name").on(t.shopId, t.name)]);

export const camshafts = pgTable("camshafts", {
  shopId: shopId().references(() => shops.id),
  id: id(),
  label: text("label").notNull(),
  side: text("side").notNull(),
  maxLiftUm: integer("max_lift_um").notNull(),
  durationDeg: doublePrecision("duration_deg"),
  /** [{ angleDeg, liftUm }]; empty when only lift and duration are known */
  profile: jsonb("profile").notNull().default(sql`'[]'::jsonb`),
  dataSource: text("data_source").notNull().default(""),
  active: boolean("active").notNull().default(true),
  version: version(),
  createdAt: createdAt(),
}, (t) => [primaryKey({ columns: [t.shopId, t.id] }), unique("camshafts_label").on(t.shopId, t.label, t.side)]);

/** Engine family as the shop names it, with its valve lists. No built-in engine data. */
export const engineFamilies = pgTable("engine_families", {
  shopId: shopId().references(() => shops.id),
  id: id(),
  name: text("name").notNull(),
  cylinders: integer("cylinders").notNull().default(1),
  boreMm: doublePrecision("bore_mm"),
  strokeMm: doublePrecision("stroke_mm"),
  /** [{ side, position, headMm, stemMm, seatAngleDeg }] */
  valves: jsonb("valves").notNull().default(sql`'[]'::jsonb`),
  camLiftIntakeUm: integer("cam_lift_intake_um"),
  camLiftExhaustUm: integer("cam_lift_exhaust_um"),
  notes: text("notes").notNull().default(""),
  version: version(),
  createdAt: createdAt(),
}, (t) => [primaryKey({ columns: [t.shopId, t.id] }), unique("engine_families_name").on(t.shopId, t.name)]);

/** A physical casting the shop has flowed: a customer's piece, or the shop's own development head. */
export const heads = pgTable("heads", {
  shopId: shopId().references(() => shops.id),
  id: id(),
  pieceId: uuid("piece_id"),
  ownerKind: text("owner_kind").notNull().default("customer"),
  mark: text("mark").notNull(),
  family: text("family").notNull(),
  castingNumber: text("casting_number").notNull().default(""),
  cylinders: integer("cylinders").notNull().default(1),
  boreMm: doublePrecision("bore_mm"),
  strokeMm: doublePrecision("stroke_mm"),
  seatMaterial: text("seat_material").notNull().default("unknown"),
  camLiftIntakeUm: integer("cam_lift_intake_um"),
  camLiftExhaustUm: integer("cam_lift_exhaust_um"),
  /** Work done, as searched: epoxy, weld, valve size, seat. */
  workDone: text("work_done").array().notNull().default(sql`'{}'::text[]`),
  notes: text("notes").notNull().default(""),
  version: version(),
  createdAt: createdAt(),
}, (t) => [
  primaryKey({ columns: [t.shopId, t.id] }),
  uniqueIndex("heads_piece").on(t.shopId, t.pieceId).where(sql`piece_id is not null`),
  foreignKey({ columns: [t.shopId, t.pieceId], foreignColumns: [workPieces.shopId, workPieces.id] }),
  index("heads_family").on(t.shopId, t.family),
]);

/** One run over the lifts on one port and side. Frozen when complete; corrected by a new one that names it. */
export const flowTests = pgTable("flow_tests", {
  shopId: shopId(),
  id: id(),
  headId: uuid("head_id").notNull(),
  cylinder: integer("cylinder").notNull().default(1),
  side: text("side").notNull(),
  /** baseline | after | interim | check */
  purpose: text("purpose").notNull(),
  runNo: integer("run_no").notNull().default(1),
  benchId: uuid("bench_id").notNull(),
  benchFactor: doublePrecision("bench_factor").notNull().default(1),
  benchCheckedAt: instant("bench_checked_at"),
  fixtureId: uuid("fixture_id").notNull(),
  liftDeviceId: uuid("lift_device_id"),
  camshaftId: uuid("camshaft_id"),
  camLiftUm: integer("cam_lift_um"),
  nominalPressureInH2O: doublePrecision("nominal_pressure_inh2o").notNull(),
  /** The ladder the test was planned for, read yet or not: [{ liftUm, text }]. */
  lifts: jsonb("lifts").$type<{ liftUm: number; text: string }[]>().notNull().default(sql`'[]'::jsonb`),
  liftUnit: text("lift_unit").notNull().default("in"),
  entry: text("entry").notNull().default("radius"),
  valvesOpen: text("valves_open").notNull().default("all"),
  valveMm: doublePrecision("valve_mm"),
  seatNote: text("seat_note").notNull().default(""),
  plugClosed: boolean("plug_closed").notNull().default(true),
  testSprings: boolean("test_springs").notNull().default(true),
  warmUpMinutes: integer("warm_up_minutes"),
  roomTemperatureText: text("room_temperature_text").notNull().default(""),
  roomPressureText: text("room_pressure_text").notNull().default(""),
  roomHumidityText: text("room_humidity_text").notNull().default(""),
  leakText: text("leak_text").notNull().default(""),
  leakPressureText: text("leak_pressure_text").notNull().default(""),
  /** A leak read at another pressure than a reading may be scaled to it. */
  leakScalingAgreed: boolean("leak_scaling_agreed").notNull().default(false),
  /** What the indicator showed on the closed seat after the last lift, micrometres; null = not looked at. */
  zeroReturnUm: integer("zero_return_um"),
  notes: text("notes").notNull().default(""),
  operatorId: uuid("operator_id").notNull(),
  startedAt: instant("started_at").notNull(),
  completedAt: instant("completed_at"),
  state: text("state").notNull().default("draft"),
  voidReason: text("void_reason"),
  correctsTestId: uuid("corrects_test_id"),
  importedFrom: text("imported_from"),
  version: version(),
  createdAt: createdAt(),
}, (t) => [
  primaryKey({ columns: [t.shopId, t.id] }),
  foreignKey({ columns: [t.shopId, t.headId], foreignColumns: [heads.shopId, heads.id] }),
  foreignKey({ columns: [t.shopId, t.benchId], foreignColumns: [benches.shopId, benches.id] }),
  foreignKey({ columns: [t.shopId, t.fixtureId], foreignColumns: [fixtures.shopId, fixtures.id] }),
  foreignKey({ columns: [t.shopId, t.liftDeviceId], foreignColumns: [liftDevices.shopId, liftDevices.id] }),
  foreignKey({ columns: [t.shopId, t.camshaftId], foreignColumns: [camshafts.shopId, camshafts.id] }),
  foreignKey({ columns: [t.shopId, t.operatorId], foreignColumns: [people.shopId, people.id] }),
  index("flow_tests_head").on(t.shopId, t.headId, t.side),
  index("flow_tests_started").on(t.shopId, t.startedAt, t.id),
  index("flow_tests_corrects").on(t.shopId, t.correctsTestId).where(sql`corrects_test_id is not null`),
]);

/**
 * Figures of a completed test, kept so that the library answers from one row a test. Made from the raw readings by the code
 * named in `constants_version`; it can be thrown away and made again at any time.
 */
export const flowTestSummaries = pgTable("flow_test_summaries", {
  shopId: shopId(),
  testId: uuid("test_id").notNull(),
  headId: uuid("head_id").notNull(),
  benchId: uuid("bench_id").notNull(),
  /** Of the head when this was made; a head that changes family is summarised again. */
  family: text("family").notNull(),
  side: text("side").notNull(),
  purpose: text("purpose").notNull(),
  startedAt: instant("started_at").notNull(),
  atInH2O: doublePrecision("at_inh2o").notNull(),
  /** Lifts increasing, and the mean flow of the repeats at each, same order. */
  liftsUm: integer("lifts_um").array().notNull(),
  flowsCfm: doublePrecision("flows_cfm").array().notNull(),
  peakCfm: doublePrecision("peak_cfm"),
  peakLiftUm: integer("peak_lift_um"),
  /** Mean over the lift from zero to cam lift; null when no cam lift is recorded or it was not reached. */
  meanToCamCfm: doublePrecision("mean_to_cam_cfm"),
  doubts: integer("doubts").notNull().default(0),
  isConverted: boolean("is_converted").notNull().default(false),
  /** Spread of the repeats within each lift, cfm2, and its degrees of freedom: what the test adds to the history of its bench. */
  repeatSquaresCfm2: doublePrecision("repeat_squares_cfm2").notNull().default(0),
  repeatDof: integer("repeat_dof").notNull().default(0),
  constantsVersion: integer("constants_version").notNull(),
  madeAt: instant("made_at").notNull(),
}, (t) => [
  primaryKey({ columns: [t.shopId, t.testId] }),
  foreignKey({ columns: [t.shopId, t.testId], foreignColumns: [flowTests.shopId, flowTests.id] }),
  foreignKey({ columns: [t.shopId, t.benchId], foreignColumns: [benches.shopId, benches.id] }),
  index("flow_test_summaries_repeats").on(t.shopId, t.benchId, t.startedAt).where(sql`repeat_dof > 0`),
  index("flow_test_summaries_family").on(t.shopId, t.family, t.side, t.startedAt),
  index("flow_test_summaries_best").on(t.shopId, t.family, t.side, t.meanToCamCfm),
  index("flow_test_summaries_head").on(t.shopId, t.headId),
]);

/** The raw reading, for ever as typed. An edit inserts the next version of the cell. */
export const flowReadings = pgTable("flow_readings", {
  shopId: shopId(),
  id: id(),
  testId: uuid("test_id").notNull(),
  liftUm: integer("lift_um").notNull(),
  liftText: text("lift_text").notNull(),
  liftUnit: text("lift_unit").notNull(),
  repeatNo: integer("repeat_no").notNull().default(1),
  /** 1, 2, 3 …: the newest is the one that counts; the older ones stay. */
  revision: integer("revision").notNull().default(1),
  valueText: text("value_text").notNull(),
  valueUnit: text("value_unit").notNull().default("cfm"),
  rangeLabel: text("range_label"),
  pressureText: text("pressure_text").notNull(),
  pressureUnit: text("pressure_unit").notNull().default("inH2O"),
  portTemperatureText: text("port_temperature_text"),
  orificeTemperatureText: text("orifice_temperature_text"),
  acceptedReason: text("accepted_reason"),
  excludedReason: text("excluded_reason"),
  clearedAt: instant("cleared_at"),
  takenAt: instant("taken_at").notNull(),
  personId: uuid("person_id"),
  source: text("source").notNull().default("typed"),
  createdAt: createdAt(),
}, (t) => [
  primaryKey({ columns: [t.shopId, t.id] }),
  unique("flow_readings_cell").on(t.shopId, t.testId, t.liftUm, t.repeatNo, t.revision),
  foreignKey({ columns: [t.shopId, t.testId], foreignColumns: [flowTests.shopId, flowTests.id] }),
]);

/** A comparison as handed to the customer, frozen with its conditions. A correction is the next version. */
export const flowComparisons = pgTable("flow_comparisons", {
  shopId: shopId(),
  id: id(),
  headId: uuid("head_id").notNull(),
  cylinder: integer("cylinder").notNull().default(1),
  comparisonNo: integer("comparison_no").notNull(),
  beforeTestIds: uuid("before_test_ids").array().notNull(),
  afterTestIds: uuid("after_test_ids").array().notNull(),
  snapshot: jsonb("snapshot").notNull(),
  customerWords: text("customer_words").notNull().default(""),
  issuedAt: instant("issued_at").notNull(),
  issuedBy: uuid("issued_by").notNull(),
  pdfFileId: uuid("pdf_file_id"),
}, (t) => [
  primaryKey({ columns: [t.shopId, t.id] }),
  unique("flow_comparisons_no").on(t.shopId, t.headId, t.cylinder, t.comparisonNo),
  foreignKey({ columns: [t.shopId, t.headId], foreignColumns: [heads.shopId, heads.id] }),
]);

export const measurements = pgTable("measurements", {
  shopId: shopId(),
  id: id(),
  headId: uuid("head_id").notNull(),
  cylinder: integer("cylinder").notNull().default(1),
  side: text("side").notNull().default(""),
  position: text("position").notNull().default(""),
  kind: text("kind").notNull(),
  revision: integer("revision").notNull().default(1),
  valueText: text("value_text").notNull(),
  unit: text("unit").notNull(),
  valueSi: doublePrecision("value_si").notNull(),
  stage: text("stage").notNull().default("before"),
  instrument: text("instrument").notNull().default(""),
  personId: uuid("person_id"),
  at: instant("at").notNull(),
}, (t) => [
  primaryKey({ columns: [t.shopId, t.id] }),
  unique("measurements_cell").on(t.shopId, t.headId, t.cylinder, t.side, t.position, t.kind, t.stage, t.revision),
  foreignKey({ columns: [t.shopId, t.headId], foreignColumns: [heads.shopId, heads.id] }),
]);

/** Limits the shop entered, with where they came from. None are built in. */
export const measurementLimits = pgTable("measurement_limits", {
  shopId: shopId().references(() => shops.id),
  id: id(),
  family: text("family").notNull(),
  kind: text("kind").notNull(),
  side: text("side").notNull().default(""),
  minText: text("min_text"),
  maxText: text("max_text"),
  unit: text("unit").notNull(),
  sourceText: text("source_text").notNull(),
  version: version(),
}, (t) => [primaryKey({ columns: [t.shopId, t.id] }), unique("measurement_limits_kind").on(t.shopId, t.family, t.kind, t.side)]);
