"use client";

import { money } from "@/modules/kernel/format";
import { minorText } from "@/modules/kernel/money";
import { Button } from "@/modules/ui/button";
import { Checkbox } from "@/modules/ui/form/checkbox";
import { DateInput } from "@/modules/ui/form/date-input";
import { MoneyInput } from "@/modules/ui/form/money-input";
import { RadioRow } from "@/modules/ui/form/radio-row";
import { SelectInput } from "@/modules/ui/form/select-input";
import { TextInput } from "@/modules/ui/form/text-input";
import { TextareaInput } from "@/modules/ui/form/textarea-input";
import { Note } from "@/modules/ui/note";
import { usePlace } from "@/modules/ui/place";
import { addPieceAction, cancelOrderAction, changeOrderAction, enterSpokenAnswerAction, handOverAction, movePromiseAction, setHoldAction, shipPiecesAction } from "../actions";
import { HOLD_REASONS } from "../domain/hold-reasons";
import { ROAD_CAUTION, USE_WORDS, USES } from "../domain/uses";
import { addPieceInput, cancelOrderInput, changeOrderInput, handOverInput, holdInput, promiseInput, shipInput, spokenAnswerInput } from "../input";
import { CommandDialog } from "./command-dialog";

/** A piece as the dialogs name it. */
export interface PieceName { id: string; label: string; declaredMinor: number | null }

export function HoldDialog({ piece }: { piece: PieceName }) {
  const { slug } = usePlace();
  return (
    <CommandDialog
      trigger={<Button size="sm">Hold</Button>} title={`Put ${piece.label} on hold?`} description="Work on it stands still until the hold is ended." submit="Hold it" schema={holdInput}
      values={{ pieceId: piece.id, reason: undefined, words: "" }} action={(s) => setHoldAction(slug, s)} done={() => `${piece.label} is on hold`}
    >
      <SelectInput name="reason" label="Why" placeholder="Choose" options={HOLD_REASONS.map((r) => ({ value: r, label: r[0]?.toUpperCase() + r.slice(1) }))} />
      <TextareaInput className="mt-3" name="words" label="More" optional rows={2} />
    </CommandDialog>
  );
}

export function PromiseDialog({ orderId, version, promisedOn, today }: { orderId: string; version: number; promisedOn: string | null; today: string }) {
  const { slug } = usePlace();
  return (
    <CommandDialog
      trigger={<Button size="sm" variant="lo">{promisedOn === null ? "Promise a day" : "Move"}</Button>} title={promisedOn === null ? "Promise a day?" : "Move the promise?"} description={promisedOn === null ? undefined : "The customer is told the new day and the reason."}
      submit={promisedOn === null ? "Promise it" : "Move it"} schema={promiseInput} values={{ workOrderId: orderId, version, promisedOn: promisedOn ?? "", reason: "" }} action={(s) => movePromiseAction(slug, s)}
      done={(v) => (v.told ? "Promise moved, and the customer told" : "Promise noted")}
    >
      <DateInput name="promisedOn" label="Promised" min={today} />
      <TextInput className="mt-3" name="reason" label="Why" hint="The customer reads it when the day moves." />
    </CommandDialog>
  );
}

export function AnswerDialog({ estimateId, version, totalMinor, customer, phone, variant = "plain" }: { estimateId: string; version: number; totalMinor: number; customer: string; phone: string; variant?: "go" | "plain" }) {
  const place = usePlace();
  return (
    <CommandDialog
      trigger={<Button variant={variant} icon="phone">Enter the answer</Button>} title={`What did they say to ${money(totalMinor, place)}?`} description={`Version ${version}. Who said it, when and how is kept with your name. Rules for spoken consent differ by place.`}
      submit="Write it down" pendingText="Writing…" schema={spokenAnswerInput} values={{ estimateId, answer: "approved", via: "phone", name: customer, phoneNumber: phone, note: "" }} action={(s) => enterSpokenAnswerAction(place.slug, s)}
      done={(v) => (v.answer === "approved" ? `Version ${v.version} is agreed` : `Version ${v.version} was declined`)}
    >
      {(watch) => (
        <>
          <RadioRow name="answer" label="Answer" options={[{ value: "approved", label: "Yes" }, { value: "declined", label: "No" }]} />
          <RadioRow className="mt-3" name="via" label="How" options={[{ value: "phone", label: "By telephone" }, { value: "counter", label: "At the counter" }]} />
          <TextInput className="mt-3" name="name" label="Who said it" />
          {watch("via") === "phone" ? <TextInput className="mt-3" name="phoneNumber" label="Number called" inputMode="tel" /> : null}
          <TextInput className="mt-3" name="note" label="Note" optional />
        </>
      )}
    </CommandDialog>
  );
}

export function EditOrderDialog({ order }: { order: { id: string; version: number; wants: string; use: string; customerReference: string; notes: string } }) {
  const { slug } = usePlace();
  return (
    <CommandDialog
      trigger={<Button size="sm" variant="lo">Change words</Button>} title="Words of this order" submit="Save" schema={changeOrderInput} values={{ ...order, use: order.use as (typeof USES)[number] }}
      action={(s) => changeOrderAction(slug, s)} done={() => "Order changed"}
    >
      {(watch) => (
        <>
          <TextareaInput name="wants" label="What they want" optional rows={3} />
          <RadioRow className="mt-3" name="use" label="Used on" options={USES.map((u) => ({ value: u, label: USE_WORDS[u] }))} />
          {watch("use") === "road" ? <div className="mt-3"><Note tone="warn">{ROAD_CAUTION}</Note></div> : null}
          <TextInput className="mt-3" name="customerReference" label="Their reference" optional />
          <TextareaInput className="mt-3" name="notes" label="Notes for the shop" optional rows={3} hint="Never printed, never on the customer's page." />
        </>
      )}
    </CommandDialog>
  );
}

export function AddPieceDialog({ orderId, family }: { orderId: string; family: string }) {
  const { slug, currency } = usePlace();
  return (
    <CommandDialog
      trigger={<Button size="sm" variant="lo" icon="plus">One more head</Button>} title="One more head on this order" submit="Add it" schema={addPieceInput}
      values={{ workOrderId: orderId, family, castingNumber: "", serial: "", declaredValue: "", description: "", ownerKind: "customer" }} action={(s) => addPieceAction(slug, s)} done={(v) => `Head ${v.pieceNo} added`}
    >
      <div className="fields">
        <TextInput name="family" label="Engine family" />
        <TextInput name="castingNumber" label="Casting number" optional />
        <TextInput name="serial" label="Serial" optional />
        <MoneyInput name="declaredValue" label="Declared value" currency={currency} optional />
      </div>
    </CommandDialog>
  );
}

export function CancelDialog({ orderId, version, number }: { orderId: string; version: number; number: string }) {
  const { slug } = usePlace();
  return (
    <CommandDialog
      trigger={<Button size="sm" variant="lo">Call it off</Button>} title={`Call off ${number}?`} description="Reserved parts are free again. A deposit stays the customer's: refund it in the books." safe="Keep it" submit="Call it off"
      schema={cancelOrderInput} values={{ workOrderId: orderId, version, reason: "" }} action={(s) => cancelOrderAction(slug, s)} done={() => `${number} was called off`}
    >
      <TextInput name="reason" label="Why" />
    </CommandDialog>
  );
}

export function LeaveDialogs({ orderId, customer, pieces, owedMinor, mayUnpaid }: { orderId: string; customer: string; pieces: readonly PieceName[]; owedMinor: number; mayUnpaid: boolean }) {
  const place = usePlace();
  const ids = pieces.map((p) => p.id);
  const insured = pieces.reduce((sum, p) => sum + (p.declaredMinor ?? 0), 0);
  const owed = owedMinor > 0 ? (
    <div className="mt-3">
      <Note tone={mayUnpaid ? "warn" : "stop"} title={`${money(owedMinor, place)} is still to pay.`}>{mayUnpaid ? "Letting it go gives up what holds it. It is recorded under your name." : "Take the payment first; only a manager lets it go unpaid."}</Note>
      {mayUnpaid ? <Checkbox className="mt-2" name="unpaidOk" label="It leaves unpaid" /> : null}
    </div>
  ) : null;
  const which = <p className="mid">{pieces.map((p) => p.label).join(", ")}</p>;
  return (
    <>
      <CommandDialog
        trigger={<Button variant="go" icon="box">Hand over</Button>} title={`Hand over to ${customer}?`} submit="Handed over" schema={handOverInput} values={{ workOrderId: orderId, pieceIds: ids, to: customer, unpaidOk: false }}
        action={(s) => handOverAction(place.slug, s)} done={(v) => `${v.pieces === 1 ? "The head has" : `${v.pieces} heads have`} left`}
      >
        {which}
        <TextInput className="mt-3" name="to" label="Who takes it" hint="Look at an identity card when it is not the customer." />
        {owed}
      </CommandDialog>
      <CommandDialog
        trigger={<Button icon="send">Ship</Button>} title={`Ship to ${customer}?`} submit="It is with the carrier" schema={shipInput} wide
        values={{ workOrderId: orderId, pieceIds: ids, carrier: "", service: "", tracking: "", insured: insured > 0 ? minorText(insured) : "", cost: "", unpaidOk: false }}
        action={(s) => shipPiecesAction(place.slug, s)} done={() => "Shipped, and the customer told"}
      >
        {which}
        <div className="fields mt-3">
          <TextInput name="carrier" label="Carrier" />
          <TextInput name="service" label="Service" optional />
          <TextInput name="tracking" label="Tracking number" optional />
          <MoneyInput name="insured" label="Insured for" currency={place.currency} hint="Declared value unless you type another." optional />
          <MoneyInput name="cost" label="Carrier's price" currency={place.currency} hint="Goes to the books as freight out." />
        </div>
        {owed}
      </CommandDialog>
    </>
  );
}
