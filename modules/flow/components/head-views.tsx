"use client";

import { useState } from "react";
import { decimal } from "@/modules/kernel/format";
import { Bay } from "@/modules/ui/bay";
import { ToggleChip } from "@/modules/ui/chip";
import { usePlace } from "@/modules/ui/place";
import type { CoefficientRow } from "../domain/coefficient-rows";
import { FLOW_FLAGS } from "../domain/flow-flags";
import type { PortFigures } from "../queries/head-figures";
import { flowText, liftWords } from "./flow-words";
import { portWords } from "./library-words";
import { Lane } from "@/modules/ui/lane";
import { NoiseVerdicts } from "./noise-verdicts";

/** A triangle beside a doubtful figure; its words stand under the table. */
function FlagMark({ row }: { row: CoefficientRow | undefined }) {
  return row && row.flags.length > 0 ? <span className="nw" title={row.flags.map((f) => FLOW_FLAGS[f]).join(" ")}>▲<span className="sr-only"> {row.flags.map((f) => FLOW_FLAGS[f]).join(" ")}</span> </span> : null;
}

/** Discharge coefficient and curtain speed before and after, in metric or inch units. */
export function HeadViews({ ports }: { ports: readonly PortFigures[] }) {
  const { locale } = usePlace();
  const [inch, setInch] = useState(true);
  const n = (v: number | undefined, digits: number) => (v === undefined ? "—" : decimal(v, digits, locale));
  const flow = (cfm: number) => (inch ? flowText(cfm, locale) : decimal(cfm * 0.4719474432, 1, locale));
  return (
    <>
      <div className="bar noprint"><ToggleChip on={inch} onChange={() => setInch(true)}>in, CFM, ft/s</ToggleChip><ToggleChip on={!inch} onChange={() => setInch(false)}>mm, L/s, m/s</ToggleChip></div>
      <div className="two mt-4">
        {ports.map((p) => {
          const unit = inch ? "in" : "mm";
          const lifts = [...new Set([...(p.before?.rows ?? []), ...(p.after?.rows ?? [])].map((r) => r.liftUm))].sort((a, b) => a - b);
          const row = (when: "before" | "after", um: number) => p[when]?.rows.find((r) => r.liftUm === um);
          const ideal = (p.after ?? p.before);
          return (
            <Bay key={`${p.cylinder}${p.side}`} label={`Coefficient and speed, ${portWords(p.cylinder, p.side)}`} flush>
              {lifts.length === 0 ? <p className="mid p-4">Valve sizes are not recorded, or not all valves were open, so there is no coefficient.</p> : (
                <Lane label={`Coefficients, ${portWords(p.cylinder, p.side)}`}><table className="calm">
                  <caption className="sr-only">Discharge coefficient on curtain area and mean speed through the curtain</caption>
                  <thead><tr><th scope="col">Lift, {unit}</th><th scope="col" className="r">L/D</th><th scope="col" className="r">{inch ? "CFM" : "L/s"} before</th><th scope="col" className="r">after</th><th scope="col" className="r">Cd before</th><th scope="col" className="r">after</th><th scope="col" className="r">{inch ? "ft/s" : "m/s"} before</th><th scope="col" className="r">after</th></tr></thead>
                  <tbody>{lifts.map((um) => {
                    const [b, a] = [row("before", um), row("after", um)];
                    const speed = (r: CoefficientRow | undefined) => n(inch ? r?.speedFtS : r?.speedMS, 0);
                    return <tr key={um}><th scope="row" className="border-b border-line align-middle normal-case tracking-normal text-ink">{liftWords(um, unit, locale)}</th><td className="r q">{n((a ?? b)?.liftOverDiameter, 3)}</td><td className="r q">{b ? flow(b.flowCfm) : "—"}</td><td className="r q">{a ? flow(a.flowCfm) : "—"}</td><td className="r q"><FlagMark row={b} />{n(b?.cd, 3)}</td><td className="r q"><FlagMark row={a} /><b>{n(a?.cd, 3)}</b></td><td className="r q">{speed(b)}</td><td className="r q">{speed(a)}</td></tr>;
                  })}</tbody>
                </table></Lane>
              )}
              {[...new Set([...(p.before?.rows ?? []), ...(p.after?.rows ?? [])].flatMap((r) => r.flags))].map((f) => <p key={f} className="sm px-3 pt-3"><b>▲</b> {FLOW_FLAGS[f]}</p>)}
              <p className="hint p-3">Compressible coefficient on curtain area, {p.valves || "valves unknown"}; dry air at 20 °C and 101.325 kPa; stated at {p.atInH2O} in H₂O{ideal ? `, where air can reach ${n(inch ? ideal.idealFtS : ideal.idealMS, 0)} ${inch ? "ft/s" : "m/s"}` : ""}.</p>
              <div className="border-t border-line"><NoiseVerdicts port={p} locale={locale} /></div>
            </Bay>
          );
        })}
      </div>
    </>
  );
}
