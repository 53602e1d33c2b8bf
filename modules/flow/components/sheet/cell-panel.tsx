"use client";
import { useId, useState } from "react";
import { Button } from "@/modules/ui/button";
import { ToggleChip } from "@/modules/ui/chip";
import { liftWords, flowText } from "../flow-words";
import { cellDoubts } from "./cell-words";
import { cellAt, flowAt, type SheetColumn } from "./sheet-figures";
import { posOf } from "./reading-grid";
import { SCALE_SIGN } from "./scale-words";
import type { Pos, Sheet } from "./use-sheet";

/** Asked for where something doubtful was typed; the value is kept with the reason. */
function ReasonField({ onKeep, onForget }: { onKeep: (reason: string) => void; onForget: () => void }) {
  const id = useId();
  const [reason, setReason] = useState("");
  return (
    <form className="flex flex-wrap items-end gap-3" onSubmit={(e) => { e.preventDefault(); if (reason.trim().length >= 3) onKeep(reason.trim()); }}>
      <span className="field grow">
        <label htmlFor={id}>Reason to keep it</label>
        <span className="in"><input id={id} value={reason} onChange={(e) => setReason(e.target.value)} maxLength={200} autoComplete="off" /></span>
      </span>
      <Button type="submit" disabledReason={reason.trim().length >= 3 ? undefined : "a few words"}>Keep it</Button>
      <Button variant="lo" onClick={onForget}>Forget it</Button>
    </form>
  );
}

/** Air at the port and at the orifice of one reading, for a bench whose blower warms the air between them. */
function AirOfReading({ port, orifice, mayMark, onMark }: { port: string; orifice: string; mayMark: boolean; onMark: (air: { portTemperature: string; orificeTemperature: string }) => void }) {
  const [air, setAir] = useState({ portTemperature: port, orificeTemperature: orifice });
  const { portTemperature, orificeTemperature } = air;
  const changed = portTemperature !== port || orificeTemperature !== orifice;
  const isWhole = (portTemperature.trim() === "") === (orificeTemperature.trim() === "");
  const field = (key: keyof typeof air, label: string) => (
    <label className="flex items-center gap-2 sm"><span>{label}</span><span className="in" style={{ width: 84 }}><input value={air[key]} placeholder="71 °F" maxLength={20} autoComplete="off" onChange={(e) => setAir({ ...air, [key]: e.target.value })} /></span></label>
  );
  return (
    <details className="sm" open={port !== "" || undefined}>
      <summary className="lk">Air</summary>
      <span className="mt-2 flex flex-wrap items-center gap-3">
        {field("portTemperature", "at the port")}{field("orificeTemperature", "at the orifice")}
        <Button size="sm" variant="lo" disabledReason={!mayMark ? "a reading first" : !isWhole ? "both, or neither" : changed ? undefined : "nothing changed"} onClick={() => onMark({ portTemperature: portTemperature.trim(), orificeTemperature: orificeTemperature.trim() })}>Correct for it</Button>
      </span>
    </details>
  );
}

/** What the panel needs of the sheet's state. */
export type PanelSheet = Pick<Sheet, "textAt" | "stuckAt" | "keptAt" | "range" | "setRange" | "held" | "setHeld" | "mark" | "type" | "commit" | "keepWithReason" | "discard" | "insist" | "takeFromBench">;

const NUMBER_WIDTH = { width: 92 } as const;

/** What belongs to the cell in hand: range, pressure held, repeats, doubts and how to settle them. */
export function CellPanel({ sheet, pos, col, locale }: { sheet: PanelSheet; pos: Pos; col: SheetColumn; locale: string }) {
  const heldId = useId();
  const { test } = col;
  const stuck = sheet.stuckAt(pos);
  const computed = cellAt(col, pos.liftUm);
  const flow = flowAt(col, pos.liftUm) ?? (stuck ? (computed?.flowCfm ?? null) : null);
  const doubts = cellDoubts(computed, col.figures, stuck, pos.liftUm);
  const repeats = [...new Set([1, ...col.figures.cells.filter((c) => c.liftUm === pos.liftUm).map((c) => c.repeatNo)])].sort((a, b) => a - b);
  const reading = col.figures.readings.find((r) => r.liftUm === pos.liftUm);
  const [extra, setExtra] = useState(0);
  const shownRepeats = Array.from({ length: Math.min(9, Math.max(repeats.at(-1) ?? 1, extra)) }, (_, i) => i + 1);
  const name = `${pos.side} ${liftWords(pos.liftUm, test.liftUnit, locale)} ${col.head.toLowerCase()}`;
  const rangeNow = sheet.keptAt(pos)?.edits.at(-1)?.range ?? computed?.rangeLabel ?? sheet.range ?? test.bench.ranges[0]?.label ?? null;
  const typedText = sheet.textAt(pos);
  const asRead = test.bench.scale === "direct" || typedText === "" ? null : `${typedText} ${SCALE_SIGN[test.bench.scale]} of range ${rangeNow ?? "not chosen"} =`;
  const again = () => setExtra((repeats.at(-1) ?? 1) + 1);
  return (
    <section className="cp" aria-label={`Reading in hand: ${name}`}>
      <p className="cp-h"><b className="capitalize">{name}</b> {asRead === null ? null : <span className="mid">{asRead}</span>} {flow === null ? <span className="mid">not read</span> : <span><b className="num">{flowText(flow, locale)}</b> <span className="unit">CFM at {test.nominalInH2O} in H₂O</span></span>}
        {reading && reading.count > 1 ? <span className="mid"> mean of {reading.count}{reading.agrees ? "" : ", more than 1 % apart: read again"}</span> : null}
      </p>
      <div className="flex flex-wrap items-center gap-3">
        {test.bench.scale === "direct" ? null : (
          // A press on a range leaves the cell as it is: the hand goes back to the number.
          <div role="group" onMouseDown={(e) => e.preventDefault()} aria-label="Range" className="flex gap-1">
            {test.bench.ranges.map((r) => <ToggleChip key={r.label} on={rangeNow === r.label} onChange={() => { sheet.setRange(r.label); if (sheet.textAt(pos) !== "") sheet.mark(pos, { range: r.label }); }}>{r.label}</ToggleChip>)}
          </div>
        )}
        <span className="flex items-center gap-2">
          <label htmlFor={heldId} className="sm">Held</label>
          <span className="in" style={{ ...NUMBER_WIDTH, width: 140 }}>
            <input id={heldId} inputMode="decimal" value={sheet.held} placeholder={String(test.nominalInH2O)} onChange={(e) => sheet.setHeld(e.target.value)} onBlur={() => { if (sheet.textAt(pos) !== "" && sheet.held !== "") sheet.mark(pos, { pressure: sheet.held }); }} />
            <span className="unit">in H₂O</span>
          </span>
        </span>
        {test.bench.kind === "absolute_meter" || test.state !== "draft" ? null : <AirOfReading key={computed?.revision ?? 0} port={computed?.portTemperatureText ?? ""} orifice={computed?.orificeTemperatureText ?? ""} mayMark={typedText !== ""} onMark={(air) => sheet.mark(pos, air)} />}
        {shownRepeats.slice(1).map((n) => {
          const at = posOf(col, pos.liftUm, n);
          return (
            <span key={n} className="in" style={NUMBER_WIDTH}>
              <input aria-label={`Repeat ${n}, ${name}`} inputMode="decimal" value={sheet.textAt(at)} placeholder={`again ${n}`} onChange={(e) => sheet.type(at, e.target.value)} onBlur={() => sheet.commit(at)} onKeyDown={(e) => { if (e.key === "Enter") sheet.commit(at); }} />
            </span>
          );
        })}
        {test.state === "draft" && shownRepeats.length < 9 ? <Button size="sm" variant="lo" icon="plus" onClick={again}>Read again</Button> : null}
        {computed && !stuck && test.state === "draft" ? <Button size="sm" variant="lo" onClick={() => sheet.mark(pos, computed.excludedReason ? { excludedReason: null } : { excludedReason: "left out at the bench" })}>{computed.excludedReason ? "Count it again" : "Leave out"}</Button> : null}
      </div>
      {doubts.map((d) => <p key={d.words} className="sm"><span aria-hidden="true">▲ </span>{d.words}</p>)}
      {stuck?.askReason ? <ReasonField onKeep={(reason) => sheet.keepWithReason(pos, reason)} onForget={() => sheet.discard(pos)} /> : null}
      {stuck?.theirs ? (
        <div className="flex gap-3">
          <Button size="sm" onClick={() => sheet.insist(pos)}>Write mine over it</Button>
          <Button size="sm" variant="lo" onClick={() => { sheet.discard(pos); void sheet.takeFromBench(); }}>Take {stuck.theirs.valueText || "theirs"}</Button>
        </div>
      ) : null}
    </section>
  );
}
