"use client";

import type { SelectHTMLAttributes } from "react";
import { Icon } from "../icon";
import { Field } from "./field";
import { useField, type FieldProps } from "./use-field";

export interface SelectOption {
  value: string;
  label: string;
  disabled?: boolean;
}

type Native = Omit<SelectHTMLAttributes<HTMLSelectElement>, "name" | "id" | "value" | "defaultValue" | "className" | "size">;

/** The browser's own list: works with every keyboard, phone and screen reader. `placeholder` is a first, empty choice. */
export function SelectInput({
  name,
  label,
  hint,
  optional,
  className,
  options,
  placeholder,
  hideLabel,
  onChange,
  onBlur,
  ...native
}: FieldProps & Native & { options: readonly SelectOption[]; placeholder?: string; hideLabel?: boolean }) {
  const { id, error, form, initial, aria } = useField({ name, label, hint });
  return (
    <Field id={id} label={label} hint={hint} error={error} optional={optional} hideLabel={hideLabel} className={className}>
      <span className="in">
        <select {...native} defaultValue={initial} {...form.register(name, { onChange, onBlur })} {...aria}>
          {placeholder === undefined ? null : <option value="">{placeholder}</option>}
          {options.map((o) => (
            <option key={o.value} value={o.value} disabled={o.disabled}>
              {o.label}
            </option>
          ))}
        </select>
        <Icon name="down" size={14} />
      </span>
    </Field>
  );
}
