"use client";
import { useRouter } from "next/navigation";
import { PartPicker } from "@/modules/stock/components/part-picker";
import { DialogClose, TaskDialog } from "@/modules/ui/dialog";
import { CommandForm } from "@/modules/ui/form/command-form";
import { NumberInput } from "@/modules/ui/form/number-input";
import { SelectInput } from "@/modules/ui/form/select-input";
import { SubmitButton } from "@/modules/ui/form/submit-button";
import { useCommandForm } from "@/modules/ui/form/use-command-form";
import { usePlace } from "@/modules/ui/place";
import { useToast } from "@/modules/ui/toast";
import { needPartAction } from "../parts-actions";
import { needPartInput } from "../parts-input";

/** Adds a part beside what was agreed. It is reserved if it is there; the price stays the customer's to agree to. */
export function AddPartDialog({ workOrderId, pieces, onClose }: { workOrderId: string; pieces: readonly { id: string; label: string }[]; onClose: () => void }) {
  const { slug } = usePlace();
  const router = useRouter();
  const toast = useToast();
  const form = useCommandForm({
    schema: needPartInput, defaultValues: { workOrderId, partId: "", qty: "1", pieceId: "" }, guard: false,
    action: (sent) => needPartAction(slug, sent), onDone: () => { toast({ text: "Part added to the order" }); onClose(); router.refresh(); },
  });
  return (
    <TaskDialog open onOpenChange={(o) => (o ? undefined : onClose())} title="Add a part" description="Its cost goes to the order. What the customer pays stays as agreed, until a new estimate says otherwise.">
      <CommandForm form={form} label="Add a part" toFix="before it is added">
        <div className="fields">
          <PartPicker name="partId" label="Part" className="full" />
          <NumberInput name="qty" label="How many" alignEnd />
          {pieces.length > 1 ? <SelectInput name="pieceId" label="For" options={[{ value: "", label: "The whole order" }, ...pieces.map((p) => ({ value: p.id, label: p.label }))]} /> : null}
        </div>
        <div className="dlg-act"><DialogClose>Not now</DialogClose><SubmitButton pendingText="Adding…">Add it</SubmitButton></div>
      </CommandForm>
    </TaskDialog>
  );
}
