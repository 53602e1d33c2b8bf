"use client";

import { Checkbox } from "@/modules/ui/form/checkbox";
import { DateInput } from "@/modules/ui/form/date-input";
import { TextInput } from "@/modules/ui/form/text-input";
import type { Reply } from "@/modules/ui/form/reply";
import { useCommandForm } from "@/modules/ui/form/use-command-form";
import { usePlace } from "@/modules/ui/place";
import { addCheckPlateAction, addLiftDeviceAction, changeCheckPlateAction, changeFixtureAction, changeLiftDeviceAction, setUpFixtureAction } from "../gear-actions";
import { fixtureInput, liftDeviceInput, plateInput } from "../gear-input";
import type { FixtureView, LiftDeviceView, PlateView } from "../queries/gear";
import { fieldText, useGearDone } from "./gear-done";
import { GearFormFrame } from "./gear-form-frame";

export function PlateForm({ plate }: { plate: PlateView | null }) {
  const { slug } = usePlace();
  const done = useGearDone("plates");
  const form = useCommandForm({
    schema: plateInput,
    defaultValues: { serial: plate?.serial ?? "", referenceFlow: fieldText(plate?.referenceFlowCfm), atPressure: fieldText(plate?.atPressureInH2O ?? 28), certificate: plate?.certificate ?? "", dueOn: plate?.dueOn ?? "", active: plate?.active ?? true },
    action: async ({ requestId, input }): Promise<Reply<{ id: string }>> => (plate ? changeCheckPlateAction(slug, { requestId, input: { ...input, id: plate.id, version: plate.version } }) : addCheckPlateAction(slug, { requestId, input })),
    onDone: () => done(plate ? "Check plate changed" : "Check plate added"),
  });
  return (
    <GearFormFrame form={form} view="plates" title={plate ? `Plate ${plate.serial}` : "New check plate"} save={plate ? "Keep changes" : "Add plate"}>
      <div className="fields">
        <TextInput name="serial" label="Serial" />
        <TextInput name="referenceFlow" label="Certified flow" unit="CFM" inputMode="decimal" alignEnd />
        <TextInput name="atPressure" label="At pressure" unit="in H₂O" inputMode="decimal" alignEnd />
        <DateInput name="dueOn" label="Due again" optional />
        <TextInput name="certificate" label="Certificate" className="full" optional hint="Number and who gave it." />
        <Checkbox name="active" label="In use" className="full" />
      </div>
    </GearFormFrame>
  );
}

export function FixtureForm({ fixture }: { fixture: FixtureView | null }) {
  const { slug } = usePlace();
  const done = useGearDone("fixtures");
  const form = useCommandForm({
    schema: fixtureInput,
    defaultValues: { name: fixture?.name ?? "", bore: fieldText(fixture?.boreMm), length: fieldText(fixture?.lengthMm), headPattern: fixture?.headPattern ?? "", plate: fixture?.plate ?? "", active: fixture?.active ?? true },
    action: async ({ requestId, input }): Promise<Reply<{ id: string }>> => (fixture ? changeFixtureAction(slug, { requestId, input: { ...input, id: fixture.id, version: fixture.version } }) : setUpFixtureAction(slug, { requestId, input })),
    onDone: () => done(fixture ? "Fixture changed" : "Fixture added"),
  });
  return (
    <GearFormFrame form={form} view="fixtures" title={fixture ? fixture.name : "New fixture"} save={fixture ? "Keep changes" : "Add fixture"}>
      <div className="fields">
        <TextInput name="name" label="Name" className="full" hint="As it is written on the sleeve or plate." />
        <TextInput name="bore" label="Sleeve bore" unit="mm" inputMode="decimal" alignEnd />
        <TextInput name="length" label="Sleeve length" unit="mm" inputMode="decimal" alignEnd optional />
        <TextInput name="headPattern" label="Head pattern" optional />
        <TextInput name="plate" label="Adapter plate" optional />
        <Checkbox name="active" label="In use" className="full" />
      </div>
    </GearFormFrame>
  );
}

export function LiftDeviceForm({ device }: { device: LiftDeviceView | null }) {
  const { slug } = usePlace();
  const done = useGearDone("lift");
  const form = useCommandForm({
    schema: liftDeviceInput,
    defaultValues: { name: device?.name ?? "", resolution: fieldText(device?.resolutionMm), uncertainty: fieldText(device?.uncertaintyMm), active: device?.active ?? true },
    action: async ({ requestId, input }): Promise<Reply<{ id: string }>> => (device ? changeLiftDeviceAction(slug, { requestId, input: { ...input, id: device.id, version: device.version } }) : addLiftDeviceAction(slug, { requestId, input })),
    onDone: () => done(device ? "Lift device changed" : "Lift device added"),
  });
  return (
    <GearFormFrame form={form} view="lift" title={device ? device.name : "New lift device"} save={device ? "Keep changes" : "Add device"}>
      <div className="fields">
        <TextInput name="name" label="Name" className="full" hint="Screw or bridge, with its indicator." />
        <TextInput name="resolution" label="Indicator reads to" unit="mm" inputMode="decimal" alignEnd />
        <TextInput name="uncertainty" label="Lift set to within" unit="mm" inputMode="decimal" alignEnd optional hint="One standard uncertainty." />
        <Checkbox name="active" label="In use" className="full" />
      </div>
    </GearFormFrame>
  );
}
