"use client";

import { useState } from "react";
import { Button } from "@/modules/ui/button";
import { Note } from "@/modules/ui/note";
import { usePlace } from "@/modules/ui/place";
import { markCautionsSeenAction } from "../caution-actions";
import { CAUTION_CLOSE, cautionsFor } from "../domain/cautions";

/**
 * What can hurt at this step, once a job for each person; on a head of the shop's own (`headId`, no order) once a day. `hazards` are
 * the ones still to be shown (`cautionsToShow`, `cautionsOfOwnHead`). It never blocks the work beside it.
 */
export function CautionNote({ hazards, workOrderId, headId, step, big = false }: { hazards: readonly string[]; workOrderId: string | null; headId?: string; step: string; big?: boolean }) {
  const { slug } = usePlace();
  const [state, setState] = useState<"shown" | "sending" | "gone" | "failed">("shown");
  const [requestId] = useState(() => crypto.randomUUID());
  const cautions = cautionsFor(hazards);
  if (cautions.length === 0 || state === "gone") return null;

  const job = workOrderId !== null ? { workOrderId } : headId !== undefined ? { headId } : null;
  const read = async (on: NonNullable<typeof job>) => {
    setState("sending");
    try {
      const reply = await markCautionsSeenAction(slug, { requestId, input: { ...on, hazards: cautions.map((c) => c.hazard), step } });
      setState(reply.status === "ok" ? "gone" : "failed");
    } catch {
      setState("failed");
    }
  };
  return (
    <section aria-label="Before you begin" className="noprint">
      <Note big={big}>
        {cautions.map((c) => (
          <span key={c.hazard} className="mb-1 block"><b>{c.title}</b> {c.words} <span className="dim sm">{c.source}.</span></span>
        ))}
        <span className="mid block">{CAUTION_CLOSE}</span>
        {job === null ? null : <span className="mt-2 block"><Button size={big ? "xl" : "sm"} pending={state === "sending"} pendingText="Writing it down…" onClick={() => void read(job)}>I have read this</Button></span>}
        {state === "failed" ? <span role="alert" className="block"><b>Not written down.</b> The work can go on; try again when the link is back.</span> : null}
      </Note>
    </section>
  );
}
