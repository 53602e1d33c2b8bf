import { ok, type Result } from "@/modules/kernel/result";
import type { FlowFlag } from "./flow-flags";
import { refuseFlow, refuseNotFinite } from "./flow-refusal";
import { interpolateFlows, pointsOf, type FlowTable } from "./interpolate-flow";
import type { CurvePoint } from "./monotone-curve";
import { isIncreasing, neighbours, paired } from "./neighbours";

/** Straight-line flow between tested points; null outside. */
function straightLine(points: readonly CurvePoint[], lift: number): number | null {
  const piece = neighbours(points).find(([a, b]) => lift >= a.lift && lift <= b.lift);
  if (!piece) return null;
  const [a, b] = piece;
  return a.flowCfm + ((lift - a.lift) / (b.lift - a.lift)) * (b.flowCfm - a.flowCfm);
}

const trapezoid = (xy: readonly (readonly [number, number])[]): number =>
  neighbours(xy).reduce((sum, [a, b]) => sum + ((b[0] - a[0]) * (a[1] + b[1])) / 2, 0);

/**
 * Mean flow over a range of lift, cfm: trapezoid on the tested points, ends on the straight line between them.
 * @param from, to same unit as the lifts, inside the tested range, from < to.
 * Source: trapezoid rule. Errors: OUTSIDE_TESTED_LIFT, LIFTS_NOT_INCREASING, TOO_FEW_POINTS.
 */
export function meanFlowOverLift(table: FlowTable, from: number, to: number): Result<number> {
  const bad = refuseNotFinite({ lifts: table.lifts, flowsCfm: table.flowsCfm, from, to });
  if (bad) return bad;
  const points = pointsOf(table);
  if (!points.ok) return points;
  if (points.value.length < 2) return refuseFlow("TOO_FEW_POINTS", "lifts");
  if (!isIncreasing(table.lifts)) return refuseFlow("LIFTS_NOT_INCREASING", "lifts");
  if (to <= from) return refuseFlow("LIFTS_NOT_INCREASING", "to");
  const start = straightLine(points.value, from);
  const end = straightLine(points.value, to);
  if (start === null) return refuseFlow("OUTSIDE_TESTED_LIFT", "from");
  if (end === null) return refuseFlow("OUTSIDE_TESTED_LIFT", "to");
  const inner = points.value.filter((p) => p.lift > from && p.lift < to).map((p) => [p.lift, p.flowCfm] as const);
  return ok(trapezoid([[from, start], ...inner, [to, end]]) / (to - from));
}

/**
 * Mean flow over the time a cam holds the valve open, cfm: trapezoid over the angles, flow by the monotone curve, (0, 0) added.
 * @param anglesDeg increasing. @param camLifts valve lift after lash and rocker ratio, same unit as the flow table.
 * Source: mean inlet flow coefficient, Taylor, The Internal Combustion Engine (1985) vol. 1 ch. 6. Errors: as `interpolateFlow`.
 */
export function meanFlowOverCam(input: { anglesDeg: readonly number[]; camLifts: readonly number[]; table: FlowTable }): Result<number> {
  const { anglesDeg, camLifts, table } = input;
  const bad = refuseNotFinite({ anglesDeg, camLifts });
  if (bad) return bad;
  if (anglesDeg.length < 2) return refuseFlow("TOO_FEW_POINTS", "anglesDeg");
  if (!isIncreasing(anglesDeg)) return refuseFlow("LIFTS_NOT_INCREASING", "anglesDeg");
  const flows = interpolateFlows(table, camLifts);
  if (!flows.ok) return flows;
  const curve = paired(anglesDeg, flows.value);
  if (!curve) return refuseFlow("TOO_FEW_POINTS", "camLifts");
  return ok(trapezoid(curve) / ((anglesDeg.at(-1) ?? 0) - (anglesDeg[0] ?? 0)));
}

/**
 * A stand-in lift table when only maximum lift and duration are known: `Lmax sin^2(pi theta/duration)`. An assumption, flag SYNTHETIC_CAM.
 * @param maxLift > 0. @param durationDeg > 0. @param stepDeg > 0, the last angle is always the duration.
 * Errors: GEOMETRY_INVALID, TOO_MANY_LIFTS (over 2000 steps).
 */
export function syntheticCam(input: { maxLift: number; durationDeg: number; stepDeg: number }): Result<{
  anglesDeg: readonly number[];
  camLifts: readonly number[];
  flags: readonly FlowFlag[];
}> {
  const { maxLift, durationDeg, stepDeg } = input;
  const bad = refuseNotFinite(input);
  if (bad) return bad;
  if (maxLift <= 0) return refuseFlow("GEOMETRY_INVALID", "maxLift");
  if (durationDeg <= 0 || stepDeg <= 0) return refuseFlow("GEOMETRY_INVALID", durationDeg <= 0 ? "durationDeg" : "stepDeg");
  const steps = Math.ceil(durationDeg / stepDeg - 1e-9);
  if (steps > 2000) return refuseFlow("TOO_MANY_LIFTS", "stepDeg");
  const anglesDeg = Array.from({ length: steps + 1 }, (_, i) => Math.min(i * stepDeg, durationDeg));
  const camLifts = anglesDeg.map((a) => maxLift * Math.sin((Math.PI * a) / durationDeg) ** 2);
  return ok({ anglesDeg, camLifts: camLifts.map((l, i) => (i === 0 || i === steps ? 0 : l)), flags: ["SYNTHETIC_CAM"] });
}
