import { z } from "@/modules/kernel/zod";
import { parseLiftUm } from "./domain/lift-ladder";
import { plateFlowCfm } from "./domain/plate-reading";
import type { BenchRange, BenchScale } from "./domain/raw-test";
import { typedNumber } from "./domain/typed-number";
import { line, optionalField, typedField, words } from "./typed-field";

/** For the edit forms: which record, and as it was when the form was opened. */
const edited = { id: z.uuid(), version: z.number().int() };
const CFM = { min: 0, above: true, max: 5000, unit: "CFM" };

/** Valve lift as typed, with its unit behind it where it is not the field's: `8.6`, `.340 in`. Empty = none. */
const optionalLift = line(24).default("").transform((text, ctx) => {
  if (text === "") return null;
  const um = parseLiftUm(text, "mm");
  if (um.ok && um.value > 0) return um.value;
  ctx.addIssue({ code: "custom", message: "A valve lift above 0 and up to 50 mm, such as 8.6 or .340 in. Or leave it empty." });
  return z.NEVER;
});
const lift = line(24).transform((text, ctx) => {
  const um = parseLiftUm(text, "mm");
  if (um.ok && um.value > 0) return um.value;
  ctx.addIssue({ code: "custom", message: "A valve lift above 0 and up to 50 mm, such as 8.6 or .340 in." });
  return z.NEVER;
});

const range = z.strictObject({
  label: line(20).min(1, "Name the range as it stands on the bench, such as 4 or low."),
  fullScaleCfm: typedField(CFM),
  fullScaleHead: optionalField({ min: 0, above: true, max: 1000 }),
});

/** Pressures a bench is run at: numbers with a blank or a semicolon between. */
const pressures = line(60).transform((text, ctx) => {
  const list = text.split(/[\s;]+/).filter(Boolean).map((t) => typedNumber(t));
  const values = list.flatMap((r) => (r.ok && r.value > 0 && r.value <= 100 ? [r.value] : []));
  if (values.length > 0 && values.length === list.length && values.length <= 8) return [...new Set(values)];
  ctx.addIssue({ code: "custom", message: "One to eight pressures above 0 and up to 100 in H₂O, with a blank between: 28 10." });
  return z.NEVER;
});

const benchFields = z.strictObject({
  name: line(60).min(1, "Name the bench."),
  kind: z.enum(["series_orifice", "absolute_meter"]),
  scale: z.enum(["direct", "percent_linear", "orifice_head"]),
  ranges: z.array(range).max(24, "At most 24 ranges.").default([]),
  waterUnit: z.enum(["conventional", "39.2F", "60F"]),
  nominalPressures: pressures,
  maxFlow: typedField(CFM),
  uPressure: optionalField({ min: 0, max: 5, unit: "in H₂O" }),
  uReading: optionalField({ min: 0, max: 50, unit: "CFM" }),
  altitude: optionalField({ min: -500, max: 5000, unit: "m" }),
  active: z.boolean().default(true),
});
type BenchIn = z.output<typeof benchFields>;
const rangesFit = (b: BenchIn, ctx: z.RefinementCtx) => {
  if (b.scale !== "direct" && b.ranges.length === 0) ctx.addIssue({ code: "custom", path: ["ranges"], message: "A bench read on a scale needs at least one range. Add it below." });
  const seen = new Set<string>();
  b.ranges.forEach((r, i) => {
    if (seen.has(r.label.toLowerCase())) ctx.addIssue({ code: "custom", path: ["ranges", i, "label"], message: "Two ranges of one name. Give each its own." });
    seen.add(r.label.toLowerCase());
    if (b.scale === "orifice_head" && r.fullScaleHead === null) ctx.addIssue({ code: "custom", path: ["ranges", i, "fullScaleHead"], message: "Type the head at the end of the scale, in the manometer's own unit." });
  });
};
export const benchInput = benchFields.superRefine(rangesFit);
export const benchEditInput = benchFields.extend(edited).superRefine(rangesFit);

/** Plates as the form of the bench check holds them, on the bench's own scale; a plate left empty was not flowed. */
export const plateCheckForm = (bench: { scale: BenchScale; ranges: readonly BenchRange[] }) => z.strictObject({
  plates: z.array(z.strictObject({ serial: z.string(), reference: z.string(), range: z.string(), indicated: line(20) })).max(12),
  note: words(500).default(""),
  reason: words(500).default(""),
}).superRefine((check, ctx) => {
  check.plates.forEach((p, i) => {
    const flow = p.indicated === "" ? null : plateFlowCfm(bench, p);
    if (flow && !flow.ok) ctx.addIssue({ code: "custom", path: ["plates", i, flow.refusal.field === "range" ? "range" : "indicated"], message: flow.refusal.message });
  });
  if (check.plates.every((p) => p.indicated === "")) ctx.addIssue({ code: "custom", path: ["plates", 0, "indicated"], message: "Type what the bench showed for at least one plate." });
});
export const strikeCheckInput = z.strictObject({ checkId: z.uuid(), reason: words(500).min(3, "Say why it is put out of use, such as plate typed ten times too high.") });

const plateFields = z.strictObject({
  serial: line(40).min(1, "Type the serial cut into the plate."),
  referenceFlow: typedField(CFM),
  atPressure: typedField({ min: 0, above: true, max: 100, unit: "in H₂O" }),
  certificate: line(120).default(""),
  dueOn: z.union([z.literal(""), z.iso.date("A date such as 2026-03-31.")]).default(""),
  active: z.boolean().default(true),
});
export const plateInput = plateFields;
export const plateEditInput = plateFields.extend(edited);

const fixtureFields = z.strictObject({
  name: line(60).min(1, "Name the fixture."),
  bore: typedField({ min: 0, above: true, max: 300, unit: "mm" }),
  length: optionalField({ min: 0, above: true, max: 1000, unit: "mm" }),
  headPattern: line(120).default(""),
  plate: line(60).default(""),
  active: z.boolean().default(true),
});
export const fixtureInput = fixtureFields;
export const fixtureEditInput = fixtureFields.extend(edited);

const liftDeviceFields = z.strictObject({
  name: line(60).min(1, "Name the lift device."),
  resolution: typedField({ min: 0, above: true, max: 1, unit: "mm" }),
  uncertainty: optionalField({ min: 0, max: 1, unit: "mm" }),
  active: z.boolean().default(true),
});
export const liftDeviceInput = liftDeviceFields;
export const liftDeviceEditInput = liftDeviceFields.extend(edited);

/** One line of the cam table: angle in degrees and lift, as pasted from a spreadsheet or typed. */
export const profileText = words(20_000).default("");
const camFields = z.strictObject({
  label: line(60).min(1, "Name the camshaft as its maker does."),
  side: z.enum(["intake", "exhaust"]),
  maxLift: lift,
  duration: optionalField({ min: 30, max: 400, unit: "degrees" }),
  profile: profileText,
  profileUnit: z.enum(["mm", "in"]).default("mm"),
  dataSource: line(200).default(""),
  active: z.boolean().default(true),
});
const camKnown = { error: "Give the table of angle and lift, or the duration.", path: ["duration"] };
export const camshaftInput = camFields.refine((c) => c.duration !== null || c.profile !== "", camKnown);
export const camshaftEditInput = camFields.extend(edited).refine((c) => c.duration !== null || c.profile !== "", camKnown);

const valve = z.strictObject({
  side: z.enum(["intake", "exhaust"]),
  position: z.enum(["single", "left", "centre", "right"]),
  head: typedField({ min: 5, max: 120, unit: "mm" }),
  stem: typedField({ min: 1, max: 30, unit: "mm" }),
  seatAngle: optionalField({ min: 0, max: 75, unit: "degrees" }),
});
const familyFields = z.strictObject({
  name: line(80).min(1, "Name the family as the shop does."),
  cylinders: z.coerce.number<string | number>().int("Whole cylinders.").min(1, "At least 1.").max(16, "At most 16.").default(1),
  bore: optionalField({ min: 10, max: 300, unit: "mm" }),
  stroke: optionalField({ min: 10, max: 300, unit: "mm" }),
  valves: z.array(valve).max(8, "At most 8 valves a cylinder.").default([]),
  camLiftIntake: optionalLift,
  camLiftExhaust: optionalLift,
  notes: words(2000).default(""),
});
const valvesFit = (f: z.output<typeof familyFields>, ctx: z.RefinementCtx) => {
  const seen = new Set<string>();
  f.valves.forEach((v, i) => {
    const key = `${v.side} ${v.position}`;
    if (seen.has(key)) ctx.addIssue({ code: "custom", path: ["valves", i, "position"], message: `Two ${key} valves. Give each its own place.` });
    seen.add(key);
    if (v.stem >= v.head) ctx.addIssue({ code: "custom", path: ["valves", i, "stem"], message: "The stem is thinner than the head." });
  });
};
export const familyInput = familyFields.superRefine(valvesFit);
export const familyEditInput = familyFields.extend(edited).superRefine(valvesFit);

/** Kinds of work the library looks for. */
export const HEAD_WORK = ["epoxy", "weld", "valve size", "seat", "port shape", "chamber"] as const;

/** A casting of the shop's own, for development: no customer, no order. */
export const ownHeadInput = z.strictObject({
  mark: line(60).min(1, "Give the casting a mark: a serial, or what is written on it."),
  family: line(80).min(1, "Name the engine family."),
  castingNumber: line(60).default(""),
  /** Left out: the family's, else one. */
  cylinders: z.coerce.number<string | number>().int("Whole cylinders.").min(1, "At least 1.").max(16, "At most 16.").optional(),
  bore: optionalField({ min: 10, max: 300, unit: "mm" }),
  stroke: optionalField({ min: 10, max: 300, unit: "mm" }),
  seatMaterial: z.enum(["unknown", "steel", "iron", "bronze", "copper-beryllium"]).default("unknown"),
  workDone: z.array(z.enum(HEAD_WORK)).max(6).default([]),
  notes: words(2000).default(""),
});
/** Work done and notes of any head, as searched in the library. */
export const headWorkInput = z.strictObject({ id: z.uuid(), version: z.number().int(), workDone: ownHeadInput.shape.workDone, notes: words(2000).default("") });
