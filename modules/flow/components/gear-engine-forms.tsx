"use client";

import { useFieldArray } from "react-hook-form";
import { Button } from "@/modules/ui/button";
import { Checkbox } from "@/modules/ui/form/checkbox";
import { SelectInput } from "@/modules/ui/form/select-input";
import { TextInput } from "@/modules/ui/form/text-input";
import { TextareaInput } from "@/modules/ui/form/textarea-input";
import type { Reply } from "@/modules/ui/form/reply";
import { useCommandForm } from "@/modules/ui/form/use-command-form";
import { usePlace } from "@/modules/ui/place";
import { camTableText } from "../domain/cam-table";
import { addCamshaftAction, changeCamshaftAction, changeFamilyAction, setUpFamilyAction } from "../gear-actions";
import { camshaftInput, familyInput } from "../gear-input";
import type { CamshaftView, FamilyView } from "../queries/gear";
import { fieldText, liftField, useGearDone } from "./gear-done";
import { GearFormFrame } from "./gear-form-frame";

const SIDES = [{ value: "intake", label: "Intake" }, { value: "exhaust", label: "Exhaust" }];

export function CamshaftForm({ cam }: { cam: CamshaftView | null }) {
  const { slug } = usePlace();
  const done = useGearDone("camshafts");
  const form = useCommandForm({
    schema: camshaftInput,
    defaultValues: {
      label: cam?.label ?? "", side: cam?.side ?? "intake", maxLift: liftField(cam?.maxLiftUm), duration: fieldText(cam?.durationDeg), profile: cam ? camTableText(cam.profile, "mm") : "", profileUnit: "mm",
      dataSource: cam?.dataSource ?? "", active: cam?.active ?? true,
    },
    action: async ({ requestId, input }): Promise<Reply<{ id: string }>> => (cam ? changeCamshaftAction(slug, { requestId, input: { ...input, id: cam.id, version: cam.version } }) : addCamshaftAction(slug, { requestId, input })),
    onDone: () => done(cam ? "Camshaft changed" : "Camshaft added"),
  });
  return (
    <GearFormFrame form={form} view="camshafts" title={cam ? `${cam.label}, ${cam.side}` : "New camshaft"} save={cam ? "Keep changes" : "Add camshaft"}>
      <div className="fields">
        <TextInput name="label" label="Label" />
        <SelectInput name="side" label="Side" options={SIDES} />
        <TextInput name="maxLift" label="Greatest valve lift" unit="mm" alignEnd hint="After lash and rocker. Write in behind inches: .340 in" />
        <TextInput name="duration" label="Duration" unit="°" inputMode="decimal" alignEnd optional hint="Of the crank, over the lift the table or maker names." />
        <TextareaInput name="profile" label="Table of angle and lift" className="full" rows={7} optional hint="One point a line: angle, blank, valve lift. Without a table the lift is drawn from lift and duration, and said to be so." />
        <SelectInput name="profileUnit" label="Lifts of the table in" options={[{ value: "mm", label: "mm" }, { value: "in", label: "in" }]} />
        <TextInput name="dataSource" label="Where the figures are from" optional />
        <Checkbox name="active" label="In use" className="full" />
      </div>
    </GearFormFrame>
  );
}

const PLACES = [{ value: "single", label: "Single" }, { value: "left", label: "Left" }, { value: "centre", label: "Centre" }, { value: "right", label: "Right" }];

export function FamilyForm({ family }: { family: FamilyView | null }) {
  const { slug } = usePlace();
  const done = useGearDone("families");
  const form = useCommandForm({
    schema: familyInput,
    defaultValues: {
      name: family?.name ?? "", cylinders: String(family?.cylinders ?? 1), bore: fieldText(family?.boreMm), stroke: fieldText(family?.strokeMm), camLiftIntake: liftField(family?.camLiftIntakeUm), camLiftExhaust: liftField(family?.camLiftExhaustUm),
      notes: family?.notes ?? "", valves: family?.valves.map((v) => ({ side: v.side, position: v.position, head: String(v.headMm), stem: fieldText(v.stemMm), seatAngle: fieldText(v.seatAngleDeg) })) ?? [],
    },
    action: async ({ requestId, input }): Promise<Reply<{ id: string }>> => (family ? changeFamilyAction(slug, { requestId, input: { ...input, id: family.id, version: family.version } }) : setUpFamilyAction(slug, { requestId, input })),
    onDone: () => done(family ? "Family changed" : "Family added"),
  });
  const valves = useFieldArray({ control: form.rhf.control, name: "valves" });
  return (
    <GearFormFrame form={form} view="families" title={family ? family.name : "New engine family"} save={family ? "Keep changes" : "Add family"}>
      <div className="fields">
        <TextInput name="name" label="Name in this shop" className="full" />
        <TextInput name="cylinders" label="Cylinders a head" inputMode="numeric" alignEnd />
        <TextInput name="bore" label="Bore" unit="mm" inputMode="decimal" alignEnd optional />
        <TextInput name="stroke" label="Stroke" unit="mm" inputMode="decimal" alignEnd optional />
        <span aria-hidden="true" />
        <TextInput name="camLiftIntake" label="Cam lift, intake" unit="mm" alignEnd optional hint="At the valve. Or .340 in" />
        <TextInput name="camLiftExhaust" label="Cam lift, exhaust" unit="mm" alignEnd optional />
      </div>
      <fieldset className="mt-4">
        <legend className="eng ink mb-2">Valves of one cylinder</legend>
        {valves.fields.map((row, i) => (
          <div key={row.id} className="mb-3 grid grid-cols-2 items-end gap-2 border-b border-line pb-3">
            <SelectInput name={`valves.${i}.side`} label="Side" options={SIDES} />
            <SelectInput name={`valves.${i}.position`} label="Place" options={PLACES} />
            <TextInput name={`valves.${i}.head`} label="Head" unit="mm" inputMode="decimal" alignEnd />
            <TextInput name={`valves.${i}.stem`} label="Stem" unit="mm" inputMode="decimal" alignEnd />
            <TextInput name={`valves.${i}.seatAngle`} label="Seat angle" unit="°" inputMode="decimal" alignEnd optional />
            <Button variant="lo" onClick={() => valves.remove(i)} aria-label={`Take out valve ${i + 1}`}>Take out</Button>
          </div>
        ))}
        <Button size="sm" icon="plus" onClick={() => { const last = form.rhf.getValues("valves")?.at(-1); valves.append({ side: last?.side ?? "intake", position: last ? "right" : "left", head: last?.head ?? "", stem: last?.stem ?? "", seatAngle: last?.seatAngle ?? "45" }); }}>Another valve</Button>
      </fieldset>
      <div className="fields one mt-4"><TextareaInput name="notes" label="Notes" rows={2} optional /></div>
    </GearFormFrame>
  );
}
