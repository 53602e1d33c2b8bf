import type { CurveGeometry } from "./curve-geometry";
import { grown, overlaps, segmentMeets, type Rect } from "./label-placement";
import { textWidthPx } from "./line-end-labels";
import { neighbours } from "./neighbours";
import { sampledPath, type PathPoint } from "./sampled-path";

/** The words of a loss on paper, in ink, points. */
export interface PaperPlate extends Rect {
  /** From the reading to the plate; null where it stands close by. */
  readonly leader: { readonly x1: number; readonly y1: number; readonly x2: number; readonly y2: number } | null;
}

/** The paper's type is smaller than the screen's: 7 pt on plates, 7.6 pt at the line ends. */
const PLATE_SHARE = 0.54;
const LABEL_SHARE = 0.6;
const PLATE_HEIGHT_PT = 12;
/** Air about a line and about a reading's dot, its own half thickness within, points. */
const LINE_AIR_PT = 2.2;
const DOT_AIR_PT = 3.6;
/** Nearer than this needs no leader. */
const CLOSE_PT = 7;
const STEP_PT = 3;
/** So far from its reading a plate may go for more air, points; beyond, the nearest clear place is better. */
const ROOMY_WITHIN_PT = 60;

type Drawing = Pick<CurveGeometry, "plot" | "lines" | "points" | "losses" | "labels" | "cam" | "bars" | "bands" | "mini">;

/** Triangle that marks a loss under its reading. */
const markBox = ({ x, y }: { x: number; y: number }): Rect => ({ x: x - 3.2, y: y + 3.6, width: 6.4, height: 5 });
const nearest = (box: Rect, { x, y }: PathPoint): PathPoint => ({ x: Math.min(Math.max(x, box.x), box.x + box.width), y: Math.min(Math.max(y, box.y), box.y + box.height) });
const distance = (a: PathPoint, b: PathPoint): number => Math.hypot(a.x - b.x, a.y - b.y);

/** Every place in the plot on a fine lattice, nearest to the reading first. */
function placesFor(at: PathPoint, width: number, plot: Drawing["plot"]): { box: Rect; away: number }[] {
  const places: { box: Rect; away: number }[] = [];
  for (let x = plot.left + 2; x + width <= plot.right; x += STEP_PT) {
    for (let y = plot.top; y + PLATE_HEIGHT_PT <= plot.bottom - 2; y += STEP_PT) {
      const box = { x, y, width, height: PLATE_HEIGHT_PT };
      places.push({ box, away: distance(at, nearest(box, at)) });
    }
  }
  return places.sort((p, q) => p.away - q.away);
}

/**
 * Plates of the losses at the size of the paper, same order as `losses`. None covers a curve, a reading's dot, the mark of a loss,
 * a label, a leader or another plate; where there is room it keeps off the cam line, the noise and curves under its leader as well.
 * Null where the plot has no such place, and in the mini form: the mark and the table carry the loss.
 */
export function paperPlates(g: Drawing): (PaperPlate | null)[] {
  if (g.mini) return g.losses.map(() => null);
  const edges = (list: readonly { segments: CurveGeometry["lines"][number]["segments"] }[]) => list.flatMap((l) => sampledPath(l.segments)).flatMap((path) => neighbours(path));
  const curves = edges(g.lines);
  const noise = edges(g.bands);
  const fixed: Rect[] = [
    ...g.points.map((p) => grown({ x: p.x, y: p.y, width: 0, height: 0 }, DOT_AIR_PT)), ...g.losses.map((m) => grown(markBox(m), 0.8)),
    ...g.labels.map((l) => ({ x: l.x - 2, y: l.y - 9, width: Math.max(0, ...l.lines.map(textWidthPx)) * LABEL_SHARE + 4, height: l.lines.length * 9.4 + 2 })),
  ];
  const soft: Rect[] = [
    ...(g.cam ? [{ x: g.cam.x - 1.5, y: g.cam.top, width: 3, height: g.cam.bottom - g.cam.top }] : []),
    ...g.bars.map((b) => ({ x: b.x - 3, y: b.top - 1, width: 6, height: b.bottom - b.top + 2 })),
  ];
  const plates: Rect[] = [];
  const leaders: (readonly [PathPoint, PathPoint])[] = [];
  return g.losses.map((m): PaperPlate | null => {
    const width = (Math.ceil(textWidthPx(m.text)) + 12) * PLATE_SHARE;
    const leaderTo = (box: Rect): readonly [PathPoint, PathPoint] => {
      const end = nearest(box, m);
      const share = 3 / Math.max(3, distance(m, end));
      return [{ x: m.x + (end.x - m.x) * share, y: m.y + (end.y - m.y) * share }, end];
    };
    const meetsAny = (box: Rect, lines: readonly (readonly [PathPoint, PathPoint])[]) => lines.some(([p, q]) => segmentMeets(p, q, box));
    const isClear = (box: Rect): boolean =>
      !fixed.some((f) => overlaps(f, box)) && !plates.some((p) => overlaps(grown(p, 1.5), box)) && !meetsAny(grown(box, LINE_AIR_PT), curves) && !meetsAny(grown(box, 1), leaders)
      && !plates.some((p) => segmentMeets(...leaderTo(box), grown(p, 1)));
    const isRoomy = (box: Rect): boolean => {
      const [from, to] = leaderTo(box);
      return !soft.some((s) => overlaps(s, box)) && !meetsAny(grown(box, 0.6), noise) && !curves.some(([p, q]) => segmentsCross(from, to, p, q));
    };
    let found: { box: Rect; away: number } | null = null;
    for (const place of placesFor(m, width, g.plot)) {
      if (found && place.away > ROOMY_WITHIN_PT) break;
      if (!isClear(place.box)) continue;
      found ??= place;
      if (!isRoomy(place.box)) continue;
      found = place;
      break;
    }
    if (!found) return null;
    plates.push(found.box);
    const leader = leaderTo(found.box);
    if (found.away <= CLOSE_PT) return { ...found.box, leader: null };
    leaders.push(leader);
    return { ...found.box, leader: { x1: leader[0].x, y1: leader[0].y, x2: leader[1].x, y2: leader[1].y } };
  });
}

/** True when the two segments cross inside both. */
function segmentsCross(a: PathPoint, b: PathPoint, c: PathPoint, d: PathPoint): boolean {
  const side = (p: PathPoint, q: PathPoint, r: PathPoint) => Math.sign((q.x - p.x) * (r.y - p.y) - (q.y - p.y) * (r.x - p.x));
  return side(a, b, c) * side(a, b, d) < 0 && side(c, d, a) * side(c, d, b) < 0;
}
