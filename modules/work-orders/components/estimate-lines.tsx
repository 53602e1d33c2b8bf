"use client";

import clsx from "clsx";
import type { UseFieldArrayReturn, UseFormReturn } from "react-hook-form";
import { amount } from "@/modules/kernel/format";
import { EmptyState } from "@/modules/ui/empty-state";
import { SelectInput } from "@/modules/ui/form/select-input";
import { TextInput } from "@/modules/ui/form/text-input";
import { Icon } from "@/modules/ui/icon";
import { usePlace } from "@/modules/ui/place";
import { amountOfLine, type EstimateForm, type LineForm } from "./estimate-form-values";

/** The lines of a draft, each typed in place. Enter in a quantity or price goes to the adding box. */
export function EstimateLines({ rhf, lines, pieces, skuOf, onAddNext }: {
  rhf: UseFormReturn<EstimateForm, unknown, never>; lines: UseFieldArrayReturn<EstimateForm, "lines">; pieces: readonly { pieceNo: number; family: string; tag: string | null }[]; skuOf: Readonly<Record<string, string>>; onAddNext: () => void;
}) {
  const place = usePlace();
  const many = pieces.length > 1;
  const now = rhf.watch("lines");
  if (lines.fields.length === 0) return <EmptyState title="Nothing on it yet" level={3}>Take a set, or add work and parts one by one.</EmptyState>;
  return (
    <>
      <div className={clsx("est-head eng", many && "many")} aria-hidden="true">
        <span>Code</span><span>Work or part</span>{many ? <span>Head</span> : null}<span className="r">Qty</span><span className="r">Each</span><span className="r">Amount</span><span />
      </div>
      <ul className={clsx("est-lines", many && "many")}>
        {lines.fields.map((f, i) => {
          const line: LineForm | undefined = now[i];
          const code = f.kind === "labor" ? f.operationCode : f.kind === "part" ? skuOf[f.partId ?? ""] ?? "Part" : f.kind === "outside" ? "Outside" : "Note";
          const name = `Line ${i + 1}`;
          const enter = (e: { key: string; preventDefault: () => void }) => { if (e.key === "Enter") { e.preventDefault(); onAddNext(); } };
          return (
            <li key={f.id} aria-label={`${name}, ${line?.description ?? ""}`}>
              <span className="code">{code}</span>
              <TextInput hideLabel className="desc" name={`lines.${i}.description`} label={`${name}, words`} />
              {many ? <SelectInput hideLabel className="piece" name={`lines.${i}.pieceNo`} label={`${name}, head`} options={[{ value: "", label: "All" }, ...pieces.map((p) => ({ value: String(p.pieceNo), label: p.tag?.slice(-2) ?? String(p.pieceNo) }))]} /> : null}
              {f.kind === "note" ? <><span /><span /></> : (
                <>
                  <TextInput hideLabel alignEnd inputMode="decimal" name={`lines.${i}.qty`} label={`${name}, quantity`} onKeyDown={enter} />
                  <TextInput hideLabel alignEnd inputMode="decimal" name={`lines.${i}.unitPrice`} label={`${name}, price each`} onKeyDown={enter} />
                </>
              )}
              <span className="amt q">{f.kind === "note" || !line ? "" : amount(amountOfLine(line), place)}</span>
              <button type="button" className="icon-btn gone" aria-label={`Take line ${i + 1} off`} onClick={() => lines.remove(i)}><Icon name="x" size={16} /></button>
            </li>
          );
        })}
      </ul>
    </>
  );
}
