"use client";

import { useRouter } from "next/navigation";
import { useState } from "react";
import { money } from "@/modules/kernel/format";
import { Button } from "@/modules/ui/button";
import { DialogClose, TaskDialog } from "@/modules/ui/dialog";
import { CommandForm } from "@/modules/ui/form/command-form";
import { SubmitButton } from "@/modules/ui/form/submit-button";
import { TextInput } from "@/modules/ui/form/text-input";
import { useCommandForm } from "@/modules/ui/form/use-command-form";
import { Note } from "@/modules/ui/note";
import { usePlace } from "@/modules/ui/place";
import { useToast } from "@/modules/ui/toast";
import { sendEstimateAction } from "../actions";
import { ROAD_CAUTION } from "../domain/uses";
import { sendEstimateInput } from "../input";
import type { EstimateEditor } from "../queries/estimates";

/** Asks where the version goes, saves what is typed, and fixes it. After that it never changes; a change is the next one. */
export function SendEstimateDialog({ editor, totalMinor, depositMinor, before }: { editor: EstimateEditor; totalMinor: number; depositMinor: number; before: () => Promise<number | null> }) {
  const place = usePlace();
  const router = useRouter();
  const toast = useToast();
  const [open, setOpen] = useState(false);
  const [blocked, setBlocked] = useState(false);
  const draft = editor.draft;
  const form = useCommandForm({
    schema: sendEstimateInput, guard: false, defaultValues: { estimateId: draft?.estimateId ?? "", version: draft?.version ?? 1, to: editor.customerEmail },
    action: (sent) => sendEstimateAction(place.slug, sent),
    onDone: (v) => {
      toast({ text: v.mailedTo ? `Version ${v.version} is on its way to ${v.mailedTo}` : `Version ${v.version} is fixed; print it from the order` });
      router.push(`/s/${place.slug}/orders/${editor.number}`);
    },
  });
  const start = async () => {
    const version = await before();
    setBlocked(version === null);
    if (version === null) return;
    form.rhf.setValue("version", version);
    setOpen(true);
  };
  const to = form.rhf.watch("to");
  return (
    <>
      <Button variant="go" hotkey="F9" icon="send" onClick={() => void start()}>Send version {draft?.estimateNo ?? ""}</Button>
      {blocked ? <Note tone="stop" live>Not sent: something above needs another look first.</Note> : null}
      <TaskDialog open={open} onOpenChange={setOpen} title={`Send ${money(totalMinor, place)} to ${editor.customer}?`} description={depositMinor > 0 ? `A deposit of ${money(depositMinor, place)} is asked with the yes. The version is fixed once sent.` : "The version is fixed once sent. No new deposit is asked."}>
        <CommandForm form={form} label="Send the estimate" toFix="before it goes out">
          <TextInput name="to" label="E-mail" optional inputMode="email" hint={to === "" ? "Nothing is mailed. Print the paper and take the answer at the counter." : "The paper is attached; the link lets them answer on a phone."} />
          {editor.use === "road" ? <div className="mt-3"><Note tone="warn">{ROAD_CAUTION} It stands on the paper.</Note></div> : null}
          <div className="dlg-act">
            <DialogClose>Not yet</DialogClose>
            <SubmitButton pendingText="Sending…">{to === "" ? "Fix it for print" : "Send it"}</SubmitButton>
          </div>
        </CommandForm>
      </TaskDialog>
    </>
  );
}
