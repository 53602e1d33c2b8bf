import type { ReactNode } from "react";
import { Note } from "@/modules/ui/note";
import { FLOW_FLAGS } from "../../domain/flow-flags";
import { differenceText, liftWords } from "../flow-words";
import type { SheetFigures } from "./sheet-figures";

const SIDE_WORDS = { intake: "Intake", exhaust: "Exhaust" } as const;

export interface SheetNote { key: string; title: string; words: string }

/** What a person should know before believing the sheet: why a gain is withheld, every loss, an old bench check. */
export function notesOf(figures: SheetFigures, benchCheckHours: number, locale: string): SheetNote[] {
  const notes = new Map<string, SheetNote>();
  const add = (note: SheetNote) => { if (!notes.has(note.key)) notes.set(note.key, note); };
  for (const side of figures.sides) {
    const { gain } = side;
    if (gain?.state === "withheld") {
      for (const r of gain.reasons) {
        const pending = r.code === "NO_COMMON_LIFT";
        if (!pending) add({ key: `${r.code}${r.words}`, title: r.words, words: "No difference is shown." });
      }
    }
    if (gain?.comparable) {
      for (const loss of gain.losses) {
        add({ key: `loss-${side.side}-${loss.liftUm}`, title: `${SIDE_WORDS[side.side]} ${liftWords(loss.liftUm, gain.liftUnit, locale)} lost ${differenceText(loss.gainCfm, locale).replace("−", "")} CFM.`, words: "Check valve lapping, then read it again or leave a note." });
      }
    }
    if (gain?.state !== "withheld") {
      for (const col of [side.before, side.after]) {
        if (!col || col.test.state === "void") continue;
        const at = col.test.benchCheckedAt;
        const hours = at === null ? Infinity : (new Date(col.test.startedAt).getTime() - new Date(at).getTime()) / 3_600_000;
        if (hours > benchCheckHours) {
          add({ key: `check-${col.when}`, title: at === null ? "The bench has not been checked." : `The bench check was ${Math.round(hours)} h old.`, words: `${col.head} relies on it; it holds for ${benchCheckHours} h. Check the bench, or no difference will be shown.` });
        }
      }
    }
  }
  for (const col of figures.sides.flatMap((s) => [s.before, s.after])) {
    for (const { flag } of col?.figures.doubts ?? []) {
      if (col && (flag === "NOT_TESTED_TO_CAM_LIFT" || flag === "LIFT_ZERO_DRIFT")) add({ key: `${flag}-${col.side}-${col.when}`, title: `${SIDE_WORDS[col.side]}, ${col.head.toLowerCase()}.`, words: FLOW_FLAGS[flag] });
    }
  }
  return [...notes.values()];
}

export function SheetNotes({ notes, children }: { notes: readonly SheetNote[]; children?: ReactNode }) {
  if (notes.length === 0 && !children) return null;
  return (
    <section className="warns" aria-label="Can these tests be compared?">
      {children}
      {notes.map((n) => <Note key={n.key} tone="warn" title={n.title}>{n.words}</Note>)}
    </section>
  );
}
