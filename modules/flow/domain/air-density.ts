import { ok, type Result } from "@/modules/kernel/result";
import type { FlowFlag } from "./flow-flags";
import { refuseFlow, refuseNotFinite } from "./flow-refusal";
import { kelvinOfCelsius } from "./units";

/**
 * Density of moist air, kg/m3, by CIPM-2007.
 * @param temperatureC air, stated range 15 to 27. @param pressurePa station pressure (never the sea-level pressure of a forecast), 60 000 to 110 000.
 * @param relativeHumidity fraction 0 to 1. Outside the stated range: computed, flag OUTSIDE_CIPM_RANGE.
 * Source: Picard, Davis, Glaser, Fujii, Metrologia 45 (2008) 149-155, CO2 mole fraction 0.0004.
 * Errors: HUMIDITY_NOT_FRACTION, PRESSURE_NOT_POSITIVE, READING_OUT_OF_RANGE (at or below absolute zero).
 */
export function moistAirDensity(input: { temperatureC: number; pressurePa: number; relativeHumidity: number }): Result<{
  densityKgM3: number;
  flags: readonly FlowFlag[];
}> {
  const { temperatureC: t, pressurePa: p, relativeHumidity: h } = input;
  const bad = refuseNotFinite({ temperatureC: t, pressurePa: p, relativeHumidity: h });
  if (bad) return bad;
  if (h < 0 || h > 1) return refuseFlow("HUMIDITY_NOT_FRACTION", "relativeHumidity", { min: 0, max: 1 });
  if (p <= 0) return refuseFlow("PRESSURE_NOT_POSITIVE", "pressurePa");
  const T = kelvinOfCelsius(t);
  if (T <= 0) return refuseFlow("READING_OUT_OF_RANGE", "temperatureC");
  const saturationPa = Math.exp(1.2378847e-5 * T * T - 1.9121316e-2 * T + 33.93711047 - 6.3431645e3 / T);
  const enhancement = 1.00062 + 3.14e-8 * p + 5.6e-7 * t * t;
  const xv = (h * enhancement * saturationPa) / p;
  const virial =
    1.58123e-6 - 2.9331e-8 * t + 1.1043e-10 * t * t + (5.707e-6 - 2.051e-8 * t) * xv + (1.9898e-4 - 2.376e-6 * t) * xv * xv;
  const Z = 1 - (p / T) * virial + (p / T) ** 2 * (1.83e-11 - 0.765e-8 * xv * xv);
  const Ma = 28.96546e-3;
  const Mv = 18.01528e-3;
  const densityKgM3 = ((p * Ma) / (Z * 8.314472 * T)) * (1 - xv * (1 - Mv / Ma));
  const inside = t >= 15 && t <= 27 && p >= 60_000 && p <= 110_000;
  return ok({ densityKgM3, flags: inside ? [] : ["OUTSIDE_CIPM_RANGE"] });
}
