interface Point { readonly x: number; readonly y: number }
export interface HatchLine { readonly x1: number; readonly y1: number; readonly x2: number; readonly y2: number }

/**
 * Slanted strokes that fill an outline, for a paper that cannot clip: lines rising to the right at 45 degrees, `gap` apart,
 * cut where they cross the outline (even-odd rule). They start from a fixed lattice, so neighbouring areas share it.
 * @param outline closed by itself, at least three points. @param gap between strokes, px, > 0.
 * Source: scan conversion of a polygon, even-odd rule (W3C SVG 2, fill-rule).
 */
export function hatchLines(outline: readonly Point[], gap: number): HatchLine[] {
  if (outline.length < 3 || !(gap > 0)) return [];
  // A stroke is x + y = c; along it a point is known by x - y.
  const step = gap * Math.SQRT2;
  const sums = outline.map((p) => p.x + p.y);
  const first = Math.ceil(Math.min(...sums) / step) * step;
  const last = Math.max(...sums);
  const lines: HatchLine[] = [];
  for (let c = first; c < last; c += step) {
    const cuts = outline
      .flatMap((p, i) => {
        const q = outline[(i + 1) % outline.length] ?? p;
        const [a, b] = [p.x + p.y - c, q.x + q.y - c];
        if (a < 0 === b < 0) return [];
        const t = a / (a - b);
        return [p.x - p.y + t * (q.x - q.y - (p.x - p.y))];
      })
      .sort((m, n) => m - n);
    for (let i = 0; i + 1 < cuts.length; i += 2) {
      const [from, to] = [cuts[i] ?? 0, cuts[i + 1] ?? 0];
      lines.push({ x1: (c + from) / 2, y1: (c - from) / 2, x2: (c + to) / 2, y2: (c - to) / 2 });
    }
  }
  return lines;
}
