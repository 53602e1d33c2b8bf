import { ok, type Result } from "@/modules/kernel/result";
import type { FlowFlag } from "./flow-flags";
import { refuseFlow, refuseNotFinite } from "./flow-refusal";

export interface Clearance {
  readonly clearanceMm: number;
  readonly flags: readonly FlowFlag[];
}
const below = (clearanceMm: number, minimumMm: number): boolean => clearanceMm < minimumMm - 1e-9;

/**
 * Valve to piston, square to the valve head, after milling: `clay - milled cos(angle) + sink`.
 * After a cam change measure again; never compute. Measure before starting the engine.
 * @param clayMm thinnest clay >= 0. @param milledMm taken off the head >= 0. @param valveAngleDeg valve to bore axis, 0 to 90.
 * @param minimumMm from the service manual or the cam's maker.
 * Source: geometry. Errors: GEOMETRY_INVALID.
 */
export function valveToPiston(input: {
  clayMm: number;
  milledMm: number;
  valveAngleDeg: number;
  minimumMm: number;
  valveSinkMm?: number;
}): Result<Clearance> {
  const { clayMm, milledMm, valveAngleDeg, minimumMm, valveSinkMm = 0 } = input;
  const bad = refuseNotFinite({ clayMm, milledMm, valveAngleDeg, minimumMm, valveSinkMm });
  if (bad) return bad;
  if (clayMm < 0) return refuseFlow("GEOMETRY_INVALID", "clayMm");
  if (milledMm < 0) return refuseFlow("GEOMETRY_INVALID", "milledMm");
  if (valveSinkMm < 0) return refuseFlow("GEOMETRY_INVALID", "valveSinkMm");
  if (valveAngleDeg < 0 || valveAngleDeg >= 90) return refuseFlow("GEOMETRY_INVALID", "valveAngleDeg", { min: 0, max: 90 });
  const clearanceMm = clayMm - milledMm * Math.cos((valveAngleDeg * Math.PI) / 180) + valveSinkMm;
  return ok({ clearanceMm, flags: below(clearanceMm, minimumMm) ? ["VALVE_TO_PISTON_BELOW_MINIMUM"] : [] });
}

/**
 * Retainer to seal at full lift, mm: `distance closed - lift`.
 * @param minimumMm often 1.0 mm (common practice, no source); manual first. Errors: GEOMETRY_INVALID.
 */
export function retainerToSeal(input: { distanceClosedMm: number; liftMm: number; minimumMm: number }): Result<Clearance> {
  const bad = refuseNotFinite(input);
  if (bad) return bad;
  if (input.distanceClosedMm < 0) return refuseFlow("GEOMETRY_INVALID", "distanceClosedMm");
  if (input.liftMm < 0) return refuseFlow("GEOMETRY_INVALID", "liftMm");
  // Whole micrometres: an indicator shows no finer, and 11.2 - 8.6 must be 2.6.
  const clearanceMm = Math.round((input.distanceClosedMm - input.liftMm) * 1000) / 1000;
  return ok({ clearanceMm, flags: below(clearanceMm, input.minimumMm) ? ["RETAINER_TO_SEAL_BELOW_MINIMUM"] : [] });
}

/**
 * Seat runout: offset is half the total indicator reading; judged on the total.
 * @param limitMm from the service manual. Source: geometry. Errors: GEOMETRY_INVALID.
 */
export function seatRunout(input: { totalIndicatorMm: number; limitMm: number }): Result<{ offsetMm: number; withinLimit: boolean }> {
  const bad = refuseNotFinite(input);
  if (bad) return bad;
  if (input.totalIndicatorMm < 0) return refuseFlow("GEOMETRY_INVALID", "totalIndicatorMm");
  if (input.limitMm < 0) return refuseFlow("GEOMETRY_INVALID", "limitMm");
  return ok({ offsetMm: input.totalIndicatorMm / 2, withinLimit: input.totalIndicatorMm <= input.limitMm + 1e-9 });
}

/**
 * Worst stem clearance, mm: largest guide bore less smallest stem, over all heights and directions measured.
 * Source: definition. Errors: TOO_FEW_POINTS, GEOMETRY_INVALID.
 */
export function stemClearanceMm(input: { guideBoresMm: readonly number[]; stemsMm: readonly number[] }): Result<number> {
  const bad = refuseNotFinite(input);
  if (bad) return bad;
  if (input.guideBoresMm.length === 0) return refuseFlow("TOO_FEW_POINTS", "guideBoresMm");
  if (input.stemsMm.length === 0) return refuseFlow("TOO_FEW_POINTS", "stemsMm");
  if ([...input.guideBoresMm, ...input.stemsMm].some((v) => v <= 0)) return refuseFlow("GEOMETRY_INVALID", "guideBoresMm");
  return ok(Math.round((Math.max(...input.guideBoresMm) - Math.min(...input.stemsMm)) * 1e4) / 1e4);
}
