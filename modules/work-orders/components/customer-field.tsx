"use client";

import { keepPreviousData, useQuery } from "@tanstack/react-query";
import { useDeferredValue, useEffect, useState } from "react";
import { useFormContext } from "react-hook-form";
import type { CustomerRow } from "@/modules/customers/queries";
import { Button } from "@/modules/ui/button";
import type { ComboItem } from "@/modules/ui/combobox";
import { getJson } from "@/modules/ui/fetch-json";
import { ComboboxInput } from "@/modules/ui/form/combobox-input";
import { TextInput } from "@/modules/ui/form/text-input";
import { usePlace } from "@/modules/ui/place";

const itemOf = (c: CustomerRow): ComboItem => ({
  id: c.id, label: c.name, detail: [c.phone, c.email].filter(Boolean).join(", "), ...(c.laborDiscountBasisPoints > 0 ? { aside: `−${c.laborDiscountBasisPoints / 100} % labor` } : {}),
});
const KEPT = "picked-customer";
/** Who was picked, kept beside the form's own draft, which holds only the id. */
function keptPick(): ComboItem | null {
  try {
    const value: unknown = JSON.parse(sessionStorage.getItem(KEPT) ?? "null");
    return typeof value === "object" && value !== null && "id" in value && "label" in value ? { id: String(value.id), label: String(value.label) } : null;
  } catch {
    return null;
  }
}
function keepPick(item: ComboItem | null): void {
  try {
    sessionStorage.setItem(KEPT, JSON.stringify(item));
  } catch {
    // Storage is full or shut: only the draft is poorer for it.
  }
}
const EMPTY = { name: "", phone: "", email: "", kind: "person" as const };

/**
 * The customer of an order: found by any scrap, or added right here. Nothing typed is lost on the way between the two.
 * Holds `customerId` and `newCustomer` of the form.
 */
export function CustomerField({ initial }: { initial: ComboItem | null }) {
  const { slug } = usePlace();
  const { setValue, setFocus, getValues, watch } = useFormContext();
  const [text, setText] = useState("");
  const [kept, setKept] = useState<typeof EMPTY>(EMPTY);
  const [picked, setPicked] = useState<ComboItem | null>(initial);
  // What was kept from an earlier visit is known only in the browser, after the first paint.
  // eslint-disable-next-line react-hooks/set-state-in-effect
  useEffect(() => { setPicked((now) => now ?? keptPick()); }, []);
  const customerId = watch("customerId") as string;
  const isNew = watch("newCustomer") !== null;
  const q = useDeferredValue(text);
  const { data, isFetching } = useQuery({
    queryKey: ["customers", slug, q], queryFn: ({ signal }) => getJson<{ rows: CustomerRow[] }>(`/api/v1/s/${slug}/customers`, { q, limit: 8 }, signal), placeholderData: keepPreviousData,
  });
  const addNew = (typed: string) => {
    const isPhone = /^[+\d][\d\s().-]{4,}$/.test(typed);
    const isMail = typed.includes("@");
    setValue("customerId", "");
    setValue("newCustomer", { ...kept, ...(isPhone ? { phone: typed } : isMail ? { email: typed } : typed === "" ? {} : { name: typed }) }, { shouldDirty: true });
    setTimeout(() => setFocus(isPhone || isMail ? "newCustomer.name" : "newCustomer.phone"), 0);
  };
  const backToKnown = () => {
    setKept((getValues("newCustomer") as typeof EMPTY | null) ?? EMPTY);
    setValue("newCustomer", null);
    setTimeout(() => setFocus("customerId"), 0);
  };
  if (!isNew) {
    return (
      <ComboboxInput
        name="customerId" label="Customer" hint="Name, telephone or e-mail. Somebody new is added right here." placeholder="Any scrap will do"
        items={(data?.rows ?? []).map(itemOf)} picked={picked?.id === customerId ? picked : null} onPicked={(item) => { setPicked(item); keepPick(item); }} onInputValueChange={setText} loading={isFetching && !data} emptyText="Nobody of that name or number"
        onAddNew={addNew} addNewLabel={(t) => (t === "" ? "Add a new customer" : `Add “${t}” as a new customer`)}
      />
    );
  }
  return (
    <div className="full" role="group" aria-label="New customer">
      <div className="flex items-baseline justify-between gap-4">
        <span className="eng ink">New customer</span>
        <Button size="sm" variant="lo" onClick={backToKnown}>Pick a known one</Button>
      </div>
      <div className="fields three mt-3">
        <TextInput name="newCustomer.name" label="Name" autoComplete="off" />
        <TextInput name="newCustomer.phone" label="Telephone" inputMode="tel" optional />
        <TextInput name="newCustomer.email" label="E-mail" inputMode="email" optional hint="The estimate goes there." />
      </div>
    </div>
  );
}
