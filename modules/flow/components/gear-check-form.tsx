"use client";

import { useState } from "react";
import { useRouter } from "next/navigation";
import { useWatch, type Control } from "react-hook-form";
import { Button } from "@/modules/ui/button";
import { CommandForm } from "@/modules/ui/form/command-form";
import { settles } from "@/modules/ui/form/reply";
import { RequestIds } from "@/modules/ui/form/request-id";
import { SelectInput } from "@/modules/ui/form/select-input";
import { SubmitButton } from "@/modules/ui/form/submit-button";
import { TextInput } from "@/modules/ui/form/text-input";
import { useCommandForm } from "@/modules/ui/form/use-command-form";
import { decimal } from "@/modules/kernel/format";
import type { z } from "@/modules/kernel/zod";
import { usePlace } from "@/modules/ui/place";
import { useToast } from "@/modules/ui/toast";
import { recordBenchCheckAction } from "../actions";
import { plateFlowCfm } from "../domain/plate-reading";
import type { BenchRange, BenchScale } from "../domain/raw-test";
import { plateCheckForm } from "../gear-input";
import type { PlateView } from "../queries/gear";

type Bench = { id: string; scale: BenchScale; ranges: readonly BenchRange[] };
type Typed = z.input<ReturnType<typeof plateCheckForm>>;
const SHOWN: Readonly<Record<BenchScale, { unit: string; words: string }>> = {
  direct: { unit: "CFM", words: "bench shows" }, percent_linear: { unit: "%", words: "percent of its range" }, orifice_head: { unit: "head", words: "head on the manometer" },
};

/** The flow that a reading on the bench's own scale means before any factor, beside its well. */
function FlowBeside({ control, index, bench, locale }: { control: Control<Typed>; index: number; bench: Bench; locale: string }) {
  const typed = useWatch({ control, name: `plates.${index}` });
  const flow = typed && typed.indicated.trim() !== "" ? plateFlowCfm(bench, typed) : null;
  return <output className="dim sm block text-right">{flow?.ok ? <>= <span className="q">{decimal(flow.value, 1, locale)}</span> CFM</> : "\u00a0"}</output>;
}

/** Plates as flowed on the bench, on its own scale; an empty one was not flowed. Without plates the bench may still be said to stand as it was. */
export function GearCheckForm({ bench, plates }: { bench: Bench; plates: readonly PlateView[] }) {
  const { slug, locale } = usePlace();
  const router = useRouter();
  const toast = useToast();
  const [schema] = useState(() => plateCheckForm(bench));
  /** A doubtful check was asked about: it is kept with a reason. */
  const [asked, setAsked] = useState(false);
  const isScaled = bench.scale !== "direct";
  const empty = { plates: plates.map((p) => ({ serial: p.serial, reference: String(p.referenceFlowCfm), range: isScaled ? (bench.ranges[0]?.label ?? "") : "", indicated: "" })), note: "", reason: "" };
  const form = useCommandForm({
    schema,
    defaultValues: empty,
    draft: `bench-check-${bench.id}`,
    action: async ({ requestId, input }) => {
      const flowed = input.plates.flatMap((p, i) => (p.indicated.trim() === "" ? [] : [i]));
      const reply = await recordBenchCheckAction(slug, { requestId, input: { benchId: bench.id, plates: flowed.map((i) => input.plates[i]), note: input.note, reason: asked ? input.reason : "" } });
      if (reply.status !== "refused") return reply;
      if (reply.data?.askReason === true) setAsked(true);
      // Plates that were not flowed are not sent: the answer counts without them.
      const [, at, field] = /^plates\.(\d+)\.(\w+)$/.exec(reply.field ?? "") ?? [];
      return at === undefined ? reply : { ...reply, field: `plates.${flowed[Number(at)] ?? 0}.${field ?? "indicated"}` };
    },
    onDone: (value) => {
      toast({ text: `Bench factor ${decimal(value.factor, 4, locale)} from today on` });
      form.rhf.reset(empty);
      setAsked(false);
      router.refresh();
    },
  });
  const [ids] = useState(() => new RequestIds());
  const stands = async () => {
    const note = form.rhf.getValues("note") ?? "";
    const reply = await recordBenchCheckAction(slug, { requestId: ids.take(note), input: { benchId: bench.id, plates: [], isFine: true, note } }).catch(() => null);
    if (reply && settles(reply)) ids.settle(note);
    if (reply?.status === "ok") { toast({ text: "Looked over: the bench keeps its factor" }); router.refresh(); } else toast({ text: "The check was not written down. Try again.", tone: "failed" });
  };
  const { unit, words } = SHOWN[bench.scale];
  return (
    <CommandForm form={form} toFix="before this check is kept" label="Bench check">
      {plates.length === 0 ? <p className="mid mb-3">No check plates are in use. Add them under Check plates, or say that the bench stands as it was.</p> : (
        <ul className="mb-4 grid gap-4">
          {plates.map((p, i) => (
            <li key={p.id} className="grid grid-cols-[minmax(0,1fr)_9.5rem] items-start gap-x-3 gap-y-1.5">
              <span><span className="ord">{p.serial}</span><span className="dim sm block"><span className="q">{decimal(p.referenceFlowCfm, 1, locale)}</span> CFM at {p.atPressureInH2O}{p.isOverdue ? ", past its date" : ""}</span></span>
              <span className="grid gap-2">
                {isScaled ? <SelectInput name={`plates.${i}.range`} label={`Plate ${p.serial}, range`} hideLabel options={bench.ranges.map((r) => ({ value: r.label, label: `Range ${r.label}` }))} /> : null}
                <TextInput name={`plates.${i}.indicated`} label={`Plate ${p.serial}, ${words}`} hideLabel unit={unit} inputMode="decimal" alignEnd />
                {isScaled ? <FlowBeside control={form.rhf.control} index={i} bench={bench} locale={locale} /> : null}
              </span>
            </li>
          ))}
        </ul>
      )}
      <div className="grid gap-4">
        {asked ? <TextInput name="reason" label="Why it stands" hint="Or type the plate again. What is written here stays with the check." /> : null}
        <TextInput name="note" label="Note" optional />
      </div>
      <div className="form-act">
        {plates.length === 0 ? null : <SubmitButton pendingText="Working it out…">Keep this check</SubmitButton>}
        <Button onClick={() => void stands()}>Looked over, stands as it was</Button>
      </div>
    </CommandForm>
  );
}
