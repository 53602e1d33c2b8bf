import { describe, expect, it } from "vitest";
import { HERO_FLOWS, HERO_LIFTS_UM } from "@/tests/support/hero-flow";
import { refusalOf, valueOf } from "@/tests/support/value-of";
import { coefficientTable } from "./coefficient-rows";
import { engineEstimate } from "./engine-estimate";
import { noiseRows, otherUncertaintyCfm } from "./noise-rows";
import { POWER_ESTIMATE_WORDS } from "./power-estimate";
import type { KnownUncertainty, RawCell, RawTest } from "./raw-test";
import { figuresOfTest } from "./test-figures";

describe("coefficients lift by lift", () => {
  it("give 0.496 on 2 x 31 mm at 8 mm for 170 cfm at 28 in H2O, within the air of the worked example", () => {
    // Worked example: 0.496068 compressible at 1.199314 kg/m3; here the air is dry, 1.2041: the root of the ratio is 1.0020.
    const table = coefficientTable({ readings: [{ liftUm: 8000, flowCfm: 170 }], side: "intake", valveDiametersMm: [31, 31], atInH2O: 28 });
    expect(table?.rows[0]?.curtainMm2).toBeCloseTo(1558.23, 2);
    expect(table?.rows[0]?.liftOverDiameter).toBeCloseTo(0.25806, 5);
    expect(table?.rows[0]?.cd).toBeCloseTo(0.496068 * Math.sqrt(1.2041 / 1.199314), 3);
    // 28 inH2O in dry air near 60 F is quoted as 350 ft/s; at 20 C it is a little more.
    expect(table?.idealFtS).toBeGreaterThan(350);
    expect(table?.idealFtS).toBeLessThan(355);
  });
  it("flag what cannot be, leave out the shut valve, and give nothing without valves", () => {
    const table = coefficientTable({ readings: [{ liftUm: 0, flowCfm: 0.4 }, { liftUm: 1000, flowCfm: 130 }], side: "intake", valveDiametersMm: [31, 31], atInH2O: 28 });
    expect(table?.rows.map((r) => [r.liftUm, r.flags])).toEqual([[1000, ["CD_ABOVE_ONE"]]]);
    expect(coefficientTable({ readings: [{ liftUm: 1000, flowCfm: 20 }], side: "intake", valveDiametersMm: [], atInH2O: 28 })).toBeNull();
  });
});

const cell = (liftUm: number, repeatNo: number, valueText: string): RawCell => ({
  liftUm, repeatNo, revision: 1, valueText, valueUnit: "cfm", rangeLabel: null, pressureText: "28", pressureUnit: "inH2O", acceptedReason: null, excludedReason: null, takenAt: "2026-02-26T17:00:00Z",
});
const test = (cells: RawCell[]): RawTest => ({
  id: "t", side: "intake", purpose: "after", runNo: 1, state: "complete", version: 1, bench: { id: "b", name: "Bench", scale: "direct", ranges: [], waterUnit: "conventional" }, benchFactor: 1, benchCheckedAt: null,
  fixture: { id: "f", name: "77", boreMm: 77 }, nominalInH2O: 28, lifts: [], liftUnit: "mm", camLiftUm: null, entry: "radius", valvesOpen: "all", valveMm: null, seatNote: "", plugClosed: true, testSprings: true, warmUpMinutes: null,
  roomTemperatureText: "", roomPressureText: "", roomHumidityText: "", leakText: "", leakPressureText: "", notes: "", operator: { id: "p", name: "June" }, startedAt: "2026-02-26T17:00:00Z", completedAt: null, correctsTestId: null, voidReason: null, cells,
});
const nothing: KnownUncertainty = { pressureInH2O: null, readingCfm: null, liftMm: null, liftStepMm: null };

describe("the change against the noise", () => {
  it("is larger than the noise for the worked repeats: 2.667 against U 0.924 with 0.30 of its own", () => {
    const before = figuresOfTest(test([cell(5000, 1, "103.2"), cell(5000, 2, "103.6"), cell(5000, 3, "103.5")]));
    const after = figuresOfTest(test([cell(5000, 1, "105.9"), cell(5000, 2, "106.4"), cell(5000, 3, "106.0")]));
    const [row] = noiseRows(before, after, 28, { ...nothing, readingCfm: 0.3 });
    expect(row?.verdict).toBe("larger_than_noise");
    expect(row?.differenceCfm).toBeCloseTo(2.6667, 4);
    expect(row?.expandedCfm).toBeCloseTo(0.9236, 3);
    expect(row?.words).toBe("larger than the measurement noise (95 %)");
  });
  it("is not assessed without repeats, and says so", () => {
    const one = figuresOfTest(test([cell(5000, 1, "103.2")]));
    expect(noiseRows(one, figuresOfTest(test([cell(5000, 1, "115")])), 28, nothing)).toMatchObject([{ verdict: "not_assessed", expandedCfm: null, words: "not assessed" }]);
  });
  it("takes 0.17857 cfm from 0.1 in H2O at 100 cfm and 28 in H2O (worked example)", () => {
    const figures = figuresOfTest(test([cell(5000, 1, "100")]));
    expect(otherUncertaintyCfm(figures, 5000, 100, 28, { ...nothing, pressureInH2O: 0.1 })).toBeCloseTo(0.17857, 5);
  });
});

describe("engine estimates", () => {
  const readings = HERO_LIFTS_UM.map((liftUm, i) => ({ liftUm, flowCfm: HERO_FLOWS.intake.after[i] ?? 0 }));
  const base = { readings, atInH2O: 28, boreMm: 77, strokeMm: 53.6, cylinders: 1 };
  it("keep their words, their order, and say when the cam is a stand-in", () => {
    const made = valueOf(engineEstimate({ ...base, cam: { maxLiftUm: 8636, durationDeg: 240, profile: [] } }));
    expect(made.words).toBe(POWER_ESTIMATE_WORDS);
    expect(made.isSynthetic).toBe(true);
    expect(made.rpmAt0_6 / made.rpmAt0_5).toBeCloseTo(1.2, 9);
    expect(made.lowKW).toBeLessThan(made.midKW);
    expect(made.midKW).toBeLessThan(made.highKW);
    expect(made.meanFlowCfm).toBeGreaterThan(60);
    expect(made.meanFlowCfm).toBeLessThan(143.6);
  });
  it("use the table of a measured cam", () => {
    const profile = [0, 60, 120, 180, 240].map((angleDeg, i) => ({ angleDeg, liftUm: [0, 5000, 8636, 5000, 0][i] ?? 0 }));
    expect(valueOf(engineEstimate({ ...base, cam: { maxLiftUm: 8636, durationDeg: null, profile } })).isSynthetic).toBe(false);
  });
  it("are refused without a cam or where the readings do not reach it", () => {
    expect(refusalOf(engineEstimate({ ...base, cam: { maxLiftUm: 8636, durationDeg: null, profile: [] } })).code).toBe("CAM_NOT_KNOWN");
    expect(refusalOf(engineEstimate({ ...base, cam: { maxLiftUm: 12_000, durationDeg: 240, profile: [] } })).code).toBe("OUTSIDE_TESTED_LIFT");
  });
});
