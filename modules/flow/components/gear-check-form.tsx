"use client";

import { useState } from "react";
import { useRouter } from "next/navigation";
import { Button } from "@/modules/ui/button";
import { CommandForm } from "@/modules/ui/form/command-form";
import { settles } from "@/modules/ui/form/reply";
import { RequestIds } from "@/modules/ui/form/request-id";
import { SubmitButton } from "@/modules/ui/form/submit-button";
import { TextInput } from "@/modules/ui/form/text-input";
import { useCommandForm } from "@/modules/ui/form/use-command-form";
import { decimal } from "@/modules/kernel/format";
import { usePlace } from "@/modules/ui/place";
import { useToast } from "@/modules/ui/toast";
import { recordBenchCheckAction } from "../actions";
import { plateCheckForm } from "../gear-input";
import type { PlateView } from "../queries/gear";

/** Plates as flowed on the bench; an empty one was not flowed. Without plates the bench may still be said to stand as it was. */
export function GearCheckForm({ benchId, plates }: { benchId: string; plates: readonly PlateView[] }) {
  const { slug, locale } = usePlace();
  const router = useRouter();
  const toast = useToast();
  const form = useCommandForm({
    schema: plateCheckForm,
    defaultValues: { plates: plates.map((p) => ({ serial: p.serial, reference: String(p.referenceFlowCfm), indicated: "" })), note: "" },
    draft: `bench-check-${benchId}`,
    action: async ({ requestId, input }) => recordBenchCheckAction(slug, { requestId, input: { benchId, plates: input.plates.filter((p) => p.indicated !== ""), note: input.note } }),
    onDone: (value) => {
      toast({ text: `Bench factor ${decimal(value.factor, 4, locale)} from today on` });
      form.rhf.reset();
      router.refresh();
    },
  });
  const [ids] = useState(() => new RequestIds());
  const stands = async () => {
    const note = form.rhf.getValues("note") ?? "";
    const reply = await recordBenchCheckAction(slug, { requestId: ids.take(note), input: { benchId, plates: [], isFine: true, note } }).catch(() => null);
    if (reply && settles(reply)) ids.settle(note);
    if (reply?.status === "ok") { toast({ text: "Looked over: the bench keeps its factor" }); router.refresh(); } else toast({ text: "The check was not written down. Try again.", tone: "failed" });
  };
  return (
    <CommandForm form={form} toFix="before this check is kept" label="Bench check">
      {plates.length === 0 ? <p className="mid mb-3">No check plates are in use. Add them under Check plates, or say that the bench stands as it was.</p> : (
        <table className="calm mb-3">
          <thead><tr><th scope="col">Plate</th><th scope="col" className="r">Certified</th><th scope="col" className="r">Bench shows</th></tr></thead>
          <tbody>
            {plates.map((p, i) => (
              <tr key={p.id}>
                <th scope="row" className="border-b border-line normal-case tracking-normal text-ink"><span className="ord">{p.serial}</span>{p.isOverdue ? <span className="dim sm"> past its date</span> : null}</th>
                <td className="r q">{decimal(p.referenceFlowCfm, 1, locale)} <span className="unit">CFM at {p.atPressureInH2O}</span></td>
                <td className="w-36"><TextInput name={`plates.${i}.indicated`} label={`Plate ${p.serial}, bench shows`} hideLabel unit="CFM" inputMode="decimal" alignEnd /></td>
              </tr>
            ))}
          </tbody>
        </table>
      )}
      <TextInput name="note" label="Note" optional />
      <div className="form-act">
        {plates.length === 0 ? null : <SubmitButton pendingText="Working it out…">Keep this check</SubmitButton>}
        <Button onClick={() => void stands()}>Looked over, stands as it was</Button>
      </div>
    </CommandForm>
  );
}
