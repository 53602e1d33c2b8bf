/** Lift and flow. */
type Reading = readonly [number, number];

/** How far a reading lies from the straight line through two others: log of the ratio, alike for too high and too low. */
function departure(p: Reading, a: Reading, b: Reading): number {
  const expected = a[1] + ((p[0] - a[0]) / (b[0] - a[0])) * (b[1] - a[1]);
  const floor = 1e-3;
  return Math.abs(Math.log(Math.max(p[1], floor) / Math.max(expected, floor)));
}

/** Departure of every reading but the first from its two neighbours; of the last from the two before it. */
function departures(curve: readonly Reading[]): number[] {
  return curve.flatMap((p, i) => {
    const isLast = i === curve.length - 1;
    const a = curve[isLast ? i - 2 : i - 1];
    const b = curve[isLast ? i - 1 : i + 1];
    return i === 0 || !a || !b ? [] : [departure(p, a, b)];
  });
}

/** Only so many are told: where more stick out the whole sheet is doubtful. */
const OUTLIERS_MAX = 3;

/**
 * Lifts whose reading does not fit its neighbours: some departure exceeds `timesMedian` the median one and `shareMin`.
 * A wrong reading makes its neighbours stick out too, so the one named is that without which the rest is smoothest.
 * @param curve lifts increasing; (0, 0) is added when the first lift is above zero. Fewer than four points: none.
 * @param limits `shareMin` as a share, e.g. 0.1; a smoother sheet than that is never doubted. Our rule, no source.
 */
export function outlierLifts(curve: readonly Reading[], limits: { timesMedian: number; shareMin: number }): number[] {
  const first = curve[0];
  let rest: readonly Reading[] = first && first[0] > 0 ? [[0, 0], ...curve] : curve;
  const found: number[] = [];
  while (rest.length >= 4 && found.length < OUTLIERS_MAX) {
    const now = departures(rest);
    const sorted = [...now].sort((x, y) => x - y);
    const median = sorted[Math.floor((sorted.length - 1) / 2)] ?? 0;
    if (Math.max(...now) <= Math.max(limits.timesMedian * median, limits.shareMin)) break;
    const series = rest;
    const without = series.slice(1).map((left) => {
      const others = series.filter((p) => p !== left);
      return { left, others, roughness: departures(others).reduce((s, d) => s + d * d, 0) };
    });
    const best = without.reduce((a, b) => (b.roughness < a.roughness ? b : a));
    found.push(best.left[0]);
    rest = best.others;
  }
  return found.sort((a, b) => a - b);
}
