import { ok, type Result } from "@/modules/kernel/result";
import type { FlowFlag } from "./flow-flags";
import { refuseFlow, refuseNotFinite } from "./flow-refusal";
import { tFactor } from "./t-factor";
import { CONVERSION_ALLOWANCE_SHARE } from "./test-pressure";

/** Repeat pairs a bench needs before its history may stand in for repeats. */
export const HISTORY_PAIRS_MIN = 10;

/** Repeats of one bench over twelve months. */
export interface BenchHistory {
  /** Pooled standard deviation, cfm, >= 0. */
  readonly pooledCfm: number;
  /** Repeat pairs: degrees of freedom behind it, >= 0. */
  readonly pairs: number;
}

/**
 * May the history stand in for repeats? Enough pairs, and some spread: repeats that never differ show an indicator coarser than
 * the noise, not that there is none.
 */
export const isHistoryUsable = (history: BenchHistory): boolean => history.pairs >= HISTORY_PAIRS_MIN && history.pooledCfm > 0;

export type NoiseVerdict =
  | {
      readonly verdict: "larger_than_noise" | "within_noise";
      readonly meanBeforeCfm: number;
      readonly meanAfterCfm: number;
      readonly differenceCfm: number;
      readonly combinedUCfm: number;
      /** Welch-Satterthwaite, cut down to a whole number; Infinity without Type A part. */
      readonly effectiveDof: number;
      readonly k: number;
      readonly expandedUCfm: number;
      /** What the change must exceed: U, and across a pressure conversion 3 % of the before reading more. */
      readonly marginCfm: number;
      readonly flags: readonly FlowFlag[];
    }
  | {
      readonly verdict: "not_assessed";
      readonly meanBeforeCfm: number;
      readonly meanAfterCfm: number;
      readonly differenceCfm: number;
      readonly flags: readonly FlowFlag[];
    };

/** Words for a report. Never "significant" alone. */
export const NOISE_WORDS: Readonly<Record<NoiseVerdict["verdict"], string>> = {
  larger_than_noise: "larger than the measurement noise (95 %)",
  within_noise: "not distinguishable from zero",
  not_assessed: "not assessed",
};

/** Where a verdict rests on the bench's history: `by bench history (24 repeat pairs in 12 months)`. */
export const historyWords = ({ pairs }: BenchHistory): string => `by bench history (${pairs} repeat pairs in 12 months)`;

const mean = (list: readonly number[]): number => list.reduce((a, b) => a + b, 0) / list.length;

/** Variance of the mean, `s^2/n`, of at least two readings. */
function varianceOfMean(list: readonly number[]): number {
  const m = mean(list);
  return list.reduce((s, v) => s + (v - m) ** 2, 0) / (list.length - 1) / list.length;
}

/**
 * Is the change larger than the noise? `U = t(nu) u_c`, `u_c^2 = uA_before^2 + uA_after^2 + 2 u_other^2`.
 * Bench factor and range are common to both tests on one bench and cancel; leave them out of `uOtherCfm`.
 * Across a pressure conversion (`isConverted`) the change must exceed U plus 3 % of the before reading.
 * A side read once takes the bench's pooled repeats, flag BENCH_HISTORY, where there are enough (GUM 4.2.4); a side with repeats keeps its own.
 * @param uOtherCfm Type B standard uncertainty of one test, >= 0. @param confidence default 0.95.
 * Source: JCGM 100:2008 (GUM) 4.2, 5.1.2, G.4.1 (Welch-Satterthwaite). Errors: TOO_FEW_POINTS, READING_OUT_OF_RANGE.
 */
export function compareWithNoise(input: {
  beforeCfm: readonly number[];
  afterCfm: readonly number[];
  uOtherCfm: number;
  confidence?: number;
  history?: BenchHistory;
  isConverted?: boolean;
}): Result<NoiseVerdict> {
  const { beforeCfm, afterCfm, uOtherCfm, confidence = 0.95, history, isConverted = false } = input;
  const bad = refuseNotFinite({ beforeCfm, afterCfm, uOtherCfm, confidence, pooledCfm: history?.pooledCfm });
  if (bad) return bad;
  if (beforeCfm.length === 0) return refuseFlow("TOO_FEW_POINTS", "beforeCfm");
  if (afterCfm.length === 0) return refuseFlow("TOO_FEW_POINTS", "afterCfm");
  if (uOtherCfm < 0) return refuseFlow("READING_OUT_OF_RANGE", "uOtherCfm", { min: 0 });
  const meanBeforeCfm = mean(beforeCfm);
  const meanAfterCfm = mean(afterCfm);
  const differenceCfm = meanAfterCfm - meanBeforeCfm;
  const means = { meanBeforeCfm, meanAfterCfm, differenceCfm };
  const single = [beforeCfm, afterCfm].filter((list) => list.length < 2);
  const usable = history && isHistoryUsable(history) ? history : null;
  if (single.length > 0 && !usable) return ok({ ...means, verdict: "not_assessed", flags: ["NO_REPEATS"] });

  const parts = [beforeCfm, afterCfm]
    .filter((list) => list.length >= 2)
    .map((list) => ({ variance: varianceOfMean(list), dof: list.length - 1 }));
  // Two single readings judged by one pooled value share its degrees of freedom: one part, not two.
  if (usable && single.length > 0) parts.push({ variance: single.length * usable.pooledCfm ** 2, dof: usable.pairs });
  const variance = parts.reduce((s, p) => s + p.variance, 0) + 2 * uOtherCfm ** 2;
  const spread = parts.reduce((s, p) => s + p.variance ** 2 / p.dof, 0);
  const effectiveDof = spread === 0 ? Infinity : Math.floor(variance ** 2 / spread + 1e-9);
  const k = tFactor(confidence, effectiveDof);
  if (!k.ok) return k;
  const combinedUCfm = Math.sqrt(variance);
  const expandedUCfm = k.value * combinedUCfm;
  const allowance = isConverted ? CONVERSION_ALLOWANCE_SHARE * Math.abs(meanBeforeCfm) : 0;
  return ok({
    ...means,
    verdict: Math.abs(differenceCfm) > expandedUCfm + allowance ? "larger_than_noise" : "within_noise",
    combinedUCfm,
    effectiveDof,
    k: k.value,
    expandedUCfm,
    marginCfm: expandedUCfm + allowance,
    flags: [...(single.length > 0 ? (["BENCH_HISTORY"] as const) : []), ...(isConverted ? (["CONVERTED_PRESSURE"] as const) : [])],
  });
}
