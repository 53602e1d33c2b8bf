"use client";
import { useRouter } from "next/navigation";
import { useWatch } from "react-hook-form";
import { date, dateTime, dateTimeZone } from "@/modules/kernel/format";
import { milliText, parseMilli } from "@/modules/kernel/quantity";
import { instantsOf } from "@/modules/kernel/instant";
import { qtyText } from "@/modules/stock/domain/qty-text";
import { cureReadyAt } from "@/modules/time/domain/cure";
import { Bay, Bays } from "@/modules/ui/bay";
import { EmptyState } from "@/modules/ui/empty-state";
import { Flag } from "@/modules/ui/flag";
import { Checkbox } from "@/modules/ui/form/checkbox";
import { CommandForm } from "@/modules/ui/form/command-form";
import { NumberInput } from "@/modules/ui/form/number-input";
import { RadioRow } from "@/modules/ui/form/radio-row";
import { SelectInput } from "@/modules/ui/form/select-input";
import { SubmitButton } from "@/modules/ui/form/submit-button";
import { TextInput } from "@/modules/ui/form/text-input";
import { useCommandForm } from "@/modules/ui/form/use-command-form";
import { Note } from "@/modules/ui/note";
import { usePlace } from "@/modules/ui/place";
import { useToast } from "@/modules/ui/toast";
import { recordEpoxyFillAction } from "../parts-actions";
import { epoxyInput } from "../parts-input";
import type { EpoxySheet } from "../queries/parts";

/** Epoxy mixed and put into a port: lots and grams, when it was mixed, when the port may be ground. */
export function EpoxyForm({ sheet, now }: { sheet: EpoxySheet; now: string }) {
  const place = usePlace();
  const { slug, zone } = place;
  const router = useRouter();
  const toast = useToast();
  const own = sheet.operations.find((o) => o.code === "EPX") ?? sheet.operations[0];
  const form = useCommandForm({
    schema: epoxyInput, draft: `epoxy-${sheet.pieceId}`,
    defaultValues: { pieceId: sheet.pieceId, operationId: own?.id ?? "", partId: sheet.epoxies[0]?.partId ?? "", port: "intake", gramsInPort: "", gramsWaste: "", ratio: "", surfacePrepared: false, mixedAt: now, which: "", cureHours: "", lotId: "" },
    action: (sent) => recordEpoxyFillAction(slug, sent),
    onDone: (v) => {
      toast({ text: `Epoxy kept: ${v.lots.map((l) => `${qtyText(l.qtyMilli, "gram")} of lot ${l.lotCode ?? ""}`).join(", ")}. Ready ${dateTimeZone(v.readyAt, place)}` });
      router.push(`/s/${slug}/orders/${sheet.number}`);
    },
  });
  const [mixedAt, cureHours, partId, inPort, waste] = useWatch({ control: form.rhf.control, name: ["mixedAt", "cureHours", "partId", "gramsInPort", "gramsWaste"] });
  const epoxy = sheet.epoxies.find((e) => e.partId === partId);
  const times = instantsOf(mixedAt, zone);
  const mixed = times[0];
  const cure = parseMilli(cureHours);
  const ready = mixed && cure !== null && cure > 0 ? cureReadyAt(mixed, Math.round((cure * 60) / 1000)) : null;
  const grams = (parseMilli(inPort) ?? 0) + (parseMilli(waste) ?? 0);

  if (sheet.operations.length === 0 || sheet.epoxies.length === 0) {
    return <EmptyState title={sheet.operations.length === 0 ? "No porting on this head" : "No epoxy in stock"}>{sheet.operations.length === 0 ? "An epoxy fill belongs to an agreed operation at Porting." : "Add the epoxy as a part kept in grams and by lot, then take it in."}</EmptyState>;
  }
  return (
    <div className="split" style={{ ["--side" as string]: "360px" }}>
      <div className="min-w-0">
        <Note title="Uncured resin and hardener harm skin, eyes and lungs.">Gloves and eye protection, fresh air, no flame. Sand only when the cure is over, with dust extraction and a mask. Ratio, pot life and cure time are those of the product&rsquo;s data sheet; follow it, its safety data sheet and your local rules.</Note>
        <CommandForm form={form} label="Epoxy fill" toFix="before the fill is kept" className="mt-4">
          <div className="fields">
            <SelectInput name="operationId" label="Operation" options={sheet.operations.map((o) => ({ value: o.id, label: o.name }))} />
            <RadioRow name="port" label="Port" options={[{ value: "intake", label: "Intake" }, { value: "exhaust", label: "Exhaust" }]} />
            <SelectInput name="partId" label="Epoxy" options={sheet.epoxies.map((e) => ({ value: e.partId, label: `${e.sku}, ${e.description}` }))} />
            <SelectInput name="lotId" label="Lot" options={[{ value: "", label: "First to expire" }, ...(epoxy?.lots ?? []).map((l) => ({ value: l.id, label: `${l.code}, ${qtyText(l.onHandMilli, "gram")}${l.expired ? ", expired" : ""}`, disabled: l.expired }))]} />
            <NumberInput name="gramsInPort" label="In the port" unit="g" alignEnd />
            <NumberInput name="gramsWaste" label="Left in the pot" unit="g" alignEnd optional hint="Goes to the job too." />
            <TextInput name="ratio" label="Ratio, resin to hardener" hint="By weight, as on the can, such as 100:20." />
            <NumberInput name="cureHours" label="Cure of the data sheet" unit="h" alignEnd />
            <TextInput name="mixedAt" label="Mixed at" type="datetime-local" />
            {times.length > 1 ? <RadioRow name="which" label="The clocks were put back: which?" options={[{ value: "first", label: "The first" }, { value: "second", label: "The second" }]} /> : <div />}
            <Checkbox name="surfacePrepared" label="Surface cleaned and keyed as the data sheet says" className="full" />
          </div>
          <div className="form-act"><SubmitButton pendingText="Keeping…">{grams > 0 ? `Keep the fill, ${milliText(grams)} g` : "Keep the fill"}</SubmitButton></div>
        </CommandForm>
      </div>
      <Bays>
        <Bay label="Ready">
          {ready ? <><p className="num n-m">{dateTimeZone(ready, place)}</p><p className="mid sm">Elapsed time from mixing; a change of clocks does not shorten it. No porting on this head before then, but by a lead with a reason.</p></> : <p className="mid">Type when it was mixed and the cure time.</p>}
        </Bay>
        {epoxy ? (
          <Bay label="Lots, first to expire on top" flush><table className="calm"><caption className="sr-only">Lots of this epoxy</caption><tbody>{epoxy.lots.map((l) => (
            <tr key={l.id}><td className="b">{l.code}</td><td>{qtyText(l.onHandMilli, "gram")}</td><td>{l.expired ? <Flag>Expired</Flag> : <span className="mid">{l.expiresOn ? date(l.expiresOn, place.locale) : "no date"}</span>}</td></tr>
          ))}</tbody></table></Bay>
        ) : null}
        {sheet.fills.length ? (
          <Bay label="Fills of this head"><ul className="grid gap-2 sm">{sheet.fills.map((f) => <li key={f.id}><b>{`${f.port}, ${milliText(f.gramsInPortMilli)} g`}</b>{`, mixed ${dateTime(f.mixedAt, place)}${f.personName ? ` by ${f.personName}` : ""}, ready ${dateTimeZone(f.readyAt, place)}`}</li>)}</ul></Bay>
        ) : null}
      </Bays>
    </div>
  );
}
