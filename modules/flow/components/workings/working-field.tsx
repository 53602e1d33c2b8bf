"use client";

import clsx from "clsx";
import { FieldFoot } from "@/modules/ui/form/field";
import { Icon } from "@/modules/ui/icon";
import type { Field } from "../../workings/field";

const YES_NO = [{ value: "yes", label: "Yes" }, { value: "no", label: "No" }];

/** One input of a working: label with its unit in the well, an example where nothing stands, hint and refusal under it. */
export function WorkingField({ id, field, text, error, onType, className }: { id: string; field: Field; text: string; error?: string; onType: (text: string) => void; className?: string }) {
  const common = { id, value: text, "aria-invalid": error === undefined ? undefined : true, "aria-describedby": clsx(error !== undefined && `${id}-err`, field.hint !== undefined && `${id}-hint`) || undefined } as const;
  const unit = field.unit === "" ? null : <span className="unit normal-case tracking-normal" aria-hidden>{field.unit}</span>;
  const isList = field.kind === "numbers" || field.kind === "one_or_more" || field.kind === "words";
  return (
    <div className={clsx("field", isList && "full", className)}>
      <label htmlFor={id}>{field.label}{field.unit === "" ? null : <span className="sr-only">, {field.unit}</span>}{field.optional ? <span className="opt"> (optional)</span> : null}</label>
      <span className="in">
        {field.kind === "choice" || field.kind === "yes" ? (
          <>
            <select {...common} onChange={(e) => onType(e.target.value)}><option value="">{field.optional ? "not said" : "choose"}</option>{(field.options ?? YES_NO).map((o) => <option key={o.value} value={o.value}>{o.label}</option>)}</select>
            <Icon name="down" size={14} />
          </>
        ) : field.kind === "instant" ? <input {...common} type="datetime-local" onChange={(e) => onType(e.target.value)} />
          : isList ? <textarea {...common} rows={1} autoComplete="off" spellCheck={false} placeholder={field.example} onChange={(e) => onType(e.target.value)} />
            : <input {...common} className={field.kind === "number" ? "at-r" : undefined} inputMode={field.kind === "number" ? "decimal" : undefined} autoComplete="off" placeholder={field.example} onChange={(e) => onType(e.target.value)} />}
        {unit}
      </span>
      <FieldFoot id={id} hint={field.hint} error={error} />
    </div>
  );
}
