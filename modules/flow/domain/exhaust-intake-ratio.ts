import { ok, type Result } from "@/modules/kernel/result";
import { refuseFlow, refuseNotFinite } from "./flow-refusal";

/** What the two flows have in common; the ratio means nothing without it. */
export type RatioBasis = "equal_lift" | "equal_lift_over_diameter" | "own_cam_lift";

/**
 * Exhaust flow over intake flow at one test pressure. Shown without a target: trade articles quote 0.75 to 0.80, while
 * NACA TN 1365 (1947) found best output near 1.
 * Source: definition. Errors: PRESSURE_MISMATCH, READING_OUT_OF_RANGE, PRESSURE_NOT_POSITIVE.
 */
export function exhaustIntakeRatio(input: {
  exhaustCfm: number;
  intakeCfm: number;
  exhaustAtInH2O?: number;
  intakeAtInH2O?: number;
  basis?: RatioBasis;
}): Result<{ ratio: number; basis: RatioBasis }> {
  const { exhaustCfm, intakeCfm, exhaustAtInH2O, intakeAtInH2O, basis = "equal_lift" } = input;
  const bad = refuseNotFinite({ exhaustCfm, intakeCfm, exhaustAtInH2O, intakeAtInH2O });
  if (bad) return bad;
  if (exhaustCfm < 0) return refuseFlow("READING_OUT_OF_RANGE", "exhaustCfm", { min: 0 });
  if (intakeCfm <= 0) return refuseFlow("READING_OUT_OF_RANGE", "intakeCfm");
  if (exhaustAtInH2O !== undefined && exhaustAtInH2O <= 0) return refuseFlow("PRESSURE_NOT_POSITIVE", "exhaustAtInH2O");
  if (intakeAtInH2O !== undefined && intakeAtInH2O <= 0) return refuseFlow("PRESSURE_NOT_POSITIVE", "intakeAtInH2O");
  // One pressure stated and the other not is not "the same pressure" either.
  if (exhaustAtInH2O !== intakeAtInH2O) return refuseFlow("PRESSURE_MISMATCH", "exhaustAtInH2O");
  return ok({ ratio: exhaustCfm / intakeCfm, basis });
}
