"use client";

import { useId, useState } from "react";
import { Button } from "@/modules/ui/button";
import { Lane } from "@/modules/ui/lane";
import { liftLadder, liftText, type LiftUnit } from "../domain/lift-ladder";
import { Pick } from "./upload-mapping";

interface FamilyLift { name: string; camLiftIntakeUm: number | null; camLiftExhaustUm: number | null }
const BLANKS = ["Tag or mark", "Port", "Order", "Date", "By", "Bench", "Bore adapter", "Valves", "Seats", "Entry", "Leak, CFM at", "Room, °C and hPa"];

/** An empty ladder for one port, both sides, two readings a lift; prints alone on one page. */
export function LadderPaper({ shopName, nominal, families }: { shopName: string; nominal: number; families: readonly FamilyLift[] }) {
  const [family, setFamily] = useState((families.find((f) => f.camLiftIntakeUm !== null || f.camLiftExhaustUm !== null) ?? families[0])?.name ?? "");
  const [unit, setUnit] = useState<LiftUnit>("in");
  const camOf = (name: string, u: LiftUnit) => { const f = families.find((x) => x.name === name); const um = Math.max(f?.camLiftIntakeUm ?? 0, f?.camLiftExhaustUm ?? 0); return um > 0 ? liftText(um, u) : ""; };
  const [camLift, setCamLift] = useState(camOf(family, "in"));
  const [step, setStep] = useState(".050");
  const ladder = camLift === "" ? null : liftLadder({ step, camLift, unit });
  const stepId = useId();
  const camId = useId();
  const rungs = ladder?.ok ? ladder.value.rungs : [];
  return (
    <>
      <div className="noprint">
        <div className="fields three">
          {families.length > 0 ? <Pick label="Family" value={family} options={families.map((f) => ({ value: f.name, label: f.name }))} onChange={(v) => { setFamily(v); setCamLift(camOf(v, unit)); }} /> : null}
          <Pick label="Lifts in" value={unit} options={[{ value: "in", label: "in" }, { value: "mm", label: "mm" }]} onChange={(v) => { const u = v === "mm" ? "mm" : "in"; setUnit(u); setStep(u === "mm" ? "1" : ".050"); setCamLift(camOf(family, u)); }} />
          <div className="field"><label htmlFor={stepId}>Step</label><span className="in"><input id={stepId} className="at-r" inputMode="decimal" value={step} onChange={(e) => setStep(e.target.value)} /><span className="unit">{unit}</span></span></div>
          <div className="field"><label htmlFor={camId}>Cam lift at the valve</label><span className="in"><input id={camId} className="at-r" inputMode="decimal" value={camLift} onChange={(e) => setCamLift(e.target.value)} /><span className="unit">{unit}</span></span></div>
        </div>
        {ladder === null ? <p className="hint mt-3">Type the cam lift; the ladder goes one step past it.</p> : ladder.ok ? null : <p className="err mt-3" role="alert">{ladder.refusal.message}</p>}
        <div className="form-act"><Button variant="go" icon="print" disabledReason={rungs.length === 0 ? "The ladder has no lifts yet." : undefined} onClick={() => window.print()}>Print</Button></div>
      </div>
      {rungs.length === 0 ? null : (
        <section className="sheet mt-6" aria-label="Empty ladder">
          <h2 className="mb-1 font-cut text-h3">{shopName}: flow sheet</h2>
          <p className="mb-4">{family}. Stated at {nominal} in H₂O. CFM or percent and range; strike out what does not hold.</p>
          <dl className="mb-5 grid grid-cols-2 gap-x-6 sm:grid-cols-3 print:grid-cols-3 gap-y-4 text-small">{BLANKS.map((b) => <div key={b} className="border-b border-line-2 pb-4"><dt className="eng">{b}</dt><dd className="sr-only">to fill in</dd></div>)}</dl>
          <Lane label="Lifts to read"><table className="calm">
            <caption className="sr-only">Lifts to read, with room for two readings a side</caption>
            <thead>
              <tr><th scope="col" rowSpan={2}>Lift, {unit}</th><th scope="colgroup" colSpan={4}>Intake</th><th scope="colgroup" colSpan={4}>Exhaust</th></tr>
              <tr>{["in", "ex"].flatMap((s) => ["Held", "Range", "1st", "2nd"].map((h) => <th key={s + h} scope="col">{h}</th>))}</tr>
            </thead>
            <tbody>{rungs.map((r) => (
              <tr key={r.text}><th scope="row" className="border-b border-line-2 normal-case tracking-normal text-ink">{r.text}{ladder?.ok && r.liftUm > ladder.value.camLiftUm ? <span className="sm dim"> past cam</span> : null}</th>{Array.from({ length: 8 }, (_, i) => <td key={i} className="h-9 border-l border-line-2" />)}</tr>
            ))}</tbody>
          </table></Lane>
          <p className="mt-4 text-small">Zero the indicator on the closed seat. Wear hearing protection; shut the blower before reaching in. Notes:</p>
        </section>
      )}
    </>
  );
}
