import { ok, type Result } from "@/modules/kernel/result";
import type { PortSide } from "./comparison-reasons";
import { curveScale, flowTicks, liftTicks, scaleLiftText, type DecimalText, type FlowTick, type LiftTick, type PlotBox } from "./curve-scale";
import { flowMeasure, type CurveMeasure } from "./curve-measure";
import { curveDescription } from "./curve-description";
import { curveSegments, drawnCurve, type DrawnCurve } from "./drawn-curve";
import { refuseFlow, refuseNotFinite } from "./flow-refusal";
import { areasBetween } from "./gain-area";
import type { LiftUnit } from "./lift-ladder";
import { endLabels, textWidthPx, type EndLabel, type LabelRoom, type LineEnd } from "./line-end-labels";
import { lossMarkers, type LossMarker } from "./loss-markers";
import { noiseBand, type LiftMargin, type MarginBar } from "./noise-band";
import { pathText, type Segment } from "./path-segments";
import type { LiftReading } from "./repeats";

export type When = "before" | "after";

/** Both tests of one side. An empty list = not read yet; lists of different length are drawn as far as they go. */
export interface CurveLine {
  readonly side: PortSide;
  readonly before: readonly LiftReading[];
  readonly after: readonly LiftReading[];
  /** `withheld` when the sets are not comparable: curves stand, no area and no loss mark is made. */
  readonly gain: "shown" | "withheld";
  /** What a change must exceed at the lifts that were judged against the noise; drawn as a band about before. */
  readonly margins?: readonly LiftMargin[];
}
export interface CurveGeometryInput {
  readonly widthPx: number;
  readonly heightPx: number;
  /** Fewer ticks, larger type in proportion, no plates. Default: narrower than 480 px. */
  readonly mini?: boolean;
  readonly unit: LiftUnit;
  readonly atInH2O: number;
  readonly camLiftUm: number | null;
  readonly lines: readonly CurveLine[];
  readonly decimalText?: DecimalText;
  /** Default: flow as read. The figures of `lines` are then of this measure. */
  readonly measure?: CurveMeasure;
  /** Drawn for a paper: small type, labels close by with leaders, both axes named in the mini form too. */
  readonly paper?: boolean;
  readonly labels?: LabelRoom;
}

export interface DrawnLine {
  readonly side: PortSide;
  readonly when: When;
  /** Exhaust. */
  readonly isDashed: boolean;
  /** Before is thin, after is thick. */
  readonly widthPx: number;
  readonly path: string;
  readonly segments: readonly Segment[];
}
export interface DrawnArea {
  readonly side: PortSide;
  readonly kind: "gain" | "loss";
  readonly path: string;
  readonly segments: readonly Segment[];
}
/** Inside it a change cannot be told from nothing. */
export interface DrawnBand {
  readonly side: PortSide;
  readonly path: string;
  readonly segments: readonly Segment[];
}
export interface DrawnBar extends MarginBar {
  readonly side: PortSide;
}
export interface DrawnPoint {
  readonly side: PortSide;
  readonly when: When;
  readonly liftUm: number;
  readonly flowCfm: number;
  readonly x: number;
  readonly y: number;
  readonly radiusPx: number;
  /** Intake filled, exhaust open. */
  readonly isFilled: boolean;
}
export interface CamMark {
  readonly x: number;
  readonly top: number;
  readonly bottom: number;
  readonly text: string;
  /** Null in the mini form. */
  readonly plate: { readonly path: string; readonly segments: readonly Segment[]; readonly textX: number; readonly textY: number } | null;
}
export interface CurveGeometry {
  readonly widthPx: number;
  readonly heightPx: number;
  readonly mini: boolean;
  readonly plot: PlotBox;
  readonly liftTicks: readonly LiftTick[];
  readonly flowTicks: readonly FlowTick[];
  readonly flowTitle: { readonly text: string; readonly x: number; readonly y: number; readonly anchor: "start" | "end" } | null;
  readonly liftTitle: { readonly text: string; readonly x: number; readonly y: number; readonly anchor: "end" } | null;
  readonly areas: readonly DrawnArea[];
  readonly bands: readonly DrawnBand[];
  readonly bars: readonly DrawnBar[];
  readonly lines: readonly DrawnLine[];
  readonly points: readonly DrawnPoint[];
  readonly cam: CamMark | null;
  readonly labels: readonly EndLabel[];
  readonly losses: readonly LossMarker<PortSide>[];
  /** Text alternative with the key readings. */
  readonly description: string;
}

const WIDTH_PX: Readonly<Record<When, number>> = { before: 1.6, after: 2.6 };
const MINI_BELOW_PX = 480;
/** Above the plot on paper: the axis title, the words of the cam line. */
const PAPER_TOP_PX = 27;
/** Type of 7.6 points: lines stand closer, and every label that left its line's end says whose it is. */
const PAPER_LABELS: LabelRoom = { gapPx: 9.6, columnPx: 17, leaderBeyondPx: 1.5 };
const SIDE_WORDS: Readonly<Record<PortSide, string>> = { intake: "Intake", exhaust: "Exhaust" };

interface ReadyLine {
  readonly side: PortSide;
  readonly gain: CurveLine["gain"];
  readonly margins: readonly LiftMargin[];
  readonly before: DrawnCurve;
  readonly after: DrawnCurve;
}

function camMark(liftUm: number, x: number, plot: PlotBox, widthPx: number, mini: boolean, text: string): CamMark {
  const half = Math.ceil(textWidthPx(text) / 2) + 4;
  // The plate stays in the box; its point stays on the line.
  const centre = Math.min(Math.max(x, half + 1), widthPx - half - 1);
  const top = plot.top - 30;
  const foot = top + 20;
  const at = (dx: number, y: number): Segment => ({ kind: "line", x: dx, y });
  const segments: Segment[] = [
    { kind: "move", x: centre - half, y: top },
    at(centre + half, top),
    at(centre + half, foot),
    at(x + 6, foot),
    at(x, foot + 7),
    at(x - 6, foot),
    at(centre - half, foot),
    { kind: "close" },
  ];
  const plate = mini ? null : { path: pathText(segments), segments, textX: centre, textY: top + 14 };
  return { x, top: plot.top - 4, bottom: plot.bottom, text, plate };
}

function lineEnds(lines: readonly ReadyLine[], x: (um: number) => number, y: (cfm: number) => number, mini: boolean): LineEnd[] {
  return lines.flatMap((line) =>
    (["after", "before"] as const).flatMap((when) => {
      const last = line[when].readings.at(-1);
      // The mini form names the line that counts and leaves the other to its weight.
      if (!last || (mini && when === "before" && line.after.readings.length > 0)) return [];
      const words = SIDE_WORDS[line.side];
      return [{ key: `${line.side}-${when}`, lines: mini ? [words, when] : [`${words} ${when}`], x: x(last.liftUm), y: y(last.flowCfm) }];
    }),
  );
}

/**
 * Everything a flow curve needs to be drawn, as plain numbers: the same geometry feeds the screen and the paper.
 * Intake solid, exhaust dashed; before thin, after thick; both axes from zero; a monotone cubic through every reading.
 * Errors: GEOMETRY_INVALID (a box too small to draw in), LIFTS_NOT_INCREASING (a lift twice), NUMBER_NOT_FINITE, READING_OUT_OF_RANGE.
 */
export function curveGeometry(input: CurveGeometryInput): Result<CurveGeometry> {
  const { widthPx, heightPx, unit, atInH2O, camLiftUm, lines } = input;
  const decimalText: DecimalText = input.decimalText ?? ((value, digits) => value.toFixed(digits));
  const all = lines.flatMap((l) => [...l.before, ...l.after]);
  const bad = refuseNotFinite({ widthPx, heightPx, lifts: all.map((r) => r.liftUm), flowsCfm: all.map((r) => r.flowCfm), camLiftUm: camLiftUm ?? undefined, marginsCfm: lines.flatMap((l) => (l.margins ?? []).map((m) => m.marginCfm)) });
  if (bad) return bad;
  if (all.some((r) => r.liftUm < 0 || r.flowCfm < 0) || lines.some((l) => l.margins?.some((m) => m.marginCfm < 0))) return refuseFlow("READING_OUT_OF_RANGE", "lines", { min: 0 });
  const mini = input.mini ?? widthPx < MINI_BELOW_PX;
  const paper = input.paper ?? false;
  const measure = input.measure ?? flowMeasure("read", `${atInH2O} in H₂O`);
  const plot: PlotBox = paper
    ? { left: 34, right: widthPx - (mini ? 56 : 76), top: PAPER_TOP_PX, bottom: heightPx - 28 }
    : mini
    ? { left: 34, right: widthPx - 78, top: 14, bottom: heightPx - 26 }
    : { left: 46, right: widthPx - 116, top: 36, bottom: heightPx - 46 };
  if (plot.right - plot.left < 60 || plot.bottom - plot.top < 60) return refuseFlow("GEOMETRY_INVALID", "widthPx");

  const ready: ReadyLine[] = [];
  for (const line of lines) {
    const before = drawnCurve(line.before, measure.fromZero);
    if (!before.ok) return before;
    const after = drawnCurve(line.after, measure.fromZero);
    if (!after.ok) return after;
    ready.push({ side: line.side, gain: line.gain, margins: line.gain === "shown" ? (line.margins ?? []) : [], before: before.value, after: after.value });
  }
  const bandTops = ready.flatMap((l) => l.before.readings.map((r) => r.flowCfm + (l.margins.find((m) => m.liftUm === r.liftUm)?.marginCfm ?? 0)));
  const scale = curveScale(plot, [...all.map((r) => r.liftUm), camLiftUm ?? 0], [...all.map((r) => r.flowCfm), ...bandTops]);
  const bands = ready.map((l) => ({ side: l.side, ...noiseBand(l.before, l.margins, scale) }));
  const labels = endLabels(lineEnds(ready, scale.x, scale.y, mini), plot, paper ? PAPER_LABELS : input.labels);
  const shown = ready.filter((l) => l.gain === "shown");
  const camText = camLiftUm === null ? "" : `Cam lift ${scaleLiftText(camLiftUm, unit, decimalText)}`;
  const cam = camLiftUm === null ? null : camMark(camLiftUm, scale.x(camLiftUm), plot, widthPx, mini, camText);
  const flowTitle = measure.axis;
  const titleHitsPlate = cam?.plate != null && cam.plate.textX - textWidthPx(camText) / 2 - 8 < plot.left + textWidthPx(flowTitle);

  return ok({
    widthPx,
    heightPx,
    mini,
    plot,
    liftTicks: liftTicks(scale, unit, decimalText),
    flowTicks: flowTicks(scale, mini ? 4 : 8, decimalText),
    // On paper the title stands over the words of the cam line, so neither can cover the other.
    flowTitle: paper ? { text: flowTitle, x: 0, y: plot.top - 25, anchor: "start" } : mini ? null : { text: flowTitle, x: titleHitsPlate ? widthPx - 4 : plot.left, y: plot.top - 16, anchor: titleHitsPlate ? "end" : "start" },
    liftTitle: paper ? { text: `Valve lift, ${unit}`, x: plot.right, y: plot.bottom + 17, anchor: "end" } : mini ? null : { text: `Valve lift, ${unit}`, x: plot.right, y: heightPx - 4, anchor: "end" },
    areas: shown.flatMap((l) =>
      areasBetween(l.before, l.after, scale).map(({ kind, segments }) => ({ side: l.side, kind, path: pathText(segments), segments })),
    ),
    bands: bands.flatMap(({ side, outlines }) => outlines.map((segments) => ({ side, path: pathText(segments), segments }))),
    bars: bands.flatMap(({ side, bars }) => bars.map((bar) => ({ ...bar, side }))),
    lines: ready.flatMap((l) =>
      (["before", "after"] as const).flatMap((when) => {
        const segments = curveSegments(l[when], scale);
        if (segments.length === 0) return [];
        return [{ side: l.side, when, isDashed: l.side === "exhaust", widthPx: WIDTH_PX[when], path: pathText(segments), segments }];
      }),
    ),
    points: ready.flatMap((l) =>
      (["before", "after"] as const).flatMap((when) =>
        l[when].readings.map((r) => ({
          side: l.side,
          when,
          ...r,
          x: scale.x(r.liftUm),
          y: scale.y(r.flowCfm),
          radiusPx: when === "before" ? 2 : mini ? 2.4 : 3.4,
          isFilled: l.side === "intake",
        })),
      ),
    ),
    cam,
    labels,
    losses: lossMarkers({
      pairs: shown,
      curves: ready.flatMap((l) => [l.before, l.after]),
      taken: labels.map((l) => l.box),
      scale,
      withPlates: !mini,
      decimalText,
    }),
    description: curveDescription(lines, unit, camLiftUm, decimalText, measure),
  });
}
