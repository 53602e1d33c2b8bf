"use client";

import type { TextareaHTMLAttributes } from "react";
import { Field } from "./field";
import { useField, type FieldProps } from "./use-field";

type Native = Omit<TextareaHTMLAttributes<HTMLTextAreaElement>, "name" | "id" | "value" | "defaultValue" | "className">;

/** Several lines of text. */
export function TextareaInput({ name, label, hint, optional, className, rows = 3, hideLabel, onChange, onBlur, ...native }: FieldProps & Native & { hideLabel?: boolean }) {
  const { id, error, form, initial, aria } = useField({ name, label, hint });
  return (
    <Field id={id} label={label} hint={hint} error={error} optional={optional} hideLabel={hideLabel} className={className}>
      <span className="in">
        <textarea rows={rows} {...native} defaultValue={initial} {...form.register(name, { onChange, onBlur })} {...aria} />
      </span>
    </Field>
  );
}
