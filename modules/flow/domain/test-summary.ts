import { repeatSums, type RepeatSums } from "./bench-history";
import { meanFlowOverLift } from "./mean-flow";
import type { RawTest } from "./raw-test";
import { countingFlows, figuresOfTest, type TestFigures } from "./test-figures";

/** Counts changes of the factors and rules that turn a reading into a flow. A summary made under an older one is made again. */
export const FLOW_CONSTANTS_VERSION = 2;

export interface TestSummary {
  /** Increasing; one flow each, same order: the mean of the repeats at the nominal pressure. */
  readonly liftsUm: readonly number[];
  readonly flowsCfm: readonly number[];
  readonly peakCfm: number | null;
  /** The lower lift when two read alike. */
  readonly peakLiftUm: number | null;
  /** Mean over the lift from zero to cam lift, cfm; null without a cam lift, or when the readings do not reach it. */
  readonly meanToCamCfm: number | null;
  readonly doubts: number;
  readonly isConverted: boolean;
  /** What the test adds to the repeat history of its bench. */
  readonly repeats: RepeatSums;
}

function meanToCam(liftsUm: readonly number[], flowsCfm: readonly number[], camLiftUm: number | null): number | null {
  if (camLiftUm === null || camLiftUm <= 0) return null;
  const withZero = liftsUm[0] === 0 ? { lifts: liftsUm, flowsCfm } : { lifts: [0, ...liftsUm], flowsCfm: [0, ...flowsCfm] };
  const mean = meanFlowOverLift(withZero, 0, camLiftUm);
  return mean.ok ? mean.value : null;
}

/** One row about a test, from its raw cells. Source: means as `meanFlowOverLift`. */
export function summaryOfTest(test: RawTest, figures: TestFigures = figuresOfTest(test)): TestSummary {
  const liftsUm = figures.readings.map((r) => r.liftUm);
  const flowsCfm = figures.readings.map((r) => r.flowCfm);
  const peak = figures.readings.reduce<{ liftUm: number; flowCfm: number } | null>((best, r) => (best === null || r.flowCfm > best.flowCfm ? r : best), null);
  return {
    liftsUm, flowsCfm, peakCfm: peak?.flowCfm ?? null, peakLiftUm: peak?.liftUm ?? null, meanToCamCfm: meanToCam(liftsUm, flowsCfm, test.camLiftUm),
    doubts: figures.doubts.length + figures.cells.filter((c) => c.flags.some((f) => f !== "SELF_CANCELLING")).length, isConverted: figures.isConverted,
    repeats: repeatSums(countingFlows(figures)),
  };
}
