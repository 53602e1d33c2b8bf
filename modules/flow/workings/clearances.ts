import { CAUTIONS } from "../domain/cautions";
import { retainerToSeal, seatRunout, stemClearanceMm, valveToPiston } from "../domain/clearances";
import { lashAfterSeatCut, lashShim, lashShimCandidates } from "../domain/lash-shim";
import { maybe, num, nums, yesNo } from "./field";
import { figure, isSo, rows, sometimes } from "./output";
import { named, working } from "./working";

const MANUAL = "Defer to the service manual: limits come from it.";
const ENGINE_BREAKS = `${MANUAL} ${CAUTIONS.clearance.words}`;
const FROM_MANUAL = "From the service manual or the cam's maker.";
/** Shims and kits end far below this; a kit of that size still has few enough of them. */
const SHIM = { min: 0, max: 20 };

/** Clearances: shims, seats, and those that break engines. */
export const CLEARANCE_WORKINGS = [
  working({
    name: "lash_shim", title: "Valve clearance shim", purpose: "The shim that brings a clearance to its target, or every shim of a kit that brings it into range.",
    fields: {
      old_shim_mm: { ...num("Old shim", "mm", "1.85", SHIM), hint: "Measured, not read off its face." }, measured_mm: num("Clearance measured", "mm", "0.05", SHIM), target_mm: maybe(num("Clearance wanted", "mm", "0.15", SHIM), "This, or a range with the step of the kit."),
      min_mm: maybe(num("Least clearance", "mm", "0.10", SHIM), MANUAL), max_mm: maybe(num("Greatest clearance", "mm", "0.15", SHIM), MANUAL), step_mm: maybe(num("Step of the kit", "mm", "0.05", { min: 0.001, max: 20 })),
      smallest_mm: maybe(num("Smallest shim of the kit", "mm", "1.20", SHIM), "1.20 where left out."), largest_mm: maybe(num("Largest shim of the kit", "mm", "3.00", SHIM), "3.00 where left out."), is_at_most: maybe(yesNo("Less than the thinnest gauge", "no"), "Then the clearance is at most what is typed."),
    },
    worked: ["old_shim_mm", "measured_mm", "min_mm", "max_mm", "step_mm"],
    either: [{ of: [["target_mm"], ["min_mm", "max_mm", "step_mm"]] }, { of: [["target_mm"], ["smallest_mm"]], optional: true }, { of: [["target_mm"], ["largest_mm"]], optional: true }, { of: [["target_mm"], ["is_at_most"]], optional: true }],
    outputs: [sometimes(figure("new_shim_mm", "New shim", "mm", 3)), sometimes(rows("candidates", "Shims of the kit", [figure("shim_mm", "Shim", "mm", 3), figure("clearance_mm", "Clearance with it", "mm", 3)]))],
    source: "The rule of workshop manuals: new = old + measured - wanted.", caution: `${MANUAL} Check the clearance again with the new shim in.`,
    compute: (v) => {
      const common = { oldShimMm: v.old_shim_mm, measuredMm: v.measured_mm };
      if (v.target_mm !== undefined) return named(lashShim({ ...common, targetMm: v.target_mm }), (new_shim_mm) => ({ values: { new_shim_mm } }));
      return named(lashShimCandidates({ ...common, minMm: v.min_mm ?? 0, maxMm: v.max_mm ?? 0, stepMm: v.step_mm ?? 0, smallestMm: v.smallest_mm, largestMm: v.largest_mm, isAtMost: v.is_at_most }), (a) => ({ values: { candidates: a.candidates.map((c) => ({ shim_mm: c.shimMm, clearance_mm: c.clearanceMm })) }, flags: a.flags }));
    },
  }),
  working({
    name: "lash_after_seat_cut", title: "Clearance after a seat cut", purpose: "What a sunk valve leaves of its clearance, bucket directly on the stem.",
    fields: {
      clearance_before_mm: num("Clearance before", "mm", "0.14"), valve_sink_mm: maybe(num("Valve sunk by", "mm", "0.12"), "This, or the metal removed with the seat angle."),
      removed_normal_mm: maybe(num("Metal removed, square to the face", "mm", "0.085")), seat_angle_deg: maybe(num("Seat angle", "°", "45")),
    },
    worked: ["clearance_before_mm", "valve_sink_mm"], either: [{ of: [["valve_sink_mm"], ["removed_normal_mm", "seat_angle_deg"]] }],
    outputs: [figure("valve_sink_mm", "Valve sinks by", "mm", 3), figure("clearance_after_mm", "Clearance after", "mm", 3)],
    source: "Geometry.", caution: `${MANUAL} Below zero the valve is held open. Seats cut deeper also lengthen the spring's installed height: check it again.`, called: { cut: "removed_normal_mm" },
    compute: (v) => named(
      lashAfterSeatCut(v.valve_sink_mm !== undefined ? { clearanceBeforeMm: v.clearance_before_mm, valveSinkMm: v.valve_sink_mm } : { clearanceBeforeMm: v.clearance_before_mm, removedNormalMm: v.removed_normal_mm ?? 0, seatAngleDeg: v.seat_angle_deg ?? 0 }),
      (a) => ({ values: { valve_sink_mm: a.valveSinkMm, clearance_after_mm: a.clearanceAfterMm } }),
    ),
  }),
  working({
    name: "valve_to_piston", title: "Valve to piston after milling", purpose: "What milling leaves between valve and piston. After a cam change measure again; never compute.",
    fields: {
      clay_mm: { ...num("Thinnest clay", "mm", "1.95"), hint: "Square to the valve head, before milling." }, milled_mm: num("Milled off", "mm", "0.30"), valve_angle_deg: { ...num("Valve to bore axis", "°", "14"), hint: "0 is a valve that stands straight up." },
      minimum_mm: { ...num("Least clearance", "mm", "1.5"), hint: FROM_MANUAL }, valve_sink_mm: maybe(num("Valve sunk by", "mm", "0.12")),
    },
    outputs: [figure("clearance_mm", "Clearance", "mm", 2)], source: "Geometry.", caution: ENGINE_BREAKS,
    compute: (v) => named(valveToPiston({ clayMm: v.clay_mm, milledMm: v.milled_mm, valveAngleDeg: v.valve_angle_deg, minimumMm: v.minimum_mm, valveSinkMm: v.valve_sink_mm }), (a) => ({ values: { clearance_mm: a.clearanceMm }, flags: a.flags })),
  }),
  working({
    name: "retainer_to_seal", title: "Retainer to seal", purpose: "What full lift leaves between retainer and seal.",
    fields: { distance_closed_mm: num("Distance with the valve shut", "mm", "11.2"), lift_mm: num("Lift", "mm", "8.6"), minimum_mm: { ...num("Least clearance", "mm", "1.0"), hint: FROM_MANUAL } },
    outputs: [figure("clearance_mm", "Clearance", "mm", 2)], source: "Definition; 1.0 mm is common practice, no published source.", caution: ENGINE_BREAKS,
    compute: (v) => named(retainerToSeal({ distanceClosedMm: v.distance_closed_mm, liftMm: v.lift_mm, minimumMm: v.minimum_mm }), (a) => ({ values: { clearance_mm: a.clearanceMm }, flags: a.flags })),
  }),
  working({
    name: "seat_runout", title: "Seat runout", purpose: "How far a seat stands off its guide, judged on the total of the indicator.",
    fields: { total_indicator_mm: num("Total of the indicator", "mm", "0.060"), limit_mm: { ...num("Limit of the total", "mm", "0.05"), hint: "From the service manual." } },
    outputs: [figure("offset_mm", "Offset", "mm", 3), isSo("within_limit", "Within the limit")], source: "Geometry: the offset is half the total.", caution: MANUAL,
    compute: (v) => named(seatRunout({ totalIndicatorMm: v.total_indicator_mm, limitMm: v.limit_mm }), (a) => ({ values: { offset_mm: a.offsetMm, within_limit: a.withinLimit } })),
  }),
  working({
    name: "stem_clearance", title: "Stem in its guide", purpose: "Worst clearance between guide and stem, over all heights and directions measured.",
    fields: { guide_bores_mm: nums("Guide bores", "mm", "5.525 5.530 5.528"), stems_mm: nums("Stems", "mm", "5.488 5.490 5.486") },
    outputs: [figure("clearance_mm", "Worst clearance", "mm", 3)], source: "Definition: largest bore less smallest stem.", caution: MANUAL,
    compute: (v) => named(stemClearanceMm({ guideBoresMm: v.guide_bores_mm, stemsMm: v.stems_mm }), (clearance_mm) => ({ values: { clearance_mm } })),
  }),
];
