"use client";
import { useState, type KeyboardEvent, type PointerEvent } from "react";
import { decimal } from "@/modules/kernel/format";
import type { CurveLine } from "../domain/curve-geometry";
import { gainAt } from "../domain/gain";
import { GainCurve, geometryOf, type GainCurveProps } from "./gain-curve";
import { differenceText, liftWords } from "./flow-words";

const SIDE_WORDS = { intake: "Intake", exhaust: "Exhaust" } as const;

function wordsAt(lines: readonly CurveLine[], liftUm: number, locale: string, digits: number): string {
  const text = (value: number) => decimal(value, digits, locale);
  return lines.flatMap((line) => {
    const before = line.before.find((r) => r.liftUm === liftUm);
    const after = line.after.find((r) => r.liftUm === liftUm);
    if (!before && !after) return [];
    const parts = [before && `${text(before.flowCfm)} before`, after && `${text(after.flowCfm)} after`].filter(Boolean).join(", ");
    const gain = before && after && line.gain === "shown" ? gainAt(before.flowCfm, after.flowCfm) : null;
    const margin = line.margins?.find((m) => m.liftUm === liftUm);
    return [`${SIDE_WORDS[line.side]} ${parts}${gain === null ? "" : `, ${gain < 0 ? "loss" : "gain"} ${differenceText(gain, locale, digits)}${margin === undefined ? "" : `, noise ±${text(margin.marginCfm)}${margin.byHistory ? " by bench history" : ""}`}`}`];
  }).join(". ");
}

/** A curve whose points are read with the pointer, or with the arrow keys once it has the focus. */
export function CurveReader(props: GainCurveProps & { label: string }) {
  const { lines, locale, unit, label, ...rest } = props;
  const lifts = [...new Set(lines.flatMap((l) => [...l.before, ...l.after]).map((r) => r.liftUm))].sort((a, b) => a - b);
  const [at, setAt] = useState<number | null>(null);
  const index = at === null ? -1 : lifts.indexOf(at);
  const move = (event: KeyboardEvent) => {
    const to = { ArrowRight: Math.min(index + 1, lifts.length - 1), ArrowUp: Math.min(index + 1, lifts.length - 1), ArrowLeft: Math.max(index - 1, 0), ArrowDown: Math.max(index - 1, 0), Home: 0, End: lifts.length - 1 }[event.key];
    if (event.key === "Escape") setAt(null);
    if (to === undefined || lifts[to] === undefined) return;
    event.preventDefault();
    setAt(lifts[to]);
  };
  const point = (event: PointerEvent<HTMLDivElement>) => {
    const g = geometryOf({ ...rest, lines, locale, unit });
    if (!g || lifts.length === 0) return;
    // The drawing may be smaller than its box where the height is short.
    const drawn = event.currentTarget.querySelector("svg")?.getScreenCTM();
    if (!drawn) return;
    const x = (event.clientX - drawn.e) / drawn.a;
    const near = g.points.reduce<{ liftUm: number; d: number } | null>((best, p) => { const d = Math.abs(p.x - x); return best && best.d <= d ? best : { liftUm: p.liftUm, d }; }, null);
    setAt(near && near.d < 40 ? near.liftUm : null);
  };
  const text = at === null ? "" : `${liftWords(at, unit, locale)}: ${wordsAt(lines, at, locale, props.measure?.digits ?? 1)}.`;
  return (
    <div className="curve-r">
      <div
        role="slider" tabIndex={0} aria-label={label} aria-valuemin={0} aria-valuemax={Math.max(0, lifts.length - 1)} aria-valuenow={Math.max(0, index)} aria-valuetext={text || "No point chosen"}
        onKeyDown={move} onPointerMove={point} onPointerLeave={() => setAt(null)} onBlur={() => setAt(null)}
      >
        <GainCurve {...rest} lines={lines} locale={locale} unit={unit} readAtUm={at} />
      </div>
      <p className={text === "" ? "curve-t idle noprint" : "curve-t"} aria-hidden="true">{text || "Point at the curve, or use the arrow keys, to read it."}</p>
    </div>
  );
}
