import { ok, type Result } from "@/modules/kernel/result";
import type { FlowFlag } from "./flow-flags";
import { refuseFlow, refuseNotFinite } from "./flow-refusal";
import { idealMassFlow } from "./ideal-mass-flow";
import type { FlaggedFlow } from "./reading-to-flow";
import { PA_PER_INH2O } from "./units";

/** A set-point error up to this share of the nominal is corrected without remark. */
export const SET_POINT_SHARE_MAX = 0.02;
/** Part of a reading that a gain across a conversion must exceed on top of the noise. */
export const CONVERSION_ALLOWANCE_SHARE = 0.03;
const DUST = 1e-9;

/** Flags of bringing a reading held at one pressure to another. */
export function conversionFlags(fromInH2O: number, toInH2O: number): FlowFlag[] {
  const flags: FlowFlag[] = [];
  const ratio = toInH2O / fromInH2O;
  if (Math.abs(fromInH2O / toInH2O - 1) > SET_POINT_SHARE_MAX + DUST) flags.push("CONVERTED_PRESSURE");
  if (ratio > 2 + DUST || ratio < 0.5 - DUST) flags.push("PRESSURE_RATIO_LARGE");
  return flags;
}

/**
 * Flow stated at another test pressure: `Q2 = Q1 sqrt(dp2/dp1)`. Subtract the leak first.
 * Holds for constant discharge coefficient and density; over a wide ratio it overstates (see `compressiblePressureRatio`).
 * Source: Bernoulli; ISO 5167-1:2003 eq. (1). Errors: PRESSURE_NOT_POSITIVE, READING_OUT_OF_RANGE (flow < 0).
 */
export function correctToPressure(input: { flowCfm: number; fromInH2O: number; toInH2O: number }): Result<FlaggedFlow> {
  const { flowCfm, fromInH2O, toInH2O } = input;
  const bad = refuseNotFinite({ flowCfm, fromInH2O, toInH2O });
  if (bad) return bad;
  if (fromInH2O <= 0) return refuseFlow("PRESSURE_NOT_POSITIVE", "fromInH2O");
  if (toInH2O <= 0) return refuseFlow("PRESSURE_NOT_POSITIVE", "toInH2O");
  if (flowCfm < 0) return refuseFlow("READING_OUT_OF_RANGE", "flowCfm", { min: 0 });
  return ok({ flowCfm: flowCfm * Math.sqrt(toInH2O / fromInH2O), flags: conversionFlags(fromInH2O, toInH2O) });
}

/**
 * How far ideal flow really rises between two pressures, against the square-root law.
 * @param p0Pa upstream stagnation pressure, Pa, greater than both depressions.
 * Source: Heywood, Internal Combustion Engine Fundamentals (1988), App. C eq. (C.8). Errors: PRESSURE_NOT_POSITIVE.
 */
export function compressiblePressureRatio(input: { fromInH2O: number; toInH2O: number; p0Pa: number }): Result<{
  ratio: number;
  sqrtRatio: number;
  sqrtOverstatesPercent: number;
}> {
  const { fromInH2O, toInH2O, p0Pa } = input;
  const at = (dpInH2O: number) => idealMassFlow({ areaMm2: 1, p0Pa, t0K: 293.15, dpPa: dpInH2O * PA_PER_INH2O });
  const from = at(fromInH2O);
  if (!from.ok) return from;
  const to = at(toInH2O);
  if (!to.ok) return to;
  const ratio = to.value.massFlowKgS / from.value.massFlowKgS;
  const sqrtRatio = Math.sqrt(toInH2O / fromInH2O);
  return ok({ ratio, sqrtRatio, sqrtOverstatesPercent: (sqrtRatio / ratio - 1) * 100 });
}
