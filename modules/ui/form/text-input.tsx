"use client";

import clsx from "clsx";
import type { InputHTMLAttributes, ReactNode } from "react";
import { Field } from "./field";
import { useField, type FieldProps } from "./use-field";

type Native = Omit<InputHTMLAttributes<HTMLInputElement>, "name" | "id" | "value" | "defaultValue" | "className" | "size">;

export interface TextInputProps extends FieldProps, Native {
  /** Inside the well at the right: "USD", "in", "h". */
  unit?: ReactNode;
  /** Inside the well at the left. */
  lead?: ReactNode;
  /** A key inside the well, after the unit. */
  inside?: ReactNode;
  alignEnd?: boolean;
  hideLabel?: boolean;
}

/** One line of text. */
export function TextInput({ name, label, hint, optional, className, unit, lead, inside, alignEnd, hideLabel, onChange, onBlur, ...native }: TextInputProps) {
  const { id, error, form, initial, aria } = useField({ name, label, hint });
  return (
    <Field id={id} label={label} hint={hint} error={error} optional={optional} hideLabel={hideLabel} className={className}>
      <span className="in">
        {lead}
        <input
          type="text"
          {...native}
          defaultValue={initial}
          {...form.register(name, { onChange, onBlur })}
          {...aria}
          className={clsx(alignEnd && "at-r")}
        />
        {unit === undefined ? null : <span className="unit">{unit}</span>}
        {inside}
      </span>
    </Field>
  );
}
