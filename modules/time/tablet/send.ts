import type { ClockBoard, OwnScreen } from "../board";
import { LIVE_SECONDS_MAX } from "../domain/punch-time";
import { clockOffset } from "./clock-offset";
import { dropItem, keptItems, markRefused, writeOffset, type KeptItem } from "./store";

export type Said = { readonly kind: "ok"; readonly value: unknown } | { readonly kind: "refused"; readonly code: string; readonly message: string; readonly data: Record<string, unknown> } | { readonly kind: "no link" } | { readonly kind: "not enrolled" };

const WAIT_MS = 8_000;

async function ask(path: string, init: RequestInit): Promise<Said> {
  try {
    const response = await fetch(path, { ...init, signal: AbortSignal.timeout(WAIT_MS), cache: "no-store", credentials: "same-origin" });
    if (response.ok) return { kind: "ok", value: await response.json() };
    if (response.status === 401) return { kind: "not enrolled" };
    if (response.status >= 500 || response.status === 429) return { kind: "no link" };
    const body = (await response.json().catch(() => ({}))) as { title?: string; code?: string; data?: Record<string, unknown> };
    return { kind: "refused", code: body.code ?? String(response.status), message: body.title ?? "This was not taken.", data: body.data ?? {} };
  } catch {
    return { kind: "no link" };
  }
}

const post = (path: string, body: unknown, requestId: string) =>
  ask(path, { method: "POST", headers: { "content-type": "application/json", "idempotency-key": requestId }, body: JSON.stringify(body) });

/** The board, and by the way how far the tablet's clock is off. */
export async function fetchBoard(): Promise<Said & { board?: ClockBoard; offsetMs?: number }> {
  const [sentAt, begun] = [Date.now(), performance.now()];
  const said = await ask("/api/v1/clock/board", { method: "GET" });
  if (said.kind !== "ok") return said;
  const board = said.value as ClockBoard;
  const offsetMs = clockOffset({ sentAt, receivedAt: Date.now(), elapsedMs: performance.now() - begun, serverAt: new Date(board.at).getTime() });
  if (offsetMs === null) return { ...said, board };
  await writeOffset(offsetMs);
  return { ...said, board, offsetMs };
}

export const askWho = async (input: { kind: "badge"; badge: string } | { kind: "pin"; personId: string; pin: string }): Promise<Said & { own?: OwnScreen }> => {
  const said = await post("/api/v1/clock/identify", input, crypto.randomUUID());
  return said.kind === "ok" ? { ...said, own: said.value as OwnScreen } : said;
};

export const enrol = (code: string): Promise<Said> => post("/api/v1/clock/enrol", { code }, crypto.randomUUID());

/**
 * Sends what is kept, in its order, until there is none or no link. One tab at a time. What the server has is dropped here;
 * what it refuses is dropped when it was just pressed (the person is told), and marked when it was kept.
 */
export async function sendKept(): Promise<Map<string, Said>> {
  const said = new Map<string, Said>();
  await navigator.locks.request("valvekeeper-clock-send", async () => {
    for (const item of await keptItems()) {
      if (item.refused !== undefined) continue;
      const answer = await post("/api/v1/clock/punches", { press: item.press, input: item.input }, item.requestId);
      said.set(item.requestId, answer);
      if (answer.kind === "no link" || answer.kind === "not enrolled") return;
      if (answer.kind === "ok" || isLive(item)) await dropItem(item.counter);
      else await markRefused(item, answer.message);
    }
  });
  return said;
}

const isLive = (item: KeptItem): boolean => Date.now() - new Date(item.deviceAt).getTime() <= (LIVE_SECONDS_MAX + WAIT_MS / 1000) * 1000;
