"use client";

import type { FileRows } from "../domain/file-rows";
import type { HeldUnit, ValueUnit } from "../domain/raw-test";
import { VALUE_SIGN } from "./sheet/scale-words";
import { portWords } from "./library-words";
import { Lane } from "@/modules/ui/lane";

const FEW = 12;
const HELD_SIGN: Readonly<Partial<Record<HeldUnit, string>>> = { inH2O: "in H₂O" };

/** What the file says by the mapping: first readings, every refused row by its number, repetitions. */
export function UploadPreview({ read, units, leaveOut, onLeaveOut }: { read: FileRows; units: { lift: string; flowUnit: string; pressureUnit: string }; leaveOut: ReadonlySet<number>; onLeaveOut: (rows: ReadonlySet<number>) => void }) {
  const { readings, refusals, duplicates } = read;
  const flowSign = VALUE_SIGN[units.flowUnit as ValueUnit];
  const ports = [...new Map(readings.map((r) => [`${r.cylinder}/${r.side}`, r])).values()];
  const toggle = (row: number) => { const next = new Set(leaveOut); if (!next.delete(row)) next.add(row); onLeaveOut(next); };
  return (
    <>
      <p role="status" className="mb-3"><b>{readings.length} reading{readings.length === 1 ? "" : "s"}</b> for {ports.length === 0 ? "no port" : ports.map((p) => portWords(p.cylinder, p.side)).join(", ")}. {refusals.length === 0 ? "No row refused." : `${refusals.length} row${refusals.length === 1 ? "" : "s"} refused.`} {duplicates.length === 0 ? "" : `${duplicates.length} said twice, taken once: row ${duplicates.slice(0, 8).map((d) => `${d.row} like ${d.of}`).join(", ")}.`}</p>
      {refusals.length === 0 ? null : (
        <div className="mb-4"><Lane label="Refused rows"><table className="calm">
          <caption className="sr-only">Refused rows</caption>
          <thead><tr><th scope="col">Row</th><th scope="col">What is wrong</th><th scope="col">Leave out</th></tr></thead>
          <tbody>{refusals.slice(0, 100).map((r) => (
            <tr key={r.row}><td className="q">{r.row}</td><td><b className="neg">▲ {r.column}.</b> {r.words}</td><td><label className="tick"><input type="checkbox" checked={leaveOut.has(r.row)} onChange={() => toggle(r.row)} /><span className="sr-only">Leave out row {r.row}</span></label></td></tr>
          ))}</tbody>
        </table></Lane></div>
      )}
      {readings.length === 0 ? null : (
        <Lane label="First readings"><table className="calm">
          <caption className="sr-only">First readings of the file</caption>
          <thead><tr><th scope="col">Row</th><th scope="col">Port</th><th scope="col" className="r">Lift, {units.lift}</th><th scope="col" className="r">Repeat</th><th scope="col" className="r">Reading, {flowSign}</th><th scope="col" className="r">Held, {HELD_SIGN[units.pressureUnit as HeldUnit] ?? units.pressureUnit}</th></tr></thead>
          <tbody>{readings.slice(0, FEW).map((r) => <tr key={r.row}><td className="q">{r.row}</td><td>{portWords(r.cylinder, r.side)}</td><td className="r q">{r.liftText}</td><td className="r q">{r.repeatNo}</td><td className="r q"><b>{r.valueText}</b></td><td className="r q">{r.pressureText || "nominal"}</td></tr>)}</tbody>
        </table>{readings.length > FEW ? <p className="hint">And {readings.length - FEW} more.</p> : null}</Lane>
      )}
    </>
  );
}
