"use client";

import { useState, type FormEvent } from "react";
import { Icon } from "@/modules/ui/icon";
import { KioskStrip } from "@/modules/ui/kiosk-strip";
import { Note } from "@/modules/ui/note";
import { enrol } from "./send";

/** A tablet that belongs to no shop yet, or no longer: the manager's code makes it one. */
export function EnrolScreen({ kept, onEnrolled }: { kept: number; onEnrolled: () => void }) {
  const [code, setCode] = useState("");
  const [trouble, setTrouble] = useState<string | null>(null);
  const [busy, setBusy] = useState(false);
  const send = async (event: FormEvent) => {
    event.preventDefault();
    if (busy) return;
    if (code.replace(/[^0-9a-z]/gi, "").length !== 8) { setTrouble("Type the eight letters and digits of the code, such as 7KMP-Q2XD."); return; }
    setBusy(true);
    const said = await enrol(code);
    setBusy(false);
    if (said.kind === "ok") onEnrolled();
    else setTrouble(said.kind === "refused" ? said.message : "No answer from the shop. Check the link and try again.");
  };
  return (
    <div className="kiosk">
      <KioskStrip name="Clock" sub="This tablet is not enrolled" linked clock="" />
      <main id="main" className="k-cols">
        <section>
          <h1 className="mb-3 font-cut text-h3 font-bold">Type the code for this tablet</h1>
          <p className="mid mb-6 text-lead">A manager makes it under Shop settings, Tablets. It works once, for ten minutes.</p>
          <form onSubmit={(event) => void send(event)} noValidate>
            <label htmlFor="code" className="eng ink" style={{ fontSize: "0.9375rem" }}>Code</label>
            <input
              id="code" className="mt-2 h-[76px] w-full rounded-bay border-2 border-line-2 bg-well px-5 text-num-m uppercase tracking-widest" style={{ fontSize: "2rem" }} autoComplete="off" autoCapitalize="characters" spellCheck={false}
              value={code} onChange={(e) => setCode(e.target.value)} aria-invalid={trouble !== null} aria-describedby={trouble ? "code-err" : undefined} maxLength={12}
            />
            {trouble ? <p id="code-err" className="err mt-2" role="alert"><Icon name="warn" size={18} /> {trouble}</p> : null}
            <button type="submit" className="k-key k1 mt-6 w-full">{busy ? "Asking…" : "Enrol this tablet"}</button>
          </form>
        </section>
        <section>{kept > 0 ? <Note tone="warn" big title={`${kept} ${kept === 1 ? "time waits" : "times wait"} on this tablet.`}>They are kept. Enrol it again and they are sent.</Note> : null}</section>
      </main>
    </div>
  );
}
