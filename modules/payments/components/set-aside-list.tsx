"use client";
import { useState } from "react";
import { amount, dateTime } from "@/modules/kernel/format";
import { Button } from "@/modules/ui/button";
import { EmptyState } from "@/modules/ui/empty-state";
import { Note } from "@/modules/ui/note";
import { usePlace } from "@/modules/ui/place";
import { useAct } from "@/modules/ui/use-act";
import { answerRefundAction, closeEventAction, retryEventAction } from "../actions";
import type { SetAsideRow, WaitingRefund } from "../queries";

function Row({ row, mayAct }: { row: SetAsideRow; mayAct: boolean }) {
  const place = usePlace();
  const [reason, setReason] = useState("");
  const again = useAct(retryEventAction.bind(null, place.slug));
  const close = useAct(closeEventAction.bind(null, place.slug));
  const trouble = again.trouble ?? close.trouble;
  return (
    <li className="border-b border-line py-4">
      <p><b>{row.reason}</b></p>
      <p className="sm mid">{row.type}, {dateTime(row.receivedAt, place)}{row.amountMinor === null ? "" : `, ${row.currency ?? ""} ${amount(row.amountMinor, place)}`}{row.timesSeen > 1 ? `, came ${row.timesSeen} times` : ""} <span className="q break-all">{row.reference}</span></p>
      {mayAct ? (
        <form className="mt-2 flex flex-wrap items-end gap-2" onSubmit={(e) => { e.preventDefault(); void close.run({ eventId: row.id, reason }); }}>
          <Button size="sm" pending={again.pending} pendingText="Trying…" onClick={() => void again.run({ eventId: row.id })}>Try again</Button>
          <div className="field grow"><label htmlFor={`why-${row.id}`}>What was found</label><div className="in"><input id={`why-${row.id}`} value={reason} maxLength={240} onChange={(e) => setReason(e.target.value)} /></div></div>
          <Button size="sm" type="submit" variant="lo" pending={close.pending} pendingText="Taking off…">Take off the list</Button>
        </form>
      ) : null}
      {trouble ? <Note tone="stop" live>{trouble.text}</Note> : null}
    </li>
  );
}

/** Messages of the payment provider that were not booked, each with its reason and what a person can do. */
export function SetAsideList({ rows, mayAct }: { rows: readonly SetAsideRow[]; mayAct: boolean }) {
  if (rows.length === 0) return <EmptyState title="Nothing is set aside">A payment that cannot be booked (another amount, an unknown page) waits here with its reason.</EmptyState>;
  return <ul>{rows.map((r) => <Row key={r.id} row={r} mayAct={mayAct} />)}</ul>;
}

/** Refunds that wait for a second person. */
export function WaitingRefunds({ rows }: { rows: readonly WaitingRefund[] }) {
  const place = usePlace();
  const act = useAct(answerRefundAction.bind(null, place.slug));
  if (rows.length === 0) return null;
  return (
    <section className="mb-6">
      <h2 className="section-h">Refunds to accept</h2>
      <ul>{rows.map((r) => (
        <li key={r.id} className="flex flex-wrap items-center gap-3 border-b border-line py-3">
          <b className="num n-s">{amount(r.amountMinor, place)}</b><span><b>{r.customer}</b>, receipt {r.receiptNumber}. {r.reason}</span>
          <span className="ms-auto flex gap-2">
            <Button size="sm" pending={act.pending} onClick={() => void act.run({ refundId: r.id, accept: true })}>{r.mine ? "Accept alone" : "Accept"}</Button>
            <Button size="sm" variant="lo" onClick={() => void act.run({ refundId: r.id, accept: false })}>Decline</Button>
          </span>
        </li>
      ))}</ul>
      {act.trouble ? <Note tone="stop" live>{act.trouble.text}</Note> : null}
    </section>
  );
}
