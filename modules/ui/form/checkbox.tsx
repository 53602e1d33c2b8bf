"use client";

import clsx from "clsx";
import { FieldFoot } from "./field";
import { useField, type FieldProps } from "./use-field";

/** One yes or no. The value is a boolean. */
export function Checkbox({ name, label, hint, className, disabled, onChange }: Omit<FieldProps, "optional"> & { disabled?: boolean; onChange?: () => void }) {
  const { id, error, form, aria } = useField({ name, label, hint });
  return (
    <div className={clsx("field", className)}>
      <div className="tick">
        <input type="checkbox" disabled={disabled} {...form.register(name, { onChange })} {...aria} />
        <label htmlFor={id}>{label}</label>
      </div>
      <FieldFoot id={id} hint={hint} error={error} />
    </div>
  );
}
