import type { LiftUnit } from "./lift-ladder";

export interface PlotBox {
  readonly left: number;
  readonly right: number;
  readonly top: number;
  readonly bottom: number;
}
/** Data to pixels; both axes begin at zero. */
export interface CurveScale {
  readonly plot: PlotBox;
  readonly liftUmMax: number;
  readonly flowCfmMax: number;
  readonly x: (liftUm: number) => number;
  readonly y: (flowCfm: number) => number;
}
export interface LiftTick {
  readonly x: number;
  readonly liftUm: number;
  readonly isLong: boolean;
  readonly lengthPx: number;
  /** Absent on short ticks and where labels would crowd. */
  readonly text?: string;
}
export interface FlowTick {
  readonly y: number;
  readonly flowCfm: number;
  readonly text: string;
}
/** Writes a number for the reader's place. */
export type DecimalText = (value: number, digits: number) => string;

/** Short tick, long tick: .050 and .100 in; 1 and 2 mm. */
const TICK_UM: Readonly<Record<LiftUnit, number>> = { in: 1_270, mm: 1_000 };
const LABEL_PX_MIN = 34;

/** Lift as a scale shows it: `.350` in, `8.6` mm. */
export const scaleLiftText = (liftUm: number, unit: LiftUnit, decimalText: DecimalText): string =>
  unit === "in" ? decimalText(liftUm / 25_400, 3).replace(/^0(?=\D)/, "") : decimalText(liftUm / 1000, 1);

/** Scale that holds every lift and flow given; top of the flow axis leaves some air over the highest reading. */
export function curveScale(plot: PlotBox, liftsUm: readonly number[], flowsCfm: readonly number[]): CurveScale {
  const liftUmMax = Math.max(0, ...liftsUm) || 10_000;
  const flowCfmMax = (Math.max(0, ...flowsCfm) || 100) * 1.05;
  return {
    plot,
    liftUmMax,
    flowCfmMax,
    x: (liftUm) => plot.left + (liftUm / liftUmMax) * (plot.right - plot.left),
    y: (flowCfm) => plot.bottom - (flowCfm / flowCfmMax) * (plot.bottom - plot.top),
  };
}

export function liftTicks(scale: CurveScale, unit: LiftUnit, decimalText: DecimalText): LiftTick[] {
  const step = TICK_UM[unit];
  const longPx = scale.x(2 * step) - scale.x(0);
  const everyLong = Math.max(1, Math.ceil(LABEL_PX_MIN / longPx));
  return Array.from({ length: Math.floor(scale.liftUmMax / step + 1e-9) + 1 }, (_, i) => {
    const liftUm = i * step;
    const isLong = i % 2 === 0;
    const labelled = i > 0 && isLong && (i / 2) % everyLong === 0;
    return {
      x: scale.x(liftUm),
      liftUm,
      isLong,
      lengthPx: isLong ? 8 : 4,
      ...(labelled ? { text: scaleLiftText(liftUm, unit, decimalText) } : {}),
    };
  });
}

/** Steps of 1, 2 or 5 times a power of ten, and at most `most` of them above zero. Zero is always there. */
export function flowTicks(scale: CurveScale, most: number, decimalText: DecimalText): FlowTick[] {
  const power = 10 ** Math.floor(Math.log10(scale.flowCfmMax / most));
  const step = [1, 2, 5, 10, 20].map((m) => m * power).find((s) => scale.flowCfmMax / s <= most) ?? scale.flowCfmMax;
  const digits = step < 0.1 ? 2 : step < 1 ? 1 : 0;
  return Array.from({ length: Math.floor(scale.flowCfmMax / step + 1e-9) + 1 }, (_, i) => ({
    y: scale.y(i * step),
    flowCfm: i * step,
    text: decimalText(i * step, digits),
  }));
}
