"use client";

import { useRouter } from "next/navigation";
import { useEffect, useState } from "react";
import { useFieldArray } from "react-hook-form";
import { Bay, Bays } from "@/modules/ui/bay";
import { Button, LinkButton } from "@/modules/ui/button";
import type { ComboItem } from "@/modules/ui/combobox";
import { CommandForm } from "@/modules/ui/form/command-form";
import { DateInput } from "@/modules/ui/form/date-input";
import { MoneyInput } from "@/modules/ui/form/money-input";
import { RadioRow } from "@/modules/ui/form/radio-row";
import { SubmitButton } from "@/modules/ui/form/submit-button";
import { TextInput } from "@/modules/ui/form/text-input";
import { TextareaInput } from "@/modules/ui/form/textarea-input";
import { useCommandForm } from "@/modules/ui/form/use-command-form";
import { KeyHints } from "@/modules/ui/key-hints";
import { Note } from "@/modules/ui/note";
import { usePlace } from "@/modules/ui/place";
import { TextLink } from "@/modules/ui/text-link";
import { openOrderAction, startEstimateAction } from "../actions";
import { ROAD_CAUTION, USE_WORDS, USES } from "../domain/uses";
import { openOrderInput } from "../input";
import { CustomerField } from "./customer-field";

const PIECE = { family: "", castingNumber: "", serial: "", declaredValue: "", description: "", ownerKind: "customer" as const };

/** A work order while the customer is on the telephone: by keyboard alone, one page, nothing lost. */
export function OpenOrderForm({ families, today, customer }: { families: readonly string[]; today: string; customer: ComboItem | null }) {
  const { slug, currency } = usePlace();
  const router = useRouter();
  const [first, setFirst] = useState<string | null>(null);
  const form = useCommandForm({
    schema: openOrderInput,
    defaultValues: { customerId: customer?.id ?? "", newCustomer: null, pieces: [PIECE], wants: "", use: undefined, promisedOn: "", customerReference: "" },
    action: async (sent) => {
      const reply = await openOrderAction(slug, sent);
      setFirst(reply.status === "refused" && reply.code === "PIECE_ON_OPEN_ORDER" ? String(reply.data?.number ?? "") : null);
      return reply;
    },
    onDone: (value) => {
      // The first draft is begun at once, so that pricing goes on without another press; if that fails the page offers it.
      void startEstimateAction(slug, { requestId: crypto.randomUUID(), input: { workOrderId: value.id } })
        .catch(() => undefined)
        .then(() => router.push(`/s/${slug}/orders/${value.number}/estimate`));
    },
    draft: `new-order-${slug}`,
  });
  const { control, setFocus, watch } = form.rhf;
  const pieces = useFieldArray({ control, name: "pieces" });
  const use = watch("use");
  useEffect(() => {
    // Whoever typed before the page came alive keeps the field they are in.
    if (document.activeElement === document.body) setFocus(customer ? "pieces.0.family" : "customerId");
  }, [setFocus, customer]);
  return (
    <CommandForm form={form} toFix="before this order opens" label="New work order" className="max-w-[1120px]">
      {first ? <Note tone="stop" live title="That head is here already." action={<LinkButton size="sm" href={`/s/${slug}/orders/${first}`}>Open {first}</LinkButton>}>A head stands on one open order at a time.</Note> : null}
      <datalist id="families">{families.map((f) => <option key={f} value={f} />)}</datalist>
      <Bays className="mt-4">
        <Bay label="Who">
          <div className="fields">
            <CustomerField initial={customer} />
            <TextInput name="customerReference" label="Their reference" optional hint="Order or job number of the customer." />
          </div>
        </Bay>
        <Bay label={pieces.fields.length === 1 ? "Head" : `Heads, ${pieces.fields.length}`}>
          {pieces.fields.map((f, i) => (
            <div key={f.id} role="group" aria-label={`Head ${i + 1}`} className={i === 0 ? undefined : "mt-5 border-t border-line pt-4"}>
              <div className="grid gap-x-4 gap-y-4" style={{ gridTemplateColumns: "repeat(auto-fit, minmax(200px, 1fr))" }}>
                <TextInput name={`pieces.${i}.family`} label="Engine family" list="families" autoComplete="off" hint={i === 0 ? "Or “unknown”." : undefined} />
                <TextInput name={`pieces.${i}.castingNumber`} label="Casting number" optional autoComplete="off" />
                <TextInput name={`pieces.${i}.serial`} label="Serial" optional autoComplete="off" />
                <MoneyInput name={`pieces.${i}.declaredValue`} label="Declared value" currency={currency} optional />
                <TextInput name={`pieces.${i}.description`} label="Remarks" optional className="col-span-full" />
              </div>
              {pieces.fields.length > 1 ? <Button size="sm" variant="lo" icon="minus" className="mt-2" onClick={() => pieces.remove(i)}>Take head {i + 1} off</Button> : null}
            </div>
          ))}
          <Button size="sm" variant="lo" icon="plus" className="mt-4" onClick={() => pieces.append({ ...PIECE, family: form.rhf.getValues("pieces.0.family"), castingNumber: form.rhf.getValues("pieces.0.castingNumber") ?? "" }, { focusName: `pieces.${pieces.fields.length}.serial` })}>One more head</Button>
        </Bay>
        <Bay label="What and when">
          <div className="fields">
            <TextareaInput name="wants" label="What they want" optional rows={3} className="full" hint="In their words. The estimate lists the work." />
            <RadioRow name="use" label="Used on" options={USES.map((u) => ({ value: u, label: USE_WORDS[u] }))} />
            <DateInput name="promisedOn" label="Promised" optional min={today} hint="Today or later. It can be left open." />
            {use === "road" ? <div className="full"><Note tone="warn" live>{ROAD_CAUTION}</Note></div> : null}
          </div>
        </Bay>
      </Bays>
      <div className="form-act">
        <SubmitButton hotkey="F9" pendingText="Opening…">Open order</SubmitButton>
        <span className="sm dim">Then the estimate. <TextLink href={`/s/${slug}/orders`}>Back to the orders</TextLink></span>
        <span className="ml-auto hide-s"><KeyHints hints={[{ keys: ["Tab"], does: "next" }, { keys: ["F9"], does: "open the order" }]} /></span>
      </div>
    </CommandForm>
  );
}
