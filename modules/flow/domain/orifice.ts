import { ok, type Result } from "@/modules/kernel/result";
import { refuseFlow, refuseNotFinite } from "./flow-refusal";

/**
 * Mass flow through an orifice, kg/s: `C/sqrt(1 - b^4) eps (pi/4) d^2 sqrt(2 dp rho)`, b = d/D.
 * @param orificeM, pipeM diameters in metres, 0 < orifice < pipe. @param dpPa > 0. @param densityKgM3 upstream, > 0.
 * Source: ISO 5167-1:2003 eq. (1); ASME MFC-3M. A bench orifice between two plenums is not certified by the standard: calibrate it.
 * Errors: GEOMETRY_INVALID, PRESSURE_NOT_POSITIVE, DENSITY_REQUIRED.
 */
export function orificeMassFlow(input: {
  coefficient: number;
  expansibility: number;
  orificeM: number;
  pipeM: number;
  dpPa: number;
  densityKgM3: number;
}): Result<number> {
  const { coefficient, expansibility, orificeM, pipeM, dpPa, densityKgM3 } = input;
  const bad = refuseNotFinite(input);
  if (bad) return bad;
  if (orificeM <= 0 || pipeM <= orificeM) return refuseFlow("GEOMETRY_INVALID", "orificeM");
  if (coefficient <= 0) return refuseFlow("GEOMETRY_INVALID", "coefficient");
  if (expansibility <= 0 || expansibility > 1) return refuseFlow("GEOMETRY_INVALID", "expansibility");
  if (dpPa <= 0) return refuseFlow("PRESSURE_NOT_POSITIVE", "dpPa");
  if (densityKgM3 <= 0) return refuseFlow("DENSITY_REQUIRED", "densityKgM3");
  const b = orificeM / pipeM;
  const approach = coefficient / Math.sqrt(1 - b ** 4);
  return ok(approach * expansibility * (Math.PI / 4) * orificeM ** 2 * Math.sqrt(2 * dpPa * densityKgM3));
}

export type PressureTaps = "corner" | "d_and_half_d" | "flange";

function insideLimits(orificeM: number, pipeM: number, reynolds: number, taps: PressureTaps): boolean {
  const b = orificeM / pipeM;
  if (orificeM < 0.0125 || pipeM < 0.05 || pipeM > 1 || b < 0.1 || b > 0.75) return false;
  if (taps === "flange") return reynolds >= 5000 && reynolds >= 170 * b * b * pipeM * 1000;
  return b <= 0.56 ? reynolds >= 5000 : reynolds >= 16_000 * b * b;
}

/**
 * Discharge coefficient of a sharp-edged orifice plate, Reader-Harris/Gallagher.
 * @param reynolds pipe Reynolds number.
 * Limits: d >= 12.5 mm, 50 <= D <= 1000 mm, 0.10 <= d/D <= 0.75, Reynolds by tap kind.
 * Source: ISO 5167-2:2003 eq. (4). Errors: GEOMETRY_INVALID, OUTSIDE_ISO_5167_LIMITS.
 */
export function orificeCoefficient(input: { pipeM: number; orificeM: number; reynolds: number; taps: PressureTaps }): Result<number> {
  const { pipeM, orificeM, reynolds, taps } = input;
  const bad = refuseNotFinite({ pipeM, orificeM, reynolds });
  if (bad) return bad;
  if (orificeM <= 0 || pipeM <= orificeM) return refuseFlow("GEOMETRY_INVALID", "orificeM");
  if (!insideLimits(orificeM, pipeM, reynolds, taps)) return refuseFlow("OUTSIDE_ISO_5167_LIMITS");
  const b = orificeM / pipeM;
  const pipeMm = pipeM * 1000;
  const flange = 25.4 / pipeMm;
  const [l1, l2] = taps === "corner" ? [0, 0] : taps === "flange" ? [flange, flange] : [1, 0.47];
  const a = ((19_000 * b) / reynolds) ** 0.8;
  const m2 = (2 * l2) / (1 - b);
  const plain = 0.5961 + 0.0261 * b ** 2 - 0.216 * b ** 8 + 0.000521 * ((1e6 * b) / reynolds) ** 0.7;
  const slow = (0.0188 + 0.0063 * a) * b ** 3.5 * (1e6 / reynolds) ** 0.3;
  const upstream = (0.043 + 0.08 * Math.exp(-10 * l1) - 0.123 * Math.exp(-7 * l1)) * (1 - 0.11 * a) * (b ** 4 / (1 - b ** 4));
  const downstream = 0.031 * (m2 - 0.8 * m2 ** 1.1) * b ** 1.3;
  const small = pipeMm < 71.12 ? 0.011 * (0.75 - b) * (2.8 - pipeMm / 25.4) : 0;
  return ok(plain + slow + upstream - downstream + small);
}

/**
 * Expansibility factor of an orifice plate.
 * @param beta diameter ratio, 0 < beta < 1. @param p1Pa, p2Pa absolute pressures, 0.75 <= p2/p1 < 1. @param kappa isentropic exponent > 1.
 * Source: ISO 5167-2:2003 eq. (5). Errors: PRESSURE_RATIO_BELOW_0_75, PRESSURE_NOT_POSITIVE, GEOMETRY_INVALID.
 */
export function orificeExpansibility(input: { beta: number; p1Pa: number; p2Pa: number; kappa: number }): Result<number> {
  const { beta, p1Pa, p2Pa, kappa } = input;
  const bad = refuseNotFinite(input);
  if (bad) return bad;
  if (beta <= 0 || beta >= 1) return refuseFlow("GEOMETRY_INVALID", "beta");
  if (kappa <= 1) return refuseFlow("GEOMETRY_INVALID", "kappa");
  if (p1Pa <= 0 || p2Pa > p1Pa) return refuseFlow("PRESSURE_NOT_POSITIVE", "p2Pa");
  const ratio = p2Pa / p1Pa;
  if (ratio < 0.75) return refuseFlow("PRESSURE_RATIO_BELOW_0_75", "p2Pa");
  return ok(1 - (0.351 + 0.256 * beta ** 4 + 0.93 * beta ** 8) * (1 - ratio ** (1 / kappa)));
}
