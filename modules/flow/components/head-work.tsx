"use client";

import { useRouter } from "next/navigation";
import { useState } from "react";
import { Button } from "@/modules/ui/button";
import { DialogClose, TaskDialog } from "@/modules/ui/dialog";
import { CommandForm } from "@/modules/ui/form/command-form";
import { SubmitButton } from "@/modules/ui/form/submit-button";
import { TextareaInput } from "@/modules/ui/form/textarea-input";
import { useCommandForm } from "@/modules/ui/form/use-command-form";
import { usePlace } from "@/modules/ui/place";
import { changeHeadWorkAction } from "../gear-actions";
import { HEAD_WORK, headWorkInput } from "../gear-input";

export interface WorkedHead { readonly id: string; readonly version: number; readonly workDone: readonly string[]; readonly notes: string }
type Work = (typeof HEAD_WORK)[number];

const LABELS: Readonly<Record<Work, string>> = { epoxy: "Epoxy in a port", weld: "Welded", "valve size": "Other valve size", seat: "Seats cut or renewed", "port shape": "Port shape", chamber: "Chamber" };
const isWork = (w: string): w is Work => (HEAD_WORK as readonly string[]).includes(w);

/** What was done to the head, in the library's words; `none noted` without any. */
export const workWords = (workDone: readonly string[]): string => (workDone.length === 0 ? "none noted" : HEAD_WORK.filter((w) => workDone.includes(w)).map((w) => LABELS[w].toLowerCase()).join(", "));

/** The choice with what is chosen already; each opening begins with the head as it stands. */
export function HeadWorkForm({ head, onDone }: { head: WorkedHead; onDone: () => void }) {
  const { slug } = usePlace();
  const form = useCommandForm({
    schema: headWorkInput,
    defaultValues: { id: head.id, version: head.version, workDone: head.workDone.filter(isWork), notes: head.notes },
    action: async ({ requestId, input }) => changeHeadWorkAction(slug, { requestId, input }),
    onDone,
  });
  return (
    <CommandForm form={form} toFix="before it is kept">
      <fieldset className="grid gap-2">
        <legend className="label">Work done</legend>
        {HEAD_WORK.map((w) => <label key={w} className="tick"><input type="checkbox" value={w} {...form.rhf.register("workDone")} /><span>{LABELS[w]}</span></label>)}
      </fieldset>
      <TextareaInput className="mt-3" name="notes" label="Notes" rows={3} optional hint="Such as the valve fitted, the rod or the product used." />
      <div className="form-act"><SubmitButton pendingText="Keeping…">Keep it</SubmitButton><DialogClose>Leave as it is</DialogClose></div>
    </CommandForm>
  );
}

/** Work done on a head, and the dialog that changes it. */
export function HeadWork({ head, mayChange }: { head: WorkedHead; mayChange: boolean }) {
  const router = useRouter();
  const [open, setOpen] = useState(false);
  return (
    <p className="flex flex-wrap items-baseline gap-x-3 gap-y-1">
      <span><span className="mid">Work done: </span>{workWords(head.workDone)}{head.notes ? <span className="mid">. {head.notes}</span> : null}</span>
      {mayChange ? (
        <TaskDialog open={open} onOpenChange={setOpen} trigger={<Button size="sm" variant="lo">Change work done</Button>} title="Work done on this head" description="The library finds a head by it.">
          <HeadWorkForm key={head.version} head={head} onDone={() => { setOpen(false); router.refresh(); }} />
        </TaskDialog>
      ) : null}
    </p>
  );
}
