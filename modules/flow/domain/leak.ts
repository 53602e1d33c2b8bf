import { ok, type Result } from "@/modules/kernel/result";
import type { FlowFlag } from "./flow-flags";
import { refuseFlow, refuseNotFinite } from "./flow-refusal";
import type { FlaggedFlow } from "./reading-to-flow";
import { SANITY_LIMITS, type SanityLimits } from "./sanity-limits";
import { SET_POINT_SHARE_MAX } from "./test-pressure";

/**
 * Flow without the fixture leak, both at one pressure (within 2 %).
 * With `allowScaling` a leak read at another pressure is scaled by the root of the pressure ratio, a stopgap (flag LEAK_SCALED).
 * Source: conservation of mass. Errors: LEAK_PRESSURE_MISMATCH, LEAK_EXCEEDS_FLOW, PRESSURE_NOT_POSITIVE, READING_OUT_OF_RANGE.
 */
export function subtractLeak(input: {
  measuredCfm: number;
  leakCfm: number;
  measuredAtInH2O: number;
  leakAtInH2O: number;
  allowScaling?: boolean;
  limits?: SanityLimits | undefined;
}): Result<FlaggedFlow> {
  const { measuredCfm, leakCfm, measuredAtInH2O, leakAtInH2O, allowScaling = false, limits = SANITY_LIMITS } = input;
  const bad = refuseNotFinite({ measuredCfm, leakCfm, measuredAtInH2O, leakAtInH2O });
  if (bad) return bad;
  if (measuredAtInH2O <= 0) return refuseFlow("PRESSURE_NOT_POSITIVE", "measuredAtInH2O");
  if (leakAtInH2O <= 0) return refuseFlow("PRESSURE_NOT_POSITIVE", "leakAtInH2O");
  if (leakCfm < 0) return refuseFlow("READING_OUT_OF_RANGE", "leakCfm", { min: 0 });
  if (measuredCfm < 0) return refuseFlow("READING_OUT_OF_RANGE", "measuredCfm", { min: 0 });
  const flags: FlowFlag[] = [];
  let leak = leakCfm;
  if (Math.abs(leakAtInH2O / measuredAtInH2O - 1) > SET_POINT_SHARE_MAX + 1e-9) {
    if (!allowScaling) return refuseFlow("LEAK_PRESSURE_MISMATCH", "leakAtInH2O", { measuredAtInH2O, leakAtInH2O });
    leak = leakCfm * Math.sqrt(measuredAtInH2O / leakAtInH2O);
    flags.push("LEAK_SCALED");
  }
  if (leak > 0 && leak >= measuredCfm) return refuseFlow("LEAK_EXCEEDS_FLOW", "leakCfm", { measuredCfm, leakCfm: leak });
  if (leak > limits.leakShare * measuredCfm) flags.push("LEAK_HIGH");
  return ok({ flowCfm: measuredCfm - leak, flags });
}
