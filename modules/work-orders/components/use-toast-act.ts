"use client";

import { useRouter } from "next/navigation";
import { useRef, useState } from "react";
import type { Reply } from "@/modules/ui/form/reply";
import { useToast } from "@/modules/ui/toast";
import { wordsOf } from "@/modules/ui/use-act";

/** Runs one act of a key or menu: one at a time, under one request id until it is settled; says what came of it and looks again. */
export function useToastAct() {
  const router = useRouter();
  const toast = useToast();
  const [pending, setPending] = useState(false);
  const busy = useRef(false);
  const act = async <T>(send: (requestId: string) => Promise<Reply<T>>, done: (value: T) => string | null): Promise<boolean> => {
    if (busy.current) return false;
    busy.current = true;
    setPending(true);
    const id = crypto.randomUUID();
    try {
      const reply = await send(id).catch(() => send(id));
      if (reply.status !== "ok") {
        toast({ text: wordsOf(reply), tone: "failed" });
        return false;
      }
      const said = done(reply.value);
      if (said !== null) toast({ text: said });
      router.refresh();
      return true;
    } catch {
      toast({ text: "No link to the shop. Nothing was changed; try again.", tone: "failed" });
      return false;
    } finally {
      busy.current = false;
      setPending(false);
    }
  };
  return { act, pending };
}
