"use client";
import { useId, useState } from "react";
import { ConfirmDialog } from "@/modules/ui/dialog";
import type { RawTest } from "../../domain/raw-test";
import type { UnreadLifts } from "../../domain/unread-lifts";
import { zeroReturnWords } from "../../domain/zero-return";
import { liftWords } from "../flow-words";
import { PURPOSE_WORDS } from "./start-sheet-form";

/** What becomes of a draft in which nothing was read. */
export type EmptyAct = "open" | "void";

/** Asked before tests with holes are finished: names each hole, and what becomes of a side nothing was read on. */
export function FinishDialog({ holes, unit, locale, onFinish, onLeave }: { holes: readonly UnreadLifts[]; unit: RawTest["liftUnit"]; locale: string; onFinish: (empty: EmptyAct) => void; onLeave: () => void }) {
  const id = useId();
  const [empty, setEmpty] = useState<EmptyAct>("open");
  const hasEmpty = holes.some((h) => h.isEmpty);
  return (
    <ConfirmDialog open onOpenChange={(to) => { if (!to) onLeave(); }} question="Finish with lifts unread?" safe="Read on" action="Finish as it is" onAction={() => onFinish(empty)}>
      <ul className="grid gap-1">
        {holes.map((h) => (
          <li key={h.test.id}><b className="capitalize">{h.test.side}</b> {PURPOSE_WORDS[h.test.purpose]}: {h.isEmpty ? "nothing was read." : `${h.liftsUm.map((um) => liftWords(um, unit, locale)).join(", ")} ${unit} not read.`}</li>
        ))}
      </ul>
      {hasEmpty ? (
        <fieldset className="mt-3 flex flex-wrap gap-5">
          <legend className="label">The side nothing was read on</legend>
          {([["open", "Leave it open"], ["void", "Void it"]] as const).map(([value, label]) => <label key={value} className="tick"><input type="radio" name={id} checked={empty === value} onChange={() => setEmpty(value)} /><span>{label}</span></label>)}
        </fieldset>
      ) : null}
    </ConfirmDialog>
  );
}

/** What the indicator shows on the closed seat after the last lift, one field a draft. Not asked, only offered. */
export function ZeroReturn({ drafts, values, onChange }: { drafts: readonly RawTest[]; values: Readonly<Record<string, string>>; onChange: (testId: string, text: string) => void }) {
  const id = useId();
  return (
    <details className="sm">
      <summary className="lk">Indicator after the last lift</summary>
      <div className="mt-2 flex flex-wrap gap-4">
        {drafts.map((t) => {
          const text = values[t.id] ?? "";
          const words = text === "-" ? null : zeroReturnWords(text, t.liftUnit, t.limits);
          return (
            <span key={t.id} className="field">
              <label htmlFor={`${id}${t.side}`}><span className="capitalize">{t.side}</span>, valve shut</label>
              <span className="in" style={{ width: 120 }}><input id={`${id}${t.side}`} value={text} inputMode="decimal" placeholder="0" maxLength={20} autoComplete="off" aria-describedby={`${id}${t.side}w`} aria-invalid={words === null ? undefined : true} onChange={(e) => onChange(t.id, e.target.value)} /><span className="unit">{t.liftUnit}</span></span>
              <span id={`${id}${t.side}w`} className="hint" role="status">{words === null ? "" : `▲ ${words}`}</span>
            </span>
          );
        })}
      </div>
    </details>
  );
}
