"use client";

import { useRouter } from "next/navigation";
import { useState, type ReactElement, type ReactNode } from "react";
import type { DefaultValues, FieldValues } from "react-hook-form";
import type { z } from "@/modules/kernel/zod";
import { DialogClose, TaskDialog } from "@/modules/ui/dialog";
import { CommandForm } from "@/modules/ui/form/command-form";
import type { Reply } from "@/modules/ui/form/reply";
import { SubmitButton } from "@/modules/ui/form/submit-button";
import { useCommandForm } from "@/modules/ui/form/use-command-form";
import { useToast } from "@/modules/ui/toast";

interface Props<I extends FieldValues, O, V> {
  trigger: ReactElement;
  title: string;
  description?: ReactNode;
  schema: z.ZodType<O, I>;
  values: DefaultValues<I>;
  action: (sent: { requestId: string; input: I }) => Promise<Reply<V>>;
  /** Past tense, for the toast. */
  done: (value: V) => string;
  onDone?: (value: V) => void;
  safe?: string;
  submit: string;
  pendingText?: string;
  wide?: boolean;
  /** Open from the first look at the page. */
  startsOpen?: boolean;
  /** Keeps what is typed in this tab under the given name until it is sent, also when the dialog is closed. */
  draft?: string;
  children: ReactNode | ((watch: (name: string) => unknown) => ReactNode);
}

/** A small form over the page that sends one command, then closes and lets the page look again. */
export function CommandDialog<I extends FieldValues, O, V>(props: Props<I, O, V>) {
  const [open, setOpen] = useState(props.startsOpen === true);
  const { trigger, title, description, wide } = props;
  return (
    <TaskDialog trigger={trigger} open={open} onOpenChange={setOpen} title={title} {...(description === undefined ? {} : { description })} {...(wide === undefined ? {} : { wide })}>
      {open ? <Body {...props} close={() => setOpen(false)} /> : null}
    </TaskDialog>
  );
}

/** Mounted with the dialog, so that each opening begins with the values of now. */
function Body<I extends FieldValues, O, V>({ schema, values, action, done, onDone, safe = "Not yet", submit, pendingText, title, draft, children, close }: Props<I, O, V> & { close: () => void }) {
  const router = useRouter();
  const toast = useToast();
  const form = useCommandForm<I, O, V>({
    schema, defaultValues: values, guard: false, action, ...(draft === undefined ? {} : { draft }),
    onDone: (value) => {
      close();
      toast({ text: done(value) });
      onDone?.(value);
      router.refresh();
    },
  });
  return (
    <CommandForm form={form} label={title}>
      <div className="mt-3">{typeof children === "function" ? children((name) => form.rhf.watch(name as never)) : children}</div>
      <div className="dlg-act">
        <DialogClose>{safe}</DialogClose>
        <SubmitButton {...(pendingText === undefined ? {} : { pendingText })}>{submit}</SubmitButton>
      </div>
    </CommandForm>
  );
}
