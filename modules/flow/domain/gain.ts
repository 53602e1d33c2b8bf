import { ok, type Result } from "@/modules/kernel/result";
import { refuseFlow, refuseNotFinite } from "./flow-refusal";
import { interpolateFlows } from "./interpolate-flow";
import { isIncreasing, paired } from "./neighbours";

/** A difference without the binary dust of decimal readings: 51.6 - 48.9 is 2.7. Keeps six decimals, alike on both sides of zero. */
export const withoutDust = (value: number): number => {
  const rounded = (Math.sign(value) * Math.round(Math.abs(value) * 1e6)) / 1e6;
  return rounded === 0 ? 0 : rounded;
};

/** After less before, cfm. A loss is negative and is shown as plainly as a gain. */
export const gainAt = (beforeCfm: number, afterCfm: number): number => withoutDust(afterCfm - beforeCfm);

/** Gain in percent of before; null when before is 0, because there is no such percent. */
export const gainPercentAt = (beforeCfm: number, afterCfm: number): number | null =>
  beforeCfm === 0 ? null : (100 * (afterCfm - beforeCfm)) / beforeCfm;

export interface GainRow {
  readonly lift: number;
  readonly beforeCfm: number;
  readonly afterCfm: number;
  readonly gainCfm: number;
  readonly gainPercent: number | null;
}

export interface BeforeAfter {
  /** Strictly increasing, one unit; the lifts of `beforeCfm`, and of `afterCfm` unless `afterLifts` is given. */
  readonly lifts: readonly number[];
  readonly beforeCfm: readonly number[];
  readonly afterCfm: readonly number[];
  readonly afterLifts?: readonly number[];
}

/**
 * Gain at every lift of the before test; the after test is brought to those lifts by the monotone curve when its own differ.
 * Source: subtraction. Errors: TOO_FEW_POINTS, LIFTS_NOT_INCREASING, OUTSIDE_TESTED_LIFT.
 */
export function gainTable(input: BeforeAfter): Result<readonly GainRow[]> {
  const { lifts, beforeCfm, afterCfm, afterLifts } = input;
  const bad = refuseNotFinite({ lifts, beforeCfm, afterCfm, afterLifts });
  if (bad) return bad;
  if (lifts.length === 0) return refuseFlow("TOO_FEW_POINTS", "lifts");
  if (!isIncreasing(lifts)) return refuseFlow("LIFTS_NOT_INCREASING", "lifts");
  const after = afterLifts ? interpolateFlows({ lifts: afterLifts, flowsCfm: afterCfm }, lifts) : ok(afterCfm);
  if (!after.ok) return after;
  const flows = paired(beforeCfm, after.value);
  const rows = flows && paired(lifts, flows);
  if (!rows) return refuseFlow("TOO_FEW_POINTS", "afterCfm");
  return ok(
    rows.map(([lift, [before, aft]]) => ({
      lift,
      beforeCfm: before,
      afterCfm: aft,
      gainCfm: gainAt(before, aft),
      gainPercent: gainPercentAt(before, aft),
    })),
  );
}
