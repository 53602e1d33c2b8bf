import { ok, type Result } from "@/modules/kernel/result";
import { refuseFlow, refuseNotFinite } from "./flow-refusal";
import { GAMMA_AIR, R_DRY_AIR } from "./ideal-mass-flow";
import { kelvinOfCelsius } from "./units";

/** Speed of sound in a perfect gas, m/s: `sqrt(gamma R T)`. Source: ISO 2533:1975. Errors: READING_OUT_OF_RANGE. */
export function speedOfSound(input: { temperatureC: number; gamma?: number; gasConstant?: number }): Result<number> {
  const { temperatureC, gamma = GAMMA_AIR, gasConstant = R_DRY_AIR } = input;
  const bad = refuseNotFinite({ temperatureC, gamma, gasConstant });
  if (bad) return bad;
  const square = gamma * gasConstant * kelvinOfCelsius(temperatureC);
  return square > 0 ? ok(Math.sqrt(square)) : refuseFlow("READING_OUT_OF_RANGE", "temperatureC");
}
