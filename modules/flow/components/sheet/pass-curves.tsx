"use client";
import { useState } from "react";
import { dateTime, decimal } from "@/modules/kernel/format";
import { ToggleChip } from "@/modules/ui/chip";
import type { PlaceFacts } from "@/modules/ui/place";
import type { PortSide } from "../../domain/comparison-reasons";
import { curveScale, flowTicks, liftTicks, type PlotBox } from "../../domain/curve-scale";
import { curveSegments, drawnCurve } from "../../domain/drawn-curve";
import type { LiftUnit } from "../../domain/lift-ladder";
import { endLabels } from "../../domain/line-end-labels";
import { markPath, passLines, passScale, type PassLine } from "../../domain/pass-lines";
import { pathText, px } from "../../domain/path-segments";
import type { RawTest } from "../../domain/raw-test";
import { flowText, liftWords } from "../flow-words";
import { Lane } from "@/modules/ui/lane";

const SIDE_WORDS = { intake: "Intake", exhaust: "Exhaust" } as const;

/** The passes as lines: each has its own stroke, its own point and its name at the end. Both axes begin at zero. */
export function PassChart({ lines, unit, atInH2O, camLiftUm, locale, title, width, height }: {
  lines: readonly PassLine[]; unit: LiftUnit; atInH2O: number; camLiftUm: number | null; locale: string; title: string; width: number; height: number;
}) {
  const isSmall = width < 480;
  const plot: PlotBox = { left: isSmall ? 34 : 46, right: width - (isSmall ? 88 : 116), top: 30, bottom: height - 42 };
  const text = (v: number, d: number) => decimal(v, d, locale);
  const all = lines.flatMap((l) => l.readings);
  const scale = curveScale(plot, [...all.map((r) => r.liftUm), camLiftUm ?? 0], all.map((r) => r.flowCfm));
  const drawn = lines.flatMap((line) => { const made = drawnCurve(line.readings); return made.ok ? [{ line, path: pathText(curveSegments(made.value, scale)), last: made.value.readings.at(-1) }] : []; });
  const labels = endLabels(drawn.flatMap(({ line, last }) => (last ? [{ key: line.testId, lines: [line.name], x: scale.x(last.liftUm), y: scale.y(last.flowCfm) }] : [])), plot);
  const words = lines.map((l) => { const last = l.readings.at(-1); return `${l.name}: ${l.readings.length} lifts${last ? `, ${flowText(last.flowCfm, locale)} CFM at ${liftWords(last.liftUm, unit, locale)} ${unit}` : ""}`; }).join("; ");
  return (
    <svg className="ch" viewBox={`0 0 ${width} ${height}`} role="img" aria-label={`${title}. ${words}.`}>
      {flowTicks(scale, isSmall ? 5 : 8, text).map((t) => (
        <g key={t.flowCfm}>{t.flowCfm === 0 ? null : <path className="gr" d={`M${plot.left} ${t.y}H${plot.right}`} />}<text x={plot.left - 8} y={t.y + 4} textAnchor="end">{t.text}</text></g>
      ))}
      {liftTicks(scale, unit, text).map((t) => (
        <g key={t.liftUm}><path className="tk" d={`M${t.x} ${plot.bottom}v${t.lengthPx}`} />{t.text === undefined ? null : <text x={t.x} y={plot.bottom + 22} textAnchor="middle">{t.text}</text>}</g>
      ))}
      <path className="ax" d={`M${plot.left} ${plot.top - 6}V${plot.bottom}H${plot.right}`} />
      {camLiftUm === null ? null : <g><path className="cam" d={`M${scale.x(camLiftUm)} ${plot.top - 4}V${plot.bottom}`} /><text x={scale.x(camLiftUm)} y={plot.top - 8} textAnchor="middle">Cam lift {liftWords(camLiftUm, unit, locale)}</text></g>}
      {drawn.map(({ line, path }, i) => (
        <g key={line.testId} data-pass={line.name}>
          <path d={path} fill="none" stroke="var(--ink)" strokeWidth={i === drawn.length - 1 ? 2.6 : 1.5} {...(line.dash === "" ? {} : { strokeDasharray: line.dash })} />
          {line.readings.map((r) => <path key={r.liftUm} d={markPath(line.mark, px(scale.x(r.liftUm)), px(scale.y(r.flowCfm)), 3.4)} fill="var(--panel)" stroke="var(--ink)" strokeWidth={1.4} />)}
        </g>
      ))}
      {labels.map((l) => l.lines.map((name) => <text key={l.key} className="lab" x={l.x} y={l.y}>{name}</text>))}
      {isSmall ? null : <text className="eng" x={plot.left} y={12}>{`CFM AT ${atInH2O} IN H₂O`}</text>}
      {isSmall ? null : <text className="eng" x={plot.right} y={height - 2} textAnchor="end">{`VALVE LIFT, ${unit.toUpperCase()}`}</text>}
    </svg>
  );
}

/** The figures behind the lines, lift by lift, each head with the point of its line. */
export function PassTable({ lines, unit, place, title }: { lines: readonly PassLine[]; unit: LiftUnit; place: Pick<PlaceFacts, "locale" | "zone">; title: string }) {
  const lifts = [...new Set(lines.flatMap((l) => l.readings).map((r) => r.liftUm))].sort((a, b) => a - b);
  return (
    <Lane label={title}><table className="calm">
      <caption className="sr-only">{title}</caption>
      <thead>
        <tr>
          <th scope="col">Lift, {unit}</th>
          {lines.map((l) => (
            <th key={l.testId} scope="col" className="r" title={`${dateTime(l.takenAt, place)}, ${l.operator}`}>
              <svg aria-hidden="true" width="12" height="12" viewBox="0 0 12 12" style={{ display: "inline" }}><path d={markPath(l.mark, 6, 6, 3.6)} fill="none" stroke="currentColor" strokeWidth="1.4" /></svg> {l.name}
            </th>
          ))}
        </tr>
      </thead>
      <tbody>
        {lifts.map((um) => (
          <tr key={um}>
            <th scope="row" className="border-b border-line align-middle normal-case tracking-normal text-ink">{liftWords(um, unit, place.locale)}</th>
            {lines.map((l) => { const r = l.readings.find((x) => x.liftUm === um); return <td key={l.testId} className="r q">{r ? flowText(r.flowCfm, place.locale) : "—"}</td>; })}
          </tr>
        ))}
      </tbody>
    </table></Lane>
  );
}

/** Sides that were run more than twice over, so that there is more to see than before and after. */
export const sidesWithPasses = (tests: readonly RawTest[]): PortSide[] =>
  (["intake", "exhaust"] as const).filter((side) => passLines(tests, side).some((l) => l.name.startsWith("Pass")) && passLines(tests, side).length > 1);

/** Every pass of a port while it is worked, over each other, with the table of the same figures. */
export function PassCurves({ tests, place, sides }: { tests: readonly RawTest[]; place: Pick<PlaceFacts, "locale" | "zone">; sides: readonly PortSide[] }) {
  const [chosen, setSide] = useState<PortSide>(sides[0] ?? "intake");
  const side = sides.includes(chosen) ? chosen : (sides[0] ?? "intake");
  const lines = passLines(tests, side);
  const scale = passScale(tests, lines);
  const cam = tests.find((t) => t.side === side && t.camLiftUm !== null)?.camLiftUm ?? null;
  const title = `Every pass, ${side}`;
  return (
    <>
      {sides.length > 1 ? <div role="group" aria-label="Side" className="mb-2 flex gap-1">{sides.map((s) => <ToggleChip key={s} on={s === side} onChange={() => setSide(s)}>{SIDE_WORDS[s]}</ToggleChip>)}</div> : null}
      {scale === null ? <p className="hint">These passes are stated at different test pressures and do not stand on one scale; the table has them.</p> : (
        <>
          <div className="only-wide"><PassChart lines={lines} {...scale} camLiftUm={cam} locale={place.locale} title={title} width={560} height={366} /></div>
          <div className="only-narrow"><PassChart lines={lines} {...scale} camLiftUm={cam} locale={place.locale} title={title} width={350} height={290} /></div>
        </>
      )}
      <PassTable lines={lines} unit={scale?.unit ?? tests[0]?.liftUnit ?? "in"} place={place} title={`${title}, CFM`} />
    </>
  );
}
