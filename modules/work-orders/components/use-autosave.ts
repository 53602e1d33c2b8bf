"use client";

import { useCallback, useEffect, useRef, useState } from "react";
import { settles, type Reply } from "@/modules/ui/form/reply";

export type SaveState =
  | { kind: "saved"; at: string | null }
  | { kind: "unsaved" }
  | { kind: "saving" }
  | { kind: "wrong"; message: string }
  | { kind: "conflict"; message: string }
  | { kind: "no-link" };

const PAUSE_MS = 900;

/**
 * Saves a draft when the hand rests. One save is under way at a time; what was typed meanwhile goes with the next.
 * `send` returns the reply of the command; `settled` hears of the new version. A save that got no answer may have been done:
 * the next one first sends that very request again, so that nobody meets a conflict with themselves.
 */
export function useAutosave<Values, Value extends { version: number; savedAt: string }>({ read, check, send, settled, wrong: tellField }: {
  read: () => Values;
  /** What is wrong with it as it stands, or null when it can be sent. */
  check: (values: Values) => string | null;
  send: (values: Values, requestId: string) => Promise<Reply<Value>>;
  settled: (value: Value) => void;
  /** A refusal that belongs to one field. */
  wrong: (path: string, message: string) => void;
}) {
  const [state, setState] = useState<SaveState>({ kind: "saved", at: null });
  const timer = useRef<ReturnType<typeof setTimeout> | undefined>(undefined);
  const running = useRef<Promise<boolean> | null>(null);
  const again = useRef(false);
  const unsettled = useRef<{ values: Values; requestId: string } | null>(null);

  const save = useCallback(async (): Promise<boolean> => {
    clearTimeout(timer.current);
    if (running.current) {
      again.current = true;
      await running.current;
      if (!again.current) return true;
    }
    again.current = false;
    const ask = async (request: { values: Values; requestId: string }): Promise<Reply<Value>> => {
      unsettled.current = request;
      const reply = await send(request.values, request.requestId);
      if (settles(reply)) unsettled.current = null;
      if (reply.status === "ok") settled(reply.value);
      return reply;
    };
    const work = (async () => {
      let values = read();
      const wrong = check(values);
      if (wrong !== null) {
        setState({ kind: "wrong", message: wrong });
        return false;
      }
      setState({ kind: "saving" });
      try {
        const earlier = unsettled.current ? await ask(unsettled.current) : null;
        if (earlier?.status === "ok") values = read();
        const reply = earlier && !settles(earlier) ? earlier : await ask({ values, requestId: crypto.randomUUID() });
        if (reply.status === "ok") {
          setState({ kind: "saved", at: reply.value.savedAt });
          return true;
        }
        if (reply.status === "refused" && reply.field !== undefined) tellField(reply.field, reply.message);
        if (reply.status === "invalid") for (const f of reply.fields) tellField(f.path, f.message);
        setState(reply.status === "refused" && !settles(reply) ? { kind: "no-link" } : reply.status === "conflict" ? { kind: "conflict", message: reply.message }
          : { kind: "wrong", message: reply.status === "refused" ? reply.message : reply.status === "invalid" ? (reply.fields[0]?.message ?? "Something is not right.") : reply.status === "signed-out" ? "You are signed out. Sign in in another tab; what you typed is still here." : `Something went wrong on our side, reference ${reply.reference}.` });
        return false;
      } catch {
        setState({ kind: "no-link" });
        return false;
      }
    })();
    running.current = work;
    const good = await work;
    running.current = null;
    return good;
  }, [read, check, send, settled, tellField]);

  const touch = useCallback(() => {
    setState((s) => (s.kind === "conflict" ? s : { kind: "unsaved" }));
    clearTimeout(timer.current);
    timer.current = setTimeout(() => { void save(); }, PAUSE_MS);
  }, [save]);

  useEffect(() => () => clearTimeout(timer.current), []);
  useEffect(() => {
    if (state.kind === "saved") return;
    const ask = (event: BeforeUnloadEvent) => event.preventDefault();
    window.addEventListener("beforeunload", ask);
    return () => window.removeEventListener("beforeunload", ask);
  }, [state.kind]);
  return { state, touch, save };
}
