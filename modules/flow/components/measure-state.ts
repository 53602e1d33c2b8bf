"use client";

import { useCallback, useMemo, useState, useSyncExternalStore } from "react";
import { usePlace } from "@/modules/ui/place";
import { measureKind } from "../domain/measure-kinds";
import { lineKey, type LinePlace, type Stage } from "../domain/measure-line";
import { measuredValue, measureQuestion } from "../domain/measure-value";
import type { MeasurementSheet } from "../queries/measurements";
import { keptLineKey, MeasureQueue, type KeptLine, type SavedLine, type StuckLine } from "./measure-queue";
import { deviceStore, lineSender } from "./measure-store";
import { useSending } from "./use-sending";

/** A line as it is shown: what is typed and not yet in the records, else what stands there. */
export interface Entry { readonly text: string; readonly unit: string; readonly isKeptHere: boolean; readonly stuck: StuckLine | null }
/** Which line, and the unit a bare number in it is meant in. */
export interface LineAsked { readonly stage: Stage; readonly place: LinePlace; readonly kind: string; readonly unit: string }
interface Standing { readonly text: string; readonly revision: number; readonly unit: string }

const withUnit = (valueText: string, unit: string): string => (valueText === "" ? "" : `${valueText} ${unit}`);
const keyOf = (l: Pick<KeptLine, "stage" | "place" | "kind">): string => lineKey(l.stage, l.place, l.kind);

/** Lines of one sheet. Each typed value is kept on the device first and stays there until the records have it. */
export function useMeasureLines(sheet: MeasurementSheet, instrument: string) {
  const { slug } = usePlace();
  const headId = sheet.head.id;
  const [standing, setStanding] = useState<ReadonlyMap<string, Standing>>(() => new Map(sheet.cells.map((c) => [
    lineKey(c.stage, { cylinder: c.cylinder, side: c.side, position: c.position as LinePlace["position"] }, c.kind),
    { text: withUnit(c.valueText, c.unit), revision: c.revision, unit: c.unit },
  ])));
  const [savedAt, setSavedAt] = useState<Date | null>(null);
  const onSaved = useCallback(({ line, revision, valueText, unit }: SavedLine) => {
    setSavedAt(new Date());
    if (line.headId === headId) setStanding((now) => new Map(now).set(keyOf(line), { text: withUnit(valueText, unit), revision, unit }));
  }, [headId]);
  const [queue] = useState(() => new MeasureQueue(deviceStore(slug), lineSender(slug), (s) => onSaved(s), sheet.viewerId));
  const state = useSyncExternalStore(queue.subscribe, queue.snapshot, queue.snapshot);

  useSending(queue);

  const entries = useMemo(() => {
    const out = new Map<string, Entry>([...standing].map(([key, s]) => [key, { text: s.text, unit: s.unit, isKeptHere: false, stuck: null }]));
    for (const line of state.lines.values()) {
      const last = line.edits.at(-1);
      if (line.headId === headId && last) out.set(keyOf(line), { text: last.value, unit: last.unit, isKeptHere: true, stuck: line.stuck });
    }
    return out;
  }, [standing, state, headId]);

  const at = useCallback((l: LineAsked) => ({ shop: slug, headId, stage: l.stage, place: l.place, kind: l.kind, revision: standing.get(keyOf(l))?.revision ?? 0 }), [slug, headId, standing]);
  const queueKey = useCallback((l: LineAsked) => keptLineKey(sheet.viewerId, at(l)), [sheet.viewerId, at]);

  const type = useCallback((l: LineAsked, value: string) => void queue.write(at(l), { requestId: crypto.randomUUID(), value, unit: l.unit, instrument, confirmed: false }), [queue, at, instrument]);

  /** Sends the line, or holds it where it is doubtful or no number. Called when it is left. */
  const leave = useCallback((l: LineAsked) => {
    const key = queueKey(l);
    const kept = queue.snapshot().lines.get(key);
    const last = kept?.edits.at(-1);
    if (!kept || !last || last.sent || kept.stuck) return;
    const was = standing.get(keyOf(l));
    const text = last.value.trim();
    if (kept.edits.length === 1 && text === (was?.text ?? "")) {
      void queue.discard(key);
      return;
    }
    const kind = measureKind(l.kind);
    if (kind && text !== "") {
      const value = measuredValue(text, kind, last.unit);
      const question = value.ok ? measureQuestion(value.value, kind) : null;
      if (!value.ok || (question && !last.confirmed)) {
        void queue.hold(key, value.ok ? (question?.words ?? "") : value.refusal.message, value.ok);
        return;
      }
    }
    void queue.release(key).then(() => queue.flush());
  }, [queue, queueKey, standing]);

  /** Values by kind of one place, from what stands there or is being typed. */
  const measured = useCallback((stage: Stage, place: LinePlace): Map<string, number> => {
    const out = new Map<string, number>();
    const prefix = lineKey(stage, place, "");
    for (const [key, entry] of entries) {
      if (!key.startsWith(prefix) || entry.text.trim() === "") continue;
      const kind = measureKind(key.slice(prefix.length));
      const value = kind ? measuredValue(entry.text, kind, entry.unit) : null;
      if (kind && value?.ok) out.set(kind.key, value.value.base);
    }
    return out;
  }, [entries]);

  return {
    entries, state, savedAt, type, leave, measured,
    keepAsTyped: (l: LineAsked) => void queue.insist(queueKey(l), crypto.randomUUID()).then(() => queue.flush()),
    /** What was typed is let go; what somebody else wrote there meanwhile is shown instead. */
    forget: (l: LineAsked) => {
      const theirs = queue.snapshot().lines.get(queueKey(l))?.stuck?.theirs;
      if (theirs) setStanding((now) => new Map(now).set(keyOf(l), { text: withUnit(theirs.valueText, theirs.unit), revision: theirs.revision, unit: theirs.unit }));
      void queue.discard(queueKey(l));
    },
    tryAgain: () => void queue.flush(),
  };
}
