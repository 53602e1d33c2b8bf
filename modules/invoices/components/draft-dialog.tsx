"use client";
import { useState } from "react";
import { useFieldArray } from "react-hook-form";
import { minorText } from "@/modules/kernel/money";
import { Button } from "@/modules/ui/button";
import { DialogClose, TaskDialog } from "@/modules/ui/dialog";
import { CommandForm } from "@/modules/ui/form/command-form";
import { MoneyInput } from "@/modules/ui/form/money-input";
import { SubmitButton } from "@/modules/ui/form/submit-button";
import { TextareaInput } from "@/modules/ui/form/textarea-input";
import { TextInput } from "@/modules/ui/form/text-input";
import { useCommandForm } from "@/modules/ui/form/use-command-form";
import { usePlace } from "@/modules/ui/place";
import { saveDraftAction } from "../actions";
import { saveDraftInput } from "../input";
import type { InvoicePageView } from "../queries";
import { useRouter } from "next/navigation";

/** Words and amounts of a draft's lines. What is left out is not billed; what is over the approval is refused at issue. */
export function DraftDialog({ view }: { view: InvoicePageView }) {
  const [open, setOpen] = useState(false);
  return (
    <TaskDialog trigger={<Button variant="lo" icon="edit">Change lines</Button>} open={open} onOpenChange={setOpen} wide title="Change lines" description="Amounts may go down. More than was approved needs a new approval.">
      {open ? <DraftForm view={view} onDone={() => setOpen(false)} /> : null}
    </TaskDialog>
  );
}

function DraftForm({ view, onDone }: { view: InvoicePageView; onDone: () => void }) {
  const place = usePlace();
  const router = useRouter();
  const form = useCommandForm({
    schema: saveDraftInput, action: saveDraftAction.bind(null, place.slug), guard: false,
    defaultValues: { invoiceId: view.id, version: view.version, note: "", lines: view.snapshot.lines.map((l) => ({ lineId: l.id, description: l.description, amount: minorText(l.amountMinor) })) },
    onDone: () => { onDone(); router.refresh(); },
  });
  const { fields, remove } = useFieldArray({ control: form.rhf.control, name: "lines", keyName: "key" });
  return (
    <CommandForm form={form} toFix="before the draft is saved">
      <div className="grid max-h-[55vh] gap-2 overflow-auto pe-1">
        {fields.map((f, i) => (
          <div key={f.key} className="grid grid-cols-[minmax(0,1fr)_130px_auto] items-start gap-2">
            <TextInput name={`lines.${i}.description`} label={`Line ${i + 1}`} hideLabel />
            <MoneyInput name={`lines.${i}.amount`} label={`Amount of line ${i + 1}`} hideLabel currency={place.currency} />
            <Button variant="lo" onClick={() => remove(i)} aria-label={`Leave line ${i + 1} out`} icon="minus">Out</Button>
          </div>
        ))}
      </div>
      <TextareaInput name="note" label="Words to print at the end" optional rows={2} />
      <div className="form-act"><DialogClose>Leave it</DialogClose><SubmitButton pendingText="Saving…">Save lines</SubmitButton></div>
    </CommandForm>
  );
}
