"use client";

import { useRouter } from "next/navigation";
import { useRef } from "react";
import { Button } from "@/modules/ui/button";
import { DialogClose, TaskDialog } from "@/modules/ui/dialog";
import { CommandForm } from "@/modules/ui/form/command-form";
import { SelectInput } from "@/modules/ui/form/select-input";
import { SubmitButton } from "@/modules/ui/form/submit-button";
import { TextInput } from "@/modules/ui/form/text-input";
import { TextareaInput } from "@/modules/ui/form/textarea-input";
import { useCommandForm } from "@/modules/ui/form/use-command-form";
import { usePlace } from "@/modules/ui/place";
import { addOwnHeadAction } from "../gear-actions";
import { ownHeadInput } from "../gear-input";

const SEATS = [{ value: "unknown", label: "Not known" }, { value: "steel", label: "Steel" }, { value: "iron", label: "Iron" }, { value: "bronze", label: "Bronze" }, { value: "copper-beryllium", label: "Copper-beryllium" }];

/** A casting of the shop's own: no customer, no order. */
export function OwnHeadDialog({ families }: { families: readonly { name: string; cylinders: number | null }[] }) {
  const { slug } = usePlace();
  const router = useRouter();
  const form = useCommandForm({
    schema: ownHeadInput,
    defaultValues: { mark: "", family: families[0]?.name ?? "", castingNumber: "", cylinders: String(families[0]?.cylinders ?? 1), bore: "", stroke: "", seatMaterial: "unknown", workDone: [], notes: "" },
    action: async ({ requestId, input }) => addOwnHeadAction(slug, { requestId, input }),
    onDone: (value) => router.push(`/s/${slug}/flow/${value.id}`),
  });
  /** Cylinders follow the family until somebody types them. */
  const byHand = useRef(false);
  const follow = (name: string) => {
    const known = families.find((f) => f.name === name.trim())?.cylinders;
    if (known && !byHand.current) form.rhf.setValue("cylinders", String(known), { shouldValidate: true });
  };
  return (
    <TaskDialog trigger={<Button icon="plus">Own head</Button>} title="A head of the shop's own" description="For development. It has no customer and no order; its tests stand in the library.">
      <CommandForm form={form} toFix="before it is kept" className="mt-5">
        <div className="fields">
          <TextInput name="mark" label="Mark" hint="A serial, or what is written on it." />
          <TextInput name="family" label="Family" list="own-head-families" onChange={(e) => follow(e.target.value)} />
          <datalist id="own-head-families">{families.map((f) => <option key={f.name} value={f.name} />)}</datalist>
          <TextInput name="castingNumber" label="Casting number" optional />
          <TextInput name="cylinders" label="Cylinders" inputMode="numeric" alignEnd hint="The family's, unless this one differs." onChange={() => { byHand.current = true; }} />
          <TextInput name="bore" label="Bore" unit="mm" inputMode="decimal" alignEnd optional hint="Else the family's." />
          <SelectInput name="seatMaterial" label="Seats" options={SEATS} />
          <TextareaInput name="notes" label="Notes" className="full" rows={2} optional />
        </div>
        <div className="form-act"><SubmitButton>Add head</SubmitButton><DialogClose>Leave it</DialogClose></div>
      </CommandForm>
    </TaskDialog>
  );
}
