import { gainAtCamLift } from "../domain/cam-lift";
import { crossovers } from "../domain/crossovers";
import { exhaustIntakeRatio, type RatioBasis } from "../domain/exhaust-intake-ratio";
import { gainTable } from "../domain/gain";
import { choice, maybe, num, nums } from "./field";
import { EITHER_LIFTS, inEither, LIFT_FIELDS, LIFTS_ALONG } from "./lifts";
import { column, figure, isSo, rows, said, significant, sometimes } from "./output";
import { named, working } from "./working";

const BOTH = { before_cfm: nums("Before", "CFM", "18.4 37.9 56.3 73.1 87.0 97.2 103.4 106.1 107.0"), after_cfm: nums("After", "CFM", "18.1 38.6 58.9 78.4 95.7 109.2 118.6 124.0 126.8") };
const CALLED = { lifts: "lifts_mm", at: "cam_max_lift_mm" };
const BASIS: Readonly<Record<RatioBasis, string>> = { equal_lift: "equal lift", equal_lift_over_diameter: "equal lift over diameter", own_cam_lift: "each at its own cam lift" };
const DIRECTIONS = { loss_to_gain: "from loss to gain", gain_to_loss: "from gain to loss" };

/** Before against after. A loss is negative, and as plain as a gain. */
export const GAIN_WORKINGS = [
  working({
    name: "gain_table", title: "Gain at every lift", purpose: "After less before at every lift, in CFM and percent; a loss is negative.",
    fields: { ...LIFT_FIELDS, ...BOTH }, worked: ["lifts_mm", "before_cfm", "after_cfm"], either: [EITHER_LIFTS],
    outputs: [column("gain_cfm", "Gain", "CFM", 1, LIFTS_ALONG), column("gain_percent", "Gain", "%", 1, LIFTS_ALONG)],
    source: "Subtraction. Compare only tests of one port, bench, pressure, fixture and entry.", called: CALLED,
    compute: (v) => named(gainTable({ lifts: inEither(v.lifts_mm, v.lifts_in, []), beforeCfm: v.before_cfm, afterCfm: v.after_cfm }), (r) => ({ values: { gain_cfm: r.map((x) => x.gainCfm), gain_percent: r.map((x) => x.gainPercent) } })),
  }),
  working({
    name: "crossovers", title: "Where loss turns to gain", purpose: "Lifts at which loss turns to gain or gain to loss, and every tested lift with a loss.",
    fields: { ...LIFT_FIELDS, ...BOTH }, worked: ["lifts_mm", "before_cfm", "after_cfm"], either: [EITHER_LIFTS],
    outputs: [
      rows("crossovers", "Crossovers", [significant("lift", "Lift", "", 3), said("direction", "Turns", DIRECTIONS)]),
      sometimes(column("loss_points_mm", "Lifts with a loss", "mm", 2, [])), sometimes(column("loss_points_in", "Lifts with a loss", "in", 3, [])),
    ],
    source: "Linear interpolation of the difference.", called: CALLED,
    compute: (v) => named(crossovers({ lifts: inEither(v.lifts_mm, v.lifts_in, []), beforeCfm: v.before_cfm, afterCfm: v.after_cfm }), (a) => ({
      values: { crossovers: a.crossovers.map((c) => ({ lift: c.lift, direction: c.direction })), ...(v.lifts_mm ? { loss_points_mm: a.lossLifts } : { loss_points_in: a.lossLifts }) },
    })),
  }),
  working({
    name: "gain_at_cam_lift", title: "Gain at cam lift", purpose: "Gain at the cam's greatest lift and at the tested lifts above it; none where the test does not reach so far.",
    fields: { ...LIFT_FIELDS, ...BOTH, cam_max_lift_mm: maybe(num("Greatest valve lift of the cam", "mm", "8.6"), "With lifts in mm."), cam_max_lift_in: maybe(num("Greatest valve lift of the cam", "in", ".340"), "With lifts in inches.") },
    worked: ["lifts_mm", "before_cfm", "after_cfm", "cam_max_lift_mm"],
    either: [{ of: [["lifts_mm", "cam_max_lift_mm"], ["lifts_in", "cam_max_lift_in"]] }],
    outputs: [
      sometimes(figure("gain_at_cam_lift_cfm", "Gain at cam lift", "CFM", 1)), sometimes(column("points_at_or_above_mm", "Tested at or above it", "mm", 2, [])), sometimes(column("points_at_or_above_in", "Tested at or above it", "in", 3, [])),
      isSo("tested_beyond_cam", "Tested beyond cam lift"),
    ],
    source: "The monotone curve of each test (Fritsch & Carlson 1980) at cam lift.", called: { ...CALLED, camMaxLift: "cam_max_lift_mm" },
    compute: (v) => named(gainAtCamLift({ lifts: inEither(v.lifts_mm, v.lifts_in, []), beforeCfm: v.before_cfm, afterCfm: v.after_cfm, camMaxLift: inEither(v.cam_max_lift_mm, v.cam_max_lift_in, 0) }), (a) => {
      const above = a.testedToCamLift ? a.rowsAtOrAbove.map((r) => r.lift) : [];
      return { values: { gain_at_cam_lift_cfm: a.testedToCamLift ? a.gainCfm : undefined, ...(v.lifts_mm ? { points_at_or_above_mm: above } : { points_at_or_above_in: above }), tested_beyond_cam: a.testedBeyondCam }, flags: a.flags };
    }),
  }),
  working({
    name: "exhaust_intake_ratio", title: "Exhaust against intake", purpose: "Exhaust flow over intake flow at one pressure, on a stated basis; there is no target.",
    fields: {
      exhaust_cfm: num("Exhaust flow", "CFM", "93"), intake_cfm: num("Intake flow", "CFM", "121"),
      exhaust_dp_inH2O: maybe(num("Exhaust read at", "in H₂O", "10"), "Both or neither."), intake_dp_inH2O: maybe(num("Intake read at", "in H₂O", "10"), "Both or neither."), basis: maybe(choice("On the basis of", BASIS, "equal_lift"), "Equal lift where left out."),
    },
    outputs: [figure("ratio", "Exhaust over intake", "", 3), said("basis", "On the basis of", BASIS)],
    source: "Definition. Trade articles quote 0.75 to 0.80; NACA TN 1365 (1947) found best output near 1.", called: { exhaustAtInH2O: "exhaust_dp_inH2O", intakeAtInH2O: "intake_dp_inH2O" },
    compute: (v) => named(exhaustIntakeRatio({ exhaustCfm: v.exhaust_cfm, intakeCfm: v.intake_cfm, exhaustAtInH2O: v.exhaust_dp_inH2O, intakeAtInH2O: v.intake_dp_inH2O, basis: v.basis }), (a) => ({ values: { ratio: a.ratio, basis: a.basis } })),
  }),
];
