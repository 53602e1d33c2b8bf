"use client";

import { useRouter } from "next/navigation";
import { useController } from "react-hook-form";
import type { Role } from "@/modules/access/roles";
import { date, money } from "@/modules/kernel/format";
import { Bay } from "@/modules/ui/bay";
import { CommandForm } from "@/modules/ui/form/command-form";
import { DateInput } from "@/modules/ui/form/date-input";
import { Field } from "@/modules/ui/form/field";
import { MoneyInput } from "@/modules/ui/form/money-input";
import { SubmitButton } from "@/modules/ui/form/submit-button";
import { TextInput } from "@/modules/ui/form/text-input";
import { useCommandForm } from "@/modules/ui/form/use-command-form";
import { useField } from "@/modules/ui/form/use-field";
import { usePlace } from "@/modules/ui/place";
import { addPersonAction, changePersonAction, setBadgeAction, setPinAction, setRateAction } from "../actions";
import { ROLE_WORDS } from "../role-words";
import { badgeInput, personEditInput, personInput, pinInput, rateInput } from "../input";
import type { PersonRow } from "../queries/settings-lists";
import { ActButton } from "./act-button";

function RolesField() {
  const { id, error, form } = useField({ name: "roles", label: "Roles" });
  const { field } = useController({ name: "roles", control: form.control });
  const has = (field.value ?? []) as Role[];
  return (
    <Field id={id} label="Roles" error={error} className="full">
      <div id={id} role="group" aria-label="Roles" className="grid grid-cols-2 gap-2">
        {ROLE_WORDS.map(([role, word], i) => (
          <label key={role} className="tick"><input ref={i === 0 ? field.ref : undefined} type="checkbox" checked={has.includes(role)} onChange={(e) => field.onChange(e.target.checked ? [...has, role] : has.filter((r) => r !== role))} onBlur={field.onBlur} /> {word}</label>
        ))}
      </div>
    </Field>
  );
}

const PersonFields = () => (
  <div className="fields">
    <TextInput name="name" label="Name as on the payroll" autoComplete="off" />
    <TextInput name="shortName" label="Short name" hint="For tags and the clock" autoComplete="off" />
    <TextInput name="email" label="E-mail" optional autoComplete="off" className="full" />
    <TextInput name="skills" label="Skills" optional hint="Separated by commas, such as porting, seat machine" autoComplete="off" className="full" />
    <RolesField />
  </div>
);

export function AddPersonForm() {
  const { slug } = usePlace();
  const router = useRouter();
  const form = useCommandForm({ schema: personInput, defaultValues: { name: "", shortName: "", email: "", roles: [], skills: "" }, action: (sent) => addPersonAction(slug, sent), onDone: (v) => router.push(`/s/${slug}/settings/people/${v.id}`) });
  return <CommandForm form={form} toFix="before the person is added"><PersonFields /><div className="form-act"><SubmitButton pendingText="Adding…">Add person</SubmitButton></div></CommandForm>;
}

export function ChangePersonForm({ person }: { person: PersonRow }) {
  const { slug } = usePlace();
  const router = useRouter();
  const form = useCommandForm({
    schema: personEditInput, defaultValues: { id: person.id, version: person.version, name: person.name, shortName: person.shortName, email: person.email, roles: person.roles as Role[], skills: person.skills },
    action: (sent) => changePersonAction(slug, sent), onDone: (v) => { form.rhf.setValue("version", v.version); router.refresh(); },
  });
  return <CommandForm form={form} toFix="before it is kept"><PersonFields /><div className="form-act"><SubmitButton pendingText="Keeping…">Keep changes</SubmitButton></div></CommandForm>;
}

const newBadge = badgeInput.refine((b) => b.badgeCode !== "", { error: "Scan the badge into this field.", path: ["badgeCode"] });

/** Badge and PIN: each is written and never shown again. */
export function ClockKeys({ person }: { person: PersonRow }) {
  const { slug } = usePlace();
  const router = useRouter();
  const badge = useCommandForm({ schema: newBadge, defaultValues: { id: person.id, badgeCode: "" }, action: (sent) => setBadgeAction(slug, sent), onDone: () => { badge.rhf.reset({ id: person.id, badgeCode: "" }); router.refresh(); } });
  const pin = useCommandForm({ schema: pinInput, defaultValues: { id: person.id, pin: "" }, action: (sent) => setPinAction(slug, sent), onDone: () => { pin.rhf.reset({ id: person.id, pin: "" }); router.refresh(); } });
  return (
    <Bay label="At the shop clock">
      <CommandForm form={badge} label="Badge">
        <div className="fields one"><TextInput name="badgeCode" label="New badge code" hint={person.hasBadge ? "Has a badge. Scan another into this field." : "No badge yet. Scan it into this field."} autoComplete="off" /></div>
        <div className="form-act"><SubmitButton variant="plain" pendingText="Writing…">Set badge</SubmitButton>{person.hasBadge ? <ActButton variant="lo" action={setBadgeAction} input={{ id: person.id, badgeCode: "" }}>Take badge away</ActButton> : null}</div>
      </CommandForm>
      <div className="mt-5" />
      <CommandForm form={pin} label="PIN">
        <div className="fields one"><TextInput name="pin" label="New PIN" type="password" inputMode="numeric" autoComplete="new-password" hint={person.pin === "dead" ? "Ten wrong tries: dead until a new one is set here." : `${person.pin === "set" ? "Has a PIN." : "No PIN yet."} 6 to 8 digits, no runs or repeats.`} /></div>
        <div className="form-act"><SubmitButton variant="plain" pendingText="Writing…">Set PIN</SubmitButton></div>
      </CommandForm>
    </Bay>
  );
}

export function RatesBay({ personId, rates, today, mayWrite }: { personId: string; rates: readonly { validFrom: string; rateMinor: number }[]; today: string; mayWrite: boolean }) {
  const place = usePlace();
  const router = useRouter();
  const form = useCommandForm({ schema: rateInput, defaultValues: { personId, validFrom: today, rate: "" }, action: (sent) => setRateAction(place.slug, sent), onDone: () => { form.rhf.reset({ personId, validFrom: today, rate: "" }); router.refresh(); } });
  return (
    <Bay label="Pay rate">
      {rates.length === 0 ? <p className="mid">None yet: this person&apos;s hours cost nothing on a job.</p> : (
        <table><caption className="sr-only">Pay rates</caption><thead><tr><th scope="col">From</th><th scope="col" className="r">An hour</th></tr></thead>
          <tbody>{rates.map((r) => <tr key={r.validFrom}><td>{date(r.validFrom, place.locale)}</td><td className="r q">{money(r.rateMinor, place)}</td></tr>)}</tbody></table>
      )}
      {mayWrite ? (
        <CommandForm form={form} label="New pay rate" className="mt-4">
          <div className="fields"><DateInput name="validFrom" label="From" /><MoneyInput name="rate" label="An hour" currency={place.currency} /></div>
          <div className="form-act"><SubmitButton variant="plain" pendingText="Writing…">Set rate</SubmitButton></div>
        </CommandForm>
      ) : null}
    </Bay>
  );
}
