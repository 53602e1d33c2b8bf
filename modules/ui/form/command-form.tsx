"use client";

import clsx from "clsx";
import { useCallback, useEffect, useMemo, useRef, useState, type ReactNode } from "react";
import { FormProvider, type FieldValues } from "react-hook-form";
import { ErrorSummary } from "./error-summary";
import { FormContext } from "./form-context";
import { FormTrouble } from "./form-trouble-note";
import type { CommandForm as Handle } from "./use-command-form";

/**
 * The form around the fields: error summary and refusals on top, then the children. Enter submits.
 * `toFix` words the summary: "before this order opens".
 */
export function CommandForm<Input extends FieldValues, Output>({
  form,
  toFix,
  signInHref = "/sign-in",
  className,
  label,
  troubleText,
  children,
}: {
  form: Handle<Input, Output>;
  toFix?: string;
  signInHref?: string;
  className?: string;
  /** Names the form for screen readers when no heading does. */
  label?: string;
  /** Puts a refusal in other words, by its code and data. */
  troubleText?: (code: string, data: Record<string, string | number | boolean | null>) => ReactNode;
  children: ReactNode;
}) {
  const [labels, setLabels] = useState<ReadonlyMap<string, string>>(new Map());
  const register = useCallback((name: string, text: string) => {
    setLabels((old) => (old.get(name) === text ? old : new Map(old).set(name, text)));
  }, []);
  const context = useMemo(
    () => ({ formId: form.formId, register, pending: form.pending }),
    [form.formId, register, form.pending],
  );
  const top = useRef<HTMLDivElement>(null);
  useEffect(() => {
    // After the errors are drawn, so that there is something to read.
    if (form.failed > 0) top.current?.focus();
  }, [form.failed]);
  return (
    <FormProvider {...form.rhf}>
      <FormContext value={context}>
        <form
          id={form.formId}
          method="post"
          noValidate
          className={clsx(className)}
          aria-label={label}
          onSubmit={(event) => {
            event.preventDefault();
            // A form inside a dialog is a React child of the page's form: do not send that one too.
            event.stopPropagation();
            form.submit();
          }}
        >
          <div ref={top} tabIndex={-1} className="form-top">
            <FormTrouble trouble={form.trouble} onRetry={form.submit} pending={form.pending} signInHref={signInHref} words={troubleText} />
            <ErrorSummary labels={labels} toFix={toFix} />
          </div>
          {children}
        </form>
      </FormContext>
    </FormProvider>
  );
}
