"use client";

import { useQuery } from "@tanstack/react-query";
import { useRouter } from "next/navigation";
import { useState, type ReactElement } from "react";
import { localMinute } from "@/modules/kernel/instant";
import { DialogClose, TaskDialog } from "@/modules/ui/dialog";
import { getJson } from "@/modules/ui/fetch-json";
import { Checkbox } from "@/modules/ui/form/checkbox";
import { ComboboxInput } from "@/modules/ui/form/combobox-input";
import { CommandForm } from "@/modules/ui/form/command-form";
import { RadioRow } from "@/modules/ui/form/radio-row";
import { SelectInput } from "@/modules/ui/form/select-input";
import { SubmitButton } from "@/modules/ui/form/submit-button";
import { TextInput } from "@/modules/ui/form/text-input";
import { TextareaInput } from "@/modules/ui/form/textarea-input";
import { useCommandForm } from "@/modules/ui/form/use-command-form";
import { usePlace } from "@/modules/ui/place";
import { askCorrectionAction, enterTimeAction, setAsideEntryAction } from "../actions";
import { INDIRECT_WORK } from "../domain/indirect-work";
import { askCorrectionInput, enterTimeInput, setAsideInput } from "../input";
import type { OperationChoice } from "../queries/find-operations";
import type { SheetEntry } from "../queries/week-sheet";
import { capital } from "../tablet/words";

interface Common { trigger: ReactElement; entry?: SheetEntry | undefined; date: string }
const TWICE = [{ value: "", label: "It came once" }, { value: "first", label: "The first" }, { value: "second", label: "The second" }];

/** Asks that one's own time be put right. */
export function AskCorrectionDialog({ trigger, entry, date }: Common) {
  const [open, setOpen] = useState(false);
  return (
    <TaskDialog trigger={trigger} open={open} onOpenChange={setOpen} wide title={entry ? "Ask for a correction" : "Ask for time that is missing"} description="Somebody else accepts it. What was pressed stays to be seen.">
      {open ? <AskForm entry={entry} date={date} onDone={() => setOpen(false)} /> : null}
    </TaskDialog>
  );
}

function AskForm({ entry, date, onDone }: { entry?: SheetEntry | undefined; date: string; onDone: () => void }) {
  const { slug, zone } = usePlace();
  const router = useRouter();
  const form = useCommandForm({
    schema: askCorrectionInput, defaultValues: { timeEntryId: entry?.id ?? "", ...startValues(entry, date, zone) }, action: (sent) => askCorrectionAction(slug, sent),
    onDone: () => { onDone(); router.refresh(); },
  });
  return (
    <CommandForm form={form} toFix="before this is asked">
      <SpanFields clock={form.rhf.watch("clock") ?? "door"} which={form.trouble !== null} fixedClock={entry !== undefined} initial={choiceOf(entry)} />
      <div className="dlg-act"><DialogClose>Not now</DialogClose><SubmitButton pendingText="Asking…">Ask for it</SubmitButton></div>
    </CommandForm>
  );
}

/** Enters or puts right another person's time. */
export function EnterTimeDialog({ trigger, entry, date, personId, people }: Common & { personId?: string | undefined; people: readonly { id: string; name: string }[] }) {
  const [open, setOpen] = useState(false);
  return (
    <TaskDialog trigger={trigger} open={open} onOpenChange={setOpen} wide title={entry ? "Put this time right" : "Enter time"} description={entry ? "A new row takes its place; this one stays to be seen." : "For time nobody could press. The reason stays with it."}>
      {open ? <EnterForm entry={entry} date={date} personId={personId} people={people} onDone={() => setOpen(false)} /> : null}
    </TaskDialog>
  );
}

function EnterForm({ entry, date, personId, people, onDone }: { entry?: SheetEntry | undefined; date: string; personId?: string | undefined; people: readonly { id: string; name: string }[]; onDone: () => void }) {
  const { slug, zone } = usePlace();
  const router = useRouter();
  const form = useCommandForm({
    schema: enterTimeInput, defaultValues: { personId: personId ?? "", replacesId: entry?.id ?? "", isDone: false, ...startValues(entry, date, zone) }, action: (sent) => enterTimeAction(slug, sent),
    onDone: () => { onDone(); router.refresh(); },
  });
  const operationId = form.rhf.watch("operationId");
  return (
    <CommandForm form={form} toFix="before this is entered">
      {entry ? null : <div className="fields one mb-3"><SelectInput name="personId" label="Person" placeholder="Choose" options={people.map((p) => ({ value: p.id, label: p.name }))} /></div>}
      <SpanFields clock={form.rhf.watch("clock") ?? "bench"} which={form.trouble !== null} fixedClock={entry !== undefined} initial={choiceOf(entry)} />
      {operationId ? <div className="mt-3"><Checkbox name="isDone" label="The operation is done with it" /></div> : null}
      <div className="dlg-act"><DialogClose>Not now</DialogClose><SubmitButton pendingText="Entering…">{entry ? "Put it right" : "Enter time"}</SubmitButton></div>
    </CommandForm>
  );
}

/** Takes another person's time out of the count; it stays to be seen with the reason. */
export function SetAsideDialog({ trigger, entry }: { trigger: ReactElement; entry: SheetEntry }) {
  const [open, setOpen] = useState(false);
  return (
    <TaskDialog trigger={trigger} open={open} onOpenChange={setOpen} title="Take this time out?" description="It no longer counts, for pay or for the job. It stays to be seen, with the reason.">
      {open ? <SetAsideForm entry={entry} onDone={() => setOpen(false)} /> : null}
    </TaskDialog>
  );
}

function SetAsideForm({ entry, onDone }: { entry: SheetEntry; onDone: () => void }) {
  const { slug } = usePlace();
  const router = useRouter();
  const form = useCommandForm({ schema: setAsideInput, guard: false, defaultValues: { id: entry.id, reason: "" }, action: (sent) => setAsideEntryAction(slug, sent), onDone: () => { onDone(); router.refresh(); } });
  return (
    <CommandForm form={form} label="Take the time out">
      <TextInput className="mt-3" name="reason" label="Reason" />
      <div className="dlg-act"><DialogClose>Keep it</DialogClose><SubmitButton pendingText="Taking out…">Take it out</SubmitButton></div>
    </CommandForm>
  );
}

const startValues = (entry: SheetEntry | undefined, date: string, zone: string) => ({
  clock: entry?.clock ?? ("bench" as const), operationId: entry?.operationId ?? "", indirect: (entry?.indirect ?? "") as "", startWhich: "" as const, endWhich: "" as const, reason: "",
  start: entry ? localMinute(new Date(entry.startedAt), zone) : `${date}T08:00`, end: entry?.endedAt ? localMinute(new Date(entry.endedAt), zone) : `${date}T${entry ? "17:00" : "09:00"}`,
});
const choiceOf = (entry: SheetEntry | undefined) => (entry?.operationId ? { id: entry.operationId, label: entry.words } : null);

function SpanFields({ clock, which, fixedClock, initial }: { clock: string; which: boolean; fixedClock: boolean; initial: { id: string; label: string } | null }) {
  const { slug } = usePlace();
  const [q, setQ] = useState("");
  const found = useQuery({ queryKey: ["time-operations", slug, q], queryFn: ({ signal }) => getJson<OperationChoice[]>(`/api/v1/s/${slug}/time/operations`, { q }, signal), enabled: clock === "bench" });
  return (
    <div className="fields">
      {fixedClock ? null : <RadioRow name="clock" label="Clock" className="full" options={[{ value: "bench", label: "Bench", detail: "against work" }, { value: "door", label: "Door", detail: "attendance" }]} />}
      {clock === "bench" ? (
        <>
          <ComboboxInput name="operationId" label="Operation" hint="Part of a tag, order number or name" optional className="full" items={found.data ?? []} loading={found.isFetching} onInputValueChange={setQ} initial={initial} />
          <SelectInput name="indirect" label="Or on no head" placeholder="No, an operation" className="full" options={INDIRECT_WORK.map((w) => ({ value: w, label: capital(w) }))} />
        </>
      ) : null}
      <TextInput name="start" label="From" type="datetime-local" />
      <TextInput name="end" label="To" type="datetime-local" />
      {which ? <><SelectInput name="startWhich" label="If the start came twice" options={TWICE} /><SelectInput name="endWhich" label="If the end came twice" options={TWICE} /></> : null}
      <TextareaInput name="reason" label="Reason" rows={2} className="full" />
    </div>
  );
}
