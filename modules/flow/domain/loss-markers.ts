import type { CurveScale, DecimalText } from "./curve-scale";
import type { DrawnCurve } from "./drawn-curve";
import { gainAt } from "./gain";
import { firstClear, overlaps, type Rect } from "./label-placement";
import { textWidthPx } from "./line-end-labels";

export interface LossMarker<S extends string = string> {
  readonly side: S;
  readonly liftUm: number;
  /** Negative. */
  readonly gainCfm: number;
  /** The after reading. */
  readonly x: number;
  readonly y: number;
  readonly text: string;
  /** Plate in ink with the text centred; null in the mini form, where the mark alone stands. */
  readonly plate: (Rect & { readonly textX: number; readonly textY: number }) | null;
  readonly leader: { readonly x1: number; readonly y1: number; readonly x2: number; readonly y2: number } | null;
}

const PLATE_HEIGHT_PX = 21;

/** `▼ loss −0.6`, with a true minus sign. */
export const lossText = (gainCfm: number, decimalText: DecimalText): string => `▼ loss −${decimalText(Math.abs(gainCfm), 1)}`;

function candidatesFor(x: number, y: number, width: number): Rect[] {
  const rows = [14, 36, 58, 80, 102, -35, -57, -79, -101];
  const columns = [18, 44, 80, 120, -width - 18];
  return columns.flatMap((dx) => rows.map((dy) => ({ x: x + dx, y: y + dy, width, height: PLATE_HEIGHT_PX })));
}

/** True when no curve runs through the box, with some air around it. */
function offCurves(box: Rect, curves: readonly DrawnCurve[], scale: CurveScale): boolean {
  const perPx = scale.liftUmMax / (scale.plot.right - scale.plot.left);
  const lifts = Array.from({ length: 9 }, (_, i) => (box.x + (box.width * i) / 8 - scale.plot.left) * perPx);
  return curves.every(({ curve, readings }) =>
    lifts.every((lift) => {
      const knot = lift >= (readings[0]?.liftUm ?? Infinity) ? curve?.knotAt(lift) : null;
      if (!knot) return true;
      const y = scale.y(knot.flowCfm);
      return y < box.y - 4 || y > box.y + box.height + 4;
    }),
  );
}

/**
 * A mark for every lift that lost, shown as plainly as a gain. Plates keep off each other, the labels and, where the plot
 * has room, the curves.
 */
export function lossMarkers<S extends string>(input: {
  readonly pairs: readonly { readonly side: S; readonly before: DrawnCurve; readonly after: DrawnCurve }[];
  readonly curves: readonly DrawnCurve[];
  readonly taken: readonly Rect[];
  readonly scale: CurveScale;
  readonly withPlates: boolean;
  readonly decimalText: DecimalText;
}): LossMarker<S>[] {
  const { pairs, curves, taken, scale, withPlates, decimalText } = input;
  const { plot } = scale;
  const inside = { x: plot.left + 2, y: plot.top, width: plot.right - plot.left - 2, height: plot.bottom - plot.top - 3 };
  const used: Rect[] = [...taken];
  return pairs.flatMap(({ side, before, after }) =>
    after.readings.flatMap((reading): LossMarker<S>[] => {
      const was = before.readings.find((r) => r.liftUm === reading.liftUm);
      const gainCfm = was ? gainAt(was.flowCfm, reading.flowCfm) : 0;
      if (gainCfm >= 0) return [];
      const x = scale.x(reading.liftUm);
      const y = scale.y(reading.flowCfm);
      const text = lossText(gainCfm, decimalText);
      const marker = { side, liftUm: reading.liftUm, gainCfm, x, y, text };
      if (!withPlates) return [{ ...marker, plate: null, leader: null }];
      const candidates = candidatesFor(x, y, Math.ceil(textWidthPx(text)) + 12);
      const free = (box: Rect) => used.every((u) => !overlaps(u, box));
      const box = firstClear(candidates, inside, (c) => free(c) && offCurves(c, curves, scale)) ?? firstClear(candidates, inside, free);
      // No room left: the mark and the table carry the loss.
      if (!box) return [{ ...marker, plate: null, leader: null }];
      used.push(box);
      const isRight = box.x > x;
      const isBelow = box.y > y;
      return [
        {
          ...marker,
          plate: { ...box, textX: box.x + box.width / 2, textY: box.y + 15 },
          leader: {
            x1: x + (isRight ? 4 : -4),
            y1: y + (isBelow ? 4 : -4),
            x2: isRight ? box.x : box.x + box.width,
            y2: isBelow ? box.y + 2 : box.y + box.height - 2,
          },
        },
      ];
    }),
  );
}
