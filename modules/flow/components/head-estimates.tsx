"use client";

import { useState } from "react";
import { decimal } from "@/modules/kernel/format";
import { Note } from "@/modules/ui/note";
import { usePlace } from "@/modules/ui/place";
import { engineEstimate } from "../domain/engine-estimate";
import { POWER_ESTIMATE_WORDS } from "../domain/power-estimate";
import type { EstimateFacts } from "../queries/head-figures";
import { Pick } from "./upload-mapping";

/** Watts in one horsepower of 550 ft lbf/s. Source: NIST SP 811 B.8. */
const W_PER_HP = 745.6999;

/** Engine speed and power out of airflow: estimates, each under the same fixed words. Only where the shop switched them on. */
export function HeadEstimates({ facts }: { facts: EstimateFacts }) {
  const { locale } = usePlace();
  const [camId, setCamId] = useState(facts.cams[0]?.id ?? "");
  const cam = facts.cams.find((c) => c.id === camId);
  const n = (v: number, digits = 0) => decimal(v, digits, locale);
  const { boreMm, strokeMm } = facts;
  const missing = facts.ports.length === 0 ? "No finished intake test." : !cam ? "No intake camshaft is set up under Bench gear." : boreMm === null || strokeMm === null ? "Bore or stroke of this head is not recorded." : null;
  return (
    <>
      <Note tone="info" className="mb-3">{POWER_ESTIMATE_WORDS}</Note>
      {facts.cams.length > 0 ? <div className="fields one mb-3"><Pick label="Intake camshaft" value={camId} options={facts.cams.map((c) => ({ value: c.id, label: c.label }))} onChange={setCamId} /></div> : null}
      {missing ? <p className="mid">{missing}</p> : null}
      {cam && boreMm !== null && strokeMm !== null ? (
        <table className="calm">
          <caption className="sr-only">Estimates from airflow</caption>
          <thead><tr><th scope="col">Estimate from</th><th scope="col" className="r">Cam-mean CFM</th><th scope="col" className="r">Mach 0.5 / 0.6, r/min</th><th scope="col" className="r">Estimated kW, whole head</th></tr></thead>
          <tbody>{facts.ports.map((p) => {
            const made = engineEstimate({ readings: p.readings, atInH2O: p.atInH2O, cam, boreMm, strokeMm, cylinders: facts.cylinders });
            const name = `${facts.cylinders > 1 ? `cylinder ${p.cylinder}, ` : ""}${p.when}`;
            return (
              <tr key={name}><th scope="row">{name}</th>
                {made.ok ? <><td className="r q">{n(made.value.meanFlowCfm, 1)}{made.value.isSynthetic ? <span className="sm dim block">cam drawn from lift and duration</span> : null}</td><td className="r q">{n(made.value.rpmAt0_5)} / {n(made.value.rpmAt0_6)}</td>
                  <td className="r q">{n(made.value.lowKW)} to {n(made.value.highKW)}<span className="sm dim block">estimate; {n((made.value.lowKW * 1000) / W_PER_HP)} to {n((made.value.highKW * 1000) / W_PER_HP)} hp</span></td></> : <td colSpan={3} className="mid">{made.refusal.message}</td>}
              </tr>
            );
          })}</tbody>
        </table>
      ) : null}
    </>
  );
}
