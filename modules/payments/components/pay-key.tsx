"use client";
import { useState } from "react";
import { Button } from "@/modules/ui/button";
import { Note } from "@/modules/ui/note";
import { wordsOf } from "@/modules/ui/use-act";
import { startPaymentAction } from "../actions";

const TRIES = 15;
const pause = (ms: number) => new Promise((resolve) => setTimeout(resolve, ms));

/** The one key of a payment page: makes the provider's page, waits for it if it is slow, and goes there. */
export function PayKey({ token, label }: { token: string; label: string }) {
  const [pending, setPending] = useState(false);
  const [words, setWords] = useState<string | null>(null);
  const press = async () => {
    setPending(true);
    setWords(null);
    for (let i = 0; i < TRIES; i += 1) {
      try {
        const reply = await startPaymentAction(token, { requestId: crypto.randomUUID(), input: {} });
        if (reply.status !== "ok") { setWords(wordsOf(reply)); setPending(false); return; }
        if (reply.value.url) { window.location.assign(reply.value.url); return; }
      } catch {
        setWords("The link is weak. Trying again; nothing is paid twice.");
      }
      await pause(2000);
    }
    setWords("The payment page could not be made just now. Nothing was charged; try again in a minute, or call us.");
    setPending(false);
  };
  return (
    <>
      {words ? <Note tone="stop" live>{words}</Note> : null}
      <Button variant="go" size="xl" icon="lock" pending={pending} pendingText="Preparing your payment page…" onClick={() => void press()}>{label}</Button>
    </>
  );
}
