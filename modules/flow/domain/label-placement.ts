/** A box of the drawing, pixels. */
export interface Rect {
  readonly x: number;
  readonly y: number;
  readonly width: number;
  readonly height: number;
}

export const overlaps = (a: Rect, b: Rect): boolean =>
  a.x < b.x + b.width && b.x < a.x + a.width && a.y < b.y + b.height && b.y < a.y + a.height;

/** The box with some air all round. */
export const grown = (box: Rect, by: number): Rect => ({ x: box.x - by, y: box.y - by, width: box.width + 2 * by, height: box.height + 2 * by });

/** True when any of the straight line from `a` to `b` lies in the box. Source: Liang and Barsky, line clipping (1984). */
export function segmentMeets(a: { readonly x: number; readonly y: number }, b: { readonly x: number; readonly y: number }, box: Rect): boolean {
  // Most lines are far from most boxes.
  if (Math.max(a.x, b.x) < box.x || Math.min(a.x, b.x) > box.x + box.width || Math.max(a.y, b.y) < box.y || Math.min(a.y, b.y) > box.y + box.height) return false;
  const [dx, dy] = [b.x - a.x, b.y - a.y];
  let [from, to] = [0, 1];
  for (const [p, q] of [[-dx, a.x - box.x], [dx, box.x + box.width - a.x], [-dy, a.y - box.y], [dy, box.y + box.height - a.y]] as const) {
    if (p === 0) {
      if (q < 0) return false;
    } else if (p < 0) from = Math.max(from, q / p);
    else to = Math.min(to, q / p);
    if (from > to) return false;
  }
  return true;
}

/**
 * Heights at least `gap` apart inside `top..bottom`, each as near to the wanted one as the others allow.
 * Answers in the order of the input; equal wishes keep their order. When they cannot all fit the gap shrinks.
 * Source: isotonic regression by pooling neighbours.
 */
export function spreadApart(wanted: readonly number[], gap: number, top: number, bottom: number): number[] {
  const n = wanted.length;
  if (n === 0) return [];
  const step = n === 1 ? 0 : Math.min(gap, (bottom - top) / (n - 1));
  const order = wanted.map((y, i) => ({ y, i })).sort((a, b) => a.y - b.y || a.i - b.i);
  // Shift out the gaps, pool what is out of order, shift the gaps back in.
  const pools: { sum: number; count: number }[] = [];
  order.forEach(({ y }, k) => {
    let pool = { sum: y - k * step, count: 1 };
    for (let last = pools.at(-1); last && last.sum / last.count > pool.sum / pool.count; last = pools.at(-1)) {
      pools.pop();
      pool = { sum: pool.sum + last.sum, count: pool.count + last.count };
    }
    pools.push(pool);
  });
  const flat = pools.flatMap((p) => Array.from({ length: p.count }, () => p.sum / p.count));
  const placed = wanted.map((y) => y);
  order.forEach(({ i }, k) => {
    const base = Math.min(Math.max(flat[k] ?? 0, top), bottom - (n - 1) * step);
    placed[i] = base + k * step;
  });
  return placed;
}

/** First of the candidate boxes that lies within `inside` and is `clear`. */
export const firstClear = (candidates: readonly Rect[], inside: Rect, clear: (box: Rect) => boolean): Rect | null =>
  candidates.find(
    (c) =>
      c.x >= inside.x && c.y >= inside.y && c.x + c.width <= inside.x + inside.width && c.y + c.height <= inside.y + inside.height && clear(c),
  ) ?? null;
