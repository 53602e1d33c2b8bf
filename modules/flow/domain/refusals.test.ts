import { describe, expect, it } from "vitest";
import type { Result } from "@/modules/kernel/result";
import { refusalOf } from "@/tests/support/value-of";
import { moistAirDensity } from "./air-density";
import { benchFactorFromPlates } from "./bench-factor";
import { gainAtCamLift } from "./cam-lift";
import { compressionRatio, chamberForRatioCc } from "./compression-ratio";
import { curtainArea } from "./curtain-area";
import { correctToReferenceDensity } from "./density-reference";
import { epoxyState } from "./epoxy-state";
import { exhaustIntakeRatio } from "./exhaust-intake-ratio";
import { FLOW_REFUSALS, type FlowRefusalCode } from "./flow-refusal";
import { gainTable } from "./gain";
import { idealMassFlow } from "./ideal-mass-flow";
import { interpolateFlow, interpolateFlows } from "./interpolate-flow";
import { lashShim } from "./lash-shim";
import { subtractLeak } from "./leak";
import { liftLadder, parseLiftUm } from "./lift-ladder";
import { meanFlowOverCam, meanFlowOverLift } from "./mean-flow";
import { compareWithNoise } from "./noise";
import { orificeCoefficient, orificeExpansibility } from "./orifice";
import { flowFromDirect, flowFromOrificeHead, flowFromRangePercent } from "./reading-to-flow";
import { sanityFlagsOfReading } from "./sanity-flags";
import { seatFlowArea } from "./seat-flow-area";
import { sectionAreaMm2 } from "./section-area";
import { correctToPressure } from "./test-pressure";
import { throatRatio } from "./throat";
import { convertUnit } from "./units";
import { springAtSolid, valveSpring } from "./valve-spring";

const lifts = [1, 2, 3];
const flows = [10, 20, 28];
const seat = { valveDiameterMm: 31, seatRadialWidthMm: 1, seatAngleDeg: 45, portDiameterMm: 27, stemDiameterMm: 5.5, liftMm: 3 };
const pipe = { pipeM: 0.07391, orificeM: 0.0222, reynolds: 111_742, taps: "flange" as const };
const early = new Date("2026-02-03T09:00:00Z");
const late = new Date("2026-02-04T09:00:00Z");

const REFUSED: readonly (readonly [FlowRefusalCode, string, () => Result<unknown>])[] = [
  ["UNIT_KIND_MISMATCH", "a length is no pressure", () => convertUnit(1, "mm", "Pa")],
  ["DENSITY_REQUIRED", "kg/h without density", () => convertUnit(100, "ft3/min", "kg/h")],
  ["DENSITY_REQUIRED", "an absolute meter without density", () => correctToReferenceDensity({ method: "absolute_meter", flowCfm: 100 })],
  ["READING_OUT_OF_RANGE", "percent below zero", () => flowFromRangePercent({ rangeCfm: 60, percent: -1 })],
  ["READING_OUT_OF_RANGE", "head over full scale", () => flowFromOrificeHead({ rangeCfm: 60, head: 17, fullScaleHead: 16 })],
  ["READING_OUT_OF_RANGE", "negative direct flow", () => flowFromDirect({ valueCfm: -0.1 })],
  ["READING_OUT_OF_RANGE", "a reading of 101 percent", () => sanityFlagsOfReading({ percent: 101 })],
  ["PRESSURE_NOT_POSITIVE", "target pressure zero", () => correctToPressure({ flowCfm: 50, fromInH2O: 28, toInH2O: 0 })],
  ["PRESSURE_NOT_POSITIVE", "negative test pressure", () => correctToPressure({ flowCfm: 50, fromInH2O: -28, toInH2O: 28 })],
  ["PRESSURE_NOT_POSITIVE", "no depression at all", () => idealMassFlow({ areaMm2: 100, p0Pa: 101_325, t0K: 293, dpPa: 0 })],
  ["PRESSURE_MISMATCH", "exhaust and intake at two pressures", () => exhaustIntakeRatio({ exhaustCfm: 93, intakeCfm: 121, exhaustAtInH2O: 10, intakeAtInH2O: 28 })],
  ["PRESSURE_MISMATCH", "only one pressure known", () => exhaustIntakeRatio({ exhaustCfm: 93, intakeCfm: 121, exhaustAtInH2O: 28 })],
  ["LEAK_EXCEEDS_FLOW", "leak equal to the reading", () => subtractLeak({ measuredCfm: 1.4, leakCfm: 1.4, measuredAtInH2O: 28, leakAtInH2O: 28 })],
  ["LEAK_PRESSURE_MISMATCH", "leak at 10, reading at 28", () => subtractLeak({ measuredCfm: 50, leakCfm: 1, measuredAtInH2O: 28, leakAtInH2O: 10 })],
  ["HUMIDITY_NOT_FRACTION", "50 given for 50 %", () => moistAirDensity({ temperatureC: 20, pressurePa: 101_325, relativeHumidity: 50 })],
  ["PRESSURE_RATIO_BELOW_0_75", "ratio 0.74", () => orificeExpansibility({ beta: 0.3, p1Pa: 100_000, p2Pa: 74_000, kappa: 1.4 })],
  ["OUTSIDE_ISO_5167_LIMITS", "orifice under 12.5 mm", () => orificeCoefficient({ ...pipe, orificeM: 0.012 })],
  ["OUTSIDE_ISO_5167_LIMITS", "pipe under 50 mm", () => orificeCoefficient({ ...pipe, pipeM: 0.049 })],
  ["OUTSIDE_ISO_5167_LIMITS", "Reynolds under 5000", () => orificeCoefficient({ ...pipe, reynolds: 4999, taps: "corner" })],
  ["OUTSIDE_ISO_5167_LIMITS", "diameter ratio over 0.75", () => orificeCoefficient({ ...pipe, orificeM: 0.056 })],
  ["GEOMETRY_INVALID", "stem not smaller than the port", () => seatFlowArea({ ...seat, stemDiameterMm: 27 })],
  ["GEOMETRY_INVALID", "seat as wide as half the valve", () => seatFlowArea({ ...seat, seatRadialWidthMm: 15.5 })],
  ["GEOMETRY_INVALID", "seat angle 76", () => seatFlowArea({ ...seat, seatAngleDeg: 76 })],
  ["GEOMETRY_INVALID", "negative lift", () => seatFlowArea({ ...seat, liftMm: -0.1 })],
  ["GEOMETRY_INVALID", "no valves", () => curtainArea({ valveDiametersMm: [], liftMm: 1 })],
  ["GEOMETRY_INVALID", "corner larger than half the short side", () => sectionAreaMm2({ shape: "rounded_rectangle", longMm: 30, shortMm: 20, cornerRadiusMm: 11 })],
  ["GEOMETRY_INVALID", "throat larger than the valve", () => throatRatio({ throatDiameterMm: 32, valveDiameterMm: 31, stemDiameterMm: 5.5 })],
  ["GEOMETRY_INVALID", "no clearance volume left", () => compressionRatio({ sweptCc: 250, chamberCc: 5, domeCc: 6 })],
  ["GEOMETRY_INVALID", "a ratio of one", () => chamberForRatioCc({ boreMm: 72, strokeMm: 61.2, targetRatio: 1, otherClearanceCc: 3 })],
  ["GEOMETRY_INVALID", "a spring of which nothing follows", () => valveSpring({ liftMm: 8 })],
  ["GEOMETRY_INVALID", "solid longer than free", () => springAtSolid({ rate: 8, freeLength: 0.8, wireDiameter: 0.0625, totalCoils: 14.36 })],
  ["GEOMETRY_INVALID", "a shim of nothing", () => lashShim({ oldShimMm: 0.1, measuredMm: 0, targetMm: 0.1 })],
  ["OUTSIDE_TESTED_LIFT", "past the last lift", () => interpolateFlow({ lifts, flowsCfm: flows }, 3.001)],
  ["OUTSIDE_TESTED_LIFT", "one of several past the last lift", () => interpolateFlows({ lifts, flowsCfm: flows }, [2, 4])],
  ["OUTSIDE_TESTED_LIFT", "before the first when zero is not added", () => interpolateFlow({ lifts, flowsCfm: flows }, 0.5, { addZero: false })],
  ["OUTSIDE_TESTED_LIFT", "a mean from below the first reading", () => meanFlowOverLift({ lifts, flowsCfm: flows }, 0.5, 3)],
  ["OUTSIDE_TESTED_LIFT", "a cam that lifts further than tested", () => meanFlowOverCam({ anglesDeg: [0, 60, 120], camLifts: [0, 4, 0], table: { lifts, flowsCfm: flows } })],
  ["LIFTS_NOT_INCREASING", "rows out of order", () => interpolateFlow({ lifts: [1, 3, 2], flowsCfm: flows }, 1.5)],
  ["LIFTS_NOT_INCREASING", "a lift twice", () => gainTable({ lifts: [1, 2, 2], beforeCfm: flows, afterCfm: flows })],
  ["LIFTS_NOT_INCREASING", "angles out of order", () => meanFlowOverCam({ anglesDeg: [0, 120, 60], camLifts: [0, 2, 0], table: { lifts, flowsCfm: flows } })],
  ["TOO_FEW_POINTS", "one reading without zero", () => interpolateFlow({ lifts: [1], flowsCfm: [10] }, 1, { addZero: false })],
  ["TOO_FEW_POINTS", "lists of different length", () => gainAtCamLift({ lifts, beforeCfm: [1, 2], afterCfm: flows, camMaxLift: 2 })],
  ["TOO_FEW_POINTS", "no plates", () => benchFactorFromPlates({ referenceCfm: [], indicatedCfm: [] })],
  ["TOO_FEW_POINTS", "nothing read before", () => compareWithNoise({ beforeCfm: [], afterCfm: [1, 2], uOtherCfm: 0.3 })],
  ["NUMBER_NOT_FINITE", "a blank turned to NaN", () => correctToPressure({ flowCfm: NaN, fromInH2O: 10, toInH2O: 28 })],
  ["NUMBER_NOT_FINITE", "a blank inside a list", () => gainTable({ lifts, beforeCfm: [1, NaN, 3], afterCfm: flows })],
  ["TIME_NOT_IN_ORDER", "mixed in the future", () => epoxyState({ mixedAt: late, now: early, potLifeMin: 45, minCureH: 24 })],
  ["LIFT_NOT_READABLE", "words for a lift", () => parseLiftUm("a lot", "in")],
  ["TOO_MANY_LIFTS", "a step of one thousandth", () => liftLadder({ step: ".001", camLift: ".340", unit: "in" })],
];

describe("what cannot be computed is refused and gives no number", () => {
  it.each(REFUSED)("%s: %s", (code, _, run) => {
    const answer = run();
    const refusal = refusalOf(answer);
    expect(refusal.code).toBe(code);
    expect(refusal.message).toBe(FLOW_REFUSALS[code]);
    expect(answer).not.toHaveProperty("value");
  });
  it("every code is tried", () => {
    expect(new Set(REFUSED.map(([code]) => code))).toEqual(new Set(Object.keys(FLOW_REFUSALS)));
  });
});
