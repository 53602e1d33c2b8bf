import { ok, type Result } from "@/modules/kernel/result";
import type { FlowFlag } from "./flow-flags";
import { refuseFlow, refuseNotFinite } from "./flow-refusal";
import { paired } from "./neighbours";

/** A move of the factor beyond this share is drift. Common practice, no source. */
export const DRIFT_SHARE_MAX = 0.01;

export interface BenchFactor {
  readonly factor: number;
  /** Largest miss of a plate after the factor, percent of the plate's flow. */
  readonly maxResidualPercent: number;
  readonly flags: readonly FlowFlag[];
}

/**
 * Bench factor from check plates: least squares through zero, `sum(ref x ind)/sum(ind^2)`.
 * The factor is dated; earlier tests keep the factor of their day.
 * @param referenceCfm flows of the plates, > 0. @param indicatedCfm what the bench showed, > 0, same order. @param lastFactor > 0.
 * Source: method of least squares, any statistics text. Errors: TOO_FEW_POINTS, READING_OUT_OF_RANGE.
 */
export function benchFactorFromPlates(input: {
  referenceCfm: readonly number[];
  indicatedCfm: readonly number[];
  lastFactor?: number;
}): Result<BenchFactor> {
  const { referenceCfm, indicatedCfm, lastFactor } = input;
  const bad = refuseNotFinite({ referenceCfm, indicatedCfm, lastFactor });
  if (bad) return bad;
  const plates = paired(referenceCfm, indicatedCfm);
  if (!plates || plates.length === 0) return refuseFlow("TOO_FEW_POINTS", "indicatedCfm");
  if (referenceCfm.some((v) => v <= 0)) return refuseFlow("READING_OUT_OF_RANGE", "referenceCfm");
  if (indicatedCfm.some((v) => v <= 0)) return refuseFlow("READING_OUT_OF_RANGE", "indicatedCfm");
  if (lastFactor !== undefined && lastFactor <= 0) return refuseFlow("READING_OUT_OF_RANGE", "lastFactor");
  const factor = plates.reduce((s, [ref, ind]) => s + ref * ind, 0) / plates.reduce((s, [, ind]) => s + ind * ind, 0);
  const maxResidualPercent = Math.max(...plates.map(([ref, ind]) => (Math.abs(ref - factor * ind) / ref) * 100));
  const drifted = lastFactor !== undefined && Math.abs(factor / lastFactor - 1) > DRIFT_SHARE_MAX;
  return ok({ factor, maxResidualPercent, flags: drifted ? ["CALIBRATION_DRIFT"] : [] });
}
