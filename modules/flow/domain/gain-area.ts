import type { CurveScale } from "./curve-scale";
import { cubicBetween, type DrawnCurve } from "./drawn-curve";
import type { CurveKnot } from "./monotone-curve";
import { neighbours } from "./neighbours";
import type { Segment } from "./path-segments";

export interface AreaBetween {
  /** After above before, or below. A loss is drawn without colour. */
  readonly kind: "gain" | "loss";
  readonly fromUm: number;
  readonly toUm: number;
  /** Closed outline: along after, back along before. */
  readonly segments: readonly Segment[];
}

/** Parts of each interval looked at for a change of sign; two cubics cross at most three times in one. */
const PARTS = 24;

/** Lifts inside (from, to) at which `difference` changes sign. */
function crossingsIn(difference: (lift: number) => number, from: number, to: number): number[] {
  const at = Array.from({ length: PARTS + 1 }, (_, i) => from + ((to - from) * i) / PARTS);
  return neighbours(at).flatMap(([left, right]) => {
    let low = left;
    let high = right;
    const sign = Math.sign(difference(low));
    if (sign === 0 || Math.sign(difference(high)) !== -sign) return [];
    for (let i = 0; i < 60; i += 1) {
      const middle = (low + high) / 2;
      if (Math.sign(difference(middle)) === sign) low = middle;
      else high = middle;
    }
    return [(low + high) / 2];
  });
}

/**
 * What lies between two tests, in pieces of gain and of loss, over the lifts both have read.
 * The cuts are where the drawn curves themselves meet.
 */
export function areasBetween(before: DrawnCurve, after: DrawnCurve, scale: CurveScale): AreaBetween[] {
  const { curve: b } = before;
  const { curve: a } = after;
  const from = Math.max(before.readings[0]?.liftUm ?? Infinity, after.readings[0]?.liftUm ?? Infinity);
  const to = Math.min(before.readings.at(-1)?.liftUm ?? -Infinity, after.readings.at(-1)?.liftUm ?? -Infinity);
  if (!a || !b || !(to > from)) return [];
  const difference = (lift: number) => (a.knotAt(lift)?.flowCfm ?? 0) - (b.knotAt(lift)?.flowCfm ?? 0);
  const knots = [from, to, ...[...a.knots, ...b.knots].map((k) => k.lift).filter((l) => l > from && l < to)];
  const breaks = [...new Set(knots)].sort((x, y) => x - y);
  const cuts = [...breaks, ...neighbours(breaks).flatMap(([p, q]) => crossingsIn(difference, p, q))].sort((x, y) => x - y);

  // Neighbouring pieces of one sign make one area.
  const areas: { sign: number; lifts: number[] }[] = [];
  for (const [p, q] of neighbours(cuts)) {
    const sign = Math.sign(difference((p + q) / 2));
    const last = areas.at(-1);
    if (last && last.sign === sign) last.lifts.push(q);
    else areas.push({ sign, lifts: [p, q] });
  }
  const knotsOf = (curve: typeof a, lifts: readonly number[]) =>
    lifts.map((l) => curve.knotAt(l)).filter((k): k is CurveKnot => k !== null);
  return areas
    .filter((area) => area.sign !== 0)
    .map(({ sign, lifts }) => {
      const up = knotsOf(a, lifts);
      const back = knotsOf(b, lifts).reverse();
      const start = up[0];
      const turn = back[0];
      return {
        kind: sign > 0 ? ("gain" as const) : ("loss" as const),
        fromUm: lifts[0] ?? from,
        toUm: lifts.at(-1) ?? to,
        segments: [
          ...(start ? [{ kind: "move" as const, x: scale.x(start.lift), y: scale.y(start.flowCfm) }] : []),
          ...neighbours(up).map(([p, q]) => cubicBetween(p, q, scale)),
          ...(turn ? [{ kind: "line" as const, x: scale.x(turn.lift), y: scale.y(turn.flowCfm) }] : []),
          ...neighbours(back).map(([p, q]) => cubicBetween(p, q, scale)),
          { kind: "close" as const },
        ],
      };
    });
}
