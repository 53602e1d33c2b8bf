"use client";

import { useEffect } from "react";
import { useFormContext, useFormState } from "react-hook-form";
import { errorAt } from "./field-errors";
import { fieldId, useFormInfo } from "./form-context";

export interface FieldProps {
  /** Path in the form's values: "phone", "lines.2.qty". */
  name: string;
  label: string;
  hint?: string;
  /** Says so after the label; fields are required unless marked. */
  optional?: boolean;
  className?: string;
}

/** What every control needs: its id, its error, and the aria that ties label, hint and error to it. */
export function useField({ name, label, hint }: Pick<FieldProps, "name" | "label" | "hint">) {
  const { formId, register: tellLabel, pending } = useFormInfo();
  const form = useFormContext();
  const { errors } = useFormState({ name });
  const id = fieldId(formId, name);
  const error = errorAt(errors, name);
  useEffect(() => tellLabel(name, label), [tellLabel, name, label]);
  const described = [error === undefined ? null : `${id}-err`, hint === undefined ? null : `${id}-hint`].filter((x) => x !== null).join(" ");
  return {
    id,
    error,
    pending,
    form,
    aria: { id, "aria-invalid": error === undefined ? undefined : true, "aria-describedby": described === "" ? undefined : described },
  } as const;
}
