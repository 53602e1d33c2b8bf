"use client";

import { useState } from "react";
import { useController } from "react-hook-form";
import { Combobox, type ComboboxProps, type ComboItem } from "../combobox";
import { Field } from "./field";
import { useField, type FieldProps } from "./use-field";

type Passed = Pick<
  ComboboxProps,
  "items" | "onInputValueChange" | "loading" | "loadingText" | "emptyText" | "onAddNew" | "addNewLabel" | "placeholder" | "disabled" | "unit"
>;

/** Combobox as a field: the form holds the picked item's id ("" when none). `initial` is the item the form opens with. */
export function ComboboxInput({
  name,
  label,
  hint,
  optional,
  className,
  initial = null,
  onPicked,
  picked,
  ...combo
}: FieldProps & Passed & { initial?: ComboItem | null; onPicked?: (item: ComboItem | null) => void; /** Controlled item, e.g. one just added. */ picked?: ComboItem | null }) {
  const { id, error, form, aria } = useField({ name, label, hint });
  const { field } = useController({ name, control: form.control });
  const [own, setOwn] = useState<ComboItem | null>(initial);
  const value = picked !== undefined ? picked : own !== null && own.id === field.value ? own : (combo.items.find((i) => i.id === field.value) ?? null);
  return (
    <Field id={id} label={label} hint={hint} error={error} optional={optional} className={className}>
      <Combobox
        {...combo}
        id={id}
        value={value}
        invalid={error !== undefined}
        labelledBy={`${id}-label`}
        describedBy={aria["aria-describedby"]}
        inputRef={field.ref}
        onBlur={field.onBlur}
        onValueChange={(item) => {
          setOwn(item);
          field.onChange(item?.id ?? "");
          onPicked?.(item);
        }}
      />
    </Field>
  );
}
