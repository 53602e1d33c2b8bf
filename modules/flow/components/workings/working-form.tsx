"use client";

import { useEffect, useId, useRef, useState } from "react";
import { Bay, Bays } from "@/modules/ui/bay";
import { Button } from "@/modules/ui/button";
import { Note } from "@/modules/ui/note";
import { usePlace } from "@/modules/ui/place";
import type { Fields } from "../../workings/field";
import { addressOf, exampleTyped, workTyped, type Typed } from "../../workings/typed-inputs";
import type { Working } from "../../workings/working";
import { WorkingAnswer } from "./working-answer";
import { WorkingField } from "./working-field";

/** From so many inputs on, those beyond the worked example fold away. */
const FOLD_FROM = 10;
/** The address follows what is typed after so long, ms: browsers refuse a change at every key. */
const ADDRESS_AFTER_MS = 400;
const WIDE = "(min-width: 900px)";

/** Writes the inputs into the address, while it still is the address of this working. */
function followAddress(name: string, address: string): void {
  const { search } = window.location;
  if (search !== address && new URLSearchParams(search).get("f") === name) window.history.replaceState(null, "", address);
}

/** One working: its wells, and the answer at once as typed, by the same pure function as in the API. */
export function WorkingForm({ working, first, estimatesOn, takeFocus, onTyped }: { working: Working; first: Typed; estimatesOn: boolean; takeFocus: boolean; onTyped: (typed: Typed) => void }) {
  const { locale, zone } = usePlace();
  const [typed, setTyped] = useState(first);
  const [copied, setCopied] = useState("");
  const [emptied, setEmptied] = useState<Typed | null>(null);
  const id = useId();
  const title = useRef<HTMLHeadingElement>(null);
  const form = useRef<HTMLDivElement>(null);
  const address = addressOf(working.name, typed);
  const keepAddress = () => followAddress(working.name, address);
  useEffect(() => {
    const timer = setTimeout(() => followAddress(working.name, address), ADDRESS_AFTER_MS);
    return () => clearTimeout(timer);
  }, [working.name, address]);
  // Picked by hand: the hand goes on in the first well; on a phone the title, so that the keyboard does not cover the form.
  useEffect(() => {
    if (!takeFocus) return;
    const well = window.matchMedia(WIDE).matches ? form.current?.querySelector<HTMLElement>("input, select, textarea") : null;
    (well ?? title.current)?.focus();
  }, [takeFocus]);

  const set = (next: Typed) => { setTyped(next); setCopied(""); onTyped(next); };
  const worked = workTyped(working, typed, { zone, estimatesOn });
  const errors = worked.state === "refused" ? worked.at : {};
  const isFolded = Object.keys(working.fields).length >= FOLD_FROM;
  const isMain = (key: string) => !isFolded || working.worked.includes(key) || working.fields[key]?.optional === false;
  const wells = (fields: Fields, keys: readonly string[], before = "") => keys.map((key) => {
    const field = fields[key];
    const well = before + key;
    if (!field) return null;
    if (field.fields) {
      const inner = field.fields;
      return <fieldset key={well} className="full field"><legend className="eng ink">{field.label}</legend><div className="fields">{wells(inner, Object.keys(inner), `${well}.`)}</div></fieldset>;
    }
    return <WorkingField key={well} id={`${id}-${well}`} field={field} text={typed[well] ?? ""} error={errors[well]} onType={(text) => set({ ...typed, [well]: text })} />;
  });
  const main = Object.keys(working.fields).filter(isMain);
  const more = Object.keys(working.fields).filter((key) => !isMain(key));
  // The fold keeps as the hand left it: it must not shut over a well that is being emptied.
  const [isOpen, setOpen] = useState(() => more.some((key) => (first[key] ?? "") !== ""));
  const isEmpty = Object.values(typed).every((text) => text.trim() === "");
  const copy = async () => {
    keepAddress();
    try { await navigator.clipboard.writeText(window.location.href); setCopied("The address is copied."); } catch { setCopied("The browser did not copy it. Copy the address from its bar."); }
  };
  return (
    <article aria-labelledby={`${id}-title`}>
      <h2 id={`${id}-title`} ref={title} tabIndex={-1} className="font-cut text-h3">{working.title}</h2>
      <p className="mid mb-5 mt-1">{working.purpose}</p>
      <div className="split wk-one">
        <div ref={form} onBlur={keepAddress}>
          <Bay label="Given" level={3}>
            <div className="fields">{wells(working.fields, main)}</div>
            {more.length > 0 ? <details className="mt-4" open={isOpen} onToggle={(e) => setOpen(e.currentTarget.open)}><summary className="lk">{more.length} more inputs</summary><div className="fields mt-4">{wells(working.fields, more)}</div></details> : null}
            <div className="form-act noprint">
              {isEmpty ? <Button onClick={() => set(exampleTyped(working, zone))}>Fill in the example</Button> : <Button variant="lo" onClick={() => { setEmptied(typed); set({}); }}>Empty the wells</Button>}
              {isEmpty && emptied ? <Button variant="lo" onClick={() => set(emptied)}>Put back what was typed</Button> : null}
            </div>
          </Bay>
        </div>
        <Bays>
          <Bay label="Answer" level={3}>
            <div role="status" aria-live="polite"><WorkingAnswer working={working} worked={worked} typed={typed} locale={locale} /></div>
          </Bay>
          {working.caution === undefined || (worked.state === "refused" && worked.refusal.code === "ESTIMATES_OFF") ? null : <Note>{working.caution}</Note>}
          <p className="hint"><b>Source.</b> {working.source} Programs call it <code>{working.name}</code>.</p>
          <div className="noprint">
            <div className="form-act"><Button icon="print" onClick={() => window.print()}>Print</Button><Button variant="lo" onClick={() => void copy()}>Copy the address</Button></div>
            <p className="hint" role="status">{copied || "The address of this page holds the working with its inputs: send it to a colleague."}</p>
          </div>
        </Bays>
      </div>
    </article>
  );
}
