"use client";
import { useRouter } from "next/navigation";
import { amount, date } from "@/modules/kernel/format";
import { Button } from "@/modules/ui/button";
import { EmptyState } from "@/modules/ui/empty-state";
import { Note } from "@/modules/ui/note";
import { usePlace } from "@/modules/ui/place";
import { useAct } from "@/modules/ui/use-act";
import { draftInvoiceAction } from "../actions";
import type { ReadyRow } from "../queries";

/** Released and not billed; one press draws the draft. */
export function ReadyTable({ rows, mayWrite }: { rows: readonly ReadyRow[]; mayWrite: boolean }) {
  const place = usePlace();
  if (rows.length === 0) return <EmptyState title="Everything released is billed">An order comes here when a head passes final inspection.</EmptyState>;
  return (
    <table className="mt-4">
      <caption className="sr-only">Orders ready to bill</caption>
      <thead><tr><th scope="col">Order</th><th scope="col">Customer</th><th scope="col">Released</th><th scope="col">Pieces</th><th scope="col" className="r">Agreed</th><th scope="col"><span className="sr-only">Bill</span></th></tr></thead>
      <tbody>{rows.map((r) => (
        <tr key={r.workOrderId}>
          <td className="ord">{r.number}</td><td><b>{r.customer}</b></td><td>{r.releasedOn ? date(r.releasedOn, place.locale) : ""}</td>
          <td>{r.pieces}{r.waiting ? `, ${r.waiting} still in work` : ""}</td><td className="r q">{amount(r.agreedMinor, place)}</td><td className="r">{mayWrite ? <StartInvoice workOrderId={r.workOrderId} which={r.waiting ? "released" : "all"} /> : null}</td>
        </tr>
      ))}</tbody>
    </table>
  );
}

/** Draws the draft of an order, or opens the standing one. */
export function StartInvoice({ workOrderId, which = "all", go = false }: { workOrderId: string; which?: "all" | "released"; go?: boolean }) {
  const place = usePlace();
  const router = useRouter();
  const act = useAct(draftInvoiceAction.bind(null, place.slug), (v: { invoiceId: string }) => router.push(`/s/${place.slug}/books/invoices/${v.invoiceId}`));
  return (
    <>
      <Button variant={go ? "go" : "plain"} {...(go ? {} : { size: "sm" as const })} pending={act.pending} pendingText="Drawing…" onClick={() => void act.run({ workOrderId, which })}>{go ? "Start invoice" : which === "released" ? "Bill released" : "Start invoice"}</Button>
      {act.trouble ? <Note tone="stop" live>{act.trouble.text}</Note> : null}
    </>
  );
}
