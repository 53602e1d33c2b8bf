"use client";
import { useId, useState } from "react";
import { Button } from "@/modules/ui/button";
import { ToggleChip } from "@/modules/ui/chip";
import { isReason, LEAVE_OUT_WORDS } from "../../domain/leave-out";
import type { SheetColumn } from "./sheet-figures";
import type { Pos, Sheet } from "./use-sheet";

/** What the tools need of the sheet's state. */
export type ToolSheet = Pick<Sheet, "textAt" | "rangeAt" | "pressRange" | "held" | "setHeld" | "mark">;

/** The ranges of the bench; the one the cell in hand is read on stands out. */
export function RangeKeys({ sheet, pos, col }: { sheet: ToolSheet; pos: Pos; col: SheetColumn }) {
  if (col.test.bench.scale === "direct") return null;
  const now = sheet.rangeAt(pos);
  return (
    // A press on a range leaves the cell as it is: the hand goes back to the number.
    <div role="group" onMouseDown={(e) => e.preventDefault()} aria-label="Range" className="flex gap-1">
      {col.test.bench.ranges.map((r) => <ToggleChip key={r.label} on={now === r.label} onChange={() => sheet.pressRange(pos, r.label)}>{r.label}</ToggleChip>)}
    </div>
  );
}

/** Pressure held while reading; empty is the nominal one. */
export function HeldField({ sheet, pos, col, width = 140 }: { sheet: ToolSheet; pos: Pos; col: SheetColumn; width?: number }) {
  const id = useId();
  return (
    <span className="flex items-center gap-2">
      <label htmlFor={id} className="sm">Held</label>
      <span className="in" style={{ width }}>
        <input id={id} inputMode="decimal" value={sheet.held} placeholder={String(col.test.nominalInH2O)} onChange={(e) => sheet.setHeld(e.target.value)} onBlur={() => { if (sheet.textAt(pos) !== "" && sheet.held !== "") sheet.mark(pos, { pressure: sheet.held }); }} />
        <span className="unit">in H₂O</span>
      </span>
    </span>
  );
}

/** Air at the port and at the orifice of one reading, for a bench whose blower warms the air between them. */
export function AirOfReading({ port, orifice, mayMark, onMark }: { port: string; orifice: string; mayMark: boolean; onMark: (air: { portTemperature: string; orificeTemperature: string }) => void }) {
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

/** Asked for where something doubtful was typed; the value is kept with the reason. */
export function ReasonField({ onKeep, onForget }: { onKeep: (reason: string) => void; onForget?: () => void }) {
  const id = useId();
  const [reason, setReason] = useState("");
  return (
    <form className="flex flex-wrap items-end gap-3" onSubmit={(e) => { e.preventDefault(); if (isReason(reason)) onKeep(reason.trim()); }}>
      <span className="field grow">
        <label htmlFor={id}>Reason to keep it</label>
        <span className="in"><input id={id} value={reason} onChange={(e) => setReason(e.target.value)} maxLength={200} autoComplete="off" /></span>
      </span>
      <Button type="submit" disabledReason={isReason(reason) ? undefined : "a few words"}>Keep it</Button>
      {onForget ? <Button variant="lo" onClick={onForget}>Forget it</Button> : null}
    </form>
  );
}

/** Takes a reading out of the figures, with the reason; it stays in the record. @param repeats numbers of the readings that count. */
export function LeaveOut({ repeats, onLeaveOut }: { repeats: readonly number[]; onLeaveOut: (repeatNo: number, reason: string) => void }) {
  const id = useId();
  const [open, setOpen] = useState(false);
  const [reason, setReason] = useState("");
  const [which, setWhich] = useState<number | null>(null);
  const [first] = repeats;
  if (first === undefined) return null;
  if (!open) return <Button size="sm" variant="lo" onClick={() => setOpen(true)}>Leave out</Button>;
  const chosen = which !== null && repeats.includes(which) ? which : first;
  return (
    <form className="flex w-full flex-wrap items-end gap-3" onSubmit={(e) => { e.preventDefault(); if (isReason(reason)) { onLeaveOut(chosen, reason.trim()); setOpen(false); setReason(""); } }}>
      {repeats.length > 1 ? (
        <fieldset className="flex flex-wrap items-center gap-3 sm"><legend className="label">Which reading</legend>
          {repeats.map((n) => <label key={n} className="tick"><input type="radio" name={`${id}w`} checked={chosen === n} onChange={() => setWhich(n)} /><span>{n}</span></label>)}
        </fieldset>
      ) : null}
      <span className="field grow">
        <label htmlFor={id}>Why it is left out</label>
        <span className="in"><input id={id} list={`${id}l`} value={reason} onChange={(e) => setReason(e.target.value)} maxLength={200} autoComplete="off" autoFocus /></span>
        <datalist id={`${id}l`}>{LEAVE_OUT_WORDS.map((w) => <option key={w} value={w} />)}</datalist>
      </span>
      <Button type="submit" disabledReason={isReason(reason) ? undefined : "a few words"}>Leave it out</Button>
      <Button variant="lo" onClick={() => setOpen(false)}>It counts</Button>
    </form>
  );
}
