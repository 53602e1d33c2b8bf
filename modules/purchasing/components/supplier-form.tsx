"use client";
import { useRouter } from "next/navigation";
import { TERMS, TERMS_WORDS, type Terms } from "@/modules/customers/domain/terms";
import { LinkButton } from "@/modules/ui/button";
import { Checkbox } from "@/modules/ui/form/checkbox";
import { CommandForm } from "@/modules/ui/form/command-form";
import { NumberInput } from "@/modules/ui/form/number-input";
import { SelectInput } from "@/modules/ui/form/select-input";
import { SubmitButton } from "@/modules/ui/form/submit-button";
import { TextInput } from "@/modules/ui/form/text-input";
import { TextareaInput } from "@/modules/ui/form/textarea-input";
import { useCommandForm } from "@/modules/ui/form/use-command-form";
import { usePlace } from "@/modules/ui/place";
import { useToast } from "@/modules/ui/toast";
import { addSupplierAction, changeSupplierAction } from "../actions";
import { supplierEditInput, supplierInput } from "../input";
import type { SupplierRow } from "../queries/suppliers";

function Fields() {
  return (
    <>
      <TextInput name="name" label="Name" className="full" />
      <TextInput name="email" label="E-mail for orders" type="email" optional hint="Orders go here with their paper." />
      <TextInput name="phone" label="Telephone" inputMode="tel" optional />
      <TextareaInput name="address" label="Address" rows={3} optional className="full" />
      <SelectInput name="terms" label="Terms" options={TERMS.map((t) => ({ value: t, label: TERMS_WORDS[t] }))} />
      <NumberInput name="leadDays" label="Takes, days" whole optional hint="From order to door." alignEnd />
    </>
  );
}

/** Adds a supplier. */
export function AddSupplierForm() {
  const { slug } = usePlace();
  const router = useRouter();
  const toast = useToast();
  const form = useCommandForm({
    schema: supplierInput, draft: "add-supplier", defaultValues: { name: "", email: "", phone: "", address: "", terms: "net_30", leadDays: "" }, action: (sent) => addSupplierAction(slug, sent),
    onDone: (v) => { toast({ text: `${v.name} added` }); router.push(`/s/${slug}/purchases/suppliers`); router.refresh(); },
  });
  return <CommandForm form={form} label="Add a supplier" toFix="before the supplier is added"><div className="fields"><Fields /></div><div className="form-act"><LinkButton href={`/s/${slug}/purchases/suppliers`} variant="lo">Not now</LinkButton><SubmitButton pendingText="Adding…">Add supplier</SubmitButton></div></CommandForm>;
}

/** Changes a supplier. */
export function ChangeSupplierForm({ supplier: s }: { supplier: SupplierRow }) {
  const { slug } = usePlace();
  const router = useRouter();
  const toast = useToast();
  const form = useCommandForm({
    schema: supplierEditInput, defaultValues: { id: s.id, version: s.version, name: s.name, email: s.email, phone: s.phone, address: s.address, terms: s.terms as Terms, leadDays: s.leadDays === null ? "" : String(s.leadDays), active: s.active },
    action: (sent) => changeSupplierAction(slug, sent), onDone: () => { toast({ text: "Supplier changed" }); router.push(`/s/${slug}/purchases/suppliers`); router.refresh(); },
  });
  return <CommandForm form={form} label="Change supplier" toFix="before the supplier is changed"><div className="fields"><Fields /><Checkbox name="active" label="Still bought from" /></div><div className="form-act"><LinkButton href={`/s/${slug}/purchases/suppliers`} variant="lo">Leave it</LinkButton><SubmitButton pendingText="Saving…">Save supplier</SubmitButton></div></CommandForm>;
}
