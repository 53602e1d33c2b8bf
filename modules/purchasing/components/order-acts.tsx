"use client";
import { useRouter } from "next/navigation";
import { useState } from "react";
import { Button } from "@/modules/ui/button";
import { DialogClose, TaskDialog } from "@/modules/ui/dialog";
import { CommandForm } from "@/modules/ui/form/command-form";
import { DateInput } from "@/modules/ui/form/date-input";
import { RadioRow } from "@/modules/ui/form/radio-row";
import { SubmitButton } from "@/modules/ui/form/submit-button";
import { TextInput } from "@/modules/ui/form/text-input";
import { useCommandForm } from "@/modules/ui/form/use-command-form";
import { usePlace } from "@/modules/ui/place";
import { useToast } from "@/modules/ui/toast";
import { cancelPurchaseOrderAction, expectPurchaseOrderAction, reverseReceiptAction, sendPurchaseOrderAction } from "../actions";
import { cancelInput, expectInput, reverseReceiptInput, sendInput } from "../input";
import type { OrderDetail, ReceiptView } from "../queries/orders";

function useDone(close: () => void) {
  const router = useRouter();
  const toast = useToast();
  return (text: string) => { toast({ text }); close(); router.refresh(); };
}

/** Sends the order: it takes its number and goes out by mail with its paper, or by hand. */
export function SendDialog({ order, waits }: { order: OrderDetail; /** Why it cannot be sent yet. */ waits?: string }) {
  const [open, setOpen] = useState(false);
  if (waits !== undefined) return <Button variant="go" icon="send" disabledReason={waits}>Send order</Button>;
  return (
    <TaskDialog open={open} onOpenChange={setOpen} trigger={<Button variant="go" icon="send">Send order</Button>} title={`Send to ${order.supplier.name}`} description="The order takes its number. A change after that is a new revision, and goes out again.">
      <SendForm order={order} close={() => setOpen(false)} />
    </TaskDialog>
  );
}
function SendForm({ order, close }: { order: OrderDetail; close: () => void }) {
  const { slug } = usePlace();
  const router = useRouter();
  const toast = useToast();
  const form = useCommandForm({
    schema: sendInput, defaultValues: { id: order.id, version: order.version, by: order.supplier.email ? "mail" : "hand", expectedOn: "" }, guard: false, action: (sent) => sendPurchaseOrderAction(slug, sent),
    onDone: (v) => { toast({ text: `${v.number} sent` }); close(); router.replace(`/s/${slug}/purchases/${v.number}`); },
  });
  return (
    <CommandForm form={form} label="Send the order" toFix="before it is sent">
      <div className="fields one">
        <RadioRow name="by" label="How" down options={[{ value: "mail", label: "By mail, with its paper", detail: order.supplier.email || "no address yet" }, { value: "hand", label: "By hand: printed or telephoned" }]} />
        <DateInput name="expectedOn" label="Expected on" optional hint={order.supplier.leadDays === null ? "The supplier's date, if you have it." : `Empty: in ${order.supplier.leadDays} days.`} />
      </div>
      <div className="dlg-act"><DialogClose>Not yet</DialogClose><SubmitButton pendingText="Sending…">Send it</SubmitButton></div>
    </CommandForm>
  );
}

/** The date the supplier gave. */
export function ExpectDialog({ order }: { order: OrderDetail }) {
  const [open, setOpen] = useState(false);
  return (
    <TaskDialog open={open} onOpenChange={setOpen} trigger={<Button variant="lo">Set date</Button>} title="When will it come?">
      <ExpectForm order={order} close={() => setOpen(false)} />
    </TaskDialog>
  );
}
function ExpectForm({ order, close }: { order: OrderDetail; close: () => void }) {
  const { slug } = usePlace();
  const done = useDone(close);
  const form = useCommandForm({ schema: expectInput, defaultValues: { id: order.id, version: order.version, expectedOn: order.expectedOn ?? "" }, guard: false, action: (sent) => expectPurchaseOrderAction(slug, sent), onDone: () => done("Date kept") });
  return (
    <CommandForm form={form} label="Expected date" toFix="before the date is kept">
      <div className="fields one"><DateInput name="expectedOn" label="Expected on" hint="As the supplier said." /></div>
      <div className="dlg-act"><DialogClose>Leave it</DialogClose><SubmitButton pendingText="Keeping…">Keep the date</SubmitButton></div>
    </CommandForm>
  );
}

/** Cancels what has not come in. */
export function CancelDialog({ order }: { order: OrderDetail }) {
  const [open, setOpen] = useState(false);
  return (
    <TaskDialog open={open} onOpenChange={setOpen} trigger={<Button variant="lo">{order.state === "partly in" ? "Cancel the rest" : "Cancel order"}</Button>} title={order.state === "partly in" ? "Cancel what is still open?" : "Cancel this purchase order?"}
      description={order.rawState === "sent" && order.supplier.email ? `${order.supplier.name} is told by mail.` : undefined}>
      <CancelForm order={order} close={() => setOpen(false)} />
    </TaskDialog>
  );
}
function CancelForm({ order, close }: { order: OrderDetail; close: () => void }) {
  const { slug } = usePlace();
  const done = useDone(close);
  const form = useCommandForm({ schema: cancelInput, defaultValues: { id: order.id, version: order.version, reason: "" }, guard: false, action: (sent) => cancelPurchaseOrderAction(slug, sent), onDone: () => done("Cancelled") });
  return (
    <CommandForm form={form} label="Cancel" toFix="before it is cancelled">
      <div className="fields one"><TextInput name="reason" label="Why" /></div>
      <div className="dlg-act"><DialogClose>Keep it</DialogClose><SubmitButton pendingText="Cancelling…">Cancel it</SubmitButton></div>
    </CommandForm>
  );
}

/** Takes a receipt back, as far as its goods are on the shelf. */
export function ReverseReceiptDialog({ receipt }: { receipt: ReceiptView }) {
  const [open, setOpen] = useState(false);
  return (
    <TaskDialog open={open} onOpenChange={setOpen} trigger={<button type="button" className="lk sm">Reverse</button>} title={`Reverse ${receipt.number}`} description="What is still on the shelf goes back off it. What was issued meanwhile stays taken in.">
      <ReverseForm receipt={receipt} close={() => setOpen(false)} />
    </TaskDialog>
  );
}
function ReverseForm({ receipt, close }: { receipt: ReceiptView; close: () => void }) {
  const { slug } = usePlace();
  const done = useDone(close);
  const form = useCommandForm({
    schema: reverseReceiptInput, defaultValues: { receiptId: receipt.id, reason: "" }, guard: false, action: (sent) => reverseReceiptAction(slug, sent),
    onDone: (v) => done(`${receipt.number} reversed${v.kept.length ? `; ${v.kept.join(", ")} was used and stays in` : ""}`),
  });
  return (
    <CommandForm form={form} label="Reverse" toFix="before it is reversed">
      <div className="fields one"><TextInput name="reason" label="Why" /></div>
      <div className="dlg-act"><DialogClose>Leave it</DialogClose><SubmitButton pendingText="Reversing…">Reverse it</SubmitButton></div>
    </CommandForm>
  );
}
