import { moistAirDensity } from "./air-density";
import { camOpening, type CamFacts } from "./cam-opening";
import { STATED_AIR } from "./coefficient-rows";
import { inletMachIndex } from "./mach-index";
import { meanFlowOverCam } from "./mean-flow";
import { powerBracket, POWER_ESTIMATE_WORDS } from "./power-estimate";
import type { LiftReading } from "./repeats";
import { ok, type Result } from "@/modules/kernel/result";
import { speedOfSound } from "./speed-of-sound";

export interface EngineEstimate {
  readonly meanFlowCfm: number;
  /** Made from lift and duration only; not a measured cam. */
  readonly isSynthetic: boolean;
  /** Engine speeds at which the inlet Mach index reaches 0.5 and 0.6, r/min. */
  readonly rpmAt0_5: number;
  readonly rpmAt0_6: number;
  readonly lowKW: number;
  readonly midKW: number;
  readonly highKW: number;
  /** The fixed words; shown wherever any of this is. */
  readonly words: string;
}

/** Any speed does: the two speeds are scaled from it. */
const REFERENCE_RPM = 6000;

/**
 * Estimates from intake flow: mean over the cam, the two Mach-index speeds and the power bracket. Never a promise.
 * Source: as `meanFlowOverCam`, `inletMachIndex`, `powerBracket`; air dry at 20 °C and 101.325 kPa.
 * Errors: CAM_NOT_KNOWN, and those of the steps (OUTSIDE_TESTED_LIFT when the readings do not reach cam lift).
 */
export function engineEstimate(input: { readings: readonly LiftReading[]; atInH2O: number; cam: CamFacts; boreMm: number; strokeMm: number; cylinders: number }): Result<EngineEstimate> {
  const { readings, atInH2O, cam, boreMm, strokeMm, cylinders } = input;
  const table = camOpening(cam);
  if (!table.ok) return table;
  const mean = meanFlowOverCam({ anglesDeg: table.value.anglesDeg, camLifts: table.value.camLifts, table: { lifts: readings.map((r) => r.liftUm), flowsCfm: readings.map((r) => r.flowCfm) } });
  if (!mean.ok) return mean;
  const density = moistAirDensity(STATED_AIR);
  if (!density.ok) return density;
  const sound = speedOfSound({ temperatureC: STATED_AIR.temperatureC });
  if (!sound.ok) return sound;
  const { densityKgM3 } = density.value;
  const common = { meanFlowCfm: mean.value, dpInH2O: atInH2O, densityKgM3, soundSpeedMS: sound.value };
  const mach = inletMachIndex({ ...common, boreMm, strokeMm, speedRpm: REFERENCE_RPM });
  if (!mach.ok) return mach;
  const power = powerBracket({ ...common, engineAirDensityKgM3: densityKgM3, cylinders });
  if (!power.ok) return power;
  const { lowKW, midKW, highKW } = power.value;
  return ok({ meanFlowCfm: mean.value, isSynthetic: table.value.isSynthetic, rpmAt0_5: mach.value.rpmAt0_5, rpmAt0_6: mach.value.rpmAt0_6, lowKW, midKW, highKW, words: POWER_ESTIMATE_WORDS });
}
