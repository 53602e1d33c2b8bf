import { compareWithNoise, NOISE_WORDS, type BenchHistory, type NoiseVerdict } from "./noise";
import type { KnownUncertainty, RawTest } from "./raw-test";
import { combinedUncertainty, liftSettingUncertainty, pressureSettingUncertainty, resolutionUncertainty } from "./setting-uncertainty";
import { countingFlows, type TestFigures } from "./test-figures";

export interface NoiseRow {
  readonly liftUm: number;
  readonly verdict: NoiseVerdict["verdict"];
  readonly words: string;
  /** A side was read once and the bench's repeat history stands in. Absent in papers issued before it could. */
  readonly byHistory?: boolean;
  readonly differenceCfm: number;
  /** Expanded uncertainty at 95 %; null when not assessed. */
  readonly expandedCfm: number | null;
  /** What the change had to exceed; null when not assessed. */
  readonly marginCfm: number | null;
  readonly before: number;
  readonly after: number;
}

const flowsAt = (figures: TestFigures, liftUm: number): number[] => countingFlows(figures).filter((r) => r.liftUm === liftUm).map((r) => r.flowCfm);

/** Type B uncertainty of one reading of a test, cfm. Bench factor and range are common to both tests and cancel. Source: JCGM 100:2008 5.1.2. */
export function otherUncertaintyCfm(figures: TestFigures, liftUm: number, flowCfm: number, atInH2O: number, known: KnownUncertainty): number {
  const lifts = figures.readings.map((r) => r.liftUm);
  const uLift = known.liftMm ?? (known.liftStepMm === null ? null : resolutionUncertainty(known.liftStepMm));
  const pressure = known.pressureInH2O === null ? null : pressureSettingUncertainty({ flowCfm, dpInH2O: atInH2O, uDpInH2O: known.pressureInH2O });
  const lift = uLift === null ? null : liftSettingUncertainty({ table: { lifts, flowsCfm: figures.readings.map((r) => r.flowCfm) }, at: liftUm, uLift: uLift * 1000 });
  return combinedUncertainty([pressure?.ok ? pressure.value : 0, lift?.ok ? lift.value : 0, known.readingCfm ?? 0]);
}

/**
 * Is the change at each common lift larger than the noise? Without repeats on both sides, and without a bench history that may
 * stand in for them, it is not assessed, and says so.
 */
export function noiseRows(before: TestFigures, after: TestFigures, atInH2O: number, known: KnownUncertainty, history?: BenchHistory): NoiseRow[] {
  return after.readings.flatMap((reading) => {
    const { liftUm } = reading;
    const [beforeCfm, afterCfm] = [flowsAt(before, liftUm), flowsAt(after, liftUm)];
    if (beforeCfm.length === 0 || afterCfm.length === 0) return [];
    const uOtherCfm = otherUncertaintyCfm(after, liftUm, reading.flowCfm, atInH2O, known);
    const made = compareWithNoise({ beforeCfm, afterCfm, uOtherCfm, isConverted: before.isConverted || after.isConverted, ...(history ? { history } : {}) });
    if (!made.ok) return [];
    const { value } = made;
    const byHistory = value.flags.includes("BENCH_HISTORY");
    return [{
      liftUm, verdict: value.verdict, words: `${NOISE_WORDS[value.verdict]}${byHistory ? ", by bench history" : ""}`, byHistory, differenceCfm: value.differenceCfm, expandedCfm: value.verdict === "not_assessed" ? null : value.expandedUCfm,
      marginCfm: value.verdict === "not_assessed" ? null : value.marginCfm, before: beforeCfm.length, after: afterCfm.length,
    }];
  });
}

/** The verdicts of two tests that may be compared, and what they could not take into account. */
export interface GainNoise {
  readonly rows: readonly NoiseRow[];
  /** Uncertainties nobody stated; they count as nothing in the verdict. */
  readonly notStated: readonly string[];
  /** Repeats of the bench up to the newer test, frozen with the verdicts. Absent: it was not asked for. */
  readonly history?: BenchHistory;
}

const NOTHING_STATED: KnownUncertainty = { pressureInH2O: null, readingCfm: null, liftMm: null, liftStepMm: null };

/** Lift by lift against the noise of the bench that read both. Ask only for tests that may be compared. */
export function noiseOfTests(before: TestFigures, after: TestFigures, newer: Pick<RawTest, "known" | "nominalInH2O">, history?: BenchHistory): GainNoise {
  const known = newer.known ?? NOTHING_STATED;
  return {
    rows: noiseRows(before, after, newer.nominalInH2O, known, history),
    notStated: [
      ...(known.pressureInH2O === null ? ["pressure held"] : []), ...(known.readingCfm === null ? ["reading"] : []), ...(known.liftMm === null && known.liftStepMm === null ? ["lift"] : []),
    ],
    ...(history ? { history } : {}),
  };
}
