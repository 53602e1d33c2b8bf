"use client";

import type { KeyboardEvent } from "react";
import type { Entry } from "./measure-state";

/** One well of the sheet. Its verdict stands under it in words and shape, with what may be done about a line that waits. */
export function MeasureCell({ id, label, entry, unit, verdict, mayWrite, link, onType, onLeave, onKeep, onForget }: {
  id: string; label: string; entry: Entry | undefined; unit: string; verdict: { out: boolean; words: string } | null; mayWrite: boolean; link: "up" | "down" | "signed-out";
  onType: (text: string) => void; onLeave: () => void; onKeep: () => void; onForget: () => void;
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
  const stuck = entry?.stuck ?? null;
  const note = stuck?.message ?? (entry?.isKeptHere && link !== "up" ? "Kept on this device." : "");
  return (
    <div className="min-w-28">
      <span className={`in sm${verdict?.out ? " !border-2 !border-[var(--ink)]" : ""}`}>
        <input
          id={id} data-column={id.split("|")[0]} className="at-r" inputMode="decimal" autoComplete="off" aria-label={label} value={entry?.text ?? ""} readOnly={!mayWrite} aria-invalid={stuck !== null || undefined}
          aria-describedby={note || verdict ? `${id}-say` : undefined} placeholder={unit} maxLength={30} onChange={(e) => onType(e.target.value)} onBlur={onLeave} onKeyDown={move}
        />
      </span>
      {note || verdict ? (
        <span id={`${id}-say`} className="sm mt-1 block" role={stuck ? "alert" : undefined}>
          {note ? <span className={stuck ? "neg" : "dim"}>{stuck ? "▲ " : ""}{note} </span> : null}
          {stuck?.kind === "asked" ? <button type="button" className="lk" onClick={onKeep}>Keep as it stands</button> : null}
          {stuck?.kind === "conflict" ? <button type="button" className="lk" onClick={onKeep}>Keep mine</button> : null}
          {stuck ? <> <button type="button" className="lk" onClick={onForget}>{stuck.kind === "conflict" ? "Take theirs" : "Forget it"}</button></> : null}
          {!note && verdict ? <span className={verdict.out ? "b" : "dim"}>{verdict.out ? "▲ " : ""}{verdict.words}</span> : null}
        </span>
      ) : null}
    </div>
  );
}
