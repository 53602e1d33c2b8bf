import { ok, type Result } from "@/modules/kernel/result";
import { refuseFlow, refuseNotFinite } from "./flow-refusal";

export type SeatWidth = { readonly seatRadialWidthMm: number } | { readonly seatFaceWidthMm: number };

export type SeatFlowInput = SeatWidth & {
  readonly valveDiameterMm: number;
  /** From the plane of the valve head: the shop's "45". 0 to 75. */
  readonly seatAngleDeg: number;
  readonly portDiameterMm: number;
  readonly stemDiameterMm: number;
  readonly liftMm: number;
};

/** Radial seat width of a width measured on the face: `w_face cos beta`. */
export const radialSeatWidthMm = (faceWidthMm: number, seatAngleDeg: number): number =>
  faceWidthMm * Math.cos((seatAngleDeg * Math.PI) / 180);

/**
 * Smallest flow area of one valve, mm2, in three stages: 1 cone frustum square to the seat, 2 inner seat edge to
 * valve edge, 3 the port less the stem.
 * Source: Heywood (1988) eqs. (6.7)-(6.9), re-derived from the shortest distance between seat edge and valve face.
 * Errors: GEOMETRY_INVALID (a dimension <= 0, stem >= port, twice the seat width >= valve, angle outside 0..75, lift < 0).
 */
export function seatFlowArea(input: SeatFlowInput): Result<{ areaMm2: number; stage: 1 | 2 | 3 }> {
  const { valveDiameterMm: D, seatAngleDeg, portDiameterMm: port, stemDiameterMm: stem, liftMm: L } = input;
  const given = "seatRadialWidthMm" in input ? input.seatRadialWidthMm : input.seatFaceWidthMm;
  const bad = refuseNotFinite({ valveDiameterMm: D, seatAngleDeg, portDiameterMm: port, stemDiameterMm: stem, liftMm: L, seatWidthMm: given });
  if (bad) return bad;
  if (seatAngleDeg < 0 || seatAngleDeg > 75) return refuseFlow("GEOMETRY_INVALID", "seatAngleDeg", { min: 0, max: 75 });
  const w = "seatRadialWidthMm" in input ? given : radialSeatWidthMm(given, seatAngleDeg);
  if (D <= 0) return refuseFlow("GEOMETRY_INVALID", "valveDiameterMm");
  if (w <= 0 || 2 * w >= D) return refuseFlow("GEOMETRY_INVALID", "seatWidthMm");
  if (port <= 0) return refuseFlow("GEOMETRY_INVALID", "portDiameterMm");
  if (stem <= 0 || stem >= port) return refuseFlow("GEOMETRY_INVALID", "stemDiameterMm");
  if (L < 0) return refuseFlow("GEOMETRY_INVALID", "liftMm");
  const beta = (seatAngleDeg * Math.PI) / 180;
  const portArea = (Math.PI / 4) * (port ** 2 - stem ** 2);
  const firstEnd = seatAngleDeg === 0 ? Infinity : w / (Math.sin(beta) * Math.cos(beta));
  const stage = L <= firstEnd ? 1 : 2;
  const area =
    stage === 1
      ? Math.PI * L * Math.cos(beta) * (D - 2 * w + (L / 2) * Math.sin(2 * beta))
      : Math.PI * (D - w) * Math.sqrt((L - w * Math.tan(beta)) ** 2 + w ** 2);
  return ok(area >= portArea ? { areaMm2: portArea, stage: 3 } : { areaMm2: area, stage });
}
