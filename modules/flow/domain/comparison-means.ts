import { camOpening, type CamFacts } from "./cam-opening";
import { gainAt, gainPercentAt } from "./gain";
import { meanFlowOverCam, meanFlowOverLift } from "./mean-flow";
import type { ComparedRow, ComparableSets } from "./shop-comparison";

export interface BeforeAfterMean {
  readonly beforeCfm: number;
  readonly afterCfm: number;
  readonly gainCfm: number;
  /** Null when nothing flowed before. */
  readonly percent: number | null;
}
/** Mean over a range of lift; the range is part of the figure. */
export interface MeanOverLift extends BeforeAfterMean {
  readonly fromUm: number;
  readonly toUm: number;
}
/** Mean over the time a cam holds the valve open. */
export interface MeanOverCam extends BeforeAfterMean {
  readonly camLabel: string;
  readonly spanDeg: number;
  /** The cam was drawn from its lift and duration; an assumption. */
  readonly isSynthetic: boolean;
}
/** `no_cam`: none is named on the tests. `cam_not_known`: neither table nor duration. `not_read_so_far`: it lifts higher than was read. */
export type NoCamMean = "no_cam" | "cam_not_known" | "not_read_so_far";
export interface ComparisonMeans {
  /** Null with fewer than two lifts read in both. */
  readonly overLift: MeanOverLift | null;
  readonly overCam: MeanOverCam | NoCamMean;
}
export type NamedCam = CamFacts & { readonly label: string };

const pairOf = (beforeCfm: number, afterCfm: number): BeforeAfterMean => ({ beforeCfm, afterCfm, gainCfm: gainAt(beforeCfm, afterCfm), percent: gainPercentAt(beforeCfm, afterCfm) });
const tablesOf = (rows: readonly ComparedRow[]) => {
  const lifts = rows.map((r) => r.liftUm);
  return { before: { lifts, flowsCfm: rows.map((r) => r.beforeCfm) }, after: { lifts, flowsCfm: rows.map((r) => r.afterCfm) } };
};

function overLift({ rows, atCamLift }: Pick<ComparableSets, "rows" | "atCamLift">): MeanOverLift | null {
  const [fromUm, last] = [rows[0]?.liftUm ?? 0, rows.at(-1)?.liftUm ?? 0];
  const toUm = typeof atCamLift === "object" && atCamLift.liftUm > fromUm ? atCamLift.liftUm : last;
  const tables = tablesOf(rows);
  const [before, after] = [meanFlowOverLift(tables.before, fromUm, toUm), meanFlowOverLift(tables.after, fromUm, toUm)];
  return before.ok && after.ok ? { ...pairOf(before.value, after.value), fromUm, toUm } : null;
}

function overCam(rows: readonly ComparedRow[], cam: NamedCam | null): ComparisonMeans["overCam"] {
  if (cam === null) return "no_cam";
  const opening = camOpening(cam);
  if (!opening.ok) return "cam_not_known";
  const { anglesDeg, camLifts, isSynthetic } = opening.value;
  const tables = tablesOf(rows);
  const [before, after] = [meanFlowOverCam({ anglesDeg, camLifts, table: tables.before }), meanFlowOverCam({ anglesDeg, camLifts, table: tables.after })];
  if (!before.ok || !after.ok) return "not_read_so_far";
  return { ...pairOf(before.value, after.value), camLabel: cam.label, isSynthetic, spanDeg: (anglesDeg.at(-1) ?? 0) - (anglesDeg[0] ?? 0) };
}

/**
 * Means of two tests that may be compared, over the lifts read in both: over the lift, from the lowest to cam lift where it was
 * reached and else to the highest; and over a cam. Source: as `meanFlowOverLift`, `meanFlowOverCam`.
 */
export const comparisonMeans = (gain: Pick<ComparableSets, "rows" | "atCamLift">, cam: NamedCam | null): ComparisonMeans => ({ overLift: overLift(gain), overCam: overCam(gain.rows, cam) });
