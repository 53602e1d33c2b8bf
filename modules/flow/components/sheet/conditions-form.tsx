"use client";
import { useState } from "react";
import { DialogClose, TaskDialog } from "@/modules/ui/dialog";
import { CommandForm } from "@/modules/ui/form/command-form";
import { SubmitButton } from "@/modules/ui/form/submit-button";
import { TextareaInput } from "@/modules/ui/form/textarea-input";
import { useCommandForm } from "@/modules/ui/form/use-command-form";
import { usePlace } from "@/modules/ui/place";
import { changeSheetConditionsAction } from "../../actions";
import type { RawTest } from "../../domain/raw-test";
import type { ValveOfFamily } from "../../domain/valve-list";
import { changeSheetInput } from "../../input";
import type { BenchGear } from "../../queries/sheet";
import { liftTyped, SessionFields, SideFields } from "./start-sheet-form";

type Drafts = { intake: RawTest | null; exhaust: RawTest | null };

function ChangeForm({ gear, valves, drafts, onChanged }: { gear: BenchGear; valves: readonly ValveOfFamily[]; drafts: Drafts; onChanged: () => void }) {
  const { slug } = usePlace();
  const test = drafts.intake ?? drafts.exhaust;
  const side = (t: RawTest | null) => t ? {
    testId: t.id, version: t.version, camshaftId: t.camshaft?.id ?? "", camLift: liftTyped(t.camLiftUm, t.liftUnit), entry: t.entry, valvesOpen: t.valvesOpen,
    valve: t.valveMm === null ? "" : String(t.valveMm), seatNote: t.seatNote,
  } : undefined;
  const intake = side(drafts.intake);
  const exhaust = side(drafts.exhaust);
  const form = useCommandForm({
    schema: changeSheetInput,
    defaultValues: {
      fixtureId: test?.fixture.id ?? "", liftDeviceId: test?.liftDevice?.id ?? "", nominal: String(test?.nominalInH2O ?? ""), plugClosed: test?.plugClosed ?? true, testSprings: test?.testSprings ?? true, roomTemperature: test?.roomTemperatureText ?? "",
      roomPressure: test?.roomPressureText ?? "", roomHumidity: test?.roomHumidityText ?? "", leak: test?.leakText ?? "", leakPressure: test?.leakPressureText ?? "", leakScalingAgreed: test?.leakScalingAgreed ?? false, notes: test?.notes ?? "",
      ...(intake ? { intake } : {}), ...(exhaust ? { exhaust } : {}),
    },
    action: ({ requestId, input }) => changeSheetConditionsAction(slug, { requestId, input }),
    onDone: onChanged,
  });
  return (
    <CommandForm form={form} toFix="before the conditions change">
      <div className="fields">
        <SessionFields gear={gear} />
        {intake ? <SideFields name="intake" title="Intake" gear={gear} unit={test?.liftUnit ?? "in"} valves={valves} onCam={(lift) => form.rhf.setValue("intake.camLift", lift)} /> : null}
        {exhaust ? <SideFields name="exhaust" title="Exhaust" gear={gear} unit={test?.liftUnit ?? "in"} valves={valves} onCam={(lift) => form.rhf.setValue("exhaust.camLift", lift)} /> : null}
        <TextareaInput name="notes" label="Notes" rows={2} optional className="full" />
      </div>
      <div className="form-act"><SubmitButton pendingText="Changing…">Change them</SubmitButton><DialogClose>Leave as they are</DialogClose></div>
    </CommandForm>
  );
}

/** Conditions of the drafts in hand. */
export function ConditionsDialog({ gear, valves, drafts, onChanged }: { gear: BenchGear; valves: readonly ValveOfFamily[]; drafts: Drafts; onChanged: () => void }) {
  const [open, setOpen] = useState(false);
  return (
    <TaskDialog open={open} onOpenChange={setOpen} wide trigger={<button type="button" className="lk">Change</button>} title="Conditions of this test">
      <ChangeForm gear={gear} valves={valves} drafts={drafts} onChanged={() => { setOpen(false); onChanged(); }} />
    </TaskDialog>
  );
}
