import type { CanvasElement, Content } from "pdfmake/interfaces";
import { FACE, PAPER_INK } from "@/modules/documents/paper";
import type { CurveGeometry } from "../domain/curve-geometry";
import { hatchLines } from "../domain/hatch-lines";
import { paperPlates, type PaperPlate } from "../domain/paper-plates";
import { sampledPath } from "../domain/sampled-path";

const AREA: Record<string, string> = { "intake-gain": PAPER_INK.fluid, "exhaust-gain": "#EEF68C" };

const HATCH_PT = 3.4;

/** 1: before losses and noise were drawn. 2: plates at the ends of the screen's leaders. 3: plates placed for the paper.
 * 4: small points before as well, leaders to the labels, both axes named. */
export type DrawingKind = 1 | 2 | 3 | 4;

/** As on a paper of the second kind: the screen's plate at the size of the paper's type, kept at the end of its leader. */
function plateOfSecondKind({ x, y, plate, leader }: CurveGeometry["losses"][number]): PaperPlate | null {
  if (plate === null) return null;
  const [width, height] = [plate.width * 0.54, 12];
  return { x: plate.x > x ? plate.x : plate.x + plate.width - width, y: plate.y > y ? plate.y : plate.y + plate.height - height, width, height, leader };
}

/**
 * A flow curve as vectors and words for a paper, one pixel of the geometry to the point. Gains are filled; a loss is hatched
 * and plated as on the screen; the dotted band about before is the noise. Everything is placed from the drawing's top left.
 * @param kind of an issued paper, which is made again as it was.
 */
export function curveContent(drawing: CurveGeometry, kind: DrawingKind = 3): Content[] {
  const g: CurveGeometry = kind === 1 ? { ...drawing, areas: drawing.areas.filter((a) => a.kind === "gain"), bands: [], bars: [], losses: [] } : drawing;
  const plates = kind === 2 ? g.losses.map(plateOfSecondKind) : paperPlates(g);
  const drawn: CanvasElement[] = [];
  const line = (x1: number, y1: number, x2: number, y2: number, lineWidth: number, lineColor: string): CanvasElement => ({ type: "line", x1, y1, x2, y2, lineWidth, lineColor });
  for (const area of g.areas) {
    if (area.kind !== "gain") continue;
    for (const points of sampledPath(area.segments)) drawn.push({ type: "polyline", points, closePath: true, color: AREA[`${area.side}-gain`] ?? PAPER_INK.fluid, lineWidth: 0 });
  }
  // The paper's renderer moves the points it is given, so every shape gets points of its own.
  for (const area of g.areas) {
    if (area.kind !== "loss") continue;
    for (const points of sampledPath(area.segments)) {
      drawn.push(...hatchLines(points, HATCH_PT).map((h) => line(h.x1, h.y1, h.x2, h.y2, 0.75, PAPER_INK.ink)), { type: "polyline", points, closePath: true, lineWidth: 0.5, lineColor: PAPER_INK.ink });
    }
  }
  for (const band of g.bands) {
    for (const points of sampledPath(band.segments)) drawn.push({ type: "polyline", points, closePath: true, color: PAPER_INK.ink, fillOpacity: 0.1, lineWidth: 0.01, lineColor: PAPER_INK.line });
    for (const points of sampledPath(band.segments)) drawn.push({ type: "polyline", points, closePath: true, lineWidth: 0.6, lineColor: PAPER_INK.ink, dash: { length: 1, space: 1.8 } });
  }
  for (const b of g.bars) drawn.push(line(b.x, b.top, b.x, b.bottom, 0.7, PAPER_INK.ink), line(b.x - 2, b.top, b.x + 2, b.top, 0.7, PAPER_INK.ink), line(b.x - 2, b.bottom, b.x + 2, b.bottom, 0.7, PAPER_INK.ink));
  for (const t of g.flowTicks) if (t.flowCfm > 0) drawn.push(line(g.plot.left, t.y, g.plot.right, t.y, 0.5, PAPER_INK.line));
  for (const l of g.lines) {
    for (const points of sampledPath(l.segments)) {
      drawn.push({ type: "polyline", points, lineWidth: l.when === "after" ? 1.7 : 0.9, lineColor: l.when === "after" ? PAPER_INK.ink : PAPER_INK.edge, lineJoin: "round", ...(l.isDashed ? { dash: { length: l.when === "after" ? 4 : 3, space: 2.4 } } : {}) });
    }
  }
  // Dots of a long ladder would cover the line they stand on.
  const dot = kind === 4 && g.points.length / Math.max(1, g.lines.length) > 14 ? 1.3 : 1.9;
  for (const p of g.points) {
    if (p.when === "before") {
      if (kind === 4) drawn.push({ type: "ellipse", x: p.x, y: p.y, r1: 1.15, r2: 1.15, color: p.isFilled ? PAPER_INK.edge : "#FFFFFF", lineColor: PAPER_INK.edge, lineWidth: 0.6 });
      continue;
    }
    drawn.push({ type: "ellipse", x: p.x, y: p.y, r1: dot, r2: dot, color: p.isFilled ? PAPER_INK.ink : "#FFFFFF", lineColor: PAPER_INK.ink, lineWidth: 0.9 });
  }
  if (g.cam) drawn.push({ type: "line", x1: g.cam.x, y1: g.cam.top, x2: g.cam.x, y2: g.cam.bottom, lineWidth: 0.8, lineColor: PAPER_INK.ink, dash: { length: 1, space: 2 } });
  drawn.push(line(g.plot.left, g.plot.top, g.plot.left, g.plot.bottom, 0.9, PAPER_INK.ink), line(g.plot.left, g.plot.bottom, g.plot.right, g.plot.bottom, 0.9, PAPER_INK.ink));
  for (const t of g.liftTicks) drawn.push(line(t.x, g.plot.bottom, t.x, g.plot.bottom + (t.isLong ? 5.5 : 3), 0.7, PAPER_INK.ink));

  if (kind === 4) for (const { leader } of g.labels) if (leader) drawn.push(line(leader.x1, leader.y1, leader.x2, leader.y2, 0.6, PAPER_INK.edge));

  // The mark of a loss stands at its reading where no plate finds room; on older papers beside a plate too.
  for (const [i, m] of g.losses.entries()) {
    if (kind !== 4 || (plates[i] ?? null) === null) drawn.push({ type: "polyline", points: [{ x: m.x - 3.2, y: m.y + 3.6 }, { x: m.x + 3.2, y: m.y + 3.6 }, { x: m.x, y: m.y + 8.6 }], closePath: true, color: PAPER_INK.ink, lineWidth: 0 });
    const plate = plates[i];
    if (plate?.leader) drawn.push(line(plate.leader.x1, plate.leader.y1, plate.leader.x2, plate.leader.y2, 0.7, PAPER_INK.ink));
    if (plate) drawn.push({ type: "rect", x: plate.x, y: plate.y, w: plate.width, h: plate.height, color: PAPER_INK.ink, lineWidth: 0 });
  }

  const word = (text: string, x: number, y: number, more: object = {}): Content => ({ text, fontSize: 7.6, font: FACE.table, relativePosition: { x, y }, ...more });
  const boxed = (text: string, x: number, y: number, width: number, alignment: "right" | "center"): Content =>
    ({ columns: [{ text, width, alignment, fontSize: 7.6, font: FACE.table, color: PAPER_INK.soft }], relativePosition: { x, y } });
  return [
    ...g.flowTicks.map((t) => boxed(t.text, g.plot.left - 34, t.y - 4.6, 28, "right")),
    ...g.liftTicks.flatMap((t) => (t.text ? [boxed(t.text, t.x - 20, g.plot.bottom + 7, 40, "center")] : [])),
    ...g.labels.flatMap((l) => l.lines.map((text, i) => word(text, l.x, l.y - 8 + i * 9.4, i === 0 ? { bold: true } : { color: PAPER_INK.soft }))),
    ...(kind === 4 ? [...(g.flowTitle ? [word(g.flowTitle.text, g.flowTitle.x, g.flowTitle.y, { color: PAPER_INK.soft })] : []), ...(g.liftTitle ? [boxed(g.liftTitle.text, g.liftTitle.x - 90, g.liftTitle.y, 90, "right")] : [])] : []),
    ...(g.cam ? [boxed(g.cam.text, Math.min(g.cam.x - 40, g.widthPx - 80), g.cam.top - 10, 80, "center")] : []),
    { canvas: [...drawn, { type: "rect", x: 0, y: 0, w: g.widthPx, h: g.heightPx, lineWidth: 0, lineColor: "#FFFFFF", fillOpacity: 0 }] },
    // Words on plates come after the drawing, so they are counted from its foot.
    ...g.losses.flatMap((m, i): Content[] => {
      const plate = plates[i] ?? null;
      return plate === null ? [] : [{
        columns: [{ text: m.text, width: plate.width, alignment: "center", fontSize: kind === 4 ? 7.5 : 7, font: FACE.table, bold: true, color: "#FFFFFF" }], relativePosition: { x: plate.x, y: plate.y + (kind === 4 ? 1.3 : 1.6) - g.heightPx },
      }];
    }),
  ];
}
