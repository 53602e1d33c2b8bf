"use client";
import { useCallback, useEffect, useMemo, useRef, useState, useSyncExternalStore } from "react";
import { getJson } from "@/modules/ui/fetch-json";
import { arrivedReadings } from "../../domain/arrived-readings";
import type { PortSide } from "../../domain/comparison-reasons";
import { SCALE_UNIT } from "../../domain/computed-reading";
import { mayBeKept } from "../../domain/entry-questions";
import { lastRead, rangeOfCell, type PressedRange } from "../../domain/range-choice";
import type { RawCell, RawTest } from "../../domain/raw-test";
import { figuresOfTest } from "../../domain/test-figures";
import type { FlowSheet } from "../../queries/sheet";
import { nextEdit, type CellMore } from "./next-edit";
import { keptKey, ReadingQueue, type CellEdit, type KeptCell, type SavedCell, type Stuck } from "./reading-queue";
import { readingSender, tabletStore } from "./reading-store";
import { sheetFigures, withTyped, type When } from "./sheet-figures";
import { useSending } from "../use-sending";

export interface Pos { readonly side: PortSide; readonly when: When; readonly testId: string; readonly liftUm: number; readonly repeatNo: number }
interface Stood { readonly value: string; readonly range: string | null }
interface Undo extends Stood { readonly pos: Pos }

const lastEdit = (cell: KeptCell | undefined): CellEdit | undefined => cell?.edits.at(-1);

/** A kept value as a cell of its test, so that figures and curve follow the key, not the network. */
function rawOf(cell: KeptCell, edit: CellEdit, test: RawTest): RawCell {
  return {
    liftUm: cell.liftUm, repeatNo: cell.repeatNo, revision: cell.revision + 1, valueText: edit.value, valueUnit: edit.valueUnit ?? SCALE_UNIT[test.bench.scale], rangeLabel: edit.range,
    pressureText: edit.pressure || String(test.nominalInH2O), pressureUnit: edit.pressureUnit ?? "inH2O",
    ...(edit.portTemperature ? { portTemperatureText: edit.portTemperature } : {}), ...(edit.orificeTemperature ? { orificeTemperatureText: edit.orificeTemperature } : {}), acceptedReason: edit.acceptedReason,
    // A value that waits for a person is shown where it stands, and drawn nowhere.
    excludedReason: edit.excludedReason ?? (cell.stuck && cell.stuck.kind !== "conflict" ? "held back" : null), takenAt: edit.takenAt,
  };
}

/** State of one flow sheet in the browser: what is typed, what is saved, what waits, and the way back. */
export function useSheet(sheet: FlowSheet, slug: string) {
  const [saved, setSaved] = useState<readonly RawTest[]>(sheet.tests);
  const [savedAt, setSavedAt] = useState<Date | null>(null);
  const [pressed, setPressed] = useState<PressedRange | null>(null);
  const [held, setHeld] = useState("");
  const undos = useRef<Undo[]>([]);
  const committed = useRef(new Map<string, Stood>());
  const idle = useRef<ReturnType<typeof setTimeout> | undefined>(undefined);
  const recheck = useRef<() => Promise<void>>(() => Promise.resolve());

  const onSaved = useCallback(({ cell, edit, revision }: SavedCell) => {
    setSavedAt(new Date());
    setSaved((tests) => tests.map((t) => (t.id === cell.testId ? withTyped(t, [{ ...rawOf(cell, edit, t), revision }]) : t)));
  }, []);
  const [queue] = useState(() => new ReadingQueue(tabletStore(slug), readingSender(slug), (s) => onSaved(s), sheet.viewer.id));
  const state = useSyncExternalStore(queue.subscribe, queue.snapshot, queue.snapshot);

  useSending(queue, () => recheck.current());

  const tests = useMemo(() => saved.map((t) => withTyped(t, [...state.cells.values()].filter((c) => c.testId === t.id).flatMap((c) => { const e = lastEdit(c); return e ? [rawOf(c, e, t)] : []; }))), [saved, state]);
  const figures = useMemo(() => sheetFigures(tests, sheet.benchCheckHours, { valves: sheet.head.valves, sections: sheet.sections }), [tests, sheet.benchCheckHours, sheet.head.valves, sheet.sections]);

  const keyOf = useCallback((pos: Pos) => keptKey(slug, pos.testId, pos.liftUm, pos.repeatNo), [slug]);
  const savedCell = useCallback((pos: Pos) => saved.find((t) => t.id === pos.testId)?.cells.find((c) => c.liftUm === pos.liftUm && c.repeatNo === pos.repeatNo), [saved]);
  const textAt = useCallback((pos: Pos): string => lastEdit(state.cells.get(keyOf(pos)))?.value ?? savedCell(pos)?.valueText ?? "", [state, keyOf, savedCell]);
  const keptAt = useCallback((pos: Pos): KeptCell | undefined => state.cells.get(keyOf(pos)), [state, keyOf]);

  const rangeAt = useCallback((pos: Pos): string | null => {
    const test = tests.find((t) => t.id === pos.testId);
    const typed = lastEdit(queue.snapshot().cells.get(keyOf(pos)));
    if (!test || test.bench.scale === "direct") return (typed ? typed.range : savedCell(pos)?.rangeLabel) ?? null;
    return rangeOfCell({
      cell: keyOf(pos), pressed, typed: typed ? { valueText: typed.value, rangeLabel: typed.range } : null, saved: savedCell(pos) ?? null,
      last: lastRead(test.cells.filter((c) => c.liftUm !== pos.liftUm || c.repeatNo !== pos.repeatNo)), ranges: test.bench.ranges,
    });
  }, [tests, queue, keyOf, pressed, savedCell]);

  const put = useCallback((pos: Pos, value: string, more: CellMore = {}) => {
    const test = saved.find((t) => t.id === pos.testId);
    if (!test) return;
    const kept = queue.snapshot().cells.get(keyOf(pos));
    const before = savedCell(pos);
    const was = lastEdit(kept);
    const edit = nextEdit({ scale: test.bench.scale, value, more, was: was ?? null, saved: before ?? null, held, range: rangeAt(pos), requestId: crypto.randomUUID(), at: new Date().toISOString() });
    void queue.write({
      key: keyOf(pos), shop: slug, testId: pos.testId, liftUm: pos.liftUm, lift: test.lifts.find((l) => l.liftUm === pos.liftUm)?.text ?? String(pos.liftUm / (test.liftUnit === "in" ? 25_400 : 1000)),
      liftUnit: test.liftUnit, repeatNo: pos.repeatNo, revision: before?.revision ?? 0,
    }, edit);
  }, [saved, queue, keyOf, savedCell, slug, rangeAt, held]);

  /** A kept value among the others of its test, whether or not it is held back. */
  const judged = useCallback((testId: string, key: string, at: Pick<Pos, "liftUm" | "repeatNo">) => {
    const test = saved.find((t) => t.id === testId);
    if (!test) return null;
    const others = [...queue.snapshot().cells.values()].filter((c) => c.testId === testId).flatMap((c) => { const e = lastEdit(c); return e ? [rawOf(c.key === key ? { ...c, stuck: null } : c, e, test)] : []; });
    return figuresOfTest(withTyped(test, others)).cells.find((c) => c.liftUm === at.liftUm && c.repeatNo === at.repeatNo) ?? null;
  }, [saved, queue]);

  /** What was held back under other conditions of the test goes once nothing stands against it any more. */
  useEffect(() => {
    recheck.current = async () => {
      for (const c of queue.snapshot().cells.values()) {
        if (!c.stuck || c.stuck.theirs || c.person !== sheet.viewer.id) continue;
        const now = judged(c.testId, c.key, c);
        if (now && !now.refusal && !now.question) await queue.unhold(c.key, crypto.randomUUID());
      }
    };
  }, [judged, queue, sheet.viewer.id]);

  /** Sends the cell, or holds it where it is doubtful or no number. Called when the cell is left. */
  const commit = useCallback((pos: Pos) => {
    clearTimeout(idle.current);
    const key = keyOf(pos);
    const kept = queue.snapshot().cells.get(key);
    const edit = lastEdit(kept);
    if (!kept || !edit || kept.stuck) return;
    const before = savedCell(pos);
    const isSame = before !== undefined && before.valueText === edit.value && before.rangeLabel === edit.range && before.acceptedReason === edit.acceptedReason && before.excludedReason === edit.excludedReason && (edit.pressure === "" || before.pressureText === edit.pressure)
      && (before.portTemperatureText ?? "") === (edit.portTemperature ?? "") && (before.orificeTemperatureText ?? "") === (edit.orificeTemperature ?? "");
    const neverSent = kept.edits.every((e) => !e.sent);
    if (neverSent && (isSame || (edit.value.trim() === "" && (before?.revision ?? 0) === 0))) {
      void queue.discard(key);
      return;
    }
    const stood = committed.current.get(key) ?? { value: before?.valueText ?? "", range: before?.rangeLabel ?? null };
    if (stood.value !== edit.value) undos.current.push({ pos, ...stood });
    committed.current.set(key, { value: edit.value, range: edit.range });
    const doubt = edit.value.trim() === "" ? null : judged(pos.testId, key, pos);
    if (doubt?.question && !edit.acceptedReason) {
      void queue.hold(key, doubt.question.words, true);
      return;
    }
    if (doubt?.refusal && !doubt.question && !(edit.acceptedReason && mayBeKept(doubt.refusal.code))) {
      void queue.hold(key, doubt.refusal.message, mayBeKept(doubt.refusal.code));
      return;
    }
    void queue.release(key).then(() => queue.flush());
  }, [keyOf, queue, savedCell, judged]);

  const type = useCallback((pos: Pos, value: string) => {
    put(pos, value);
    clearTimeout(idle.current);
    idle.current = setTimeout(() => commit(pos), 4_000);
  }, [put, commit]);

  /** Back to what the cell said before. Returns where that was. */
  const undo = useCallback((at: Pos | null): Pos | null => {
    const now = at ? lastEdit(queue.snapshot().cells.get(keyOf(at)))?.value : undefined;
    const saw = at ? savedCell(at) : undefined;
    const stands = (at && committed.current.get(keyOf(at))) ?? { value: saw?.valueText ?? "", range: saw?.rangeLabel ?? null };
    const back = ({ value, range }: Stood): CellMore => (value === "" ? {} : { range });
    if (at && now !== undefined && now !== stands.value) {
      put(at, stands.value, back(stands));
      commit(at);
      return at;
    }
    const last = undos.current.pop();
    if (!last) return null;
    committed.current.set(keyOf(last.pos), last);
    put(last.pos, last.value, back(last));
    void queue.release(keyOf(last.pos)).then(() => queue.flush());
    return last.pos;
  }, [queue, keyOf, savedCell, put, commit]);

  /** Takes over what a bench computer has sent meanwhile. Answers how many readings came; null without a link. */
  const takeFromBench = useCallback(async (): Promise<number | null> => {
    try {
      const fresh = await getJson<FlowSheet>(`/api/v1/s/${slug}/flow/sheet`, { headId: sheet.head.id, cylinder: sheet.cylinder });
      setSaved(fresh.tests);
      return arrivedReadings(saved, fresh.tests);
    } catch {
      return null;
    }
  }, [slug, sheet.head.id, sheet.cylinder, saved]);

  const mark = useCallback((pos: Pos, more: CellMore) => {
    put(pos, textAt(pos), more);
    commit(pos);
  }, [put, textAt, commit]);

  /** A range pressed by hand for the cell in hand: it holds for this cell, and for empty ones until the next reading. */
  const pressRange = useCallback((pos: Pos, label: string) => {
    setPressed({ cell: keyOf(pos), label, at: new Date().toISOString() });
    if (textAt(pos) !== "") mark(pos, { range: label });
  }, [keyOf, textAt, mark]);

  return {
    /** Null when every value of this sheet is in the records; otherwise what stands in the way, in words. */
    settle: async (): Promise<string | null> => {
      await queue.flush();
      const here = [...queue.snapshot().cells.values()].filter((c) => sheet.tests.some((t) => t.id === c.testId));
      if (here.some((c) => c.stuck)) return "A reading waits for you: keep it with a reason, or forget it.";
      return here.length > 0 ? "Some readings are not saved yet. They go as soon as the link is back." : null;
    },
    tests, figures, state, savedAt, rangeAt, pressRange, held, setHeld, textAt, keptAt, type, commit, undo, takeFromBench, mark,
    keepWithReason: (pos: Pos, reason: string) => mark(pos, { acceptedReason: reason }),
    discard: (pos: Pos) => void queue.discard(keyOf(pos)),
    insist: (pos: Pos) => void queue.insist(keyOf(pos), crypto.randomUUID()).then(() => queue.flush()),
    stuckAt: (pos: Pos): Stuck | null => keptAt(pos)?.stuck ?? null,
  };
}
export type Sheet = ReturnType<typeof useSheet>;
