import { ok, type Result } from "@/modules/kernel/result";
import { curtainArea } from "./curtain-area";
import { dischargeCoefficient } from "./discharge-coefficient";
import type { FlowFlag, LiftFlag, LiftFlagAt } from "./flow-flags";
import { refuseFlow, refuseNotFinite } from "./flow-refusal";
import { isIncreasing, neighbours, paired } from "./neighbours";
import { outlierLifts } from "./outliers";
import { rangeFlags } from "./reading-to-flow";
import { SANITY_LIMITS, type SanityLimits } from "./sanity-limits";
import { SET_POINT_SHARE_MAX } from "./test-pressure";
import { M3S_PER_CFM, PA_PER_INH2O } from "./units";
import { bernoulliSpeedMS } from "./velocity";

export interface SanityTest {
  /** Strictly increasing, one unit; the unit is that of the lift in the flag. */
  readonly lifts: readonly number[];
  readonly flowsCfm: readonly number[];
  /** The before test at the same lifts; null where it was not read. */
  readonly beforeCfm?: readonly (number | null)[];
  /** Expanded uncertainty, cfm; a fall must exceed it too. */
  readonly expandedUCfm?: number;
  readonly leakCfm?: number;
  readonly camMaxLift?: number;
  readonly zeroReturnMm?: number;
}

export interface SanityReading {
  readonly flowCfm?: number;
  readonly percent?: number;
  readonly heldInH2O?: number;
  readonly nominalInH2O?: number;
  readonly densityKgM3?: number;
  readonly minSectionMm2?: number;
  readonly valveDiametersMm?: readonly number[];
  readonly liftMm?: number;
}

const at = (flag: LiftFlag, lift: number): LiftFlagAt => `${flag}@${lift}`;

/**
 * Doubts about a whole test. Nothing here stops a save; each is shown in words and shape.
 * Errors: TOO_FEW_POINTS (lists differ in length), LIFTS_NOT_INCREASING.
 */
export function sanityFlagsOfTest(test: SanityTest, limits: SanityLimits = SANITY_LIMITS): Result<readonly (FlowFlag | LiftFlagAt)[]> {
  const { lifts, flowsCfm, beforeCfm, expandedUCfm = 0, leakCfm = 0, camMaxLift, zeroReturnMm } = test;
  const bad = refuseNotFinite({ lifts, flowsCfm, beforeCfm: beforeCfm?.filter((b) => b !== null), expandedUCfm, leakCfm, camMaxLift, zeroReturnMm });
  if (bad) return bad;
  const curve = paired(lifts, flowsCfm);
  if (!curve) return refuseFlow("TOO_FEW_POINTS", "flowsCfm");
  if (!isIncreasing(lifts)) return refuseFlow("LIFTS_NOT_INCREASING", "lifts");
  const flags: (FlowFlag | LiftFlagAt)[] = [];
  for (const [[, flow], [lift, next]] of neighbours(curve)) {
    if (flow - next > Math.max(limits.fallShare * flow, expandedUCfm)) flags.push(at("FLOW_FALLS_WITH_LIFT", lift));
  }
  if (curve.some(([lift, flow]) => lift === 0 && flow > leakCfm + limits.zeroLiftExtraCfm)) flags.push("FLOW_AT_ZERO_LIFT");
  flags.push(...outlierLifts(curve, { timesMedian: limits.outlierTimesMedian, shareMin: limits.outlierShareMin }).map((lift) => at("OUTLIER", lift)));
  if (beforeCfm) {
    const both = paired(curve, beforeCfm);
    if (!both) return refuseFlow("TOO_FEW_POINTS", "beforeCfm");
    for (const [[lift, after], before] of both) {
      if (before !== null && before > 0 && after / before - 1 > limits.gainShare) flags.push(at("GAIN_UNUSUAL", lift));
    }
  }
  if (zeroReturnMm !== undefined && Math.abs(zeroReturnMm) > limits.zeroDriftMm) flags.push("LIFT_ZERO_DRIFT");
  if (camMaxLift !== undefined && !lifts.some((l) => l >= camMaxLift)) flags.push("NOT_TESTED_TO_CAM_LIFT");
  return ok(flags);
}

/**
 * Doubts about one reading; each check runs when its inputs are given.
 * Errors: READING_OUT_OF_RANGE, PRESSURE_NOT_POSITIVE, GEOMETRY_INVALID, DENSITY_REQUIRED.
 */
export function sanityFlagsOfReading(reading: SanityReading, limits: SanityLimits = SANITY_LIMITS): Result<readonly FlowFlag[]> {
  const { flowCfm, percent, heldInH2O, nominalInH2O, densityKgM3, minSectionMm2, valveDiametersMm, liftMm } = reading;
  const bad = refuseNotFinite({ flowCfm, percent, heldInH2O, nominalInH2O, densityKgM3, minSectionMm2, valveDiametersMm, liftMm });
  if (bad) return bad;
  if (heldInH2O !== undefined && heldInH2O <= 0) return refuseFlow("PRESSURE_NOT_POSITIVE", "heldInH2O");
  if (nominalInH2O !== undefined && nominalInH2O <= 0) return refuseFlow("PRESSURE_NOT_POSITIVE", "nominalInH2O");
  if (densityKgM3 !== undefined && densityKgM3 <= 0) return refuseFlow("DENSITY_REQUIRED", "densityKgM3");
  if (minSectionMm2 !== undefined && minSectionMm2 <= 0) return refuseFlow("GEOMETRY_INVALID", "minSectionMm2");
  const flags: FlowFlag[] = [];
  if (percent !== undefined) {
    if (percent < 0 || percent > 100) return refuseFlow("READING_OUT_OF_RANGE", "percent", { min: 0, max: 100 });
    flags.push(...rangeFlags(percent, limits));
  }
  if (heldInH2O !== undefined && nominalInH2O !== undefined) {
    const off = Math.abs(heldInH2O / nominalInH2O - 1);
    if (off > SET_POINT_SHARE_MAX + 1e-9) flags.push("CONVERTED_PRESSURE");
    if (off > limits.offNominalShare + 1e-9) flags.push("PRESSURE_OFF_NOMINAL");
  }
  if (flowCfm === undefined || heldInH2O === undefined || densityKgM3 === undefined) return ok(flags);
  if (valveDiametersMm && liftMm !== undefined && liftMm > 0) {
    const area = curtainArea({ valveDiametersMm, liftMm });
    if (!area.ok) return area;
    const cd = dischargeCoefficient({ model: "incompressible", flowCfm, dpInH2O: heldInH2O, densityKgM3, referenceAreaMm2: area.value.curtainAreaMm2, limits });
    if (!cd.ok) return cd;
    flags.push(...cd.value.flags);
  }
  if (minSectionMm2 !== undefined) {
    const speedMS = (flowCfm * M3S_PER_CFM) / (minSectionMm2 * 1e-6);
    if (speedMS > bernoulliSpeedMS(heldInH2O * PA_PER_INH2O, densityKgM3)) flags.push("ABOVE_IDEAL_PORT_LIMIT");
  }
  return ok(flags);
}
