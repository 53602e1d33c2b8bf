"use client";

import { useState } from "react";
import { longDay } from "@/modules/kernel/format";
import { localDate, localMinute } from "@/modules/kernel/instant";
import { Icon } from "@/modules/ui/icon";

const REASONS = ["The one before is on another bench", "Machine was free now", "Lead said so", "Parts came only now"];

/** A start that needs a reason: one touch for the usual ones, or typed. */
export function ReasonPanel({ title, message, onReason, onBack }: { title: string; message: string; onReason: (reason: string) => void; onBack: () => void }) {
  const [typed, setTyped] = useState("");
  return (
    <section aria-labelledby="ask-h">
      <h2 id="ask-h" className="mb-2 font-cut text-h3 font-bold">{title}</h2>
      <p className="mid mb-4 text-body" role="alert">{message}</p>
      <div className="k-list">{REASONS.map((r) => <button key={r} type="button" className="k-key" onClick={() => onReason(r)}>{r}</button>)}</div>
      <label htmlFor="why" className="eng ink mt-4 block">Another reason</label>
      <textarea id="why" className="k-in mt-2" rows={2} maxLength={500} value={typed} onChange={(e) => setTyped(e.target.value)} />
      <div className="mt-3 flex gap-[10px]">
        <button type="button" className="k-key flex-1" onClick={onBack}>Back</button>
        <button type="button" className="k-key k1 flex-1" aria-disabled={typed.trim() === ""} onClick={() => { if (typed.trim()) onReason(typed.trim()); }}>Start with this</button>
      </div>
    </section>
  );
}

/** "When did you leave on Tuesday?" The last thing seen of the person stands in the field. */
export function LeftPanel({ missing, zone, locale, trouble, linked, onSay }: {
  missing: { since: string; lastSeen: string }; zone: string; locale: string; trouble: { message: string; twice: boolean } | null; linked: boolean; onSay: (leftAt: string, which?: "first" | "second") => void;
}) {
  const [leftAt, setLeftAt] = useState(() => localMinute(new Date(missing.lastSeen), zone));
  return (
    <section aria-labelledby="left-h">
      <h2 id="left-h" className="mb-2 font-cut text-h3 font-bold">When did you leave on {longDay(localDate(new Date(missing.since), zone), locale)}?</h2>
      <p className="mid mb-4 text-body">There is no out. The last thing seen of you stands here; put it right.</p>
      <label htmlFor="left" className="eng ink">Left at</label>
      <input id="left" type="datetime-local" className="k-in mt-2" value={leftAt} onChange={(e) => setLeftAt(e.target.value)} aria-invalid={trouble !== null} aria-describedby={trouble ? "left-err" : undefined} />
      {trouble ? <p id="left-err" className="err mt-2" role="alert"><Icon name="warn" size={18} /> {trouble.message}</p> : null}
      <div className="mt-4 flex gap-[10px]">
        {trouble?.twice
          ? <><button type="button" className="k-key flex-1" onClick={() => onSay(leftAt, "first")}>The first one</button><button type="button" className="k-key flex-1" onClick={() => onSay(leftAt, "second")}>The second one</button></>
          : <button type="button" className="k-key k1 flex-1" aria-disabled={!linked} onClick={() => { if (linked) onSay(leftAt); }}>{linked ? "That is right" : "Needs the link"}</button>}
      </div>
    </section>
  );
}
