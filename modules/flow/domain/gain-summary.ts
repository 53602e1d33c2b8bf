import { type GainRow, withoutDust } from "./gain";

export interface GainSummary {
  /** Mean of the gains over the common lifts, cfm. */
  readonly averageGainCfm: number;
  /** 100 * (sum after - sum before) / sum before; null when before sums to 0. */
  readonly averageGainPercent: number | null;
  /** The largest gain and the lift at which it was measured; the lower lift wins a tie. */
  readonly peakGainCfm: number;
  readonly peakLift: number;
}

/**
 * One line under a before-and-after table. Airflow as measured; says nothing about power.
 * Null when there are no rows. Source: arithmetic.
 */
export function gainSummary(rows: readonly GainRow[]): GainSummary | null {
  const [first] = rows;
  if (!first) return null;
  const before = rows.reduce((sum, r) => sum + r.beforeCfm, 0);
  const after = rows.reduce((sum, r) => sum + r.afterCfm, 0);
  const peak = rows.reduce((best, r) => (r.gainCfm > best.gainCfm ? r : best), first);
  return {
    averageGainCfm: withoutDust((after - before) / rows.length),
    averageGainPercent: before === 0 ? null : (100 * (after - before)) / before,
    peakGainCfm: peak.gainCfm,
    peakLift: peak.lift,
  };
}
