"use client";
import clsx from "clsx";
import type { KeyboardEvent } from "react";
import type { CellDoubt } from "./cell-words";

export interface ReadingCellProps {
  id: string;
  /** Ids of the heads that name it: lift, side, column. */
  labelledBy: string;
  text: string;
  /** Unit of what is typed, where it is not the column's. */
  unit: string | null;
  /** Flow at the nominal pressure where it differs from what is typed. */
  corrected: string | null;
  isLoss: boolean;
  isEditable: boolean;
  isBench: boolean;
  doubts: readonly CellDoubt[];
  repeats: number;
  onText: (text: string) => void;
  onKey: (event: KeyboardEvent<HTMLInputElement>) => void;
  onEnter: () => void;
  onLeave: () => void;
}

/** One cell of the grid: a real field, named by its row and column. A finished reading is text. */
export function ReadingCell(p: ReadingCellProps) {
  const [doubt] = p.doubts;
  const noteId = `${p.id}-n`;
  const under = (
    <>
      {p.unit === null ? null : <span className="cor cu">in {p.unit}{p.corrected === null ? "" : " ="}</span>}
      {p.corrected === null ? null : <span className="cor">{p.corrected}{p.unit === null ? "" : " CFM"}</span>}
      {doubt === undefined ? null : <span className="fw"><span aria-hidden="true">▲ </span>{doubt.short}</span>}
      {p.doubts.length === 0 ? null : <span id={noteId} className="sr-only">{p.doubts.map((d) => d.words).join(" ")}</span>}
    </>
  );
  if (!p.isEditable) return <><span className="rd-only">{p.text}{p.repeats > 1 ? <small> ×{p.repeats}</small> : null}</span>{under}</>;
  return (
    <>
      <input
        id={p.id} className={clsx(p.isLoss && "loss", p.text === "" && "todo")} value={p.text} aria-labelledby={p.labelledBy} aria-describedby={p.doubts.length > 0 ? noteId : undefined}
        aria-invalid={p.doubts.some((d) => d.isWrong) || undefined} inputMode={p.isBench ? "none" : "decimal"} autoComplete="off" enterKeyHint="next" maxLength={20}
        // A press on another cell selects what stands there, so that typing replaces it.
        onMouseDown={(e) => { if (document.activeElement !== e.currentTarget) { e.preventDefault(); e.currentTarget.focus(); } }}
        onChange={(e) => p.onText(e.target.value)} onKeyDown={p.onKey} onFocus={(e) => { e.currentTarget.select(); p.onEnter(); }} onBlur={p.onLeave}
      />
      {p.repeats > 1 ? <span className="rep" aria-label={`${p.repeats} readings, mean shown`}>×{p.repeats}</span> : null}
      {under}
    </>
  );
}
