"use client";
import { useState } from "react";
import { Button } from "@/modules/ui/button";
import { Note } from "@/modules/ui/note";
import { usePlace } from "@/modules/ui/place";
import { dismissCautionsAction } from "../../actions";
import { BENCH_CAUTIONS, CAUTION_CLOSE } from "../../domain/bench-cautions";

/** Hazards of a bench session, until this person has confirmed them for the job. Nothing waits for it. */
export function BenchCautionsNote({ headId, hazards, viewer }: { headId: string; hazards: readonly string[]; viewer: string }) {
  const { slug } = usePlace();
  const [gone, setGone] = useState(false);
  const [trouble, setTrouble] = useState(false);
  const shown = BENCH_CAUTIONS.filter((c) => hazards.includes(c.hazard));
  if (gone || shown.length === 0) return null;
  const seen = async () => {
    const reply = await dismissCautionsAction(slug, { requestId: crypto.randomUUID(), input: { headId, hazards: shown.map((c) => c.hazard) } }).catch(() => null);
    if (reply?.status === "ok") setGone(true);
    else setTrouble(true);
  };
  return (
    <Note
      tone="warn" title="Before the blower starts." className="mb-5"
      action={<Button size="sm" onClick={() => void seen()}>Read, {viewer}</Button>}
    >
      {shown.map((c) => <span key={c.hazard}><b>{c.title}</b> {c.words} <span className="dim">({c.source})</span> </span>)}
      <span className="mid">{CAUTION_CLOSE}{trouble ? " That could not be kept just now; press again." : ""}</span>
    </Note>
  );
}
