import { ok, type Result } from "@/modules/kernel/result";
import { refuseFlow, refuseNotFinite } from "./flow-refusal";

/**
 * Throat diameter over valve diameter, and the throat area less the stem, mm2.
 * The trade quotes about 0.85 to 0.90 (common practice); no alarm is raised.
 * Source: definition. Errors: GEOMETRY_INVALID (throat larger than valve, stem not smaller than throat, a dimension <= 0).
 */
export function throatRatio(input: { throatDiameterMm: number; valveDiameterMm: number; stemDiameterMm: number }): Result<{
  ratio: number;
  throatAreaMm2: number;
}> {
  const { throatDiameterMm, valveDiameterMm, stemDiameterMm } = input;
  const bad = refuseNotFinite(input);
  if (bad) return bad;
  if (valveDiameterMm <= 0) return refuseFlow("GEOMETRY_INVALID", "valveDiameterMm");
  if (throatDiameterMm <= 0 || throatDiameterMm > valveDiameterMm) return refuseFlow("GEOMETRY_INVALID", "throatDiameterMm");
  if (stemDiameterMm <= 0 || stemDiameterMm >= throatDiameterMm) return refuseFlow("GEOMETRY_INVALID", "stemDiameterMm");
  return ok({ ratio: throatDiameterMm / valveDiameterMm, throatAreaMm2: (Math.PI / 4) * (throatDiameterMm ** 2 - stemDiameterMm ** 2) });
}
