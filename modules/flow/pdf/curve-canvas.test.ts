import type { CanvasElement, Content } from "pdfmake/interfaces";
import { describe, expect, it } from "vitest";
import { PAPER_INK } from "@/modules/documents/paper";
import { valueOf } from "@/tests/support/value-of";
import { curveGeometry, type CurveGeometry, type CurveLine } from "../domain/curve-geometry";
import { curveContent, type DrawingKind } from "./curve-canvas";

/** Flows at 1 to 8 mm, or at as many as are given. */
const at = (flows: readonly number[]) => flows.map((flowCfm, i) => ({ liftUm: (i + 1) * 1000, flowCfm }));
const side = (name: "intake" | "exhaust", before: readonly number[], after: readonly number[], marginCfm?: number): CurveLine =>
  ({ side: name, before: at(before), after: at(after), gain: "shown", ...(marginCfm === undefined ? {} : { margins: at(before).map(({ liftUm }) => ({ liftUm, marginCfm })) }) });

const IN = [24, 48, 70, 90, 106, 117, 124, 127];
const EX = [21, 41, 58, 71, 81, 88, 92, 95];
const plus = (flows: readonly number[], by: readonly number[]) => flows.map((f, i) => f + (by[i] ?? 0));
/** Invented curves; what is lost and where is in their names. */
const CURVES: Record<string, CurveLine[]> = {
  "a loss at the lowest lift": [side("intake", IN, plus(IN, [-0.6, 2, 5, 8, 11, 13, 15, 16])), side("exhaust", EX, plus(EX, [1, 2, 4, 6, 7, 8, 9, 10]))],
  "a loss at the highest lift": [side("intake", IN, plus(IN, [1, 2, 5, 8, 8, 6, 2, -3])), side("exhaust", EX, plus(EX, [1, 2, 4, 6, 7, 8, 9, 10]))],
  "a loss at both ends of both sides": [side("intake", IN, plus(IN, [-1, 2, 5, 8, 8, 6, 2, -3])), side("exhaust", EX, plus(EX, [-0.6, 2, 4, 6, 7, 6, 3, -2]))],
  "a loss at every lift of one side": [side("intake", IN, plus(IN, [-1, -2, -2, -3, -3, -4, -4, -5])), side("exhaust", EX, plus(EX, [1, 2, 4, 6, 7, 8, 9, 10]))],
  "losses where the sides run close": [side("intake", IN, plus(IN, [1, 1, -2, -3, -2, 3, 5, 6])), side("exhaust", plus(IN, [-2, -4, -4, -5, -6, -6, -5, -4]), plus(IN, [-3, -5, -5, -4, -3, -2, -1, 0]))],
  "losses with the noise about before": [side("intake", IN, plus(IN, [-0.6, -1, 5, 8, 11, 13, 15, -2]), 1.4), side("exhaust", EX, plus(EX, [-0.4, 2, 4, 6, 7, 8, 9, -1]), 1.2)],
  "a single lift that lost": [side("exhaust", [21], [20]), side("intake", IN, plus(IN, [1, 2, 5, 8, 11, 13, 15, 16]))],
};
/** The sizes of the report: with and without a verdict. */
const SIZES = [[515, 170], [515, 190]] as const;
const DRAWINGS = Object.entries(CURVES).flatMap(([name, lines]) => SIZES.map(([widthPx, heightPx]) => ({
  name: `${name}, ${widthPx} by ${heightPx}`, g: valueOf(curveGeometry({ widthPx, heightPx, unit: "mm", atInH2O: 28, camLiftUm: 7600, lines })),
})));

interface Box { x: number; y: number; w: number; h: number }
const canvasOf = (content: readonly Content[]): CanvasElement[] => content.flatMap((c) => (typeof c === "object" && "canvas" in c ? (c.canvas ?? []).filter((e) => e !== undefined) : []));
/** The plates as they come out on the paper: filled boxes of ink. */
const platesOf = (g: CurveGeometry, kind: DrawingKind): Box[] => canvasOf(curveContent(g, kind)).flatMap((e) => (e.type === "rect" && e.color === PAPER_INK.ink ? [{ x: e.x, y: e.y, w: e.w, h: e.h }] : []));

/** Every curve walked in steps far finer than the drawing's own, by de Casteljau's construction. */
function walked(g: CurveGeometry): { x: number; y: number }[] {
  const between = (a: number, b: number, t: number) => a + (b - a) * t;
  return g.lines.flatMap(({ segments }) => {
    const out: { x: number; y: number }[] = [];
    let from = { x: 0, y: 0 };
    for (const s of segments) {
      if (s.kind === "close") continue;
      if (s.kind === "curve") {
        for (let i = 0; i <= 200; i++) {
          const t = i / 200;
          const cut = (a: number, b: number, c: number, d: number) => {
            const [p, q, r] = [between(a, b, t), between(b, c, t), between(c, d, t)];
            return between(between(p, q, t), between(q, r, t), t);
          };
          out.push({ x: cut(from.x, s.x1, s.x2, s.x), y: cut(from.y, s.y1, s.y2, s.y) });
        }
      }
      from = { x: s.x, y: s.y };
    }
    return out;
  });
}
const awayFrom = (b: Box, p: { x: number; y: number }): number => Math.hypot(Math.max(b.x - p.x, 0, p.x - b.x - b.w), Math.max(b.y - p.y, 0, p.y - b.y - b.h));
const doOverlap = (a: Box, b: Box): boolean => a.x < b.x + b.w && b.x < a.x + a.w && a.y < b.y + b.h && b.y < a.y + a.h;
/** Half the thickness of an after curve; radius of a dot with its rim. */
const [LINE, DOT] = [0.85, 2.35];

/** What the plates of a drawing touch, in words. */
function touched(g: CurveGeometry, plates: readonly Box[]): string[] {
  const curve = walked(g);
  return plates.flatMap((plate, i) => [
    ...(curve.some((p) => awayFrom(plate, p) <= LINE) ? ["curve"] : []),
    ...(g.points.some((p) => awayFrom(plate, p) <= DOT) ? ["reading"] : []),
    ...(plates.slice(i + 1).some((other) => doOverlap(plate, other)) ? ["plate"] : []),
    ...(plate.x < g.plot.left || plate.x + plate.w > g.plot.right || plate.y < g.plot.top || plate.y + plate.h > g.plot.bottom ? ["frame"] : []),
  ]);
}

describe("plates of losses on paper", () => {
  it.each(DRAWINGS)("touch no curve, reading or other plate: $name", ({ g }) => {
    const plates = platesOf(g, 3);
    expect(plates).toHaveLength(g.losses.length);
    expect(touched(g, plates)).toEqual([]);
  });
  it("did touch as they were placed before, which is kept for papers of that time", () => {
    expect(DRAWINGS.filter(({ g }) => touched(g, platesOf(g, 2)).length > 0 || platesOf(g, 2).length < g.losses.length).map((d) => d.name)).not.toEqual([]);
    for (const { g } of DRAWINGS) {
      expect(platesOf(g, 2).map((p) => [p.w, p.h])).toEqual(g.losses.flatMap((m) => (m.plate ? [[m.plate.width * 0.54, 12]] : [])));
      expect(platesOf(g, 1)).toEqual([]);
    }
  });
  it("keep their words: one for each plate, in the order of the lifts", () => {
    for (const { g } of DRAWINGS) {
      const words = JSON.stringify(curveContent(g, 3)).match(/▼ loss −[\d.]+/g);
      expect(words).toEqual(g.losses.map((m) => m.text));
    }
  });
  it("are left out in the small form, where the mark and the table carry the loss", () => {
    const g = valueOf(curveGeometry({ widthPx: 216, heightPx: 210, mini: true, unit: "mm", atInH2O: 28, camLiftUm: 7600, lines: CURVES["a loss at the lowest lift"] ?? [] }));
    expect(platesOf(g, 3)).toEqual([]);
    expect(g.losses).toHaveLength(1);
  });
});

describe("labels and titles on paper of the fourth kind", () => {
  const SETS: Record<string, CurveLine[]> = {
    ...CURVES,
    "all four ends close together": [side("intake", IN, plus(IN, [1, 2, 3, 3, 3, 2, 2, 1])), side("exhaust", plus(IN, [-2, -2, -3, -3, -3, -3, -2, -2]), plus(IN, [-1, -1, -1, -1, -1, -1, -1, -1]))],
    "exhaust over intake": [side("intake", EX, plus(EX, [1, 1, 1, 1, 1, 1, 1, 1])), side("exhaust", IN, plus(IN, [1, 2, 3, 4, 5, 6, 7, 8]))],
    "after below before at the end": [side("intake", IN, plus(IN, [1, 2, 3, 3, 3, 2, 0, -9]))],
  };
  const PAPER = Object.entries(SETS).flatMap(([name, lines]) => [{ widthPx: 519, heightPx: 172, mini: false }, { widthPx: 519, heightPx: 116, mini: false }, { widthPx: 216, heightPx: 190, mini: true }].map((size) => ({
    name: `${name}, ${size.widthPx} by ${size.heightPx}`, g: valueOf(curveGeometry({ ...size, paper: true, unit: "in", atInH2O: 28, camLiftUm: 7600, lines })),
  })));
  const endOf = (g: CurveGeometry, key: string) => g.points.filter((p) => `${p.side}-${p.when}` === key).reduce((last, p) => (p.x >= last.x ? p : last));

  it.each(PAPER)("stand in the order of their curves' ends, none over another: $name", ({ g }) => {
    const column = g.labels.filter((l) => l.x > g.plot.right).sort((a, b) => a.y - b.y);
    const ends = column.map((l) => endOf(g, l.key).y);
    expect(ends).toEqual([...ends].sort((a, b) => a - b));
    column.slice(1).forEach((l, i) => expect(l.y - (column[i]?.y ?? 0)).toBeGreaterThanOrEqual(9.6 * (column[i]?.lines.length ?? 1) - 1e-6));
  });
  it.each(PAPER)("are joined to their own curve's end wherever they stand off it: $name", ({ g }) => {
    for (const label of g.labels) {
      const end = endOf(g, label.key);
      if (!label.leader) {
        // In the column at the height of its end; inside the plot just over it.
        expect(Math.abs(label.y - 4 - end.y)).toBeLessThanOrEqual(label.x > g.plot.right ? 1.5 : 12);
        continue;
      }
      expect(Math.hypot(label.leader.x1 - end.x, label.leader.y1 - end.y)).toBeLessThanOrEqual(5);
      expect([label.leader.x2, label.leader.y2]).toEqual([label.x - 3, label.y - 4]);
    }
    // In one column no two leaders cross: both ends are in the same order.
    const leaders = g.labels.flatMap((l) => (l.x > g.plot.right && l.leader && endOf(g, l.key).x === g.plot.right ? [l.leader] : [])).sort((a, b) => a.y1 - b.y1);
    expect(leaders.map((l) => l.y2)).toEqual(leaders.map((l) => l.y2).sort((a, b) => a - b));
    const drawn = canvasOf(curveContent(g, 4)).filter((e) => e.type === "line" && g.labels.some((l) => l.leader?.x1 === e.x1 && l.leader.y2 === e.y2));
    expect(drawn).toHaveLength(g.labels.filter((l) => l.leader).length);
  });
  it.each(PAPER)("name both axes clear of the cam's words: $name", ({ g }) => {
    const text = JSON.stringify(curveContent(g, 4));
    expect(text).toContain("CFM at 28 in H₂O");
    expect(text).toContain("Valve lift, in");
    // Type of 7.6 points is under 10 points high; the cam's words stand 10 over the line's top.
    expect((g.cam?.top ?? 0) - 10 - (g.flowTitle?.y ?? 0)).toBeGreaterThanOrEqual(10);
    expect(JSON.stringify(curveContent(g, 3))).not.toContain("Valve lift");
  });
  it("mark a loss with a triangle only where no plate stands, and every reading with a point", () => {
    const triangles = (g: CurveGeometry, kind: DrawingKind) => canvasOf(curveContent(g, kind)).filter((e) => e.type === "polyline" && e.points.length === 3 && e.color === PAPER_INK.ink).length;
    for (const { g } of PAPER) {
      expect(triangles(g, 4) + platesOf(g, 4).length).toBe(g.losses.length);
      expect(triangles(g, 3)).toBe(g.losses.length);
      expect(canvasOf(curveContent(g, 4)).filter((e) => e.type === "ellipse")).toHaveLength(g.points.length);
    }
  });
});
