"use client";

import { createContext, useContext } from "react";

interface FormInfo {
  formId: string;
  pending: boolean;
  /** Fields tell their label, so that the summary can name them. */
  register: (name: string, label: string) => void;
}

export const FormContext = createContext<FormInfo | null>(null);

export function useFormInfo(): FormInfo {
  const info = useContext(FormContext);
  if (info === null) throw new Error("fields stand inside a CommandForm");
  return info;
}

/** Id of a field's control. Dots and other signs of the path are kept out of it. */
export const fieldId = (formId: string, name: string): string => `${formId}-${name.replace(/[^a-zA-Z0-9]+/g, "-")}`;
