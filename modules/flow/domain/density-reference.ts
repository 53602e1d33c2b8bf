import { ok, type Result } from "@/modules/kernel/result";
import { refuseFlow, refuseNotFinite } from "./flow-refusal";
import type { FlaggedFlow } from "./reading-to-flow";

/** Dry air at 20 °C and 101.325 kPa, kg/m3. */
export const REFERENCE_DENSITY_KG_M3 = 1.2041;

export type DensityReferenceInput =
  | { readonly method: "absolute_meter"; readonly flowCfm: number; readonly densityKgM3?: number; readonly referenceDensityKgM3?: number }
  | { readonly method: "series_orifice"; readonly flowCfm: number; readonly portAirK?: number; readonly orificeAirK?: number };

/**
 * Flow as it would be in reference air.
 * `absolute_meter` (thermal, vane, actual volume): `Q sqrt(rho/rho_ref)`, since at constant pressure volume flow goes as 1/sqrt(rho).
 * `series_orifice`: port and orifice carry one mass flow, so weather cancels (flag SELF_CANCELLING); what remains is the
 * temperature between the two, `Q sqrt(T_port/T_orifice)`, kelvin (flag TEMPERATURE_CORRECTED).
 * Source: Bernoulli; series form derived from equal mass flow. Power correction factors are never applied to flow.
 * Errors: DENSITY_REQUIRED, READING_OUT_OF_RANGE.
 */
export function correctToReferenceDensity(input: DensityReferenceInput): Result<FlaggedFlow> {
  if (input.method === "absolute_meter") {
    const { flowCfm, densityKgM3, referenceDensityKgM3 = REFERENCE_DENSITY_KG_M3 } = input;
    const bad = refuseNotFinite({ flowCfm, densityKgM3, referenceDensityKgM3 });
    if (bad) return bad;
    if (densityKgM3 === undefined || densityKgM3 <= 0) return refuseFlow("DENSITY_REQUIRED", "densityKgM3");
    if (referenceDensityKgM3 <= 0) return refuseFlow("DENSITY_REQUIRED", "referenceDensityKgM3");
    return ok({ flowCfm: flowCfm * Math.sqrt(densityKgM3 / referenceDensityKgM3), flags: [] });
  }
  const { flowCfm, portAirK, orificeAirK } = input;
  const bad = refuseNotFinite({ flowCfm, portAirK, orificeAirK });
  if (bad) return bad;
  if (portAirK === undefined || orificeAirK === undefined || portAirK === orificeAirK) {
    return ok({ flowCfm, flags: ["SELF_CANCELLING"] });
  }
  if (portAirK <= 0 || orificeAirK <= 0) return refuseFlow("READING_OUT_OF_RANGE", portAirK <= 0 ? "portAirK" : "orificeAirK");
  return ok({ flowCfm: flowCfm * Math.sqrt(portAirK / orificeAirK), flags: ["TEMPERATURE_CORRECTED"] });
}
