import { ok, type Result } from "@/modules/kernel/result";
import type { FlowFlag } from "./flow-flags";
import { refuseFlow, refuseNotFinite } from "./flow-refusal";
import { SANITY_LIMITS, type SanityLimits } from "./sanity-limits";

export interface FlaggedFlow<F extends string = FlowFlag> {
  readonly flowCfm: number;
  readonly flags: readonly F[];
}

/** Flags of a place on the scale, percent of full scale. */
export const rangeFlags = (percent: number, limits: SanityLimits = SANITY_LIMITS): FlowFlag[] =>
  percent < limits.percentLow ? ["READING_LOW_IN_RANGE"] : percent > limits.percentHigh ? ["READING_HIGH_IN_RANGE"] : [];

/**
 * Flow on a scale linear in flow: `range x percent/100 x bench factor`. Common practice, no source.
 * @param percent 0 to 100. Errors: READING_OUT_OF_RANGE.
 */
export function flowFromRangePercent(input: { rangeCfm: number; percent: number; benchFactor?: number; limits?: SanityLimits | undefined }): Result<FlaggedFlow> {
  const { rangeCfm, percent, benchFactor = 1 } = input;
  const bad = refuseNotFinite({ rangeCfm, percent, benchFactor });
  if (bad) return bad;
  if (percent < 0 || percent > 100) return refuseFlow("READING_OUT_OF_RANGE", "percent", { min: 0, max: 100 });
  if (rangeCfm <= 0) return refuseFlow("READING_OUT_OF_RANGE", "rangeCfm");
  if (benchFactor <= 0) return refuseFlow("READING_OUT_OF_RANGE", "benchFactor");
  return ok({ flowCfm: ((rangeCfm * percent) / 100) * benchFactor, flags: rangeFlags(percent, input.limits) });
}

/**
 * Flow from the plain manometer across the metering orifice: `range x sqrt(head/full scale) x bench factor`.
 * Source: ISO 5167-1:2003 eq. (1), flow goes as the root of the differential pressure.
 * @param head same unit as `fullScaleHead`, 0 to full scale. Errors: READING_OUT_OF_RANGE.
 */
export function flowFromOrificeHead(input: {
  rangeCfm: number;
  head: number;
  fullScaleHead: number;
  benchFactor?: number;
  limits?: SanityLimits | undefined;
}): Result<FlaggedFlow> {
  const { rangeCfm, head, fullScaleHead, benchFactor = 1 } = input;
  const bad = refuseNotFinite({ rangeCfm, head, fullScaleHead, benchFactor });
  if (bad) return bad;
  if (fullScaleHead <= 0) return refuseFlow("READING_OUT_OF_RANGE", "fullScaleHead");
  if (head < 0 || head > fullScaleHead) return refuseFlow("READING_OUT_OF_RANGE", "head", { min: 0, max: fullScaleHead });
  if (rangeCfm <= 0) return refuseFlow("READING_OUT_OF_RANGE", "rangeCfm");
  if (benchFactor <= 0) return refuseFlow("READING_OUT_OF_RANGE", "benchFactor");
  const part = Math.sqrt(head / fullScaleHead);
  return ok({ flowCfm: rangeCfm * part * benchFactor, flags: rangeFlags(part * 100, input.limits) });
}

/** Flow from a meter that shows it: `value x bench factor`. @param valueCfm >= 0. Errors: READING_OUT_OF_RANGE. */
export function flowFromDirect(input: { valueCfm: number; benchFactor?: number }): Result<FlaggedFlow> {
  const { valueCfm, benchFactor = 1 } = input;
  const bad = refuseNotFinite({ valueCfm, benchFactor });
  if (bad) return bad;
  if (valueCfm < 0) return refuseFlow("READING_OUT_OF_RANGE", "valueCfm", { min: 0 });
  if (benchFactor <= 0) return refuseFlow("READING_OUT_OF_RANGE", "benchFactor");
  return ok({ flowCfm: valueCfm * benchFactor, flags: [] });
}
