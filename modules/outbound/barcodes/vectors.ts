import type { Bars, Matrix } from "./encode";

/** A filled rectangle, in points from the top left of the drawing. Fits pdfmake's `canvas`. */
export interface Rect {
  readonly type: "rect";
  readonly x: number;
  readonly y: number;
  readonly w: number;
  readonly h: number;
  readonly color: string;
}

const rect = (x: number, y: number, w: number, h: number, color: string): Rect => ({ type: "rect", x, y, w, h, color });

/** Quiet zone of a QR code in modules (ISO/IEC 18004) and of Code 128 (ISO/IEC 15417). */
const QR_QUIET = 4;
const CODE128_QUIET = 10;

/**
 * A QR code as rectangles, `sidePt` wide with its quiet zone. Runs of dark modules in a row become one
 * rectangle, so that no hairline shows between them.
 */
export function qrRects(matrix: Matrix, sidePt: number, color = "#000000"): Rect[] {
  const unit = sidePt / (matrix.size + 2 * QR_QUIET);
  const rects: Rect[] = [];
  for (let row = 0; row < matrix.size; row += 1) {
    for (let from = 0; from < matrix.size; from += 1) {
      if (!matrix.dark[row * matrix.size + from]) continue;
      let to = from;
      while (to < matrix.size && matrix.dark[row * matrix.size + to]) to += 1;
      rects.push(rect((from + QR_QUIET) * unit, (row + QR_QUIET) * unit, (to - from) * unit, unit, color));
      from = to;
    }
  }
  return rects;
}

/** Code 128 as rectangles, `widthPt` wide with its quiet zones and `heightPt` high. */
export function code128Rects(bars: Bars, widthPt: number, heightPt: number, color = "#000000"): Rect[] {
  const unit = widthPt / (bars.modules + 2 * CODE128_QUIET);
  const rects: Rect[] = [];
  let at = CODE128_QUIET;
  bars.widths.forEach((width, i) => {
    if (i % 2 === 0) rects.push(rect(at * unit, 0, width * unit, heightPt, color));
    at += width;
  });
  return rects;
}
