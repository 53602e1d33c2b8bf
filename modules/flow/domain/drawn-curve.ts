import { ok, type Result } from "@/modules/kernel/result";
import type { CurveScale } from "./curve-scale";
import { monotoneCurve, type CurveKnot, type MonotoneCurve } from "./monotone-curve";
import { neighbours } from "./neighbours";
import type { Segment } from "./path-segments";
import type { LiftReading } from "./repeats";

/** One test ready to draw: its readings by lift, and the curve through them when there are at least two. */
export interface DrawnCurve {
  readonly readings: readonly LiftReading[];
  readonly curve: MonotoneCurve | null;
}

/**
 * The same monotone curve the figures are taken from, so the drawing never differs from the numbers. It is drawn from the
 * first reading on: what was not measured is not shown, although (0, 0) shapes the slope there.
 * @param addZero false for what is not nothing at a shut valve.
 * Errors: LIFTS_NOT_INCREASING (a lift twice), NUMBER_NOT_FINITE.
 */
export function drawnCurve(readings: readonly LiftReading[], addZero = true): Result<DrawnCurve> {
  const sorted = [...readings].sort((a, b) => a.liftUm - b.liftUm);
  if (sorted.length === 0) return ok({ readings: sorted, curve: null });
  const curve = monotoneCurve(
    sorted.map((r) => ({ lift: r.liftUm, flowCfm: r.flowCfm })),
    { addZero },
  );
  if (!curve.ok) return curve.refusal.code === "TOO_FEW_POINTS" ? ok({ readings: sorted, curve: null }) : curve;
  return ok({ readings: sorted, curve: sorted.length > 1 ? curve.value : null });
}

/** Handles of the cubic between two knots: a third of the way along each slope, so the drawn cubic is the computed one. */
export function cubicBetween(a: CurveKnot, b: CurveKnot, scale: CurveScale): Segment {
  const third = (b.lift - a.lift) / 3;
  return {
    kind: "curve",
    x1: scale.x(a.lift + third),
    y1: scale.y(a.flowCfm + third * a.slope),
    x2: scale.x(b.lift - third),
    y2: scale.y(b.flowCfm - third * b.slope),
    x: scale.x(b.lift),
    y: scale.y(b.flowCfm),
  };
}

/** Segments of a curve from its first reading to its last; empty with fewer than two. */
export function curveSegments({ readings, curve }: DrawnCurve, scale: CurveScale): Segment[] {
  const first = readings[0];
  if (!curve || !first) return [];
  const knots = curve.knots.filter((k) => k.lift >= first.liftUm);
  return [
    { kind: "move", x: scale.x(first.liftUm), y: scale.y(first.flowCfm) },
    ...neighbours(knots).map(([a, b]) => cubicBetween(a, b, scale)),
  ];
}
