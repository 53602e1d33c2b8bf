import type { NoiseVerdict } from "./noise";
import type { ComparableGain } from "./side-gain";

/** The one figure a side is told by. */
export interface GainHeadline {
  /** `cam`: at the cam's full lift, which both tests reached. `mean`: mean of the lifts read in both. */
  readonly basis: "cam" | "mean";
  readonly beforeCfm: number;
  readonly afterCfm: number;
  readonly gainCfm: number;
  /** Null for the mean. */
  readonly liftUm: number | null;
  readonly verdict: NoiseVerdict["verdict"];
}
type Told = Pick<ComparableGain, "rows" | "atCamLift" | "meanBeforeCfm" | "meanAfterCfm" | "meanGainCfm" | "noise">;

const all = (verdicts: readonly NoiseVerdict["verdict"][]): NoiseVerdict["verdict"] =>
  (verdicts.length === 0 || verdicts.includes("not_assessed") ? "not_assessed" : verdicts.every((v) => v === "larger_than_noise") ? "larger_than_noise" : "within_noise");

/**
 * The gain where the cam takes the valve, never past it; without a known and reached cam lift the mean of the lifts read. At cam
 * lift the verdict is that of the lifts read either side of it, both of which must hold; for the mean that of most of the lifts. Our choice.
 */
export function gainHeadline(gain: Told): GainHeadline {
  const { rows, atCamLift } = gain;
  const verdictAt = (um: number | undefined): NoiseVerdict["verdict"] => gain.noise?.rows.find((r) => r.liftUm === um)?.verdict ?? "not_assessed";
  if (typeof atCamLift === "object") {
    const below = rows.filter((r) => r.liftUm <= atCamLift.liftUm).at(-1)?.liftUm;
    const above = rows.find((r) => r.liftUm >= atCamLift.liftUm)?.liftUm;
    return { basis: "cam", beforeCfm: atCamLift.beforeCfm, afterCfm: atCamLift.afterCfm, gainCfm: atCamLift.gainCfm, liftUm: atCamLift.liftUm, verdict: all([below ?? above, above].map(verdictAt)) };
  }
  const verdicts = rows.map((r) => verdictAt(r.liftUm));
  const most = (["larger_than_noise", "within_noise"] as const).find((v) => verdicts.filter((x) => x === v).length * 2 > rows.length);
  return { basis: "mean", beforeCfm: gain.meanBeforeCfm, afterCfm: gain.meanAfterCfm, gainCfm: gain.meanGainCfm, liftUm: null, verdict: most ?? (verdicts.includes("not_assessed") ? "not_assessed" : "within_noise") };
}
