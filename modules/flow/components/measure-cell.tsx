"use client";

import type { KeyboardEvent } from "react";
import type { Entry } from "./measure-state";

/** One well of the sheet. Its verdict stands under it in words and shape. */
export function MeasureCell({ id, label, entry, unit, verdict, mayWrite, onType, onLeave, onKeep }: {
  id: string; label: string; entry: Entry | undefined; unit: string; verdict: { out: boolean; words: string } | null; mayWrite: boolean; onType: (text: string) => void; onLeave: () => void; onKeep: () => void;
}) {
  const move = (event: KeyboardEvent<HTMLInputElement>) => {
    const down = event.key === "ArrowDown" || (event.key === "Enter" && !event.shiftKey);
    const up = event.key === "ArrowUp" || (event.key === "Enter" && event.shiftKey);
    if (!down && !up) return;
    event.preventDefault();
    const column = event.currentTarget.dataset.column ?? "";
    const all = [...document.querySelectorAll<HTMLInputElement>(`input[data-column="${column}"]`)];
    const next = all[all.indexOf(event.currentTarget) + (down ? 1 : -1)];
    // Leaving the cell keeps it; at the end the cell is left as well.
    if (next) { next.focus(); next.select(); } else event.currentTarget.blur();
  };
  const bad = entry?.state === "refused" || entry?.state === "offline";
  const note = entry?.message || (entry?.state === "sending" ? "Keeping…" : "");
  return (
    <div className="min-w-28">
      <span className={`in sm${verdict?.out ? " !border-2 !border-[var(--ink)]" : ""}`}>
        <input
          id={id} data-column={id.split("|")[0]} className="at-r" inputMode="decimal" autoComplete="off" aria-label={label} value={entry?.text ?? ""} readOnly={!mayWrite} aria-invalid={bad || undefined}
          aria-describedby={note || verdict ? `${id}-say` : undefined} placeholder={unit} onChange={(e) => onType(e.target.value)} onBlur={onLeave} onKeyDown={move}
        />
      </span>
      {note || verdict ? (
        <span id={`${id}-say`} className="sm mt-1 block" role={bad ? "alert" : undefined}>
          {note ? <span className={bad ? "neg" : "dim"}>{bad ? "▲ " : ""}{note} </span> : null}
          {entry?.asks && entry.state === "refused" ? <button type="button" className="lk" onClick={onKeep}>Keep as it stands</button> : null}
          {!note && verdict ? <span className={verdict.out ? "b" : "dim"}>{verdict.out ? "▲ " : ""}{verdict.words}</span> : null}
        </span>
      ) : null}
    </div>
  );
}
