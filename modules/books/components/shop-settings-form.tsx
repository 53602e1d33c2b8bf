"use client";
import { useRouter } from "next/navigation";
import { Bay } from "@/modules/ui/bay";
import { Checkbox } from "@/modules/ui/form/checkbox";
import { CommandForm } from "@/modules/ui/form/command-form";
import { MoneyInput } from "@/modules/ui/form/money-input";
import { NumberInput } from "@/modules/ui/form/number-input";
import { SelectInput } from "@/modules/ui/form/select-input";
import { SubmitButton } from "@/modules/ui/form/submit-button";
import { TextareaInput } from "@/modules/ui/form/textarea-input";
import { TextInput } from "@/modules/ui/form/text-input";
import { useCommandForm } from "@/modules/ui/form/use-command-form";
import { usePlace } from "@/modules/ui/place";
import { useToast } from "@/modules/ui/toast";
import { changeShopSettingsAction } from "../actions";
import type { ShopSettingsValues } from "../settings";
import { shopSettingsInput } from "../settings-input";

/** The shop's own rules of money. They hold for documents made from now on. */
export function ShopSettingsForm({ values }: { values: ShopSettingsValues }) {
  const place = usePlace();
  const router = useRouter();
  const toast = useToast();
  const form = useCommandForm({
    schema: shopSettingsInput, defaultValues: values, action: changeShopSettingsAction.bind(null, place.slug),
    onDone: (v: { version: number }) => { form.rhf.setValue("version", v.version); toast({ text: "Settings saved" }); router.refresh(); },
  });
  return (
    <CommandForm form={form} toFix="before the settings are saved">
      <div className="grid gap-7">
        <Bay label="On papers"><div className="fields">
          <TextareaInput name="address" label="Address" rows={3} />
          <div className="grid content-start gap-3"><TextInput name="phone" label="Telephone" inputMode="tel" /><TextInput name="email" label="E-mail, where answers go" inputMode="email" /></div>
          <TextInput name="taxNumber" label="Tax number" optional /><TextInput name="referencePrefix" label="Payment references begin with" hint="Two to four letters, such as NB." />
          <TextareaInput name="invoiceWords" label="Words under every invoice" optional rows={3} className="full" hint="Warranty, bank details, storage. What they may say differs by place: ask local advice." />
        </div></Bay>
        <Bay label="Tax"><div className="fields">
          <SelectInput name="taxMode" label="Kind" options={[{ value: "sales", label: "Sales tax on some lines" }, { value: "vat", label: "Value added tax" }]} />
          <TextInput name="taxName" label="Name on papers" /><TextInput name="taxRateText" label="Rate" unit="%" inputMode="decimal" />
          <SelectInput name="taxBasis" label="Rounded" options={[{ value: "invoice", label: "once per invoice and rate" }, { value: "line", label: "line by line" }]} />
          <div className="full grid gap-1"><Checkbox name="laborTaxable" label="Labor is taxed" /><Checkbox name="partsTaxable" label="Parts are taxed" /><Checkbox name="suppliesTaxable" label="Shop supplies are taxed" /><Checkbox name="freightTaxable" label="Freight is taxed" /></div>
          <TextInput name="taxDecidedBy" label="Who decided this, and when" className="full" hint="What is taxed is your decision with your adviser. This is not tax advice." />
        </div></Bay>
        <Bay label="Prices and deposits"><div className="fields">
          <TextInput name="deposit" label="Deposit asked at approval" unit="%" inputMode="decimal" /><NumberInput name="estimateValidDays" label="An estimate holds, days" />
          <TextInput name="supplies" label="Shop supplies, of gross labor" unit="%" inputMode="decimal" hint="Some places regulate such a charge." /><MoneyInput name="suppliesCap" label="At most" currency={place.currency} optional />
          <MoneyInput name="billRate" label="Bill rate per hour" currency={place.currency} /><TextInput name="burden" label="Burden on labor cost" unit="%" inputMode="decimal" />
          <MoneyInput name="writeOffLimit" label="Bookkeeper may write off up to" currency={place.currency} />
        </div></Bay>
      </div>
      <div className="form-act"><SubmitButton pendingText="Saving…">Save settings</SubmitButton></div>
    </CommandForm>
  );
}
