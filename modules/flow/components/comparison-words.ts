import { comparisonMeans, type ComparisonMeans, type NoCamMean } from "../domain/comparison-means";
import type { PortRatio } from "../domain/port-ratios";
import type { ComparableGain, SideGain } from "../domain/side-gain";
import type { UnitWords } from "./unit-words";

/** One mean, before and after, ready to print. */
export interface MeanRow {
  readonly name: string;
  readonly before: string;
  readonly after: string;
  readonly gain: string;
  readonly isLoss: boolean;
  readonly percent: string;
}

type Told = Pick<ComparableGain, "rows" | "meanBeforeCfm" | "meanAfterCfm" | "meanGainCfm" | "meanPercent" | "atCamLift" | "crossovers" | "losses">;

/**
 * What two tests come to: the plain mean of the lifts read, the means over lift and over the cam, and the figures at cam lift.
 * The plain mean has two decimals, as it always had; the others are worked out and have one.
 */
export function meanRows(gain: Told, means: ComparisonMeans | undefined, w: UnitWords): MeanRow[] {
  const row = (name: string, b: number, a: number, g: number, percent: number | null, digits = 1): MeanRow =>
    ({ name, before: w.flow(b, digits), after: w.flow(a, digits), gain: w.difference(g, digits), isLoss: g < 0, percent: percent === null ? "" : w.percent(percent, digits) });
  const { rows, atCamLift } = gain;
  const overLift = means?.overLift ?? null;
  const overCam = means?.overCam;
  return [
    row(rows.length === 1 ? "The one lift read" : `Mean of the ${rows.length} lifts read`, gain.meanBeforeCfm, gain.meanAfterCfm, gain.meanGainCfm, gain.meanPercent, 2),
    ...(overLift ? [row(`Mean over lift ${w.lift(overLift.fromUm)} to ${w.lift(overLift.toUm)}`, overLift.beforeCfm, overLift.afterCfm, overLift.gainCfm, overLift.percent)] : []),
    ...(typeof overCam === "object" ? [row(`Mean over the cam${overCam.isSynthetic ? " *" : ""}`, overCam.beforeCfm, overCam.afterCfm, overCam.gainCfm, overCam.percent)] : []),
    ...(typeof atCamLift === "object" ? [row(`At cam lift ${w.lift(atCamLift.liftUm)}`, atCamLift.beforeCfm, atCamLift.afterCfm, atCamLift.gainCfm, atCamLift.beforeCfm === 0 ? null : (100 * atCamLift.gainCfm) / atCamLift.beforeCfm)] : []),
  ];
}

/** Both sides in a line: means over the lift and where they cross. Null where nothing may be compared. */
export function shortWords(gains: readonly (SideGain | null)[], wordsOf: (gain: ComparableGain) => UnitWords): string | null {
  const told = gains.flatMap((gain) => (gain?.comparable ? [{ gain, w: wordsOf(gain), mean: comparisonMeans(gain, null).overLift }] : []));
  const means = told.flatMap(({ gain, w, mean }) => (mean ? [`${gain.side} ${mean.gainCfm < 0 ? "loss " : ""}${w.difference(mean.gainCfm)} over ${w.lift(mean.fromUm)} to ${w.lift(mean.toUm)}`] : []));
  const crossings = told.flatMap(({ gain, w }) => { const words = crossoverWords(gain, w); return words === null ? [] : [`${gain.side === "intake" ? "Intake" : "Exhaust"} ${words[0]?.toLowerCase() ?? ""}${words.slice(1)}`]; });
  return means.length + crossings.length === 0 ? null : [...(means.length > 0 ? [`Mean over the lift, ${told[0]?.w.flowUnit ?? "CFM"}: ${means.join(", ")}.`] : []), ...crossings].join(" ");
}

const NO_CAM: Readonly<Record<NoCamMean, string>> = {
  no_cam: "no camshaft is named on the tests", cam_not_known: "neither table nor duration of the camshaft is recorded", not_read_so_far: "the camshaft lifts higher than was read before and after",
};
/** Why there is no mean over the cam; null where there is one. */
export const noCamWords = (means: ComparisonMeans | undefined): string | null => (typeof means?.overCam === "string" ? `No mean over the cam: ${NO_CAM[means.overCam]}.` : null);

/** Which cam the mean is over, and that it was drawn where it was not measured. */
export function camWords(means: ComparisonMeans | undefined, degrees: (value: number) => string): string | null {
  if (typeof means?.overCam !== "object") return null;
  const { camLabel, spanDeg, isSynthetic } = means.overCam;
  return `Cam "${camLabel}", ${degrees(spanDeg)}°${isSynthetic ? "; * its curve is synthetic, drawn from lift and duration, an assumption" : ", from its table"}.`;
}

/** Where gain and loss change places; null where they do not. @param isGain false for two castings, whose difference is no gain. */
export function crossoverWords({ crossovers }: Pick<Told, "crossovers">, w: UnitWords, isGain = true): string | null {
  const [low, high] = isGain ? ["loss", "gain"] : ["lower", "higher"];
  if (crossovers.length === 0) return null;
  return `${crossovers.map((c, i) => `${i === 0 ? "Turns" : "turns"} from ${c.direction === "loss_to_gain" ? `${low} to ${high}` : `${high} to ${low}`} at ${w.lift(c.lift)}`).join(", ")} (crossover).`;
}

/** Lifts that lost, as plainly as a gain; null without one. */
export const lossWords = ({ losses }: Pick<Told, "losses">, w: UnitWords): string | null =>
  (losses.length === 0 ? null : `Lower after than before at ${losses.map((l) => `${w.lift(l.liftUm)} (${w.difference(l.gainCfm)})`).join(", ")}.`);

/** Exhaust to intake with its basis; null where there is none. */
export function ratioWords(ratios: readonly PortRatio[], w: UnitWords): string | null {
  const [first] = ratios;
  if (!first) return null;
  const basis = first.basis === "own_cam_lift" ? `each side at its own cam lift (intake ${w.lift(first.intakeLiftUm)}, exhaust ${w.lift(first.exhaustLiftUm)})` : `both at ${[...new Set(ratios.map((r) => w.lift(r.intakeLiftUm)))].join(" and ")} lift`;
  return `Exhaust to intake ${ratios.map((r) => `${w.percent(r.percent)} ${r.when}`).join(", ")}, ${basis}.`;
}
