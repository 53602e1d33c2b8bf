"use client";
import { useRouter } from "next/navigation";
import { useFieldArray } from "react-hook-form";
import { milliText } from "@/modules/kernel/quantity";
import { Button } from "@/modules/ui/button";
import { CommandForm } from "@/modules/ui/form/command-form";
import { NumberInput } from "@/modules/ui/form/number-input";
import { SubmitButton } from "@/modules/ui/form/submit-button";
import { useCommandForm } from "@/modules/ui/form/use-command-form";
import { usePlace } from "@/modules/ui/place";
import { useToast } from "@/modules/ui/toast";
import { setKitAction } from "../actions";
import { kitInput } from "../input";
import type { PartDetail } from "../queries/get-part";
import { PartPicker } from "./part-picker";

/** What a kit is made of, for one kit. */
export function KitForm({ kit }: { kit: PartDetail }) {
  const { slug } = usePlace();
  const router = useRouter();
  const toast = useToast();
  const form = useCommandForm({
    schema: kitInput, defaultValues: { kitPartId: kit.id, version: kit.version, lines: kit.kit.map((k) => ({ partId: k.partId, qty: milliText(k.qtyMilli) })) },
    action: (sent) => setKitAction(slug, sent), onDone: () => { toast({ text: `${kit.sku}: contents saved` }); router.refresh(); },
  });
  const lines = useFieldArray({ control: form.rhf.control, name: "lines" });
  const known = new Map(kit.kit.map((k) => [k.partId, k]));
  return (
    <CommandForm form={form} label="Contents of the kit" toFix="before the kit is saved">
      <div className="grid gap-2">
        {lines.fields.map((f, i) => {
          const k = known.get(f.partId);
          return (
            <div key={f.id} className="grid items-end gap-3" style={{ gridTemplateColumns: "minmax(0,1fr) 110px auto" }}>
              <PartPicker name={`lines.${i}.partId`} label={`Part ${i + 1}`} kits={false} initial={k ? { id: k.partId, sku: k.sku, description: k.description } : null} />
              <NumberInput name={`lines.${i}.qty`} label="In one kit" alignEnd />
              <Button variant="lo" onClick={() => lines.remove(i)} aria-label={`Take part ${i + 1} out of the kit`}>Take out</Button>
            </div>
          );
        })}
      </div>
      <div className="form-act"><Button variant="lo" icon="plus" onClick={() => lines.append({ partId: "", qty: "1" })}>Add a part</Button><SubmitButton pendingText="Saving…">Save contents</SubmitButton></div>
    </CommandForm>
  );
}
