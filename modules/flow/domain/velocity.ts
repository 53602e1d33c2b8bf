import { ok, type Result } from "@/modules/kernel/result";
import { moistAirDensity } from "./air-density";
import type { FlowFlag } from "./flow-flags";
import { refuseFlow, refuseNotFinite } from "./flow-refusal";
import { celsiusOfFahrenheit, M3S_PER_CFM, M_PER_FT, MM_PER_IN, PA_PER_INH2O } from "./units";

/** Bernoulli speed, m/s: `sqrt(2 dp/rho)`. Both inputs > 0. */
export const bernoulliSpeedMS = (dpPa: number, densityKgM3: number): number => Math.sqrt((2 * dpPa) / densityKgM3);

/** Cubic feet a minute that a square inch passes at a speed in ft/s: 1 cfm/in2 is 2.4 ft/s. */
const FT_S_PER_CFM_IN2 = 2.4;

export type IdealVelocityInput = {
  readonly dpInH2O: number;
  readonly relativeHumidity: number;
  readonly pressurePa: number;
} & ({ readonly temperatureC: number } | { readonly temperatureF: number });

/**
 * Highest mean speed the test pressure can make, and the flow of one square inch at it.
 * Source: Bernoulli, with CIPM-2007 density. Errors: those of `moistAirDensity`, PRESSURE_NOT_POSITIVE.
 */
export function idealVelocity(input: IdealVelocityInput): Result<{
  velocityMS: number;
  velocityFtS: number;
  limitCfmPerIn2: number;
  flags: readonly FlowFlag[];
}> {
  const { dpInH2O, relativeHumidity, pressurePa } = input;
  const bad = refuseNotFinite({ dpInH2O });
  if (bad) return bad;
  if (dpInH2O <= 0) return refuseFlow("PRESSURE_NOT_POSITIVE", "dpInH2O");
  const temperatureC = "temperatureC" in input ? input.temperatureC : celsiusOfFahrenheit(input.temperatureF);
  const density = moistAirDensity({ temperatureC, pressurePa, relativeHumidity });
  if (!density.ok) return density;
  const velocityMS = bernoulliSpeedMS(dpInH2O * PA_PER_INH2O, density.value.densityKgM3);
  const velocityFtS = velocityMS / M_PER_FT;
  return ok({ velocityMS, velocityFtS, limitCfmPerIn2: velocityFtS / FT_S_PER_CFM_IN2, flags: density.value.flags });
}

/** Mean speed `Q/A` in a section. @param areaMm2 or areaIn2, > 0. Source: continuity. Errors: GEOMETRY_INVALID. */
export function meanVelocity(input: { flowCfm: number } & ({ areaMm2: number } | { areaIn2: number })): Result<{
  velocityMS: number;
  velocityFtS: number;
}> {
  const areaMm2 = "areaMm2" in input ? input.areaMm2 : input.areaIn2 * MM_PER_IN ** 2;
  const bad = refuseNotFinite({ flowCfm: input.flowCfm, areaMm2 });
  if (bad) return bad;
  if (areaMm2 <= 0) return refuseFlow("GEOMETRY_INVALID", "areaMm2");
  const velocityMS = (input.flowCfm * M3S_PER_CFM) / (areaMm2 * 1e-6);
  return ok({ velocityMS, velocityFtS: velocityMS / M_PER_FT });
}
