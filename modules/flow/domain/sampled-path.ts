import type { Segment } from "./path-segments";

export interface PathPoint { x: number; y: number }

/** Points on each cubic: at print size the chords are shorter than the line is thick. */
const STEPS = 14;

/** A drawing as points, one list for each sub-path. Cubics are sampled; the lists are new at every call. */
export function sampledPath(segments: readonly Segment[]): PathPoint[][] {
  const paths: PathPoint[][] = [];
  for (const s of segments) {
    if (s.kind === "close") continue;
    if (s.kind === "move") {
      paths.push([{ x: s.x, y: s.y }]);
      continue;
    }
    const path = paths.at(-1);
    const from = path?.at(-1);
    if (!path || !from) continue;
    if (s.kind === "line") path.push({ x: s.x, y: s.y });
    else {
      for (let i = 1; i <= STEPS; i++) {
        const t = i / STEPS;
        const u = 1 - t;
        const mix = (a: number, b: number, c: number, d: number) => u * u * u * a + 3 * u * u * t * b + 3 * u * t * t * c + t * t * t * d;
        path.push({ x: mix(from.x, s.x1, s.x2, s.x), y: mix(from.y, s.y1, s.y2, s.y) });
      }
    }
  }
  return paths;
}
