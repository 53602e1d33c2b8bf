"use client";

import { useRouter } from "next/navigation";
import { minorText } from "@/modules/kernel/money";
import { CommandForm } from "@/modules/ui/form/command-form";
import { RadioRow } from "@/modules/ui/form/radio-row";
import { SelectInput } from "@/modules/ui/form/select-input";
import { SubmitButton } from "@/modules/ui/form/submit-button";
import { TextInput } from "@/modules/ui/form/text-input";
import { TextareaInput } from "@/modules/ui/form/textarea-input";
import { useCommandForm } from "@/modules/ui/form/use-command-form";
import { usePlace } from "@/modules/ui/place";
import { useToast } from "@/modules/ui/toast";
import { addCustomerAction, changeCustomerAction } from "../actions";
import { TERMS, TERMS_WORDS } from "../domain/terms";
import { customerEditInput, customerInput } from "../input";

export interface CustomerFields {
  id: string; version: number; kind: string; name: string; email: string | null; phone: string | null; address: string; terms: string; laborDiscountBasisPoints: number; notes: string;
}

const percent = (bp: number) => minorText(bp).replace(/\.?0+$/, "") || "0";

/** A customer's card, new or known. */
export function CustomerForm({ customer, mayChange }: { customer: CustomerFields | null; mayChange: boolean }) {
  const { slug } = usePlace();
  const router = useRouter();
  const toast = useToast();
  const values = {
    kind: (customer?.kind === "company" ? "company" : "person") as "company" | "person", name: customer?.name ?? "", email: customer?.email ?? "", phone: customer?.phone ?? "", address: customer?.address ?? "",
    terms: (TERMS.find((t) => t === customer?.terms) ?? "receipt"), laborDiscountPercent: percent(customer?.laborDiscountBasisPoints ?? 0), notes: customer?.notes ?? "",
  };
  const add = useCommandForm({ schema: customerInput, defaultValues: values, draft: `new-customer-${slug}`, action: (sent) => addCustomerAction(slug, sent), onDone: (v) => { toast({ text: `${v.name} is added` }); router.push(`/s/${slug}/customers/${v.id}`); } });
  const edit = useCommandForm({
    schema: customerEditInput, defaultValues: { ...values, id: customer?.id ?? "", version: customer?.version ?? 1 }, action: (sent) => changeCustomerAction(slug, sent), onDone: () => { toast({ text: "Saved" }); router.refresh(); },
  });
  const fields = (
    <>
      <div className="fields">
        <TextInput name="name" label="Name" autoComplete="off" />
        <RadioRow name="kind" label="Kind" options={[{ value: "person", label: "Person" }, { value: "company", label: "Company" }]} />
        <TextInput name="phone" label="Telephone" inputMode="tel" optional />
        <TextInput name="email" label="E-mail" inputMode="email" optional hint="Estimates and invoices go there." />
        <TextareaInput name="address" label="Address" optional rows={3} />
        <TextareaInput name="notes" label="Notes for the shop" optional rows={3} hint="Never printed." />
        <SelectInput name="terms" label="Pays" options={TERMS.map((t) => ({ value: t, label: TERMS_WORDS[t] }))} />
        <TextInput name="laborDiscountPercent" label="Usual discount on labor" unit="%" inputMode="decimal" hint="Above 5 % the manager gives it." />
      </div>
      {mayChange ? <div className="form-act"><SubmitButton>{customer ? "Save" : "Add customer"}</SubmitButton></div> : null}
    </>
  );
  return customer ? <CommandForm form={edit} toFix="before this is saved" label={customer.name}>{fields}</CommandForm> : <CommandForm form={add} toFix="before they are added" label="New customer">{fields}</CommandForm>;
}
