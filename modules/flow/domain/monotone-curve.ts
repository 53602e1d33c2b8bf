import { ok, type Result } from "@/modules/kernel/result";
import { refuseFlow, refuseNotFinite } from "./flow-refusal";
import { isIncreasing, neighbours } from "./neighbours";

/** A reading on the curve. Lifts of one curve are in one unit, whichever it is. */
export interface CurvePoint {
  readonly lift: number;
  readonly flowCfm: number;
}
/** A reading with the slope of the curve there, cfm per unit of lift. */
export interface CurveKnot extends CurvePoint {
  readonly slope: number;
}
export interface MonotoneCurve {
  readonly knots: readonly CurveKnot[];
  readonly liftMin: number;
  readonly liftMax: number;
  /** Null outside the tested lifts: the curve is never extended. */
  readonly knotAt: (lift: number) => CurveKnot | null;
}

interface Secant {
  readonly h: number;
  readonly s: number;
}

function innerSlope(p: Secant, q: Secant): number {
  if (p.s === 0 || q.s === 0 || Math.sign(p.s) !== Math.sign(q.s)) return 0;
  const w1 = 2 * q.h + p.h;
  const w2 = q.h + 2 * p.h;
  return (w1 + w2) / (w1 / p.s + w2 / q.s);
}

function endSlope(end: Secant, next: Secant): number {
  const d = ((2 * end.h + next.h) * end.s - end.h * next.s) / (end.h + next.h);
  if (Math.sign(d) !== Math.sign(end.s)) return 0;
  if (Math.sign(end.s) !== Math.sign(next.s) && Math.abs(d) > 3 * Math.abs(end.s)) return 3 * end.s;
  return d;
}

function slopesOf(secants: readonly Secant[]): number[] {
  const [first, second] = secants;
  const last = secants.at(-1);
  const beforeLast = secants.at(-2);
  if (!first || !last) return [];
  if (!second || !beforeLast) return [first.s, first.s];
  return [endSlope(first, second), ...neighbours(secants).map(([p, q]) => innerSlope(p, q)), endSlope(last, beforeLast)];
}

function between(a: CurveKnot, b: CurveKnot, lift: number): CurveKnot {
  if (lift === a.lift) return a;
  if (lift === b.lift) return b;
  const h = b.lift - a.lift;
  const t = (lift - a.lift) / h;
  const u = 1 - t;
  const value = u * u * (1 + 2 * t) * a.flowCfm + t * t * (3 - 2 * t) * b.flowCfm + t * u * h * (u * a.slope - t * b.slope);
  const slope = (6 * t * u * (b.flowCfm - a.flowCfm)) / h + u * (1 - 3 * t) * a.slope + t * (3 * t - 2) * b.slope;
  // The cubic stays between its ends; this only takes off what the last binary digit adds.
  const flowCfm = Math.min(Math.max(value, Math.min(a.flowCfm, b.flowCfm)), Math.max(a.flowCfm, b.flowCfm));
  return { lift, flowCfm, slope };
}

/**
 * Monotone piecewise cubic through every reading; it never shows a flow above or below its neighbours.
 * @param addZero adds (0, 0) when the first lift is above zero; do so after the leak is taken off.
 * Source: Fritsch & Carlson, SIAM J. Numer. Anal. 17 (1980) 238-246; slopes Fritsch & Butland, SIAM J. Sci. Stat. Comput. 5 (1984) 300-304,
 * so that any standard PCHIP routine gives the same numbers. Errors: TOO_FEW_POINTS (< 2), LIFTS_NOT_INCREASING.
 */
export function monotoneCurve(points: readonly CurvePoint[], options: { addZero: boolean }): Result<MonotoneCurve> {
  const bad = refuseNotFinite({ lifts: points.map((p) => p.lift), flowsCfm: points.map((p) => p.flowCfm) });
  if (bad) return bad;
  const first = points[0];
  if (!first) return refuseFlow("TOO_FEW_POINTS", "lifts");
  if (!isIncreasing(points.map((p) => p.lift))) return refuseFlow("LIFTS_NOT_INCREASING", "lifts");
  if (options.addZero && first.lift < 0) return refuseFlow("LIFTS_NOT_INCREASING", "lifts");
  const all = options.addZero && first.lift > 0 ? [{ lift: 0, flowCfm: 0 }, ...points] : points;
  const last = all.at(-1);
  const start = all[0];
  if (all.length < 2 || !last || !start) return refuseFlow("TOO_FEW_POINTS", "lifts");
  const slopes = slopesOf(neighbours(all).map(([a, b]) => ({ h: b.lift - a.lift, s: (b.flowCfm - a.flowCfm) / (b.lift - a.lift) })));
  const knots = all.map((p, i) => ({ lift: p.lift, flowCfm: p.flowCfm, slope: slopes[i] ?? 0 }));
  const pieces = neighbours(knots);
  const knotAt = (lift: number): CurveKnot | null => {
    const piece = pieces.find(([a, b]) => lift >= a.lift && lift <= b.lift);
    return piece ? between(piece[0], piece[1], lift) : null;
  };
  return ok({ knots, liftMin: start.lift, liftMax: last.lift, knotAt });
}
