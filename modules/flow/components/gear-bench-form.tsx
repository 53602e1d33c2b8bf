"use client";

import type { MouseEvent } from "react";
import { useFieldArray, useWatch } from "react-hook-form";
import { Button } from "@/modules/ui/button";
import { Checkbox } from "@/modules/ui/form/checkbox";
import { SelectInput } from "@/modules/ui/form/select-input";
import { TextInput } from "@/modules/ui/form/text-input";
import type { Reply } from "@/modules/ui/form/reply";
import { useCommandForm } from "@/modules/ui/form/use-command-form";
import { usePlace } from "@/modules/ui/place";
import { changeBenchAction, setUpBenchAction } from "../gear-actions";
import { benchInput } from "../gear-input";
import type { BenchView } from "../queries/gear";
import { fieldText, useGearDone } from "./gear-done";
import { GearFormFrame } from "./gear-form-frame";

export const SCALE_WORDS = { direct: "Shows the flow itself", percent_linear: "Percent of a range, linear in flow", orifice_head: "Head across the orifice" } as const;
export const BENCH_KIND_WORDS = { series_orifice: "Port and orifice in one air path", absolute_meter: "Meter of its own (thermal, vane, volume)" } as const;
export const WATER_WORDS = { conventional: "Conventional (249.089 Pa)", "39.2F": "At 39.2 °F (249.082 Pa)", "60F": "At 60 °F (248.84 Pa)" } as const;
const options = (words: Readonly<Record<string, string>>) => Object.entries(words).map(([value, label]) => ({ value, label }));

/** The next range of a bench, under the next number. */
const nextRange = (rows: readonly { label: string }[] | undefined) => {
  const numbers = (rows ?? []).map((r) => Number(r.label)).filter((n) => Number.isInteger(n));
  return { label: String(Math.max(0, ...numbers) + 1), fullScaleCfm: "", fullScaleHead: "" };
};
/** The field keeps the focus while the key is pressed: what its leaving would say must not push the key from under the pointer. */
const keepFocus = (event: MouseEvent) => event.preventDefault();

export function BenchForm({ bench }: { bench: BenchView | null }) {
  const { slug } = usePlace();
  const done = useGearDone("benches");
  const form = useCommandForm({
    schema: benchInput,
    defaultValues: {
      name: bench?.name ?? "", kind: bench?.kind === "absolute_meter" ? "absolute_meter" : "series_orifice", scale: bench?.scale ?? "direct", waterUnit: bench?.waterUnit ?? "conventional",
      ranges: bench?.ranges.map((r) => ({ label: r.label, fullScaleCfm: String(r.fullScaleCfm), fullScaleHead: fieldText(r.fullScaleHead) })) ?? [],
      nominalPressures: (bench?.nominalPressuresInH2O ?? [28]).join(" "), maxFlow: fieldText(bench?.maxFlowCfm ?? 600), uPressure: fieldText(bench?.pressureUncertaintyInH2O),
      uReading: fieldText(bench?.readingUncertaintyCfm), altitude: fieldText(bench?.altitudeM), active: bench?.active ?? true,
    },
    action: async ({ requestId, input }): Promise<Reply<{ id: string }>> => (bench ? changeBenchAction(slug, { requestId, input: { ...input, id: bench.id, version: bench.version } }) : setUpBenchAction(slug, { requestId, input })),
    onDone: () => done(bench ? "Bench changed" : "Bench added"),
  });
  const ranges = useFieldArray({ control: form.rhf.control, name: "ranges" });
  const scale = useWatch({ control: form.rhf.control, name: "scale" });
  /** A bench read on a scale has a range at once; what is not asked of this scale is not left standing unseen. */
  const fitRanges = (next: string) => {
    const rows = form.rhf.getValues("ranges") ?? [];
    const untyped = rows.flatMap((r, i) => (r.fullScaleCfm === "" && !r.fullScaleHead ? [i] : []));
    if (next === "direct" && untyped.length > 0) ranges.remove(untyped);
    if (next !== "direct" && rows.length === 0) ranges.append(nextRange([]), { shouldFocus: false });
    if (next === "percent_linear") rows.forEach((_, i) => form.rhf.setValue(`ranges.${i}.fullScaleHead`, ""));
  };
  const rangesError = form.rhf.formState.errors.ranges?.message ?? form.rhf.formState.errors.ranges?.root?.message;
  return (
    <GearFormFrame form={form} view="benches" title={bench ? bench.name : "New bench"} save={bench ? "Keep changes" : "Add bench"}>
      <div className="fields">
        <TextInput name="name" label="Name" className="full" />
        <SelectInput name="kind" label="Kind" options={options(BENCH_KIND_WORDS)} className="full" />
        <SelectInput name="scale" label="What its scale shows" options={options(SCALE_WORDS)} className="full" onChange={(e) => fitRanges(e.target.value)} />
      </div>
      {scale === "direct" ? null : (
        <fieldset className="mt-4">
          <legend className="eng ink mb-2">Ranges</legend>
          {ranges.fields.map((row, i) => (
            <div key={row.id} className={`mb-3 grid items-start gap-2 ${scale === "orifice_head" ? "grid-cols-2 border-b border-line pb-3" : "grid-cols-[1fr_1fr_auto]"}`}>
              <TextInput name={`ranges.${i}.label`} label="Range" />
              <TextInput name={`ranges.${i}.fullScaleCfm`} label="Full scale" unit="CFM" inputMode="decimal" alignEnd />
              {scale === "orifice_head" ? <TextInput name={`ranges.${i}.fullScaleHead`} label="Head at full scale" inputMode="decimal" alignEnd hint="In the manometer's own unit." /> : null}
              <span className="mt-[1.45rem]"><Button variant="lo" onMouseDown={keepFocus} onClick={() => ranges.remove(i)} aria-label={`Take out range ${i + 1}`}>Take out</Button></span>
            </div>
          ))}
          {typeof rangesError === "string" ? <p className="err" role="alert">{rangesError}</p> : null}
          <Button size="sm" icon="plus" onMouseDown={keepFocus} onClick={() => ranges.append(nextRange(form.rhf.getValues("ranges")))}>Another range</Button>
        </fieldset>
      )}
      <div className="fields mt-4">
        <TextInput name="nominalPressures" label="Test pressures" unit="in H₂O" hint="The first is used unless another is chosen. 28 10" />
        <SelectInput name="waterUnit" label="Inch of water" options={options(WATER_WORDS)} />
        <TextInput name="maxFlow" label="Greatest flow" unit="CFM" inputMode="decimal" alignEnd />
        <TextInput name="altitude" label="Height above sea" unit="m" inputMode="decimal" alignEnd optional />
        <TextInput name="uPressure" label="Pressure held to within" unit="in H₂O" inputMode="decimal" alignEnd optional hint="One standard uncertainty." />
        <TextInput name="uReading" label="Reading to within" unit="CFM" inputMode="decimal" alignEnd optional />
        <Checkbox name="active" label="In use" className="full" />
      </div>
    </GearFormFrame>
  );
}
