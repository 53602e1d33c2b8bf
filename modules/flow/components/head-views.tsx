"use client";

import { decimal } from "@/modules/kernel/format";
import { Bay } from "@/modules/ui/bay";
import { Lane } from "@/modules/ui/lane";
import { usePlace } from "@/modules/ui/place";
import type { CoefficientRow } from "../domain/coefficient-rows";
import { CD_MEASURE, flowMeasure, speedMeasure, type CurveMeasure, type Units } from "../domain/curve-measure";
import type { CurveLine } from "../domain/curve-geometry";
import { flagWords } from "../domain/flag-words";
import type { SanityLimits } from "../domain/sanity-limits";
import type { PortRatio } from "../domain/port-ratios";
import type { PortFigures } from "../queries/head-figures";
import { ComparisonFigures } from "./comparison-figures";
import { lineOf, scaledLines } from "./curve-lines";
import { ratioWords } from "./comparison-words";
import { CurveReader } from "./curve-reader";
import { CURVE_VIEWS, type CurveView } from "./curve-views";
import { portWords } from "./library-words";
import { NoiseVerdicts } from "./noise-verdicts";
import { unitWords, type UnitWords } from "./unit-words";

/** A triangle beside a doubtful figure; its words stand under the table. */
function FlagMark({ row, limits }: { row: CoefficientRow | undefined; limits: SanityLimits | undefined }) {
  const words = row?.flags.map((f) => flagWords(f, limits)).join(" ");
  return words ? <span className="nw" title={words}>▲<span className="sr-only"> {words}</span> </span> : null;
}

const speedOf = (r: CoefficientRow, units: Units): number => (units === "si" ? r.speedMS : r.speedFtS);

/** Lines and measure of one port in one view. Coefficient and speed rest on sizes as well as on flow, so no gain is filled between them. */
function curveOf(port: readonly PortFigures[], view: CurveView, units: Units, w: UnitWords, atInH2O: number): { lines: CurveLine[]; measure: CurveMeasure } {
  if (view === "flow") {
    // A side with one test only is drawn from it.
    const lines = port.map((p): CurveLine => (p.gain.state === "absent" ? { side: p.side, ...p.readings, gain: "withheld" } : lineOf(p.gain)));
    return { lines: scaledLines(lines, w.perCfm), measure: flowMeasure(units, w.pressure(atInH2O)) };
  }
  const value = (r: CoefficientRow) => ({ liftUm: r.liftUm, flowCfm: view === "cd" ? r.cd : speedOf(r, units) });
  return { lines: port.map((p) => ({ side: p.side, before: (p.before?.rows ?? []).map(value), after: (p.after?.rows ?? []).map(value), gain: "withheld" })), measure: view === "cd" ? CD_MEASURE : speedMeasure(units) };
}

function PortCurve({ port, view, units, locale }: { port: readonly PortFigures[]; view: CurveView; units: Units; locale: string }) {
  const [first] = port;
  if (!first) return null;
  const w = unitWords(units, first.liftUnit, locale);
  const { lines, measure } = curveOf(port, view, units, w, first.atInH2O);
  if (lines.every((l) => l.before.length + l.after.length === 0)) return <p className="mid">Valve sizes are not recorded, or not all valves were open, so there is nothing to draw here. The flow is under Flow.</p>;
  const curve = { lines, measure, unit: w.liftUnit, atInH2O: first.atInH2O, camLiftUm: first.camLiftUm, locale, label: `Read the curve: ${measure.what}${first.cylinder === 1 ? "" : `, port ${first.cylinder}`}` };
  return (
    <>
      <div className="hide-s"><CurveReader {...curve} width={620} height={360} /></div>
      <div className="only-phone"><CurveReader {...curve} width={340} height={290} mini /></div>
      <p className="hint">{measure.axis}. Thick: after, thin: before; solid: intake, broken: exhaust. The figures are in the tables below.</p>
    </>
  );
}

function Coefficients({ p, units, locale }: { p: PortFigures; units: Units; locale: string }) {
  const w = unitWords(units, p.liftUnit, locale);
  const n = (v: number | undefined, digits: number) => (v === undefined ? "—" : decimal(v, digits, locale));
  const lifts = [...new Set([...(p.before?.rows ?? []), ...(p.after?.rows ?? [])].map((r) => r.liftUm))].sort((a, b) => a - b);
  const row = (when: "before" | "after", um: number) => p[when]?.rows.find((r) => r.liftUm === um);
  const ideal = p.after ?? p.before;
  if (lifts.length === 0) return <p className="mid p-4">Valve sizes are not recorded, or not all valves were open, so there is no coefficient.</p>;
  return (
    <>
      <Lane label={`Coefficients, ${portWords(p.cylinder, p.side)}`}><table className="calm">
        <caption className="sr-only">Discharge coefficient on curtain area and mean speed through the curtain</caption>
        <thead><tr><th scope="col">Lift, {w.liftUnit}</th><th scope="col" className="r">L/D</th><th scope="col" className="r">{w.flowUnit} before</th><th scope="col" className="r">after</th><th scope="col" className="r">Cd before</th><th scope="col" className="r">after</th><th scope="col" className="r">{w.speedUnit} before</th><th scope="col" className="r">after</th></tr></thead>
        <tbody>{lifts.map((um) => {
          const [b, a] = [row("before", um), row("after", um)];
          const speed = (r: CoefficientRow | undefined) => n(r ? speedOf(r, units) : undefined, 0);
          return <tr key={um}><th scope="row">{w.lift(um)}</th><td className="r q">{n((a ?? b)?.liftOverDiameter, 3)}</td><td className="r q">{b ? w.flow(b.flowCfm) : "—"}</td><td className="r q">{a ? w.flow(a.flowCfm) : "—"}</td><td className="r q"><FlagMark row={b} limits={p.limits} />{n(b?.cd, 3)}</td><td className="r q"><FlagMark row={a} limits={p.limits} /><b>{n(a?.cd, 3)}</b></td><td className="r q">{speed(b)}</td><td className="r q">{speed(a)}</td></tr>;
        })}</tbody>
      </table></Lane>
      {[...new Set([...(p.before?.rows ?? []), ...(p.after?.rows ?? [])].flatMap((r) => r.flags))].map((f) => <p key={f} className="sm px-3 pt-3"><b>▲</b> {flagWords(f, p.limits)}</p>)}
      <p className="hint p-3">Compressible coefficient on curtain area, {p.valves || "valves unknown"}; dry air at 20 °C and 101.325 kPa; stated at {w.pressure(p.atInH2O)}{ideal ? `, where air can reach ${n(units === "si" ? ideal.idealMS : ideal.idealFtS, 0)} ${w.speedUnit}` : ""}.</p>
    </>
  );
}

/** Each port of a head: its curve in one view, what before and after come to, coefficients and the change against the noise; all in one system of units. */
export function HeadViews({ ports, ratios, units = "read", view = "flow" }: { ports: readonly PortFigures[]; ratios: readonly { cylinder: number; ratios: readonly PortRatio[] }[]; units?: Units; view?: CurveView }) {
  const { locale } = usePlace();
  const cylinders = [...new Set(ports.map((p) => p.cylinder))];
  const many = cylinders.length > 1 || cylinders[0] !== 1;
  return cylinders.map((cylinder) => {
    const port = ports.filter((p) => p.cylinder === cylinder);
    const ratio = ratioWords(ratios.find((r) => r.cylinder === cylinder)?.ratios ?? [], unitWords(units, port[0]?.liftUnit ?? "in", locale));
    const of = (words: string) => `${words}${many ? `, port ${cylinder}` : ""}`;
    return (
      <div key={cylinder} className="mt-6">
        <div className="two">
          <Bay label={of(CURVE_VIEWS.find((v) => v.key === view)?.label ?? "Flow")}><PortCurve port={port} view={view} units={units} locale={locale} /></Bay>
          <Bay label={of("Before against after")} flush>
            {port.map((p) => <ComparisonFigures key={p.side} gain={p.gain} means={p.means} w={unitWords(units, p.liftUnit, locale)} locale={locale} />)}
            {ratio === null ? null : <p className="p-3">{ratio}</p>}
          </Bay>
        </div>
        <div className="two mt-6">
          {port.map((p) => (
            <Bay key={p.side} label={`Coefficient and speed, ${portWords(p.cylinder, p.side)}`} flush>
              <Coefficients p={p} units={units} locale={locale} />
              <div className="border-t border-line"><NoiseVerdicts port={p} locale={locale} units={units} /></div>
            </Bay>
          ))}
        </div>
      </div>
    );
  });
}
