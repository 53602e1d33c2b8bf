"use client";

import { openDB, type DBSchema, type IDBPDatabase } from "idb";
import type { SavedMeasure, RefusedMeasure } from "../domain/measure-answer";
import type { KeptLine, LineSender, LineSent, LineStore } from "./measure-queue";

interface Kept extends DBSchema { lines: { key: string; value: KeptLine } }

/** Lines kept on this device, in the browser's own database. Where there is none, or it is full, they live as long as the page. */
export function deviceStore(shop: string): LineStore {
  const memory = new Map<string, KeptLine>();
  let opening: Promise<IDBPDatabase<Kept> | null> | null = null;
  const database = () => (opening ??= openDB<Kept>("valvekeeper-measure", 1, { upgrade: (db) => { db.createObjectStore("lines", { keyPath: "key" }); } }).catch(() => null));
  return {
    async all() {
      const db = await database();
      const kept = db ? await db.getAll("lines").catch(() => []) : [];
      return [...kept.filter((l) => !memory.has(l.key)), ...memory.values()].filter((l) => l.shop === shop);
    },
    async put(line) {
      const db = await database();
      const done = db ? await db.put("lines", line).then(() => true, () => false) : false;
      if (done) memory.delete(line.key);
      else memory.set(line.key, line);
    },
    async remove(key) {
      const db = await database();
      memory.delete(key);
      await db?.delete("lines", key).catch(() => undefined);
    },
  };
}

interface Answer { code?: string; saved?: SavedMeasure[]; refused?: RefusedMeasure[]; title?: string; fields?: { message: string }[] }

/** Sends one line to the shop's records. No answer, a broken one or "try again" counts as no link: the line stays. */
export const lineSender = (slug: string): LineSender => async (line, edit): Promise<LineSent> => {
  let response: Response;
  let body: Answer;
  try {
    response = await fetch(`/api/v1/s/${slug}/flow/measurements`, {
      method: "POST",
      headers: { "content-type": "application/json", "idempotency-key": edit.requestId },
      body: JSON.stringify({ by: line.person, headId: line.headId, stage: line.stage, instrument: edit.instrument, rows: [{ ...line.place, kind: line.kind, value: edit.value, unit: edit.unit, confirmed: edit.confirmed, revisionSeen: line.revision }] }),
      signal: AbortSignal.timeout(15_000),
    });
    body = (await response.json()) as Answer;
  } catch {
    return { status: "no-link" };
  }
  const [saved] = body.saved ?? [];
  const [refused] = body.refused ?? [];
  if (response.ok && saved) return { status: "saved", revision: saved.revision, valueText: saved.valueText, unit: saved.unit };
  if (response.ok && refused) return { status: "refused", message: refused.message, asks: refused.asks, theirs: refused.theirs };
  // Somebody else signed in meanwhile in another window: the line is not theirs to send.
  if (response.status === 401 || body.code === "OTHER_PERSON") return { status: "signed-out" };
  if (response.status >= 500 || response.status === 429 || response.ok) return { status: "no-link" };
  return { status: "refused", message: body.fields?.[0]?.message ?? body.title ?? "This value was not accepted.", asks: false, theirs: null };
};
