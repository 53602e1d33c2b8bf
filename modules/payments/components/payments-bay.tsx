"use client";
import { useState } from "react";
import { amount, dateTime, money } from "@/modules/kernel/format";
import { minorText } from "@/modules/kernel/money";
import { Bay } from "@/modules/ui/bay";
import { Button } from "@/modules/ui/button";
import { DialogClose, TaskDialog } from "@/modules/ui/dialog";
import { CommandForm } from "@/modules/ui/form/command-form";
import { MoneyInput } from "@/modules/ui/form/money-input";
import { RadioRow } from "@/modules/ui/form/radio-row";
import { SubmitButton } from "@/modules/ui/form/submit-button";
import { TextInput } from "@/modules/ui/form/text-input";
import { useCommandForm } from "@/modules/ui/form/use-command-form";
import { useRouter } from "next/navigation";
import { usePlace } from "@/modules/ui/place";
import { useToast } from "@/modules/ui/toast";
import { askRefundAction, takePaymentAction } from "../actions";
import { DISPUTE_WORDS } from "../domain/dispute";
import { METHOD_WORDS, type PaymentMethod } from "../domain/payment-words";
import { askRefundInput, takePaymentInput } from "../input";
import type { PaymentView } from "../queries";
import { CardPageKey } from "./card-page-key";

/** Money taken for an invoice and its order; take more, or ask for a refund. */
export function PaymentsBay({ invoiceId, openMinor, payments, may }: { invoiceId: string; openMinor: number; payments: readonly PaymentView[]; may: { take: boolean; refund: boolean } }) {
  const place = usePlace();
  const [taking, setTaking] = useState(false);
  return (
    <Bay label="Money taken" aside={may.take && openMinor > 0 ? (
      <TaskDialog trigger={<Button size="sm" variant="lo">Take payment</Button>} open={taking} onOpenChange={setTaking} title={`Take payment, ${money(openMinor, place)} open`} description="Cash, check or transfer. Cards are taken at the payment page.">
        {taking ? <TakeForm invoiceId={invoiceId} openMinor={openMinor} onDone={() => setTaking(false)} /> : null}
      </TaskDialog>
    ) : undefined}>
      {may.take && openMinor > 0 ? <CardPageKey invoiceId={invoiceId} /> : null}
      {payments.length === 0 ? <p className="mid sm">Nothing yet.</p> : (
        <ul>{payments.map((p) => (
          <li key={p.id} className="border-b border-line py-2 last:border-0">
            <span className="flex items-baseline justify-between gap-3"><span><b>{p.receiptNumber}</b> {p.purpose === "undone" ? "taken back" : `${p.purpose}, ${METHOD_WORDS[p.method as PaymentMethod]}`}</span><b className="q">{amount(p.amountMinor, place)}</b></span>
            <span className="sm mid">{dateTime(p.receivedAt, place)}{p.note ? `, ${p.note}` : ""}</span>
            {p.refunds.map((r) => <span key={r.id} className="sm block">Refund {amount(r.amountMinor, place)}: {r.state === "asked" ? "waits for a second person" : r.state}. {r.reason}</span>)}
            {p.disputes.map((d) => <span key={d.id} className="sm block"><b>Disputed {amount(d.amountMinor, place)}</b>: {DISPUTE_WORDS[d.phase]}{d.evidenceBy ? ` by ${dateTime(d.evidenceBy, place)}` : ""}.</span>)}
            {may.refund && p.purpose !== "undone" && p.amountMinor > p.refundedMinor ? <RefundDialog payment={p} /> : null}
          </li>
        ))}</ul>
      )}
    </Bay>
  );
}

function TakeForm({ invoiceId, openMinor, onDone }: { invoiceId: string; openMinor: number; onDone: () => void }) {
  const place = usePlace();
  const router = useRouter();
  const toast = useToast();
  const form = useCommandForm({
    schema: takePaymentInput, action: takePaymentAction.bind(null, place.slug), guard: false,
    defaultValues: { invoiceId, workOrderId: null, method: "cash" as const, amount: minorText(openMinor), note: "", confirmed: false },
    onDone: (v: { receiptNumber: string }) => { toast({ text: `Receipt ${v.receiptNumber}` }); onDone(); router.refresh(); },
  });
  const asks = form.trouble !== null && JSON.stringify(form.trouble).includes("ASK_");
  return (
    <CommandForm form={form} toFix="before it is booked">
      <RadioRow name="method" label="How" options={[{ value: "cash", label: "Cash" }, { value: "cheque", label: "Check" }, { value: "transfer", label: "Transfer" }]} />
      <MoneyInput name="amount" label="Amount" currency={place.currency} />
      <TextInput name="note" label="Check number or note" optional />
      <div className="form-act"><DialogClose>Leave it</DialogClose>{asks ? <Button onClick={() => { form.rhf.setValue("confirmed", true); }}>Yes, it is so</Button> : null}<SubmitButton pendingText="Booking…">Take payment</SubmitButton></div>
    </CommandForm>
  );
}

function RefundDialog({ payment }: { payment: PaymentView }) {
  const [open, setOpen] = useState(false);
  return (
    <TaskDialog trigger={<Button size="sm" variant="lo">Refund</Button>} open={open} onOpenChange={setOpen} title={`Refund of ${payment.receiptNumber}`} description="Goes back the way it came, once a second person has accepted it.">
      {open ? <RefundForm payment={payment} onDone={() => setOpen(false)} /> : null}
    </TaskDialog>
  );
}

function RefundForm({ payment, onDone }: { payment: PaymentView; onDone: () => void }) {
  const place = usePlace();
  const router = useRouter();
  const form = useCommandForm({
    schema: askRefundInput, action: askRefundAction.bind(null, place.slug), guard: false, defaultValues: { paymentId: payment.id, amount: minorText(payment.amountMinor - payment.refundedMinor), reason: "" },
    onDone: () => { onDone(); router.refresh(); },
  });
  return (
    <CommandForm form={form} toFix="before it is asked for">
      <MoneyInput name="amount" label="Amount" currency={place.currency} />
      <TextInput name="reason" label="Reason" />
      <div className="form-act"><DialogClose>Leave it</DialogClose><SubmitButton pendingText="Asking…">Ask for refund</SubmitButton></div>
    </CommandForm>
  );
}
