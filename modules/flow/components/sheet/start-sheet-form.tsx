"use client";
import { useRef, useState } from "react";
import { Button } from "@/modules/ui/button";
import { DialogClose, TaskDialog } from "@/modules/ui/dialog";
import { Checkbox } from "@/modules/ui/form/checkbox";
import { CommandForm } from "@/modules/ui/form/command-form";
import { SelectInput } from "@/modules/ui/form/select-input";
import { SubmitButton } from "@/modules/ui/form/submit-button";
import { TextInput } from "@/modules/ui/form/text-input";
import { TextareaInput } from "@/modules/ui/form/textarea-input";
import { useCommandForm } from "@/modules/ui/form/use-command-form";
import { usePlace } from "@/modules/ui/place";
import { startSheetAction } from "../../actions";
import { BORE_WITHIN_MM } from "../../domain/comparability";
import type { PortSide } from "../../domain/comparison-reasons";
import type { Purpose, RawTest } from "../../domain/raw-test";
import { liftInOtherUnit, type LiftUnit } from "../../domain/lift-ladder";
import { headDiametersMm, valveFieldHint, valveListWords, type ValveOfFamily } from "../../domain/valve-list";
import { startSheetInput } from "../../input";
import type { BenchGear, FlowSheet } from "../../queries/sheet";
import { SCALE_READ, SCALE_WORDS } from "./scale-words";

/** How readings of this bench are typed, told before the test starts. */
export function benchHint(bench: BenchGear["benches"][number] | undefined): string {
  if (!bench || bench.scale === "direct") return "Readings are typed in CFM.";
  return `Readings are typed as ${SCALE_WORDS[bench.scale]}, on range ${bench.ranges.map((r) => r.label).join(", ") || "none yet"}; the flow in CFM stands beside each.`;
}

export const PURPOSE_WORDS: Record<Purpose, string> = { baseline: "before test", after: "after test", interim: "pass in between", check: "check" };
/** A lift as it would be typed in that unit. */
export const liftTyped = (um: number | null, unit: "in" | "mm"): string => (um === null ? "" : unit === "in" ? (um / 25_400).toFixed(3) : String(um / 1000));

const ENTRIES = [{ value: "radius", label: "Radius plate" }, { value: "clay", label: "Clay radius" }, { value: "manifold", label: "Manifold" }, { value: "none", label: "None" }];

/** Fields of one side of the port, under `name.` */
export function SideFields({ name, title, gear, unit, valves, onCam }: { name: PortSide; title: string; gear: BenchGear; unit: LiftUnit; valves: readonly ValveOfFamily[]; onCam: (camLift: string) => void }) {
  const listed = headDiametersMm(valves, name);
  const valveHint = valveFieldHint(listed);
  const cams = gear.camshafts.filter((c) => c.side === name);
  return (
    <fieldset className="fields three full">
      <legend className="label">{title}</legend>
      {cams.length === 0 ? null : (
        <SelectInput name={`${name}.camshaftId`} label="Camshaft" className="full" options={[{ value: "", label: "not said" }, ...cams.map((c) => ({ value: c.id, label: `${c.label}, ${liftTyped(c.maxLiftUm, unit)} ${unit}` }))]}
          onChange={(e) => { const cam = cams.find((c) => c.id === e.target.value); if (cam) onCam(liftTyped(cam.maxLiftUm, unit)); }} />
      )}
      <TextInput name={`${name}.valve`} label="Valve" unit="mm" inputMode="decimal" optional placeholder={valveListWords(valves, name).replace(/ mm$/, "")} hint={valveHint === "" ? undefined : valveHint} />
      <TextInput name={`${name}.camLift`} label="Cam lift" unit={unit} inputMode="decimal" optional />
      <SelectInput name={`${name}.entry`} label="Entry piece" options={ENTRIES} />
      <TextInput name={`${name}.valvesOpen`} label="Valves open" hint="all, or which" />
      <TextInput name={`${name}.seatNote`} label="Seats" hint="Printed beside the table" className="col-span-2" />
    </fieldset>
  );
}

/** Fields of the session that both sides share. */
export function SessionFields({ gear }: { gear: BenchGear }) {
  return (
    <>
      <SelectInput name="fixtureId" label="Bore adapter" placeholder="Choose" options={gear.fixtures.map((f) => ({ value: f.id, label: `${f.name} (${f.boreMm} mm)` }))} />
      <TextInput name="nominal" label="Test pressure" unit="in H₂O" inputMode="decimal" />
      <TextInput name="roomTemperature" label="Room temperature" hint="with its unit, such as 71 °F" optional />
      <TextInput name="roomPressure" label="Barometer" hint="with its unit, such as 29.86 inHg" optional />
      <TextInput name="roomHumidity" label="Humidity" hint="such as 45 %" optional />
      {gear.liftDevices.length === 0 ? null : <SelectInput name="liftDeviceId" label="Lift read on" options={[{ value: "", label: "not said" }, ...gear.liftDevices.map((d) => ({ value: d.id, label: d.name }))]} />}
      <TextInput name="leak" label="Leak, valves shut" unit="CFM" inputMode="decimal" optional />
      <TextInput name="leakPressure" label="Leak read at" unit="in H₂O" inputMode="decimal" optional />
      <Checkbox name="leakScalingAgreed" label="The leak may be scaled if it was read at another pressure" className="full" />
      <Checkbox name="plugClosed" label="Plug hole closed" />
      <Checkbox name="testSprings" label="Light test springs" />
    </>
  );
}

/** The bore adapter of the last test, else the only one near enough to the head's bore, else the only one there is. */
function adapterFor(gear: BenchGear, boreMm: number | null, like: RawTest | null): string {
  if (like) return like.fixture.id;
  const near = boreMm === null ? [] : gear.fixtures.filter((f) => Math.abs(f.boreMm - boreMm) <= BORE_WITHIN_MM);
  const [only, other] = near.length > 0 ? near : gear.fixtures;
  return only && !other ? only.id : "";
}

/** Valve size of the last test of that side, else the one its family lists for it; nothing when the family's sizes differ. */
function valveFor(name: PortSide, valves: readonly ValveOfFamily[], like: RawTest | null): string {
  if (like) return like.valveMm === null ? "" : String(like.valveMm);
  const sizes = [...new Set(headDiametersMm(valves, name))];
  return sizes.length === 1 ? String(sizes[0]) : "";
}

function StartForm({ sheet, gear, purpose, basis, onStarted }: { sheet: FlowSheet; gear: BenchGear; purpose: Purpose; basis: { intake: RawTest | null; exhaust: RawTest | null }; onStarted: () => void }) {
  const { slug, locale } = usePlace();
  const [sides, setSides] = useState({ intake: true, exhaust: true });
  const like = basis.intake ?? basis.exhaust;
  const unit = like?.liftUnit ?? (locale.endsWith("US") ? "in" : "mm");
  const step = like?.lifts[0]?.text ?? (unit === "in" ? "0.050" : "1");
  const cam = liftTyped(like?.camLiftUm ?? sheet.head.camLiftIntakeUm ?? sheet.head.camLiftExhaustUm, unit);
  const side = (name: "intake" | "exhaust") => ({
    camshaftId: basis[name]?.camshaft?.id ?? "", valve: valveFor(name, sheet.head.valves, basis[name]), entry: basis[name]?.entry ?? (name === "intake" ? ("radius" as const) : ("none" as const)), valvesOpen: basis[name]?.valvesOpen ?? "all",
    camLift: liftTyped(basis[name]?.camLiftUm ?? (name === "intake" ? sheet.head.camLiftIntakeUm : sheet.head.camLiftExhaustUm), unit), seatNote: purpose === "baseline" ? "baseline on the cleaned original seats" : "",
  });
  const form = useCommandForm({
    schema: startSheetInput,
    defaultValues: {
      headId: sheet.head.id, cylinder: sheet.cylinder, purpose, benchId: like?.bench.id ?? gear.benches[0]?.id ?? "", fixtureId: adapterFor(gear, sheet.head.boreMm, like),
      liftDeviceId: like?.liftDevice?.id ?? (gear.liftDevices.length === 1 ? (gear.liftDevices[0]?.id ?? "") : ""), nominal: String(like?.nominalInH2O ?? sheet.nominalInH2O), plugClosed: true, testSprings: true, roomTemperature: "", roomPressure: "", roomHumidity: "", leak: "", leakPressure: "", leakScalingAgreed: false, notes: "",
      step, camLiftForLadder: cam, liftUnit: unit, intake: side("intake"), exhaust: side("exhaust"), operatorId: gear.operators.some((o) => o.id === sheet.viewer.id) ? sheet.viewer.id : undefined,
    },
    action: ({ requestId, input }) => startSheetAction(slug, { requestId, input: { ...input, ...(sides.intake ? {} : { intake: undefined }), ...(sides.exhaust ? {} : { exhaust: undefined }) } }),
    onDone: onStarted,
    draft: `flow-start-${sheet.head.id}-${sheet.cylinder}-${purpose}`,
  });
  const liftUnit = form.rhf.watch("liftUnit") ?? unit;
  const turned = useRef(new Map<string, { from: string; to: string }>());
  /** Lifts typed so far are turned into the unit chosen; turned back they are what was typed. */
  const turnLifts = (to: LiftUnit) => {
    for (const name of ["step", "camLiftForLadder", "intake.camLift", "exhaust.camLift"] as const) {
      const text = form.rhf.getValues(name) ?? "";
      const before = turned.current.get(name);
      const made = before?.to === text ? before.from : liftInOtherUnit(text, to === "mm" ? "in" : "mm", to);
      turned.current.set(name, { from: text, to: made });
      if (made !== text) form.rhf.setValue(name, made, { shouldDirty: true });
    }
  };
  return (
    <CommandForm form={form} toFix="before the test starts">
      <div className="fields">
        <SelectInput name="benchId" label="Bench" options={gear.benches.map((b) => ({ value: b.id, label: `${b.name}, ${SCALE_READ[b.scale]}` }))} hint={benchHint(gear.benches.find((b) => b.id === form.rhf.watch("benchId")))} />
        <SelectInput name="operatorId" label="At the bench" options={gear.operators.map((o) => ({ value: o.id, label: o.name }))} />
        <SelectInput name="liftUnit" label="Lifts in" options={[{ value: "in", label: "inches" }, { value: "mm", label: "millimetres" }]} onChange={(e) => turnLifts(e.target.value === "mm" ? "mm" : "in")} />
        <TextInput name="step" label="Step" unit={liftUnit} inputMode="decimal" hint="The ladder is made of its multiples" />
        <TextInput name="camLiftForLadder" label="Past cam lift" unit={liftUnit} inputMode="decimal" hint="One lift goes past it" />
        <SessionFields gear={gear} />
        <div className="full flex gap-5">
          {(["intake", "exhaust"] as const).map((s) => <label key={s} className="tick"><input type="checkbox" checked={sides[s]} onChange={(e) => setSides({ ...sides, [s]: e.target.checked })} /><span className="capitalize">{s}</span></label>)}
        </div>
        {sides.intake ? <SideFields name="intake" title="Intake" gear={gear} unit={liftUnit} valves={sheet.head.valves} onCam={(lift) => form.rhf.setValue("intake.camLift", lift)} /> : null}
        {sides.exhaust ? <SideFields name="exhaust" title="Exhaust" gear={gear} unit={liftUnit} valves={sheet.head.valves} onCam={(lift) => form.rhf.setValue("exhaust.camLift", lift)} /> : null}
        <TextareaInput name="notes" label="Notes" rows={2} optional className="full" />
      </div>
      <div className="form-act">
        <SubmitButton pendingText="Opening…">{`Start ${PURPOSE_WORDS[purpose]}`}</SubmitButton>
        <DialogClose>Not yet</DialogClose>
      </div>
    </CommandForm>
  );
}

/** Opens both sides of a port as drafts; what the last test had is filled in. */
export function StartSheetDialog({ purpose, isMain, onStarted, ...rest }: { sheet: FlowSheet; gear: BenchGear; purpose: Purpose; basis: { intake: RawTest | null; exhaust: RawTest | null }; isMain: boolean; onStarted: () => void }) {
  const [open, setOpen] = useState(false);
  const noGear = rest.gear.benches.length === 0 || rest.gear.fixtures.length === 0;
  const label = `Start ${PURPOSE_WORDS[purpose]}`;
  if (noGear) return <Button variant={isMain ? "go" : "plain"} disabledReason="a bench and a bore adapter are set up first">{label}</Button>;
  return (
    <TaskDialog open={open} onOpenChange={setOpen} wide trigger={<Button variant={isMain ? "go" : "lo"} size={isMain ? "m" : "sm"} icon="tube">{label}</Button>} title={`Start ${PURPOSE_WORDS[purpose]}, port ${rest.sheet.cylinder}`}>
      <StartForm {...rest} purpose={purpose} onStarted={() => { setOpen(false); onStarted(); }} />
    </TaskDialog>
  );
}
