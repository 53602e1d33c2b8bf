"use client";

import { zodResolver } from "@hookform/resolvers/zod";
import { useCallback, useEffect, useId, useInsertionEffect, useRef, useState } from "react";
import { useForm, type DefaultValues, type FieldValues, type Path, type PathValue, type UseFormReturn } from "react-hook-form";
import type { z } from "@/modules/kernel/zod";
import { earlyInput, type EarlyInput } from "./early-input";
import { keepDraft, readDraft, dropDraft } from "./draft";
import { noLink, readReply, type Reading, type Trouble } from "./form-trouble";
import type { Reply } from "./reply";
import { overlay } from "./overlay";
import { RequestId, within } from "./request-id";

export interface CommandFormOptions<Input extends FieldValues, Output, Value> {
  /** Same schema as on the server. It judges here so that mistakes show at once; the raw text is what is sent. */
  schema: z.ZodType<Output, Input>;
  defaultValues: DefaultValues<Input>;
  action: (request: { requestId: string; input: Input }) => Promise<Reply<Value>>;
  onDone?: (value: Value) => void;
  /** Keeps a copy of what is typed in this tab under the given name until it is saved. */
  draft?: string;
  /** Warn before leaving the page with unsaved text. Default true. */
  guard?: boolean;
  /** How long an answer may take, ms. Default 20 000. */
  timeoutMs?: number;
}

export interface CommandForm<Input extends FieldValues, Output> {
  rhf: UseFormReturn<Input, unknown, Output>;
  formId: string;
  /** Sends it; also what Try again calls. */
  submit: () => void;
  pending: boolean;
  trouble: Trouble | null;
  clearTrouble: () => void;
  /** Counts the tries that failed; the form moves the focus to what is wrong when it grows. */
  failed: number;
}

/** What stands in the server's form that the server did not put there. */
function readEarly(formId: string): readonly EarlyInput[] {
  const form = document.getElementById(formId);
  return form instanceof HTMLFormElement ? earlyInput(form.elements as unknown as Iterable<HTMLInputElement>) : [];
}

export function useCommandForm<Input extends FieldValues, Output, Value>({
  schema,
  defaultValues,
  action,
  onDone,
  draft,
  guard = true,
  timeoutMs = 20_000,
}: CommandFormOptions<Input, Output, Value>): CommandForm<Input, Output> {
  const formId = useId();
  const [requestId] = useState(() => new RequestId(() => crypto.randomUUID()));
  const untouched = useRef(defaultValues);
  const early = useRef<readonly EarlyInput[]>([]);
  // The one moment after all typing into the bare page and before the fields are bound and set to their defaults.
  useInsertionEffect(() => {
    early.current = readEarly(formId);
  }, [formId]);
  const [trouble, setTrouble] = useState<Trouble | null>(null);
  const [pending, setPending] = useState(false);
  const [failed, setFailed] = useState(0);
  const busy = useRef(false);
  const rhf = useForm<Input, unknown, Output>({
    resolver: zodResolver<Input, unknown, Output>(schema),
    defaultValues,
    mode: "onTouched",
    shouldFocusError: false,
  });
  const { handleSubmit, setError, setValue, reset, subscribe, getValues, formState } = rhf;
  const dirty = formState.isDirty;

  useEffect(() => {
    for (const { name, value } of early.current) {
      const path = name as Path<Input>;
      const typed = typeof value === "string" ? value : Array.isArray(getValues(path)) ? value.all : value.ticked;
      setValue(path, typed as PathValue<Input, Path<Input>>, { shouldDirty: true });
    }
    if (draft === undefined) return;
    const kept = readDraft(draft);
    if (kept !== null) reset(overlay(kept, untouched.current, getValues()) as Input, { keepDefaultValues: true });
    return subscribe({ formState: { values: true }, callback: ({ values }) => keepDraft(draft, values) });
  }, [draft, reset, setValue, subscribe, getValues]);

  useEffect(() => {
    if (!guard || !dirty) return;
    const ask = (event: BeforeUnloadEvent) => event.preventDefault();
    window.addEventListener("beforeunload", ask);
    return () => window.removeEventListener("beforeunload", ask);
  }, [guard, dirty]);

  const show = useCallback(
    (reading: Reading) => {
      for (const f of reading.fields) setError(f.path as Path<Input>, { type: "server", message: f.message });
      setTrouble(reading.trouble);
      if (!reading.keepId) requestId.settle();
      setFailed((n) => n + 1);
    },
    [requestId, setError],
  );

  const send = useCallback(async () => {
    if (busy.current) return;
    busy.current = true;
    setPending(true);
    setTrouble(null);
    try {
      const input = getValues();
      const reply = await within(timeoutMs, action({ requestId: requestId.take(), input }));
      if (reply.status === "ok") {
        requestId.settle();
        if (draft !== undefined) dropDraft(draft);
        // What was sent is now what is saved: nothing is unsaved until the next keystroke.
        reset(input, { keepValues: true });
        onDone?.(reply.value);
      } else {
        show(readReply(reply));
      }
    } catch {
      show(noLink);
    } finally {
      busy.current = false;
      setPending(false);
    }
  }, [action, draft, getValues, onDone, requestId, reset, show, timeoutMs]);

  const submit = useCallback(() => {
    void handleSubmit(send, () => setFailed((n) => n + 1))();
  }, [handleSubmit, send]);

  return { rhf, formId, submit, pending, trouble, clearTrouble: () => setTrouble(null), failed };
}
