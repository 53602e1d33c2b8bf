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
import { markOperationAction } from "../actions";
import { operationStateInput } from "../input";
import type { OperationRow } from "../queries/order-page";
import { useToastAct } from "./use-toast-act";

/** What may be done to one operation of the routing. */
export function OperationMenu({ op, mayOverride }: { op: OperationRow; mayOverride: boolean }) {
  const { slug } = usePlace();
  const { act, pending } = useToastAct();
  const [skip, setSkip] = useState(false);
  const mark = (to: "done" | "open") => act((requestId) => markOperationAction(slug, { requestId, input: { operationId: op.id, version: op.version, to } }), () => (to === "done" ? `${op.name} is done` : `${op.name} is open again`));
  const isOpen = op.state === "open" || op.state === "running";
  return (
    <>
      <Menu
        align="end"
        trigger={<button type="button" className="icon-btn" aria-label={`${op.name}: more`} disabled={pending}><Icon name="down" size={16} /></button>}
        items={[
          ...(isOpen ? [{ key: "done", label: "Operation done", icon: "check" as const, onSelect: () => void mark("done") }] : []),
          ...(isOpen ? [{ key: "skip", label: "Skip, with a reason", icon: "right" as const, onSelect: () => setSkip(true), ...(mayOverride ? {} : { disabledReason: "The lead skips operations" }) }] : []),
          ...(!isOpen ? [{ key: "open", label: "Open it again", icon: "left" as const, onSelect: () => void mark("open"), ...(mayOverride ? {} : { disabledReason: "The lead opens it again" }) }] : []),
        ]}
      />
      <TaskDialog open={skip} onOpenChange={setSkip} title={`Skip ${op.name.toLowerCase()}?`} description="It stays on the routing with the reason, and does not hold up the release.">
        {skip ? <SkipForm op={op} close={() => setSkip(false)} /> : null}
      </TaskDialog>
    </>
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
