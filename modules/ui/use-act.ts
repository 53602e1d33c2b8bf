"use client";

import { useState } from "react";
import { useRouter } from "next/navigation";
import { settles, type Reply } from "./form/reply";

/** The words of an answer that is not yes. */
export function wordsOf(reply: Exclude<Reply<unknown>, { status: "ok" }>): string {
  switch (reply.status) {
    case "refused": case "conflict": return reply.message;
    case "invalid": return reply.fields.map((f) => f.message).join(" ") || "Some fields need another look.";
    case "signed-out": return "You were signed out. Sign in in another tab, then press again; nothing was lost.";
    case "error": return `Something broke on our side. Nothing was changed. Reference ${reply.reference}.`;
  }
}

/**
 * One press that does one thing, outside a form. The request id stays until an answer settled it, so that a second press
 * after a lost link does nothing twice. After yes the page's own facts are read anew.
 */
export function useAct<T>(action: (sent: { requestId: string; input: unknown }) => Promise<Reply<T>>, onDone?: (value: T) => void) {
  const router = useRouter();
  const [id, setId] = useState<string | null>(null);
  const [pending, setPending] = useState(false);
  const [trouble, setTrouble] = useState<{ text: string; code: string | null } | null>(null);
  const run = async (input: unknown): Promise<boolean> => {
    if (pending) return false;
    const requestId = id ?? crypto.randomUUID();
    setId(requestId);
    setPending(true);
    setTrouble(null);
    try {
      const reply = await action({ requestId, input });
      if (reply.status === "ok") {
        setId(null);
        onDone?.(reply.value);
        router.refresh();
        return true;
      }
      if (settles(reply)) setId(null);
      setTrouble({ text: wordsOf(reply), code: reply.status === "refused" ? reply.code : null });
    } catch {
      setTrouble({ text: "No answer came. Check the link and press again: it will not be done twice.", code: null });
    } finally {
      setPending(false);
    }
    return false;
  };
  return { run, pending, trouble, clear: () => setTrouble(null) };
}
