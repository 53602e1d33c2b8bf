import type { CurveScale } from "./curve-scale";
import { cubicBetween, type DrawnCurve } from "./drawn-curve";
import type { CurveKnot } from "./monotone-curve";
import { neighbours } from "./neighbours";
import type { Segment } from "./path-segments";

/** What a change must exceed at one lift, cfm, >= 0. */
export interface LiftMargin {
  readonly liftUm: number;
  readonly marginCfm: number;
  /** Rests on the bench's repeat history. */
  readonly byHistory?: boolean;
}
/** The margin at one tested lift as a bar through the before reading. */
export interface MarginBar {
  readonly liftUm: number;
  readonly marginCfm: number;
  readonly x: number;
  readonly top: number;
  readonly bottom: number;
}
export interface NoiseBand {
  /** Closed outlines, one for each stretch of neighbouring lifts that were judged. */
  readonly outlines: readonly (readonly Segment[])[];
  readonly bars: readonly MarginBar[];
}

/**
 * The noise about the before curve: where the after curve leaves it, the change is larger than the noise. Its edges are the
 * drawn before curve itself moved by the margin, which runs straight from one judged lift to the next. Nothing is drawn over
 * a lift that was not judged, and nothing below no flow.
 */
export function noiseBand(before: DrawnCurve, margins: readonly LiftMargin[], scale: CurveScale): NoiseBand {
  const judged = before.readings.flatMap((r) => {
    const margin = margins.find((m) => m.liftUm === r.liftUm);
    return [{ ...r, marginCfm: margin?.marginCfm ?? null }];
  });
  const bars = judged.flatMap((r): MarginBar[] => (r.marginCfm === null ? [] : [{
    liftUm: r.liftUm, marginCfm: r.marginCfm, x: scale.x(r.liftUm), top: scale.y(r.flowCfm + r.marginCfm), bottom: scale.y(Math.max(0, r.flowCfm - r.marginCfm)),
  }]));
  const { curve } = before;
  if (!curve) return { outlines: [], bars };

  const stretches: { knot: CurveKnot; up: number; down: number }[][] = [];
  judged.forEach((r, i) => {
    const knot = r.marginCfm === null ? null : curve.knotAt(r.liftUm);
    if (!knot || r.marginCfm === null) return;
    const point = { knot, up: r.marginCfm, down: -Math.min(r.marginCfm, r.flowCfm) };
    if (i > 0 && (judged[i - 1]?.marginCfm ?? null) !== null) stretches.at(-1)?.push(point);
    else stretches.push([point]);
  });
  const edge = (points: readonly { knot: CurveKnot; by: number }[]): Segment[] =>
    neighbours(points).map(([p, q]) => {
      const slope = (q.by - p.by) / (q.knot.lift - p.knot.lift);
      const moved = ({ knot, by }: { knot: CurveKnot; by: number }): CurveKnot => ({ ...knot, flowCfm: knot.flowCfm + by, slope: knot.slope + slope });
      return cubicBetween(moved(p), moved(q), scale);
    });
  const outlines = stretches.filter((s) => s.length > 1).map((s): Segment[] => {
    const upper = s.map(({ knot, up }) => ({ knot, by: up }));
    const lower = s.map(({ knot, down }) => ({ knot, by: down })).reverse();
    const [start] = upper;
    const [turn] = lower;
    const at = (p: { knot: CurveKnot; by: number } | undefined) => ({ x: scale.x(p?.knot.lift ?? 0), y: scale.y((p?.knot.flowCfm ?? 0) + (p?.by ?? 0)) });
    return [{ kind: "move", ...at(start) }, ...edge(upper), { kind: "line", ...at(turn) }, ...edge(lower), { kind: "close" }];
  });
  return { outlines, bars };
}

/** Margins of the judged lifts, for a curve. */
export const marginsOf = (rows: readonly { readonly liftUm: number; readonly marginCfm: number | null; readonly byHistory?: boolean }[]): LiftMargin[] =>
  rows.flatMap((r) => (r.marginCfm === null ? [] : [{ liftUm: r.liftUm, marginCfm: r.marginCfm, ...(r.byHistory ? { byHistory: true } : {}) }]));
