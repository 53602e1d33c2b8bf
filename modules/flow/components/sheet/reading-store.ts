"use client";
import { openDB, type DBSchema, type IDBPDatabase } from "idb";
import type { KeptCell, QueueStore, Sender, Sent } from "./reading-queue";

interface Kept extends DBSchema { cells: { key: string; value: KeptCell } }

/** Values kept on this tablet, in the browser's own database. Without one (private windows of some browsers) they live as long as the page. */
export function tabletStore(shop: string): QueueStore {
  const memory = new Map<string, KeptCell>();
  let opening: Promise<IDBPDatabase<Kept> | null> | null = null;
  const database = () => (opening ??= openDB<Kept>("valvekeeper-flow", 1, { upgrade: (db) => { db.createObjectStore("cells", { keyPath: "key" }); } }).catch(() => null));
  return {
    async all() {
      const db = await database();
      return (db ? await db.getAll("cells") : [...memory.values()]).filter((c) => c.shop === shop);
    },
    async put(cell) {
      const db = await database();
      if (db) await db.put("cells", cell);
      else memory.set(cell.key, cell);
    },
    async remove(key) {
      const db = await database();
      if (db) await db.delete("cells", key);
      else memory.delete(key);
    },
  };
}

interface Answer { revision?: number; valueText?: string; title?: string; code?: string; fields?: { message: string }[]; data?: { askReason?: boolean; revision?: number; valueText?: string } }

/** Sends one value to the shop's records. No answer, a broken one or "try again" counts as no link: the value stays. */
export const readingSender = (slug: string): Sender => async (cell, edit): Promise<Sent> => {
  let response: Response;
  let body: Answer;
  try {
    response = await fetch(`/api/v1/s/${slug}/flow/readings`, {
      method: "POST",
      headers: { "content-type": "application/json", "idempotency-key": edit.requestId },
      body: JSON.stringify({
        testId: cell.testId, lift: cell.lift, liftUnit: cell.liftUnit, repeatNo: cell.repeatNo, value: edit.value, revisionSeen: cell.revision, takenAt: edit.takenAt,
        ...(edit.valueUnit ? { valueUnit: edit.valueUnit } : {}), ...(edit.pressure === "" ? {} : { pressure: edit.pressure, ...(edit.pressureUnit ? { pressureUnit: edit.pressureUnit } : {}) }), ...(edit.range === null ? {} : { range: edit.range }),
        ...(edit.portTemperature ? { portTemperature: edit.portTemperature } : {}), ...(edit.orificeTemperature ? { orificeTemperature: edit.orificeTemperature } : {}),
        ...(edit.acceptedReason === null ? {} : { acceptedReason: edit.acceptedReason }), ...(edit.excludedReason === null ? {} : { excludedReason: edit.excludedReason }),
      }),
      signal: AbortSignal.timeout(15_000),
    });
    body = (await response.json()) as Answer;
  } catch {
    return { status: "no-link" };
  }
  if (response.ok && body.revision !== undefined) return { status: "saved", revision: body.revision, valueText: body.valueText ?? edit.value };
  if (response.status === 401) return { status: "signed-out" };
  if (response.status >= 500 || response.status === 429 || response.ok) return { status: "no-link" };
  const theirs = body.code === "CHANGED_MEANWHILE" && body.data?.revision !== undefined ? { revision: body.data.revision, valueText: body.data.valueText ?? "" } : null;
  return { status: "refused", code: body.code ?? "", message: body.fields?.[0]?.message ?? body.title ?? "This value was not accepted.", askReason: body.data?.askReason === true, theirs };
};
