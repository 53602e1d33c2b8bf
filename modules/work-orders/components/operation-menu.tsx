"use client";

import { useState } from "react";
import { DialogClose, TaskDialog } from "@/modules/ui/dialog";
import { CommandForm } from "@/modules/ui/form/command-form";
import { SubmitButton } from "@/modules/ui/form/submit-button";
import { TextInput } from "@/modules/ui/form/text-input";
import { useCommandForm } from "@/modules/ui/form/use-command-form";
import { Icon } from "@/modules/ui/icon";
import { Menu } from "@/modules/ui/menu";
import { usePlace } from "@/modules/ui/place";
import { markOperationAction, reopenOperationAction } from "../actions";
import { operationStateInput } from "../input";
import type { OperationRow } from "../queries/order-page";
import { reopenInput } from "../reopen-input";
import { useToastAct } from "./use-toast-act";

/** What may be done to one operation of the routing. */
export function OperationMenu({ op, mayOverride }: { op: OperationRow; mayOverride: boolean }) {
  const { slug } = usePlace();
  const { act, pending } = useToastAct();
  const [asks, setAsks] = useState<"skip" | "reopen" | null>(null);
  const close = () => setAsks(null);
  const mark = (to: "done" | "open") => act((requestId) => markOperationAction(slug, { requestId, input: { operationId: op.id, version: op.version, to } }), () => (to === "done" ? `${op.name} is done` : `${op.name} is open again`));
  const isOpen = op.state === "open" || op.state === "running";
  return (
    <>
      <Menu
        align="end"
        trigger={<button type="button" className="icon-btn" aria-label={`${op.name}: more`} disabled={pending}><Icon name="down" size={16} /></button>}
        items={[
          ...(isOpen ? [{ key: "done", label: "Operation done", icon: "check" as const, onSelect: () => void mark("done") }] : []),
          ...(isOpen ? [{ key: "skip", label: "Skip, with a reason", icon: "right" as const, onSelect: () => setAsks("skip"), ...(mayOverride ? {} : { disabledReason: "The lead skips operations" }) }] : []),
          ...(!isOpen ? [{ key: "open", label: "Open it again", icon: "left" as const, onSelect: () => (op.state === "done" ? setAsks("reopen") : void mark("open")), ...(mayOverride ? {} : { disabledReason: "The lead opens it again" }) }] : []),
        ]}
      />
      <TaskDialog open={asks === "skip"} onOpenChange={close} title={`Skip ${op.name.toLowerCase()}?`} description="It stays on the routing with the reason, and does not hold up the release.">
        {asks === "skip" ? <SkipForm op={op} close={close} /> : null}
      </TaskDialog>
      <TaskDialog open={asks === "reopen"} onOpenChange={close} title={`Open ${op.name.toLowerCase()} again?`} description="Time on it from now on is rework: it costs, and earns no book hours.">
        {asks === "reopen" ? <ReopenForm op={op} close={close} /> : null}
      </TaskDialog>
    </>
  );
}

function ReopenForm({ op, close }: { op: OperationRow; close: () => void }) {
  const { slug } = usePlace();
  const { act } = useToastAct();
  const form = useCommandForm({
    schema: reopenInput, guard: false, defaultValues: { operationId: op.id, reason: "" },
    action: (sent) => reopenOperationAction(slug, sent), onDone: () => { close(); void act(() => Promise.resolve({ status: "ok", value: null }), () => `${op.name} is open again`); },
  });
  return (
    <CommandForm form={form} label="Open the operation again">
      <TextInput className="mt-3" name="reason" label="Why it is done again" />
      <div className="dlg-act"><DialogClose>Keep it done</DialogClose><SubmitButton>Open it again</SubmitButton></div>
    </CommandForm>
  );
}

function SkipForm({ op, close }: { op: OperationRow; close: () => void }) {
  const { slug } = usePlace();
  const { act } = useToastAct();
  const form = useCommandForm({
    schema: operationStateInput, guard: false, defaultValues: { operationId: op.id, version: op.version, to: "skipped", reason: "" },
    action: (sent) => markOperationAction(slug, sent), onDone: () => { close(); void act(() => Promise.resolve({ status: "ok", value: null }), () => `${op.name} is skipped`); },
  });
  return (
    <CommandForm form={form} label="Skip the operation">
      <TextInput className="mt-3" name="reason" label="Why" />
      <div className="dlg-act"><DialogClose>Keep it</DialogClose><SubmitButton>Skip it</SubmitButton></div>
    </CommandForm>
  );
}
