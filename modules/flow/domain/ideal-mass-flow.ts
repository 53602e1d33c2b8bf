import { ok, type Result } from "@/modules/kernel/result";
import type { FlowFlag } from "./flow-flags";
import { refuseFlow, refuseNotFinite } from "./flow-refusal";

/** Ratio of specific heats of air. */
export const GAMMA_AIR = 1.4;
/** Specific gas constant of dry air, J/(kg K). Source: ISO 2533:1975. */
export const R_DRY_AIR = 287.05287;

/**
 * Ideal mass flow through a restriction, kg/s; choked at and below the critical pressure ratio (flag CHOKED).
 * @param areaMm2 reference area > 0. @param p0Pa upstream stagnation pressure > 0. @param t0K upstream temperature > 0.
 * @param dpPa 0 < dp <= p0.
 * Source: Heywood (1988) eqs. (6.10), (6.11) = App. C (C.8), (C.9). Errors: GEOMETRY_INVALID, PRESSURE_NOT_POSITIVE, READING_OUT_OF_RANGE.
 */
export function idealMassFlow(input: { areaMm2: number; p0Pa: number; t0K: number; dpPa: number; gamma?: number; gasConstant?: number }): Result<{
  massFlowKgS: number;
  flags: readonly FlowFlag[];
}> {
  const { areaMm2, p0Pa, t0K, dpPa, gamma = GAMMA_AIR, gasConstant = R_DRY_AIR } = input;
  const bad = refuseNotFinite({ areaMm2, p0Pa, t0K, dpPa, gamma, gasConstant });
  if (bad) return bad;
  if (areaMm2 <= 0) return refuseFlow("GEOMETRY_INVALID", "areaMm2");
  if (p0Pa <= 0) return refuseFlow("PRESSURE_NOT_POSITIVE", "p0Pa");
  if (dpPa <= 0) return refuseFlow("PRESSURE_NOT_POSITIVE", "dpPa");
  if (dpPa > p0Pa) return refuseFlow("READING_OUT_OF_RANGE", "dpPa", { max: p0Pa });
  if (t0K <= 0) return refuseFlow("READING_OUT_OF_RANGE", "t0K");
  if (gamma <= 1 || gasConstant <= 0) return refuseFlow("READING_OUT_OF_RANGE", gamma <= 1 ? "gamma" : "gasConstant");
  const base = (areaMm2 * 1e-6 * p0Pa) / Math.sqrt(gasConstant * t0K);
  const r = (p0Pa - dpPa) / p0Pa;
  const critical = (2 / (gamma + 1)) ** (gamma / (gamma - 1));
  if (r <= critical) {
    return ok({ massFlowKgS: base * Math.sqrt(gamma) * (2 / (gamma + 1)) ** ((gamma + 1) / (2 * (gamma - 1))), flags: ["CHOKED"] });
  }
  const speed = Math.sqrt(((2 * gamma) / (gamma - 1)) * (1 - r ** ((gamma - 1) / gamma)));
  return ok({ massFlowKgS: base * r ** (1 / gamma) * speed, flags: [] });
}
