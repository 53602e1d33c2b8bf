"use client";
import { useRouter } from "next/navigation";
import { Checkbox } from "@/modules/ui/form/checkbox";
import { CommandForm } from "@/modules/ui/form/command-form";
import { MoneyInput } from "@/modules/ui/form/money-input";
import { NumberInput } from "@/modules/ui/form/number-input";
import { SelectInput } from "@/modules/ui/form/select-input";
import { SubmitButton } from "@/modules/ui/form/submit-button";
import { TextInput } from "@/modules/ui/form/text-input";
import { useCommandForm } from "@/modules/ui/form/use-command-form";
import { LinkButton } from "@/modules/ui/button";
import { usePlace } from "@/modules/ui/place";
import { useToast } from "@/modules/ui/toast";
import { addPartAction, changePartAction } from "../actions";
import { HAZARDS, PART_CLASSES, POSITIONS, STOCK_UNITS } from "../domain/part-words";
import { addPartInput, changePartInput } from "../input";
import type { PartDetail } from "../queries/get-part";

const words = (s: string) => (s === "" ? "–" : `${s[0]?.toUpperCase() ?? ""}${s.slice(1)}`);
const optionsOf = (list: readonly string[]) => list.map((value) => ({ value, label: words(value) }));
interface Choices { suppliers: readonly { id: string; name: string }[]; seesPrice: boolean }

function SharedFields({ suppliers, seesPrice }: Choices) {
  const { currency } = usePlace();
  return (
    <>
      <SelectInput name="partClass" label="Class" options={optionsOf(PART_CLASSES)} />
      <SelectInput name="position" label="Side" options={optionsOf(POSITIONS)} optional />
      <TextInput name="families" label="Fits" hint="Engine families, with commas between." optional />
      <TextInput name="bin" label="Shelf" hint="Where it lies, such as F 1." optional />
      {seesPrice ? <MoneyInput name="salePrice" label="Sale price each" currency={currency} /> : null}
      <SelectInput name="preferredSupplierId" label="Bought from" options={[{ value: "", label: "–" }, ...suppliers.map((s) => ({ value: s.id, label: s.name }))]} optional />
      <TextInput name="supplierNumber" label="Supplier's number" hint="Found by this number too." optional />
      <NumberInput name="reorderPoint" label="Reorder at" hint="Free stock at which it is bought again." optional alignEnd />
      <NumberInput name="orderQty" label="Order quantity" optional alignEnd />
      <TextInput name="materialNote" label="Material" optional />
      <SelectInput name="hazard" label="Caution" options={optionsOf(HAZARDS)} optional hint="Shown to whoever handles it." />
    </>
  );
}

/** Adds a part. */
export function AddPartForm(choices: Choices) {
  const { slug } = usePlace();
  const router = useRouter();
  const toast = useToast();
  const form = useCommandForm({
    schema: addPartInput, draft: "add-part",
    defaultValues: { sku: "", description: "", partClass: "valve", families: "", position: "", bin: "", salePrice: choices.seesPrice ? "" : "0", reorderPoint: "", orderQty: "", preferredSupplierId: "", supplierNumber: "", materialNote: "", hazard: "", stockUnit: "each", isKit: false, lotTracked: false },
    action: (sent) => addPartAction(slug, sent),
    onDone: (v) => { toast({ text: `${v.sku} added` }); router.push(`/s/${slug}/parts/${encodeURIComponent(v.sku)}`); },
  });
  return (
    <CommandForm form={form} label="Add a part" toFix="before the part is added">
      <div className="fields">
        <TextInput name="sku" label="Our number" hint="For ever: it is never changed and never used again. No blanks." autoCapitalize="characters" autoFocus />
        <TextInput name="description" label="What it is" />
        <SelectInput name="stockUnit" label="Counted in" options={optionsOf(STOCK_UNITS)} />
        <div className="grid gap-2">
          <Checkbox name="lotTracked" label="Kept by lot, with an expiry date" />
          <Checkbox name="isKit" label="A kit: sold as one, issued as its parts" />
        </div>
        <SharedFields {...choices} />
      </div>
      <div className="form-act"><LinkButton href={`/s/${slug}/parts`} variant="lo">Not now</LinkButton><SubmitButton pendingText="Adding…">Add part</SubmitButton></div>
    </CommandForm>
  );
}

/** Changes a part. Number and kind stay. */
export function ChangePartForm({ part, ...choices }: Choices & { part: PartDetail }) {
  const { slug } = usePlace();
  const router = useRouter();
  const toast = useToast();
  const href = `/s/${slug}/parts/${encodeURIComponent(part.sku)}`;
  const form = useCommandForm({
    schema: changePartInput,
    defaultValues: {
      id: part.id, version: part.version, description: part.description, partClass: part.partClass as (typeof PART_CLASSES)[number], families: part.families.join(", "), position: part.position as (typeof POSITIONS)[number], bin: part.bin,
      salePrice: part.form.salePrice, reorderPoint: part.form.reorderPoint, orderQty: part.form.orderQty, preferredSupplierId: part.supplierId ?? "", supplierNumber: part.supplierNumber, materialNote: part.materialNote,
      hazard: part.hazard as (typeof HAZARDS)[number], stockUnit: part.stockUnit as (typeof STOCK_UNITS)[number], lotTracked: part.lotTracked, active: part.active,
    },
    action: (sent) => changePartAction(slug, sent),
    onDone: (v) => { toast({ text: `${v.sku} changed` }); router.push(href); router.refresh(); },
  });
  return (
    <CommandForm form={form} label={`Change ${part.sku}`} toFix="before the part is changed">
      <div className="fields">
        <TextInput name="description" label="What it is" className="full" />
        <SelectInput name="stockUnit" label="Counted in" options={optionsOf(STOCK_UNITS)} hint="Stays once the part has moved." />
        <div className="grid gap-2">
          <Checkbox name="lotTracked" label="Kept by lot, with an expiry date" disabled={part.isKit} />
          <Checkbox name="active" label="Still kept" hint="Untick when it is no longer bought; its history stays." />
        </div>
        <SharedFields {...choices} />
      </div>
      <div className="form-act"><LinkButton href={href} variant="lo">Leave it</LinkButton><SubmitButton pendingText="Saving…">Save part</SubmitButton></div>
    </CommandForm>
  );
}
