"use client";

import clsx from "clsx";
import { FieldFoot } from "./field";
import { useField, type FieldProps } from "./use-field";

export interface RadioOption {
  value: string;
  label: string;
  detail?: string;
  disabled?: boolean;
}

/** One of a few. `down` stands them under one another. The first radio carries the field's id, so the summary can reach it. */
export function RadioRow({
  name,
  label,
  hint,
  optional,
  className,
  options,
  down = false,
  hideLabel = false,
  onChange,
}: FieldProps & { options: readonly RadioOption[]; down?: boolean; hideLabel?: boolean; onChange?: () => void }) {
  const { id, error, form, aria } = useField({ name, label, hint });
  return (
    <fieldset role="radiogroup" className={clsx("field", className)} aria-describedby={aria["aria-describedby"]} aria-invalid={aria["aria-invalid"]}>
      <legend className={clsx(hideLabel && "sr-only")}>
        {label}
        {optional ? <span className="opt"> (optional)</span> : null}
      </legend>
      <div className={clsx("radios", down && "down")}>
        {options.map((o, i) => (
          <label key={o.value} className="tick">
            <input
              type="radio"
              value={o.value}
              disabled={o.disabled}
              {...form.register(name, { onChange })}
              id={i === 0 ? id : `${id}-${i}`}
            />
            <span>
              {o.label}
              {o.detail === undefined ? null : <small>{o.detail}</small>}
            </span>
          </label>
        ))}
      </div>
      <FieldFoot id={id} hint={hint} error={error} />
    </fieldset>
  );
}
