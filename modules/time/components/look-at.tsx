"use client";

import { useRouter } from "next/navigation";
import { useState } from "react";
import { dateTime, shortDate, time } from "@/modules/kernel/format";
import { localDate } from "@/modules/kernel/instant";
import { Bay } from "@/modules/ui/bay";
import { Button } from "@/modules/ui/button";
import { DialogClose, TaskDialog } from "@/modules/ui/dialog";
import { Flag } from "@/modules/ui/flag";
import { CommandForm } from "@/modules/ui/form/command-form";
import { SubmitButton } from "@/modules/ui/form/submit-button";
import { TextareaInput } from "@/modules/ui/form/textarea-input";
import { useCommandForm } from "@/modules/ui/form/use-command-form";
import { usePlace } from "@/modules/ui/place";
import { TextLink } from "@/modules/ui/text-link";
import { acceptCorrectionAction, refuseCorrectionAction, settlePunchAction } from "../actions";
import { setAsideInput } from "../input";
import type { ToLookAt } from "../queries/to-look-at";
import { capital } from "../tablet/words";
import { ActButton } from "./act-button";

/** Exceptions first: what asks for somebody before the week is true. */
export function LookAt({ look, mayCorrect }: { look: ToLookAt; mayCorrect: boolean }) {
  const place = usePlace();
  const day = (at: string) => shortDate(localDate(new Date(at), place.zone), place.locale);
  const count = look.open.length + look.asked.length + look.flagged.length;
  const sheet = (personId: string, at: string) => `/s/${place.slug}/time?person=${personId}&date=${localDate(new Date(at), place.zone)}`;
  return (
    <Bay label="To look at" aside={count === 0 ? "nothing" : String(count)} flush={count > 0}>
      {count === 0 ? <p className="mid">Open attendances, asked corrections and flagged times land here.</p> : (
        <table>
          <caption className="sr-only">What asks for somebody</caption>
          <thead><tr><th scope="col">Person</th><th scope="col">What</th><th scope="col"><span className="sr-only">Answer</span></th></tr></thead>
          <tbody>
            {look.open.map((o) => (
              <tr key={`o${o.personId}`}>
                <td className="b">{o.name}</td>
                <td><Flag>No out</Flag> In since {dateTime(o.since, place)}. The person is asked at the next badge.</td>
                <td className="r"><TextLink href={sheet(o.personId, o.since)}>Sheet</TextLink></td>
              </tr>
            ))}
            {look.asked.map((a) => (
              <tr key={a.id}>
                <td className="b">{a.name}</td>
                <td>
                  Asks for {day(a.startedAt)} <b className="q">{time(a.startedAt, place)} to {time(a.endedAt, place)}</b>, {a.words.toLowerCase()}
                  {a.replaces ? <> in place of <span className="q">{time(a.replaces.startedAt, place)} to {a.replaces.endedAt ? time(a.replaces.endedAt, place) : "open"}</span></> : null}.
                  <span className="mid block">“{a.reason}”</span>
                </td>
                <td className="r">
                  {!mayCorrect ? null : a.isOwn ? <span className="mid sm">Yours: somebody else accepts it</span> : (
                    <span className="inline-flex flex-wrap justify-end gap-2"><ActButton size="sm" action={acceptCorrectionAction} input={{ id: a.id }} pendingText="Accepting…">Accept</ActButton><RefuseDialog id={a.id} name={a.name} /></span>
                  )}
                </td>
              </tr>
            ))}
            {look.flagged.map((f) => (
              <tr key={f.id}>
                <td className="b">{f.name}</td>
                <td><Flag tone="open">{capital(f.flag)}</Flag> {capital(f.kind)}, {dateTime(f.at, place)}{f.note ? <span className="mid block">{f.note}</span> : null}</td>
                <td className="r"><span className="inline-flex flex-wrap items-center justify-end gap-3"><TextLink href={sheet(f.personId, f.at)}>Sheet</TextLink>{mayCorrect && !f.isOwn ? <ActButton size="sm" action={settlePunchAction} input={{ id: f.id }}>Settled</ActButton> : null}</span></td>
              </tr>
            ))}
          </tbody>
        </table>
      )}
    </Bay>
  );
}

function RefuseDialog({ id, name }: { id: string; name: string }) {
  const [open, setOpen] = useState(false);
  return (
    <TaskDialog trigger={<Button size="sm" variant="lo">Refuse</Button>} open={open} onOpenChange={setOpen} title={`Refuse what ${name} asks?`}>
      {open ? <RefuseForm id={id} onDone={() => setOpen(false)} /> : null}
    </TaskDialog>
  );
}

function RefuseForm({ id, onDone }: { id: string; onDone: () => void }) {
  const { slug } = usePlace();
  const router = useRouter();
  const form = useCommandForm({ schema: setAsideInput, defaultValues: { id, reason: "" }, action: (sent) => refuseCorrectionAction(slug, sent), onDone: () => { onDone(); router.refresh(); } });
  return (
    <CommandForm form={form} toFix="before it is refused">
      <TextareaInput name="reason" label="Reason, for the person to read" rows={2} />
      <div className="dlg-act"><DialogClose>Keep it open</DialogClose><SubmitButton pendingText="Refusing…">Refuse it</SubmitButton></div>
    </CommandForm>
  );
}
