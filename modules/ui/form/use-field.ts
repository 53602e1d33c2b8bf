"use client";

import { useEffect, useState } from "react";
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
  // In the server's page too, so that a field that has a value never stands empty until the script runs.
  const [initial] = useState(() => form.getValues(name) as unknown);
  useEffect(() => tellLabel(name, label), [tellLabel, name, label]);
  const described = [error === undefined ? null : `${id}-err`, hint === undefined ? null : `${id}-hint`].filter((x) => x !== null).join(" ");
  return {
    id,
    error,
    pending,
    form,
    initial: typeof initial === "string" ? initial : undefined,
    aria: { id, "aria-invalid": error === undefined ? undefined : true, "aria-describedby": described === "" ? undefined : described },
  } as const;
}
