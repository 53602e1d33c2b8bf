import { ok, type Result } from "@/modules/kernel/result";
import type { FlowFlag } from "./flow-flags";
import { refuseFlow, refuseNotFinite } from "./flow-refusal";
import { correctToPressure } from "./test-pressure";
import { M3S_PER_CFM, PA_PER_INH2O } from "./units";
import { bernoulliSpeedMS } from "./velocity";

/** Printed wherever an estimate appears. Never on an invoice, never as a guarantee. */
export const POWER_ESTIMATE_WORDS =
  "Estimate from airflow. Power depends on cam, compression, fuel, ignition, intake and exhaust. Not a promise; measure on a dynamometer.";

/** Volumetric efficiency, Mach index, air per work (kg/kWh). Our choice inside textbook ranges (Heywood ch. 2 and 15, from memory). */
const BRACKET = {
  low: { efficiency: 0.85, z: 0.5, airKgPerKWh: 4.5 },
  mid: { efficiency: 0.92, z: 0.55, airKgPerKWh: 4.1 },
  high: { efficiency: 1, z: 0.6, airKgPerKWh: 3.7 },
} as const;

function positiveOrRefusal(inputs: Readonly<Record<string, number>>) {
  const bad = refuseNotFinite(inputs);
  if (bad) return bad;
  const wrong = Object.entries(inputs).find(([, value]) => value <= 0);
  if (!wrong) return null;
  const pressure = wrong[0].endsWith("InH2O") || wrong[0].endsWith("HPa");
  return refuseFlow(pressure ? "PRESSURE_NOT_POSITIVE" : "READING_OUT_OF_RANGE", wrong[0]);
}

/**
 * Three figures for power from cam-mean flow: `P = n rho eta Z a Qbar/(4 v_ideal BSAC)`, kW.
 * @param meanFlowCfm of one cylinder, all inputs > 0.
 * Source: derived from Taylor's Z and Heywood ch. 2 definitions. Errors: READING_OUT_OF_RANGE, PRESSURE_NOT_POSITIVE.
 */
export function powerBracket(input: {
  meanFlowCfm: number;
  dpInH2O: number;
  densityKgM3: number;
  engineAirDensityKgM3: number;
  soundSpeedMS: number;
  cylinders: number;
}): Result<{ lowKW: number; midKW: number; highKW: number; label: "estimate"; words: string }> {
  const bad = positiveOrRefusal(input);
  if (bad) return bad;
  const { meanFlowCfm, dpInH2O, densityKgM3, engineAirDensityKgM3, soundSpeedMS, cylinders } = input;
  const idealMS = bernoulliSpeedMS(dpInH2O * PA_PER_INH2O, densityKgM3);
  const kW = (b: (typeof BRACKET)[keyof typeof BRACKET]): number => {
    const airKgS = (cylinders * engineAirDensityKgM3 * b.efficiency * b.z * soundSpeedMS * meanFlowCfm * M3S_PER_CFM) / (4 * idealMS);
    return (airKgS * 3600) / b.airKgPerKWh;
  };
  return ok({ lowKW: kW(BRACKET.low), midKW: kW(BRACKET.mid), highKW: kW(BRACKET.high), label: "estimate", words: POWER_ESTIMATE_WORDS });
}

/** Pressure the rule of thumb speaks of. */
const RULE_AT_INH2O = 28;

/**
 * Rule of thumb, hp: maximum intake flow of one cylinder at 28 inH2O times a coefficient (0.257 as a rule) times cylinders.
 * Flow at another pressure is converted first and flagged. Common practice, no source; off unless the shop switches it on.
 * Errors: READING_OUT_OF_RANGE, PRESSURE_NOT_POSITIVE.
 */
export function powerRuleOfThumb(input: { maxFlowCfm: number; dpInH2O: number; cylinders: number; hpPerCfm?: number }): Result<{
  hp: number;
  label: "estimate";
  words: string;
  flags: readonly FlowFlag[];
}> {
  const { maxFlowCfm, dpInH2O, cylinders, hpPerCfm = 0.257 } = input;
  const bad = positiveOrRefusal({ maxFlowCfm, dpInH2O, cylinders, hpPerCfm });
  if (bad) return bad;
  const at28 = correctToPressure({ flowCfm: maxFlowCfm, fromInH2O: dpInH2O, toInH2O: RULE_AT_INH2O });
  if (!at28.ok) return at28;
  return ok({ hp: at28.value.flowCfm * hpPerCfm * cylinders, label: "estimate", words: POWER_ESTIMATE_WORDS, flags: at28.value.flags });
}

/**
 * Weather factor for dynamometer numbers only, never for flow: `1.180 (990/p_dry) sqrt((T + 273)/298) - 0.18`.
 * @param dryPressureHPa > 0. Outside 0.93 to 1.07 (from memory): flag FACTOR_OUTSIDE_USUAL_RANGE.
 * Source: SAE J1349 (June 1990). Errors: PRESSURE_NOT_POSITIVE, READING_OUT_OF_RANGE.
 */
export function weatherPowerFactor(input: { dryPressureHPa: number; temperatureC: number }): Result<{ factor: number; flags: readonly FlowFlag[] }> {
  const { dryPressureHPa, temperatureC } = input;
  const bad = refuseNotFinite(input);
  if (bad) return bad;
  if (dryPressureHPa <= 0) return refuseFlow("PRESSURE_NOT_POSITIVE", "dryPressureHPa");
  if (temperatureC <= -273) return refuseFlow("READING_OUT_OF_RANGE", "temperatureC");
  const factor = 1.18 * (990 / dryPressureHPa) * Math.sqrt((temperatureC + 273) / 298) - 0.18;
  return ok({ factor, flags: factor < 0.93 || factor > 1.07 ? ["FACTOR_OUTSIDE_USUAL_RANGE"] : [] });
}
