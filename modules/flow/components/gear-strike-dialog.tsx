"use client";

import { useRouter } from "next/navigation";
import { useState } from "react";
import { DialogClose, TaskDialog } from "@/modules/ui/dialog";
import { CommandForm } from "@/modules/ui/form/command-form";
import { SubmitButton } from "@/modules/ui/form/submit-button";
import { TextInput } from "@/modules/ui/form/text-input";
import { useCommandForm } from "@/modules/ui/form/use-command-form";
import { usePlace } from "@/modules/ui/place";
import { useToast } from "@/modules/ui/toast";
import { strikeBenchCheckAction } from "../gear-actions";
import { strikeCheckInput } from "../gear-input";

/** Puts a wrong check out of use, with the reason. It stays in the list, struck through. */
export function GearStrikeDialog({ checkId, when, factorText }: { checkId: string; when: string; factorText: string }) {
  const { slug } = usePlace();
  const router = useRouter();
  const toast = useToast();
  const [open, setOpen] = useState(false);
  const form = useCommandForm({
    schema: strikeCheckInput,
    defaultValues: { checkId, reason: "" },
    action: async ({ requestId, input }) => strikeBenchCheckAction(slug, { requestId, input }),
    onDone: ({ openTests, finishedTests }) => {
      const tests = (n: number, words: string) => (n === 0 ? "" : ` ${n} ${words} test${n === 1 ? "" : "s"}`);
      toast({ text: `Check put out of use.${tests(openTests, "open")}${openTests > 0 ? " took the factor before it." : ""}${tests(finishedTests, "finished")}${finishedTests > 0 ? " rely on it and stay as they were: correct them on their sheets." : ""}` });
      setOpen(false);
      router.refresh();
    },
  });
  return (
    <TaskDialog trigger={<button type="button" className="lk" aria-label={`Put the check of ${when} out of use`}>Put out of use</button>} open={open} onOpenChange={setOpen} title={`Put the check of ${when} out of use?`}
      description={`Its factor ${factorText} counts no more; the check before it does. The row stays, struck through, with your reason.`}>
      <CommandForm form={form} toFix="before it is put out of use" className="mt-4">
        <TextInput name="reason" label="Why" hint="Such as: plate P-80 typed as 803." />
        <div className="form-act"><SubmitButton pendingText="Writing it down…">Put out of use</SubmitButton><DialogClose>Keep it</DialogClose></div>
      </CommandForm>
    </TaskDialog>
  );
}
