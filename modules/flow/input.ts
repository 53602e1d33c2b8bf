import { z } from "@/modules/kernel/zod";
import { typedNumber } from "./domain/typed-number";

const line = (max: number) => z.string().trim().max(max, `At most ${max} characters.`).refine((s) => !/\p{Cc}/u.test(s), "Line breaks and control characters do not belong here.");
/** Something of the shop's gear; empty: none chosen. */
const chosen = z.union([z.literal(""), z.uuid()]).default("");
const words = (max: number) => z.string().trim().max(max, `At most ${max} characters.`);
const NUMBER_WORDS = "A number such as 28 or 27,9.";
/** A number as typed, kept as text; empty allowed. */
const typedText = line(20).refine((s) => s === "" || typedNumber(s).ok, NUMBER_WORDS);
const typedPositive = line(20).refine((s) => { const n = typedNumber(s); return n.ok && n.value > 0; }, "A number above zero, such as 28 or 27,9.");
const numberFrom = (text: z.ZodType<string>) => text.transform((s) => { const n = typedNumber(s); return n.ok ? n.value : 0; });

export const rangeInput = z.strictObject({ label: line(20).min(1, "Name the range."), fullScaleCfm: z.number().positive().max(5000), fullScaleHead: z.number().positive().max(1000).optional() });
export const addBenchInput = z.strictObject({
  name: line(60).min(1, "Name the bench."),
  kind: z.enum(["series_orifice", "absolute_meter"]).default("series_orifice"),
  scale: z.enum(["direct", "percent_linear", "orifice_head"]).default("direct"),
  ranges: z.array(rangeInput).max(12).default([]),
  waterUnit: z.enum(["conventional", "39.2F", "60F"]).default("conventional"),
  nominalPressuresInH2O: z.array(z.number().positive().max(100)).min(1).max(8).default([28]),
  maxFlowCfm: z.number().positive().max(2000).default(600),
  pressureUncertaintyInH2O: z.number().nonnegative().max(10).optional(),
  readingUncertaintyCfm: z.number().nonnegative().max(50).optional(),
  altitudeM: z.number().min(-500).max(6000).optional(),
}).refine((b) => b.scale === "direct" || b.ranges.length > 0, { error: "A bench read by range needs at least one range.", path: ["ranges"] })
  .refine((b) => b.scale !== "orifice_head" || b.ranges.every((r) => r.fullScaleHead !== undefined), { error: "Give the head at full scale for each range.", path: ["ranges"] });

export const benchCheckInput = z.strictObject({
  benchId: z.uuid(),
  /** Empty with `isFine`: the bench was looked over and stands as it was. */
  plates: z.array(z.strictObject({
    serial: line(60).min(1, "Which plate?"),
    reference: typedPositive,
    indicated: typedPositive,
    /** The bench's range that `indicated` was read on, in its own scale; empty: it is a flow in CFM. */
    range: line(20).default(""),
  })).max(12).default([]),
  isFine: z.boolean().default(false),
  note: words(500).default(""),
  /** Why a doubtful check is kept. */
  reason: words(500).default(""),
}).refine((c) => c.plates.length > 0 || c.isFine, { error: "Flow at least one check plate, or say that the bench stands as it was.", path: ["plates"] });

export const addFixtureInput = z.strictObject({
  name: line(60).min(1, "Name the fixture, such as the bore on its adapter."),
  boreMm: numberFrom(typedPositive).refine((n) => n >= 20 && n <= 200, "A bore between 20 and 200 mm."),
  lengthMm: typedText.default(""), headPattern: line(80).default(""), plate: line(60).default(""),
});

export const valveInput = z.strictObject({
  side: z.enum(["intake", "exhaust"]), position: z.enum(["single", "left", "centre", "right"]),
  headMm: z.number().positive().max(100), stemMm: z.number().positive().max(20).optional(), seatAngleDeg: z.number().min(0).max(75).optional(),
});
export const addFamilyInput = z.strictObject({
  name: line(60).min(1, "Name the family as the shop calls it."),
  cylinders: z.number().int().min(1).max(16).default(1),
  boreMm: z.number().positive().max(200).optional(), strokeMm: z.number().positive().max(200).optional(),
  valves: z.array(valveInput).max(10).default([]),
  camLiftIntake: line(20).default(""), camLiftExhaust: line(20).default(""), camLiftUnit: z.enum(["in", "mm"]).default("in"),
  notes: words(2000).default(""),
});

const side = z.enum(["intake", "exhaust"]);
const purpose = z.enum(["baseline", "after", "interim", "check"]);
const liftUnit = z.enum(["in", "mm"]);

/** What holds for one side of the port. */
const sideFields = {
  /** Empty: that of the camshaft, else of the head. */
  camLift: line(20).default(""),
  camshaftId: chosen,
  entry: z.enum(["radius", "clay", "manifold", "none"]).default("radius"),
  valvesOpen: line(60).default("all"),
  valve: typedText.default(""),
  seatNote: words(200).default(""),
};
/** What holds for the whole session. */
const sessionFields = {
  fixtureId: z.uuid({ error: "Choose the bore adapter." }),
  liftDeviceId: chosen,
  nominal: numberFrom(typedPositive),
  plugClosed: z.boolean().default(true), testSprings: z.boolean().default(true),
  warmUpMinutes: z.number().int().min(0).max(600).optional(),
  roomTemperature: line(20).default(""), roomPressure: line(20).default(""), roomHumidity: line(20).default(""),
  leak: typedText.default(""), leakPressure: typedText.default(""),
  /** The leak was read at another pressure and may be scaled. */
  leakScalingAgreed: z.boolean().default(false),
  notes: words(2000).default(""),
};

export const startTestInput = z.strictObject({
  headId: z.uuid(), cylinder: z.number().int().min(1).max(16).default(1), side, purpose,
  benchId: z.uuid({ error: "Choose the bench." }), ...sessionFields, ...sideFields,
  lifts: z.array(line(20)).max(60).default([]), liftUnit: liftUnit.default("in"), liftsReason: words(200).default(""),
  /** A device says who stands at the bench; a person is the operator themselves unless they name another. */
  operatorId: z.uuid().optional(),
});

const sheetSide = z.strictObject(sideFields).optional();
export const startSheetInput = z.strictObject({
  headId: z.uuid(), cylinder: z.number().int().min(1).max(16).default(1), purpose,
  benchId: z.uuid({ error: "Choose the bench." }), ...sessionFields,
  step: line(20).min(1, "Give the step between lifts."), camLiftForLadder: line(20).min(1, "Give the cam lift the ladder goes past."),
  liftUnit: liftUnit.default("in"),
  intake: sheetSide, exhaust: sheetSide, operatorId: z.uuid().optional(),
}).refine((s) => s.intake !== undefined || s.exhaust !== undefined, { error: "Choose intake, exhaust or both.", path: ["intake"] });

export const changeTestInput = z.strictObject({ testId: z.uuid(), version: z.number().int(), ...sessionFields, ...sideFields });
const changedSide = z.strictObject({ testId: z.uuid(), version: z.number().int(), ...sideFields }).optional();
/** Both drafts of a sheet at once: they share the session. */
export const changeSheetInput = z.strictObject({ ...sessionFields, intake: changedSide, exhaust: changedSide })
  .refine((s) => s.intake !== undefined || s.exhaust !== undefined, { error: "There is no draft to change.", path: ["intake"] });
const testSeen = z.strictObject({ testId: z.uuid(), version: z.number().int() });
/** `also`: the other side's draft of the same sheet gets the lift too, or neither does. */
export const addLiftInput = z.strictObject({
  testId: z.uuid(), version: z.number().int(), lift: line(20).min(1, "Give the lift."), reason: words(200).default(""), also: testSeen.optional(),
});
/** Takes a lift that was not read off one draft, or off both of the sheet. */
export const removeLiftInput = z.strictObject({ testId: z.uuid(), version: z.number().int(), liftUm: z.number().int().min(0), also: testSeen.optional() });

const typedCell = {
  lift: line(20), liftUnit: liftUnit.default("in"), repeatNo: z.number().int().min(1).max(9).default(1),
  /** As typed; empty clears the cell. */
  value: line(20),
  valueUnit: z.enum(["cfm", "L/s", "m3/h", "percent", "head"]).optional(),
  range: line(20).optional(),
  /** Empty: the nominal pressure was held. */
  pressure: line(20).default(""), pressureUnit: z.enum(["inH2O", "Pa", "hPa", "kPa"]).default("inH2O"),
  portTemperature: line(20).optional(), orificeTemperature: line(20).optional(),
  acceptedReason: words(200).optional(), excludedReason: words(200).optional(),
  takenAt: z.iso.datetime().optional(),
};
export const readingInput = z.strictObject({
  testId: z.uuid(), ...typedCell,
  /** Revision of the cell that was looked at; 0 = it was empty. Another revision there by now: refused. */
  revisionSeen: z.number().int().min(0).default(0),
});

export const finishInput = testSeen.extend({
  /** What the lift indicator showed on the closed seat after the last lift, in the test's unit unless it names another; empty: not looked at. */
  zeroReturn: line(20).default(""),
});
export const voidInput = testSeen.extend({ reason: words(300).min(3, "Say why, in a few words.") });
export const correctInput = z.strictObject({ testId: z.uuid(), reason: words(300).min(3, "Say what is to be corrected.") });

export const wholeTestInput = startTestInput.omit({ headId: true, lifts: true }).extend({
  headId: z.uuid().optional(),
  /** Tag of the head, instead of its id. */
  tag: line(40).optional(),
  readings: z.array(z.strictObject(typedCell).omit({ liftUnit: true })).min(1, "Send at least one reading.").max(200),
  complete: z.boolean().default(false),
  /** What the lift indicator showed on the closed seat after the last lift; kept when the test is completed. */
  zeroReturn: line(20).default(""),
}).refine((t) => t.headId !== undefined || t.tag !== undefined, { error: "Say which head: headId or tag.", path: ["tag"] });

export const issueInput = z.strictObject({ headId: z.uuid(), cylinder: z.number().int().min(1).max(16).default(1), customerWords: words(1000).default("") });
export const sheetInput = z.strictObject({ headId: z.uuid(), cylinder: z.coerce.number().int().min(1).max(16).default(1) });
/** The same for a caller who may know the head by its tag only. */
export const sheetAskInput = z.strictObject({ headId: z.uuid().optional(), tag: line(40).default(""), cylinder: sheetInput.shape.cylinder })
  .refine((s) => (s.headId === undefined) !== (s.tag === ""), { error: "Name the head by its headId or by its tag.", path: ["tag"] });
export const roomInput = z.strictObject({
  q: line(60).default(""), state: z.enum(["", "bench", "before", "after", "proved"]).default(""), limit: z.coerce.number().int().min(1).max(200).default(50), after: z.string().max(120).optional(),
});
