"use client";

import { useRouter } from "next/navigation";
import { TaskDialog } from "@/modules/ui/dialog";
import { CommandForm } from "@/modules/ui/form/command-form";
import { SelectInput } from "@/modules/ui/form/select-input";
import { SubmitButton } from "@/modules/ui/form/submit-button";
import { TextInput } from "@/modules/ui/form/text-input";
import { useCommandForm } from "@/modules/ui/form/use-command-form";
import { usePlace } from "@/modules/ui/place";
import { useToast } from "@/modules/ui/toast";
import { setMeasurementLimitAction } from "../measure-actions";
import { limitInput } from "../measure-input";
import type { LimitView } from "../queries/measurements";

/** The shop's own limit for one line of a family, with where it is from. */
export function MeasureLimitDialog({ family, kind, label, side, units, limit }: { family: string; kind: string; label: string; side: "" | "intake" | "exhaust"; units: readonly string[]; limit: LimitView | null }) {
  const { slug } = usePlace();
  const router = useRouter();
  const toast = useToast();
  const form = useCommandForm({
    schema: limitInput,
    defaultValues: { family, kind, side, min: limit?.minText ?? "", max: limit?.maxText ?? "", unit: limit?.unit ?? units[0] ?? "mm", source: limit?.source ?? "", version: limit?.version ?? 0 },
    action: async ({ requestId, input }) => setMeasurementLimitAction(slug, { requestId, input }),
    onDone: () => { toast({ text: "Limit kept" }); router.refresh(); },
  });
  return (
    <TaskDialog trigger={<button type="button" className="lk" aria-label={`${limit ? "Change" : "Set"} limit for ${label}${side ? `, ${side}` : ""}`}>{limit ? "Change" : "Set"}{limit === null && side ? (side === "intake" ? " in" : " ex") : ""}</button>} title={`Limit: ${label}${side ? `, ${side}` : ""}`} description={`For every head of ${family}. Nothing is built in: take it from the service manual.`}>
      <CommandForm form={form} toFix="before the limit is kept">
        <div className="fields">
          <TextInput name="min" label="Least" inputMode="decimal" alignEnd optional />
          <TextInput name="max" label="Most" inputMode="decimal" alignEnd optional />
          <SelectInput name="unit" label="In" options={units.map((u) => ({ value: u, label: u }))} />
          <TextInput name="source" label="Where it is from" hint="Service manual and page." />
        </div>
        <div className="form-act"><SubmitButton>Keep limit</SubmitButton></div>
      </CommandForm>
    </TaskDialog>
  );
}
