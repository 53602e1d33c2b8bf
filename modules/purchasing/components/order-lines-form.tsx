"use client";
import { useQuery } from "@tanstack/react-query";
import { useRouter } from "next/navigation";
import { useState } from "react";
import { useFieldArray, useWatch } from "react-hook-form";
import { currencyDecimals, money } from "@/modules/kernel/format";
import { extend, minorText, parseMinor } from "@/modules/kernel/money";
import { milliText, parseMilli } from "@/modules/kernel/quantity";
import { PartPicker } from "@/modules/stock/components/part-picker";
import { Button } from "@/modules/ui/button";
import { getJson } from "@/modules/ui/fetch-json";
import { CommandForm } from "@/modules/ui/form/command-form";
import { DateInput } from "@/modules/ui/form/date-input";
import { MoneyInput } from "@/modules/ui/form/money-input";
import { NumberInput } from "@/modules/ui/form/number-input";
import { SelectInput } from "@/modules/ui/form/select-input";
import { SubmitButton } from "@/modules/ui/form/submit-button";
import { TextInput } from "@/modules/ui/form/text-input";
import { TextareaInput } from "@/modules/ui/form/textarea-input";
import { useCommandForm } from "@/modules/ui/form/use-command-form";
import { usePlace } from "@/modules/ui/place";
import { useToast } from "@/modules/ui/toast";
import { changePurchaseOrderAction } from "../actions";
import { changeOrderInput } from "../input";
import type { OrderDetail } from "../queries/orders";
import { SendDialog } from "./order-acts";

/** The lines of a purchase order as typed. After sending, saving makes the next revision and mails it. */
export function OrderLinesForm({ order, onDone }: { order: OrderDetail; onDone?: () => void }) {
  const { slug, currency, locale } = usePlace();
  const router = useRouter();
  const toast = useToast();
  const decimals = currencyDecimals(currency);
  // Until the page has what was saved (this form is made anew for it), sending would send the version before.
  const [fetching, setFetching] = useState(false);
  const form = useCommandForm({
    schema: changeOrderInput,
    defaultValues: {
      id: order.id, version: order.version, neededBy: order.neededBy ?? "", notes: order.notes,
      lines: order.lines.map((l) => ({ id: l.id, partId: l.partId, supplierNumber: l.supplierNumber, qty: milliText(l.qtyMilli), price: !l.unitPriceMinor ? "" : minorText(l.unitPriceMinor, decimals), workOrderId: l.workOrderId ?? "" })),
    },
    action: (sent) => changePurchaseOrderAction(slug, sent),
    onDone: (v) => { toast({ text: order.rawState === "sent" ? `Revision ${v.revision} goes to ${order.supplier.name}` : "Lines saved" }); onDone?.(); setFetching(true); router.refresh(); },
  });
  const lines = useFieldArray({ control: form.rhf.control, name: "lines", keyName: "key" });
  const typed = useWatch({ control: form.rhf.control, name: "lines" });
  const total = (typed ?? []).reduce((sum, l) => sum + extend(parseMinor(String(l?.price ?? ""), decimals) ?? 0, parseMilli(String(l?.qty ?? "")) ?? 0), 0);
  const seesPrices = order.partsMinor !== null;
  const known = new Map(order.lines.map((l) => [l.id, l]));
  const orders = useOpenOrders(slug);
  const tied = order.lines.flatMap((l) => (l.workOrderId && l.workOrderNumber ? [{ value: l.workOrderId, label: l.workOrderNumber }] : []));
  const choices = [...new Map([...tied, ...orders].map((o) => [o.value, o])).values()];
  return (
    <CommandForm form={form} label="Lines of the purchase order" toFix="before the lines are saved">
      <div className="grid gap-4">
        {lines.fields.map((f, i) => {
          const l = known.get(f.id ?? "");
          return (
            <div key={f.key} className="grid items-start gap-3" style={{ gridTemplateColumns: "repeat(auto-fit, minmax(112px, 1fr))", borderBottom: "1px solid var(--line)", paddingBottom: 12 }}>
              <PartPicker name={`lines.${i}.partId`} label={`Line ${i + 1}, part`} kits={false} initial={l ? { id: l.partId, sku: l.sku, description: l.description } : null} {...(l ? { hint: l.description } : {})} />
              <TextInput name={`lines.${i}.supplierNumber`} label="Their number" optional />
              <NumberInput name={`lines.${i}.qty`} label="Quantity" alignEnd />
              <MoneyInput name={`lines.${i}.price`} label="Each" currency={currency} {...(seesPrices ? {} : { hint: l ? "Empty keeps what stands" : "Empty is the last price" })} />
              <SelectInput name={`lines.${i}.workOrderId`} label="For" options={[{ value: "", label: "Stock" }, ...choices]} />
              <Button variant="lo" className="self-end" onClick={() => lines.remove(i)} aria-label={`Take line ${i + 1} off`}>Take off</Button>
            </div>
          );
        })}
      </div>
      <div style={{ display: "flex", justifyContent: "space-between", gap: 12, margin: "14px 0", flexWrap: "wrap" }}>
        <Button variant="lo" icon="plus" onClick={() => lines.append({ id: "", partId: "", supplierNumber: "", qty: "1", price: "", workOrderId: "" })}>Add a part</Button>
        {seesPrices ? <b>{`Parts ${money(total, { locale, currency })}`}</b> : null}
      </div>
      <div className="fields">
        <DateInput name="neededBy" label="Needed by" optional />
        <TextareaInput name="notes" label="Notes on the order" rows={2} optional hint="Printed for the supplier." />
      </div>
      <div className="form-act">
        {order.rawState === "sent" ? <SubmitButton pendingText="Saving…">{`Save and send revision ${order.revision + 1}`}</SubmitButton> : <>
          <SubmitButton variant="plain" pendingText="Saving…">Save lines</SubmitButton>
          <SendDialog order={order} {...(form.rhf.formState.isDirty ? { waits: "Save the lines first." } : fetching ? { waits: "Fetching what was saved." } : order.lines.length === 0 ? { waits: "Add a part and save." } : {})} />
        </>}
      </div>
    </CommandForm>
  );
}

/** Open work orders to tie a line to. */
function useOpenOrders(slug: string): { value: string; label: string }[] {
  const { data } = useQuery({
    queryKey: ["purchase-work-orders", slug],
    queryFn: ({ signal }) => getJson<{ rows: { id: string; number: string; customerName: string }[] }>(`/api/v1/s/${slug}/purchases/work-orders`, {}, signal),
  });
  return (data?.rows ?? []).map((o) => ({ value: o.id, label: `${o.number}, ${o.customerName}` }));
}
