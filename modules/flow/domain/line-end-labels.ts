import type { PlotBox } from "./curve-scale";
import { spreadApart, type Rect } from "./label-placement";

export interface LineEnd {
  readonly key: string;
  /** One entry a line of text. */
  readonly lines: readonly string[];
  readonly x: number;
  readonly y: number;
}
export interface EndLabel {
  readonly key: string;
  readonly lines: readonly string[];
  /** Baseline of the first line, left-aligned. */
  readonly x: number;
  readonly y: number;
  readonly box: Rect;
  /** From the line's end to the label, when the label had to move away from it. */
  readonly leader: { readonly x1: number; readonly y1: number; readonly x2: number; readonly y2: number } | null;
}

/** Text of 13 px in the condensed face; a little wide, so that boxes never come out too small. */
const CHAR_PX = 7.2;
const LINE_PX = 15;
const ASCENT_PX = 11;

export const textWidthPx = (text: string): number => text.length * CHAR_PX;

export interface LabelRoom {
  /** Between the first lines of two labels. */
  readonly gapPx?: number;
  /** Between the plot and the column of labels. */
  readonly columnPx?: number;
  /** A label that stands further from its line's end than this has a leader. */
  readonly leaderBeyondPx?: number;
}

/**
 * Labels at the ends of the lines, none over another. A line that stops early keeps its label beside its end when there
 * is room; all others stand in the column right of the plot.
 */
export function endLabels(ends: readonly LineEnd[], plot: PlotBox, { gapPx = LINE_PX, columnPx = 10, leaderBeyondPx = 8 }: LabelRoom = {}): EndLabel[] {
  const columnX = plot.right + columnPx;
  const width = (e: LineEnd) => Math.max(0, ...e.lines.map(textWidthPx));
  const isInner = (e: LineEnd) => e.x + 13 + width(e) < plot.right - 4;
  const place = (group: readonly LineEnd[], xOf: (e: LineEnd) => number, dy: number): EndLabel[] => {
    const tallest = Math.max(1, ...group.map((e) => e.lines.length));
    const gap = tallest * gapPx;
    const ys = spreadApart(
      group.map((e) => e.y + dy),
      gap,
      plot.top + ASCENT_PX,
      plot.bottom - (tallest - 1) * LINE_PX,
    );
    return group.map((e, i) => {
      const x = xOf(e);
      const y = ys[i] ?? e.y;
      const moved = Math.abs(y - dy - e.y) > leaderBeyondPx || x - e.x > Math.max(16, columnPx);
      return {
        key: e.key,
        lines: e.lines,
        x,
        y,
        box: { x, y: y - ASCENT_PX, width: width(e), height: e.lines.length * LINE_PX - 1 },
        leader: moved ? { x1: e.x + 5, y1: e.y, x2: x - 3, y2: y - 4 } : null,
      };
    });
  };
  // Inside the plot a label stands a little above its end, out of the way of a curve that goes on.
  return [...place(ends.filter(isInner), (e) => e.x + 13, -8), ...place(ends.filter((e) => !isInner(e)), () => columnX, 4)];
}
