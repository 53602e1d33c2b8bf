import { interpolateFlow, interpolateFlows } from "../domain/interpolate-flow";
import { meanFlowOverCam, meanFlowOverLift, syntheticCam } from "../domain/mean-flow";
import { maybe, num, nums, oneOrMore, yesNo } from "./field";
import { inEither, LIFT_FIELDS } from "./lifts";
import { column, figure } from "./output";
import { named, working } from "./working";

const FLOWS = nums("Flows", "CFM", "18.4 37.9 56.3 73.1 87.0 97.2 103.4 106.1 107.0");
/** The end of the worked example of a cam: 8.6 mm over 240 degrees. */
const CAM_ANGLES = "0 20 40 60 80 100 120 140 160 180 200 220 240";
const CAM_LIFTS = "0 0.576 2.150 4.300 6.450 8.024 8.600 8.024 6.450 4.300 2.150 0.576 0";
const MONOTONE = "Fritsch & Carlson, SIAM J. Numer. Anal. 17 (1980) 238-246, with the slopes of Fritsch & Butland (1984; from memory)";

/** Curves and means. */
export const CURVE_WORKINGS = [
  working({
    name: "interpolate_flow", title: "Flow between the lifts", purpose: "Flow at lifts that were not read, on the curve through the readings; never beyond them.",
    fields: { ...LIFT_FIELDS, flows_cfm: FLOWS, at_mm: maybe(oneOrMore("At", "mm", "6.35"), "With lifts in mm."), at_in: maybe(oneOrMore("At", "in", ".250"), "With lifts in inches."), add_zero: maybe(yesNo("Start from nothing at zero lift", "yes"), "Yes where left out.") },
    worked: ["lifts_mm", "flows_cfm", "at_mm", "add_zero"],
    either: [{ of: [["lifts_mm", "at_mm"], ["lifts_in", "at_in"]] }],
    outputs: [column("flow_cfm", "Flow", "CFM", 1, ["at_mm", "at_in"])],
    source: `${MONOTONE}.`, called: { at: "at_mm" },
    compute: (v) => {
      const table = { lifts: inEither(v.lifts_mm, v.lifts_in, []), flowsCfm: v.flows_cfm };
      const at = inEither(v.at_mm, v.at_in, 0);
      return typeof at === "number" ? named(interpolateFlow(table, at, { addZero: v.add_zero }), (flow_cfm) => ({ values: { flow_cfm } })) : named(interpolateFlows(table, at, { addZero: v.add_zero }), (flow_cfm) => ({ values: { flow_cfm } }));
    },
  }),
  working({
    name: "mean_flow_over_lift", title: "Mean flow over a range of lift", purpose: "One figure for a stretch of the curve, by the tested points.",
    fields: { ...LIFT_FIELDS, flows_cfm: FLOWS, from_mm: maybe(num("From", "mm", "2"), "With lifts in mm."), to_mm: maybe(num("To", "mm", "8"), "With lifts in mm."), from_in: maybe(num("From", "in", ".100"), "With lifts in inches."), to_in: maybe(num("To", "in", ".350"), "With lifts in inches.") },
    worked: ["lifts_mm", "flows_cfm", "from_mm", "to_mm"],
    either: [{ of: [["lifts_mm", "from_mm", "to_mm"], ["lifts_in", "from_in", "to_in"]] }],
    outputs: [figure("mean_cfm", "Mean flow", "CFM", 1)], source: "Trapezoid rule; ends on the straight line between tested points.", called: { from: "from_mm", to: "to_mm", lifts: "lifts_mm" },
    compute: (v) => named(meanFlowOverLift({ lifts: inEither(v.lifts_mm, v.lifts_in, []), flowsCfm: v.flows_cfm }, inEither(v.from_mm, v.from_in, 0), inEither(v.to_mm, v.to_in, 0)), (mean_cfm) => ({ values: { mean_cfm } })),
  }),
  working({
    name: "mean_flow_over_cam", title: "Mean flow over a cam", purpose: "Flow averaged over the time that a cam holds the valve open.",
    fields: {
      angles_deg: nums("Angles", "°", CAM_ANGLES), lifts_mm: { ...nums("Valve lift at each angle", "mm", CAM_LIFTS), hint: "After lash and rocker ratio." },
      flow_lifts_mm: nums("Lifts of the flow table", "mm", "1 2 3 4 5 6 7 8 9"), flows_cfm: FLOWS,
    },
    outputs: [figure("mean_cfm", "Mean flow", "CFM", 1)],
    source: `Mean inlet flow coefficient, Taylor, The Internal Combustion Engine (1985) vol. 1 ch. 6, from memory; flow by ${MONOTONE}.`, called: { camLifts: "lifts_mm", lifts: "flow_lifts_mm", at: "lifts_mm", flowsCfm: "flows_cfm" },
    compute: (v) => named(meanFlowOverCam({ anglesDeg: v.angles_deg, camLifts: v.lifts_mm, table: { lifts: v.flow_lifts_mm, flowsCfm: v.flows_cfm } }), (mean_cfm) => ({ values: { mean_cfm } })),
  }),
  working({
    name: "synthetic_cam", title: "A stand-in for a cam", purpose: "A lift table when only greatest lift and duration are known; an assumption, and it says so.",
    fields: { max_lift_mm: num("Greatest valve lift", "mm", "8.6"), duration_deg: num("Duration", "°", "240", { max: 720 }), step_deg: num("Step", "°", "20", { min: 1, max: 90 }) },
    outputs: [column("angles_deg", "Angle", "°", 0, []), column("lifts_mm", "Lift", "mm", 3, [])], source: "Lift goes as the square of a sine: an assumption, no published source.", called: { maxLift: "max_lift_mm" },
    compute: (v) => named(syntheticCam({ maxLift: v.max_lift_mm, durationDeg: v.duration_deg, stepDeg: v.step_deg }), (a) => ({ values: { angles_deg: a.anglesDeg, lifts_mm: a.camLifts }, flags: a.flags })),
  }),
];
