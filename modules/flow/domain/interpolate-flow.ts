import { ok, type Result } from "@/modules/kernel/result";
import { refuseFlow, refuseNotFinite } from "./flow-refusal";
import { monotoneCurve, type CurveKnot, type CurvePoint } from "./monotone-curve";
import { paired } from "./neighbours";

export interface FlowTable {
  /** Strictly increasing, one unit. */
  readonly lifts: readonly number[];
  readonly flowsCfm: readonly number[];
}

/** Lifts and flows as points; refuses lists of different length. Errors: TOO_FEW_POINTS. */
export function pointsOf(table: FlowTable): Result<readonly CurvePoint[]> {
  const pairs = paired(table.lifts, table.flowsCfm);
  return pairs ? ok(pairs.map(([lift, flowCfm]) => ({ lift, flowCfm }))) : refuseFlow("TOO_FEW_POINTS", "flowsCfm");
}

/** Value and slope of the monotone curve at one lift. Errors: OUTSIDE_TESTED_LIFT, LIFTS_NOT_INCREASING, TOO_FEW_POINTS. */
export function knotOfTable(table: FlowTable, at: number, addZero: boolean): Result<CurveKnot> {
  const bad = refuseNotFinite({ at });
  if (bad) return bad;
  const points = pointsOf(table);
  if (!points.ok) return points;
  const curve = monotoneCurve(points.value, { addZero });
  if (!curve.ok) return curve;
  const { liftMin, liftMax } = curve.value;
  const knot = curve.value.knotAt(at);
  return knot ? ok(knot) : refuseFlow("OUTSIDE_TESTED_LIFT", "at", { min: liftMin, max: liftMax });
}

/**
 * Flow between the tested lifts, cfm; never beyond them, because past the last reading the port may stall.
 * @param addZero default true: (0, 0) is added unless a closed reading exists.
 * Source: see `monotoneCurve`. Errors: OUTSIDE_TESTED_LIFT, LIFTS_NOT_INCREASING, TOO_FEW_POINTS.
 */
export function interpolateFlow(table: FlowTable, at: number, options: { addZero?: boolean } = {}): Result<number> {
  const knot = knotOfTable(table, at, options.addZero ?? true);
  return knot.ok ? ok(knot.value.flowCfm) : knot;
}

/** `interpolateFlow` at several lifts; one outside the tested range refuses all. */
export function interpolateFlows(table: FlowTable, at: readonly number[], options: { addZero?: boolean } = {}): Result<number[]> {
  const flows: number[] = [];
  for (const lift of at) {
    const flow = interpolateFlow(table, lift, options);
    if (!flow.ok) return flow;
    flows.push(flow.value);
  }
  return ok(flows);
}
