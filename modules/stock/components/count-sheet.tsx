"use client";
import { useRouter } from "next/navigation";
import { LinkButton } from "@/modules/ui/button";
import { CommandForm } from "@/modules/ui/form/command-form";
import { NumberInput } from "@/modules/ui/form/number-input";
import { SelectInput } from "@/modules/ui/form/select-input";
import { SubmitButton } from "@/modules/ui/form/submit-button";
import { TextInput } from "@/modules/ui/form/text-input";
import { useCommandForm } from "@/modules/ui/form/use-command-form";
import { usePlace } from "@/modules/ui/place";
import { useToast } from "@/modules/ui/toast";
import { countStockAction } from "../actions";
import { COUNT_CAUSES, unitMark } from "../domain/part-words";
import { signedQtyText } from "../domain/qty-text";
import { countInput } from "../input";
import type { CountLine } from "../queries/count-sheet";

/** The sheet for counting shelves: what should be there is not on it. Lines left empty are not counted. */
export function CountSheet({ lines, now }: { lines: readonly CountLine[]; now: string }) {
  const { slug } = usePlace();
  const router = useRouter();
  const toast = useToast();
  const form = useCommandForm({
    schema: countInput,
    defaultValues: { countedAt: now, cause: "routine count", note: "", lines: lines.map((l) => ({ partId: l.partId, lotId: l.lotId, counted: "" })) },
    action: (sent) => countStockAction(slug, sent),
    onDone: (v) => {
      toast({ text: v.differences.length === 0 ? `${v.counted} counted, all as expected` : `${v.counted} counted. ${v.differences.map((d) => `${d.sku} ${signedQtyText(d.differenceMilli, "each")}`).join(", ")}` });
      router.push(`/s/${slug}/parts`);
    },
  });
  return (
    <CommandForm form={form} label="Count" toFix="before the count is taken">
      <div className="fields three">
        <TextInput name="countedAt" label="Counted at" type="datetime-local" hint="What moved since then is taken into account." />
        <SelectInput name="cause" label="Why" options={COUNT_CAUSES.map((c) => ({ value: c, label: `${c[0]?.toUpperCase() ?? ""}${c.slice(1)}` }))} />
        <TextInput name="note" label="Note" optional />
      </div>
      <table className="calm" style={{ marginTop: 18 }}>
        <caption className="sr-only">Parts to count</caption>
        <thead><tr><th>Shelf</th><th className="hide-s">No.</th><th>Part</th><th>Lot</th><th className="r">Counted</th></tr></thead>
        <tbody>
          {lines.map((l, i) => (
            <tr key={`${l.partId}:${l.lotId ?? ""}`}>
              <td className="mid nw">{l.bin}</td><td className="q mid nw hide-s">{l.sku}</td><td className="b">{l.description}</td><td className="mid nw">{l.lotCode ?? ""}</td>
              <td style={{ width: 150, paddingBlock: 6 }}><NumberInput name={`lines.${i}.counted`} label={`Counted ${l.sku}${l.lotCode ? `, lot ${l.lotCode}` : ""}`} hideLabel unit={unitMark(l.stockUnit) || undefined} alignEnd /></td>
            </tr>
          ))}
        </tbody>
      </table>
      <div className="form-act"><LinkButton href={`/s/${slug}/parts`} variant="lo">Not now</LinkButton><SubmitButton pendingText="Taking the count…">Take the count</SubmitButton></div>
    </CommandForm>
  );
}
