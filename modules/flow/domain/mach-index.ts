import { ok, type Result } from "@/modules/kernel/result";
import { refuseFlow, refuseNotFinite } from "./flow-refusal";
import { M3S_PER_CFM, PA_PER_INH2O } from "./units";
import { bernoulliSpeedMS } from "./velocity";

/**
 * Inlet Mach index `Z = A_piston s/((CA)_mean a)`, s mean piston speed, `(CA)_mean = Qbar/sqrt(2 dp/rho)`, and the speeds at
 * which it reaches 0.5 and 0.6, where volumetric efficiency is known to fall. An estimate, never a promise.
 * @param meanFlowCfm cam-mean flow > 0. All other inputs > 0.
 * Source: Taylor (1985) vol. 1 ch. 6; JSME mechanical engineering dictionary, mean inlet Mach number. Errors: READING_OUT_OF_RANGE, PRESSURE_NOT_POSITIVE, DENSITY_REQUIRED, GEOMETRY_INVALID.
 */
export function inletMachIndex(input: {
  meanFlowCfm: number;
  dpInH2O: number;
  densityKgM3: number;
  boreMm: number;
  strokeMm: number;
  speedRpm: number;
  soundSpeedMS: number;
}): Result<{ z: number; rpmAt0_5: number; rpmAt0_6: number }> {
  const { meanFlowCfm, dpInH2O, densityKgM3, boreMm, strokeMm, speedRpm, soundSpeedMS } = input;
  const bad = refuseNotFinite(input);
  if (bad) return bad;
  if (dpInH2O <= 0) return refuseFlow("PRESSURE_NOT_POSITIVE", "dpInH2O");
  if (densityKgM3 <= 0) return refuseFlow("DENSITY_REQUIRED", "densityKgM3");
  if (boreMm <= 0 || strokeMm <= 0) return refuseFlow("GEOMETRY_INVALID", boreMm <= 0 ? "boreMm" : "strokeMm");
  for (const [field, value] of Object.entries({ meanFlowCfm, speedRpm, soundSpeedMS })) {
    if (value <= 0) return refuseFlow("READING_OUT_OF_RANGE", field);
  }
  const pistonAreaM2 = (Math.PI / 4) * (boreMm * 1e-3) ** 2;
  const pistonSpeedMS = (2 * strokeMm * 1e-3 * speedRpm) / 60;
  const effectiveAreaM2 = (meanFlowCfm * M3S_PER_CFM) / bernoulliSpeedMS(dpInH2O * PA_PER_INH2O, densityKgM3);
  const z = (pistonAreaM2 * pistonSpeedMS) / (effectiveAreaM2 * soundSpeedMS);
  return ok({ z, rpmAt0_5: (speedRpm * 0.5) / z, rpmAt0_6: (speedRpm * 0.6) / z });
}
