"use client";

import { useCallback, useMemo, useRef, useState } from "react";
import { settles } from "@/modules/ui/form/reply";
import { RequestIds } from "@/modules/ui/form/request-id";
import { usePlace } from "@/modules/ui/place";
import { measureKind } from "../domain/measure-kinds";
import { measuredValue } from "../domain/measure-value";
import { saveMeasurementsAction } from "../measure-actions";
import type { MeasurementSheet } from "../queries/measurements";

export type Stage = "before" | "after";
export interface LinePlace { cylinder: number; side: "" | "intake" | "exhaust"; position: "" | "single" | "left" | "centre" | "right" }
export interface Entry { text: string; revision: number; state: "kept" | "typed" | "sending" | "refused" | "offline"; message: string; asks: boolean; unit: string }

export const lineKey = (stage: Stage, p: LinePlace, kind: string): string => `${stage}/${p.cylinder}/${p.side}/${p.position}/${kind}`;
const EMPTY: Entry = { text: "", revision: 0, state: "kept", message: "", asks: false, unit: "" };

/** Lines of the sheet as they stand: kept ones from the server, and what is being typed. Nothing typed is dropped by a no or a lost link. */
export function useMeasureEntries(sheet: MeasurementSheet, instrument: string) {
  const { slug } = usePlace();
  const [ids] = useState(() => new RequestIds());
  const [entries, setEntries] = useState<ReadonlyMap<string, Entry>>(() => new Map(sheet.cells.map((c) => [
    lineKey(c.stage, { cylinder: c.cylinder, side: c.side, position: c.position as LinePlace["position"] }, c.kind),
    { ...EMPTY, text: c.valueText === "" ? "" : `${c.valueText} ${c.unit}`, revision: c.revision, unit: c.unit },
  ])));
  const latest = useRef(entries);
  const put = useCallback((key: string, change: Partial<Entry>) => {
    const next = new Map(latest.current).set(key, { ...(latest.current.get(key) ?? EMPTY), ...change });
    latest.current = next;
    setEntries(next);
  }, []);
  const type = useCallback((key: string, text: string) => put(key, { text, state: "typed", message: "", asks: false }), [put]);

  const send = useCallback(async (keys: readonly { key: string; stage: Stage; place: LinePlace; kind: string; unit: string }[], confirmed = false) => {
    const due = keys.filter(({ key }) => { const e = latest.current.get(key); return e !== undefined && (e.state === "typed" || e.state === "offline" || (confirmed && e.asks)); });
    const [first] = due;
    if (!first) return;
    for (const d of due) put(d.key, { state: "sending", message: "" });
    const rows = due.map((d) => ({ ...d.place, kind: d.kind, value: (latest.current.get(d.key)?.text ?? "").trim(), unit: d.unit, confirmed, revisionSeen: latest.current.get(d.key)?.revision ?? 0 }))
      .map((row, i) => ({ row, key: due[i]?.key ?? "" }));
    const nothing = rows.filter(({ row }) => row.value === "" && row.revisionSeen === 0);
    for (const n of nothing) put(n.key, { state: "kept" });
    const real = rows.filter((r) => !nothing.includes(r));
    if (real.length === 0) return;
    const input = { headId: sheet.head.id, stage: first.stage, instrument, rows: real.map((r) => r.row) };
    const what = JSON.stringify(input);
    try {
      const reply = await saveMeasurementsAction(slug, { requestId: ids.take(what), input });
      if (settles(reply)) ids.settle(what);
      if (reply.status !== "ok") {
        const words = reply.status === "refused" || reply.status === "conflict" ? reply.message : reply.status === "invalid" ? (reply.fields[0]?.message ?? "Look at this again.") : "Not kept. Sign in again or try once more.";
        for (const r of real) put(r.key, { state: "offline", message: words });
        return;
      }
      for (const s of reply.value.saved) put(`${first.stage}/${s.key}`, { state: "kept", revision: s.revision, unit: s.unit, message: "", asks: false, text: s.valueText === "" ? "" : `${s.valueText} ${s.unit}` });
      for (const n of reply.value.refused) put(`${first.stage}/${n.key}`, { state: "refused", message: n.message, asks: n.asks });
    } catch {
      for (const r of real) put(r.key, { state: "offline", message: "No link. It is still here." });
    }
  }, [ids, instrument, put, sheet.head.id, slug]);

  /** Values by kind of one place, from what stands there or is being typed. */
  const measured = useCallback((stage: Stage, place: LinePlace, unitOf: (kind: string) => string): Map<string, number> => {
    const out = new Map<string, number>();
    const prefix = lineKey(stage, place, "");
    for (const [key, entry] of entries) {
      if (!key.startsWith(prefix) || entry.text.trim() === "") continue;
      const kind = measureKind(key.slice(prefix.length));
      const value = kind ? measuredValue(entry.text, kind, unitOf(kind.key)) : null;
      if (kind && value?.ok) out.set(kind.key, value.value.base);
    }
    return out;
  }, [entries]);
  const waiting = useMemo(() => [...entries].filter(([, e]) => e.state === "offline").length, [entries]);
  return { entries, type, send, measured, waiting };
}
