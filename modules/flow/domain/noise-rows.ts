import { compareWithNoise, NOISE_WORDS, type NoiseVerdict } from "./noise";
import type { KnownUncertainty, RawTest } from "./raw-test";
import { combinedUncertainty, liftSettingUncertainty, pressureSettingUncertainty, resolutionUncertainty } from "./setting-uncertainty";
import type { TestFigures } from "./test-figures";

export interface NoiseRow {
  readonly liftUm: number;
  readonly verdict: NoiseVerdict["verdict"];
  readonly words: string;
  readonly differenceCfm: number;
  /** Expanded uncertainty at 95 %; null when not assessed. */
  readonly expandedCfm: number | null;
  /** What the change had to exceed; null when not assessed. */
  readonly marginCfm: number | null;
  readonly before: number;
  readonly after: number;
}

const flowsAt = (figures: TestFigures, liftUm: number): number[] => figures.cells.filter((c) => c.liftUm === liftUm && c.excludedReason === null).flatMap((c) => (c.flowCfm === null ? [] : [c.flowCfm]));

/** Type B uncertainty of one reading of a test, cfm. Bench factor and range are common to both tests and cancel. Source: JCGM 100:2008 5.1.2. */
export function otherUncertaintyCfm(figures: TestFigures, liftUm: number, flowCfm: number, atInH2O: number, known: KnownUncertainty): number {
  const lifts = figures.readings.map((r) => r.liftUm);
  const uLift = known.liftMm ?? (known.liftStepMm === null ? null : resolutionUncertainty(known.liftStepMm));
  const pressure = known.pressureInH2O === null ? null : pressureSettingUncertainty({ flowCfm, dpInH2O: atInH2O, uDpInH2O: known.pressureInH2O });
  const lift = uLift === null ? null : liftSettingUncertainty({ table: { lifts, flowsCfm: figures.readings.map((r) => r.flowCfm) }, at: liftUm, uLift: uLift * 1000 });
  return combinedUncertainty([pressure?.ok ? pressure.value : 0, lift?.ok ? lift.value : 0, known.readingCfm ?? 0]);
}

/** Is the change at each common lift larger than the noise? Without repeats on both sides it is not assessed, and says so. */
export function noiseRows(before: TestFigures, after: TestFigures, atInH2O: number, known: KnownUncertainty): NoiseRow[] {
  return after.readings.flatMap((reading) => {
    const { liftUm } = reading;
    const [beforeCfm, afterCfm] = [flowsAt(before, liftUm), flowsAt(after, liftUm)];
    if (beforeCfm.length === 0 || afterCfm.length === 0) return [];
    const uOtherCfm = otherUncertaintyCfm(after, liftUm, reading.flowCfm, atInH2O, known);
    const made = compareWithNoise({ beforeCfm, afterCfm, uOtherCfm, isConverted: before.isConverted || after.isConverted });
    if (!made.ok) return [];
    const { value } = made;
    return [{
      liftUm, verdict: value.verdict, words: NOISE_WORDS[value.verdict], differenceCfm: value.differenceCfm, expandedCfm: value.verdict === "not_assessed" ? null : value.expandedUCfm,
      marginCfm: value.verdict === "not_assessed" ? null : value.marginCfm, before: beforeCfm.length, after: afterCfm.length,
    }];
  });
}

/** The verdicts of two tests that may be compared, and what they could not take into account. */
export interface GainNoise {
  readonly rows: readonly NoiseRow[];
  /** Uncertainties nobody stated; they count as nothing in the verdict. */
  readonly notStated: readonly string[];
}

const NOTHING_STATED: KnownUncertainty = { pressureInH2O: null, readingCfm: null, liftMm: null, liftStepMm: null };

/** Lift by lift against the noise of the bench that read `after`. Ask only for tests that may be compared. */
export function noiseOfTests(before: TestFigures, after: TestFigures, newer: Pick<RawTest, "known" | "nominalInH2O">): GainNoise {
  const known = newer.known ?? NOTHING_STATED;
  return {
    rows: noiseRows(before, after, newer.nominalInH2O, known),
    notStated: [
      ...(known.pressureInH2O === null ? ["pressure held"] : []), ...(known.readingCfm === null ? ["reading"] : []), ...(known.liftMm === null && known.liftStepMm === null ? ["lift"] : []),
    ],
  };
}
