import { ok, type Result } from "@/modules/kernel/result";
import type { FlowFlag } from "./flow-flags";
import { refuseFlow, refuseNotFinite } from "./flow-refusal";

/** Micrometres as whole numbers, so that 2.33 + 0.08 - 0.15 is 2.26 and nothing else. */
const um = (mm: number): number => Math.round(mm * 1000);
const mm = (wholeUm: number): number => wholeUm / 1000;

/**
 * Shim that brings a clearance to its target, mm: `old + measured - target`. Measure the old shim; do not read its face.
 * Source: workshop-manual rule. Errors: GEOMETRY_INVALID (old <= 0, a clearance < 0, result <= 0).
 */
export function lashShim(input: { oldShimMm: number; measuredMm: number; targetMm: number }): Result<number> {
  const { oldShimMm, measuredMm, targetMm } = input;
  const bad = refuseNotFinite(input);
  if (bad) return bad;
  if (oldShimMm <= 0) return refuseFlow("GEOMETRY_INVALID", "oldShimMm");
  if (measuredMm < 0) return refuseFlow("GEOMETRY_INVALID", "measuredMm");
  if (targetMm < 0) return refuseFlow("GEOMETRY_INVALID", "targetMm");
  const shimUm = um(oldShimMm) + um(measuredMm) - um(targetMm);
  return shimUm > 0 ? ok(mm(shimUm)) : refuseFlow("GEOMETRY_INVALID", "targetMm");
}

export interface ShimCandidate {
  readonly shimMm: number;
  readonly clearanceMm: number;
}

/**
 * Every size of a shim kit whose clearance lies in the range, ends included, thickest first; none: flag NO_SHIM_IN_RANGE.
 * Kit sizes run from `smallestMm` (1.20) to `largestMm` (3.00) by `stepMm`.
 * @param isAtMost the clearance was less than the thinnest gauge, so `measuredMm` is an upper bound (flag MEASURED_AT_MOST).
 * Source: workshop-manual rule. Errors: GEOMETRY_INVALID.
 */
export function lashShimCandidates(input: {
  oldShimMm: number;
  measuredMm: number;
  minMm: number;
  maxMm: number;
  stepMm: number;
  smallestMm?: number;
  largestMm?: number;
  isAtMost?: boolean;
}): Result<{ candidates: readonly ShimCandidate[]; flags: readonly FlowFlag[] }> {
  const { oldShimMm, measuredMm, minMm, maxMm, stepMm, smallestMm = 1.2, largestMm = 3, isAtMost = false } = input;
  const bad = refuseNotFinite({ oldShimMm, measuredMm, minMm, maxMm, stepMm, smallestMm, largestMm });
  if (bad) return bad;
  if (oldShimMm <= 0) return refuseFlow("GEOMETRY_INVALID", "oldShimMm");
  if (measuredMm < 0) return refuseFlow("GEOMETRY_INVALID", "measuredMm");
  if (minMm < 0 || maxMm < minMm) return refuseFlow("GEOMETRY_INVALID", "maxMm");
  if (um(stepMm) <= 0) return refuseFlow("GEOMETRY_INVALID", "stepMm");
  if (smallestMm <= 0 || largestMm < smallestMm) return refuseFlow("GEOMETRY_INVALID", "largestMm");
  const sum = um(oldShimMm) + um(measuredMm);
  const count = Math.floor((um(largestMm) - um(smallestMm)) / um(stepMm)) + 1;
  const candidates = Array.from({ length: count }, (_, i) => um(smallestMm) + i * um(stepMm))
    .filter((size) => sum - size >= um(minMm) && sum - size <= um(maxMm))
    .reverse()
    .map((size) => ({ shimMm: mm(size), clearanceMm: mm(sum - size) }));
  const flags: FlowFlag[] = [...(candidates.length === 0 ? (["NO_SHIM_IN_RANGE"] as const) : []), ...(isAtMost ? (["MEASURED_AT_MOST"] as const) : [])];
  return ok({ candidates, flags });
}

/**
 * Clearance after a seat cut, mm: the valve sinks, the clearance falls by the sink. Bucket directly on the stem only.
 * @param removedNormalMm metal taken off square to the seat face; sink is `removed/cos(seat angle)`.
 * A negative clearance means the valve is held open. Source: geometry. Errors: GEOMETRY_INVALID.
 */
export function lashAfterSeatCut(
  input: { clearanceBeforeMm: number } & ({ valveSinkMm: number } | { removedNormalMm: number; seatAngleDeg: number }),
): Result<{ valveSinkMm: number; clearanceAfterMm: number }> {
  const { clearanceBeforeMm } = input;
  const angle = "seatAngleDeg" in input ? input.seatAngleDeg : 0;
  const cut = "valveSinkMm" in input ? input.valveSinkMm : input.removedNormalMm;
  const bad = refuseNotFinite({ clearanceBeforeMm, cut, seatAngleDeg: angle });
  if (bad) return bad;
  if (cut < 0) return refuseFlow("GEOMETRY_INVALID", "valveSinkMm");
  if (angle < 0 || angle > 75) return refuseFlow("GEOMETRY_INVALID", "seatAngleDeg", { min: 0, max: 75 });
  const sinkUm = um("valveSinkMm" in input ? cut : cut / Math.cos((angle * Math.PI) / 180));
  return ok({ valveSinkMm: mm(sinkUm), clearanceAfterMm: mm(um(clearanceBeforeMm) - sinkUm) });
}
