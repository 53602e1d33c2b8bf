import { describe, expect, it } from "vitest";
import { heroTest } from "@/tests/support/hero-tests";
import { valueOf } from "@/tests/support/value-of";
import { camOpening } from "./cam-opening";
import { comparisonMeans } from "./comparison-means";
import { gainAt, gainPercentAt } from "./gain";
import { portRatios, ratiosOfPort } from "./port-ratios";
import { compareSets, type ComparedRow } from "./shop-comparison";
import { standingTests } from "./standing-tests";
import { readingSetOf } from "./test-figures";

/** The nine points of the worked example, 1 to 9 mm, cfm. */
const FLOWS = [18.4, 37.9, 56.3, 73.1, 87, 97.2, 103.4, 106.1, 107];
const AFTER = [18.1, 38.6, 58.9, 78.4, 95.7, 109.2, 118.6, 124, 126.8];
const rowsOf = (before: readonly number[], after: readonly number[], from = 1): ComparedRow[] =>
  before.map((b, i) => ({ liftUm: (i + from) * 1000, beforeCfm: b, afterCfm: after[i] ?? 0, gainCfm: gainAt(b, after[i] ?? 0), gainPercent: gainPercentAt(b, after[i] ?? 0) }));
const atCam = (liftUm: number) => ({ liftUm, beforeCfm: 0, afterCfm: 0, gainCfm: 0 });
/** Valve lift of the worked example: 8.6 mm over 240 degrees, rounded to 0.001 mm. */
const PROFILE = [0, 0.576, 2.15, 4.3, 6.45, 8.024, 8.6, 8.024, 6.45, 4.3, 2.15, 0.576, 0].map((mm, i) => ({ angleDeg: i * 20, liftUm: mm * 1000 }));

describe("mean over the lift", () => {
  it("from 2 to 8 mm is 81.500 cfm (trapezoid rule; numpy.trapezoid of the same points)", () => {
    const { overLift } = comparisonMeans({ rows: rowsOf(FLOWS.slice(1), AFTER.slice(1), 2), atCamLift: atCam(8000) }, null);
    expect(overLift).toMatchObject({ fromUm: 2000, toUm: 8000 });
    expect(overLift?.beforeCfm).toBeCloseTo(81.5, 9);
    // By hand: (38.6/2 + 58.9 + 78.4 + 95.7 + 109.2 + 118.6 + 124/2)/6.
    expect(overLift?.afterCfm).toBeCloseTo((38.6 / 2 + 58.9 + 78.4 + 95.7 + 109.2 + 118.6 + 124 / 2) / 6, 9);
    expect(overLift?.gainCfm).toBeCloseTo((overLift?.afterCfm ?? 0) - 81.5, 6);
  });
  it("goes to the highest common lift where cam lift was not reached, and is not there for one lift", () => {
    expect(comparisonMeans({ rows: rowsOf(FLOWS, AFTER), atCamLift: "not_tested" }, null).overLift).toMatchObject({ fromUm: 1000, toUm: 9000 });
    expect(comparisonMeans({ rows: rowsOf([18.4], [18.1]), atCamLift: "not_given" }, null).overLift).toBeNull();
  });
});

describe("mean over the cam", () => {
  const over = (rows: ComparedRow[], cam: Parameters<typeof comparisonMeans>[1]) => comparisonMeans({ rows, atCamLift: "not_given" }, cam).overCam;
  it("of the worked table is 64.801 cfm before (SciPy PCHIP and numpy.trapezoid)", () => {
    const mean = over(rowsOf(FLOWS, AFTER), { label: "Stock", maxLiftUm: 8600, durationDeg: null, profile: PROFILE });
    if (typeof mean === "string") throw new Error(mean);
    expect(mean.beforeCfm).toBeCloseTo(64.80064, 3);
    expect(mean).toMatchObject({ camLabel: "Stock", isSynthetic: false, spanDeg: 240 });
    expect(mean.gainCfm).toBeGreaterThan(0);
  });
  it("says when the cam was drawn from lift and duration, and then comes out near the table of the same shape", () => {
    const mean = over(rowsOf(FLOWS, AFTER), { label: "Stock", maxLiftUm: 8600, durationDeg: 240, profile: [] });
    if (typeof mean === "string") throw new Error(mean);
    expect(mean.isSynthetic).toBe(true);
    // The trapezoid over finer steps of the same curve: the 20 degree steps above are good to about 0.3 %.
    expect(Math.abs(mean.beforeCfm / 64.80064 - 1)).toBeLessThan(0.003);
  });
  it("gives no number without a cam, without its shape, or above the lifts read", () => {
    const rows = rowsOf(FLOWS, AFTER);
    expect(over(rows, null)).toBe("no_cam");
    expect(over(rows, { label: "?", maxLiftUm: 8600, durationDeg: null, profile: [] })).toBe("cam_not_known");
    expect(over(rows, { label: "Tall", maxLiftUm: 9400, durationDeg: 250, profile: [] })).toBe("not_read_so_far");
    expect(valueOf(camOpening({ maxLiftUm: 9400, durationDeg: 250, profile: [] })).camLifts.every((l) => l <= 9400)).toBe(true);
  });
});

describe("crossover of two sets", () => {
  it("is at 2.142857 mm, from loss to gain, in the worked example (linear interpolation of the difference)", () => {
    const set = (flows: readonly number[], when: "before" | "after") => readingSetOf(heroTest("intake", when, { flows: [], lifts: flows.map((_, i) => ({ liftUm: (i + 1) * 1000, text: String(i + 1) })) }), { readings: flows.map((flowCfm, i) => ({ liftUm: (i + 1) * 1000, flowCfm })), isConverted: false });
    const c = valueOf(compareSets({ before: set([14.2, 27.8, 40.1], "before"), after: set([13.6, 27.5, 41.9], "after"), camLiftUm: null }));
    if (!c.comparable) throw new Error("withheld");
    expect(c.crossovers).toHaveLength(1);
    expect(c.crossovers[0]?.direction).toBe("loss_to_gain");
    expect((c.crossovers[0]?.lift ?? 0) / 1000).toBeCloseTo(2.142857, 6);
    expect(c.losses.map((r) => r.liftUm)).toEqual([1000, 2000]);
  });
});

describe("exhaust to intake", () => {
  const set = (flows: readonly number[], camLiftUm: number | null, atInH2O = 28) => ({ readings: flows.map((flowCfm, i) => ({ liftUm: (i + 1) * 1000, flowCfm })), camLiftUm, atInH2O });
  it("is 93/121 = 0.76860 at the highest lift both were read at (measured pair at 10 in H2O)", () => {
    const [ratio] = portRatios({ before: set([60, 121], null, 10), after: null }, { before: set([50, 93, 99], null, 10), after: null });
    expect(ratio).toMatchObject({ when: "before", basis: "equal_lift", intakeLiftUm: 2000, exhaustLiftUm: 2000 });
    expect((ratio?.percent ?? 0) / 100).toBeCloseTo(0.768595, 6);
  });
  it("is each at its own cam lift only where every set was read so far, so that before and after have one basis", () => {
    const [i, e] = [set([60, 100, 121], 3000), set([50, 80, 93], 2000)];
    expect(portRatios({ before: i, after: i }, { before: e, after: e }).map((r) => [r.when, r.basis, r.percent.toFixed(2)])).toEqual([["before", "own_cam_lift", "66.12"], ["after", "own_cam_lift", "66.12"]]);
    expect(portRatios({ before: i, after: i }, { before: set([50], 2000), after: e }).map((r) => r.basis)).toEqual(["equal_lift", "equal_lift"]);
  });
  it("is not told across pressures or of one side", () => {
    expect(portRatios({ before: set([60], null, 28), after: null }, { before: set([50], null, 25), after: null })).toEqual([]);
    const tests = [heroTest("intake", "before")];
    expect(ratiosOfPort(standingTests(tests, "intake", "complete"), standingTests(tests, "exhaust", "complete"))).toEqual([]);
  });
});
