import { ok, refuse } from "@/modules/kernel/result";
import { comparability, type HardReason, type SoftReason, type TestConditions } from "../domain/comparability";
import { sanityFlagsOfReading, sanityFlagsOfTest } from "../domain/sanity-flags";
import { choice, instant, maybe, num, nums, record, word, words, type ValuesOf } from "./field";
import { isSo, saidList } from "./output";
import { named, working } from "./working";

const REASON_WORDS: Readonly<Record<HardReason | SoftReason, string>> = {
  PORT_DIFFERS: "another port", DIRECTION_DIFFERS: "the other direction", BENCH_DIFFERS: "another bench", PRESSURE_DIFFERS: "another test pressure", FIXTURE_BORE_DIFFERS: "bore fixtures more than 0.5 mm apart", ENTRY_DIFFERS: "another entry piece",
  VALVES_OPEN_DIFFER: "other valves open", VALVE_DIFFERS: "valve or seat changed; allowed, and said", OPERATOR_DIFFERS: "read by somebody else; allowed, and said", FACTOR_DIFFERS: "bench factor changed; allowed, and said",
  CONDITIONS_DIFFER: "rooms far apart; allowed, and said", OLD_BASELINE: "over 90 days between them; allowed, and said",
};

const CONDITIONS = {
  port: maybe(word("Port", "1 intake")), direction: maybe(choice("Direction", { intake: "intake", exhaust: "exhaust" }, "intake")), bench: maybe(word("Bench", "A")), dp_inH2O: maybe(num("Stated at", "in H₂O", "28")),
  fixture_bore_mm: maybe(num("Fixture bore", "mm", "77")), entry: maybe(choice("Entry", { radius: "radius", clay: "clay", manifold: "manifold", none: "none" }, "radius")), valves_open: maybe(words("Valves open", "left, right")),
  valve_diameters_mm: maybe(nums("Valve head diameters", "mm", "31 31")), seat: maybe(word("Seat", "30/45/60")), operator: maybe(word("Operator", "June")), bench_factor: maybe(num("Bench factor", "", "1.012")),
  room_C: maybe(num("Room", "°C", "20")), room_Pa: maybe(num("Station pressure", "Pa", "101325")), taken_at: maybe(instant("Taken", "2026-02-03T09:00:00Z")),
};
const conditionsOf = (v: ValuesOf<typeof CONDITIONS>): TestConditions => ({
  port: v.port, direction: v.direction, bench: v.bench, statedAtInH2O: v.dp_inH2O, fixtureBoreMm: v.fixture_bore_mm, entry: v.entry, valvesOpen: v.valves_open, valveDiametersMm: v.valve_diameters_mm, seat: v.seat, operator: v.operator,
  benchFactor: v.bench_factor, roomC: v.room_C, roomPa: v.room_Pa, takenAt: v.taken_at === undefined ? undefined : new Date(v.taken_at),
});

const TEST_ONLY = ["flows_cfm", "before_cfm", "expanded_U_cfm", "leak_cfm", "cam_max_lift_mm", "zero_return_mm"] as const;
const READING_ONLY = ["flow_cfm", "percent", "dp_inH2O", "nominal_inH2O", "density_kg_m3", "min_section_mm2", "valve_diameters_mm", "lift_mm"] as const;

/** Doubts about readings, and whether two tests may be compared. */
export const DOUBT_WORKINGS = [
  working({
    name: "sanity_flags", title: "Doubts about a test or a reading", purpose: "What in a test, or in one reading, deserves a second look.",
    fields: {
      lifts_mm: maybe(nums("Lifts of a test", "mm", "2 4 6 8"), "For a whole test; leave the inputs of one reading empty."), flows_cfm: maybe(nums("Flows of a test", "CFM", "30 55 70 68.2")), before_cfm: maybe(nums("The before test at these lifts", "CFM", "28 50 61 62")),
      expanded_U_cfm: maybe(num("Expanded uncertainty", "CFM", "0.9")), leak_cfm: maybe(num("Leak", "CFM", "1.4")), cam_max_lift_mm: maybe(num("Greatest valve lift of the cam", "mm", "8.6")), zero_return_mm: maybe(num("Indicator came back to", "mm", "0.02")),
      flow_cfm: maybe(num("Flow of one reading", "CFM", "140"), "For one reading; leave the inputs of a test empty."), percent: maybe(num("Percent of range", "%", "73.5")), dp_inH2O: maybe(num("Pressure held", "in H₂O", "28")), nominal_inH2O: maybe(num("Nominal pressure", "in H₂O", "28")),
      density_kg_m3: maybe(num("Air density", "kg/m³", "1.2")), min_section_mm2: maybe(num("Smallest section", "mm²", "560")), valve_diameters_mm: maybe(nums("Valve head diameters", "mm", "31 31")), lift_mm: maybe(num("Lift", "mm", "8")),
    },
    worked: ["lifts_mm", "flows_cfm"], outputs: [],
    source: "Common practice, no published source; the limit of a section by Bernoulli, the band of the coefficient from memory of Heywood (1988) Fig. 6-18.",
    called: { lifts: "lifts_mm", camMaxLift: "cam_max_lift_mm", heldInH2O: "dp_inH2O", flowsCfm: "flows_cfm", expandedUCfm: "expanded_U_cfm", leakCfm: "leak_cfm", dpInH2O: "dp_inH2O" },
    compute: (v) => {
      const flags = (found: readonly string[]) => ({ values: {}, flags: found });
      const ofReading = READING_ONLY.find((key) => v[key] !== undefined);
      if (v.lifts_mm !== undefined || TEST_ONLY.some((key) => v[key] !== undefined)) {
        if (ofReading) return refuse("INPUT_TWICE", "Give a whole test or one reading, not both.", { field: ofReading });
        if (v.lifts_mm === undefined || v.flows_cfm === undefined) return refuse("INPUT_MISSING", "A test needs its lifts and flows.", { field: v.lifts_mm === undefined ? "lifts_mm" : "flows_cfm" });
        return named(sanityFlagsOfTest({ lifts: v.lifts_mm, flowsCfm: v.flows_cfm, beforeCfm: v.before_cfm, expandedUCfm: v.expanded_U_cfm, leakCfm: v.leak_cfm, camMaxLift: v.cam_max_lift_mm, zeroReturnMm: v.zero_return_mm }), flags);
      }
      if (!ofReading) return refuse("INPUT_MISSING", "Needed: lifts and flows of a test, or what is known of one reading.", { field: "lifts_mm" });
      return named(sanityFlagsOfReading({ flowCfm: v.flow_cfm, percent: v.percent, heldInH2O: v.dp_inH2O, nominalInH2O: v.nominal_inH2O, densityKgM3: v.density_kg_m3, minSectionMm2: v.min_section_mm2, valveDiametersMm: v.valve_diameters_mm, liftMm: v.lift_mm }), flags);
    },
  }),
  working({
    name: "comparability", title: "May two tests be compared?", purpose: "What differs between two tests, and whether it forbids a comparison. What neither states is not judged.",
    fields: { before: record("Before", CONDITIONS), after: record("After", CONDITIONS) },
    outputs: [isSo("comparable", "May be compared"), saidList("reasons", "What differs", REASON_WORDS)],
    source: "Product rule: the conditions under which two curves may stand over each other.",
    compute: (v) => { const { comparable, reasons } = comparability(conditionsOf(v.before), conditionsOf(v.after)); return ok({ values: { comparable, reasons } }); },
  }),
];
