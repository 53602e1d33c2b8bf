"use client";
import { useState } from "react";
import { amount } from "@/modules/kernel/format";
import { Button } from "@/modules/ui/button";
import { Note } from "@/modules/ui/note";
import { usePlace } from "@/modules/ui/place";
import { useAct } from "@/modules/ui/use-act";
import { explainPayoutItemAction } from "../actions";
import type { BoardTarget } from "../bank-board";

/** A payout opened to its charges, fees and refunds; a charge that is not in the books is led to an invoice here. */
export function PayoutParts({ payout, invoices }: { payout: BoardTarget; invoices: readonly BoardTarget[] }) {
  const place = usePlace();
  const [invoice, setInvoice] = useState<Record<string, string>>({});
  const act = useAct(explainPayoutItemAction.bind(null, place.slug));
  const a = (minor: number) => amount(minor, place);
  const sum = (pick: (p: (typeof payout.parts)[number]) => number) => payout.parts.reduce((x, p) => x + pick(p), 0);
  return (
    <section className="mt-5" aria-label="What the payout is made of">
      <table>
        <caption className="eng ink text-start">Payout, part by part</caption>
        <thead><tr><th scope="col">Part</th><th scope="col">Leads to</th><th scope="col" className="r">Gross</th><th scope="col" className="r">Fee</th><th scope="col" className="r">Net</th></tr></thead>
        <tbody>
          {payout.parts.map((p) => (
            <tr key={p.id}>
              <td>{p.kind}</td>
              <td>{p.explained ? p.what : p.grossMinor > 0 ? (
                <span className="flex flex-wrap items-center gap-2">
                  <label className="sr-only" htmlFor={`x-${p.id}`}>Which invoice did it pay</label>
                  <select id={`x-${p.id}`} className="in" value={invoice[p.id] ?? ""} onChange={(e) => setInvoice({ ...invoice, [p.id]: e.target.value })}><option value="">not in the books: it paid…</option>{invoices.map((i) => <option key={i.id} value={i.id}>{i.label} {i.name}, {a(i.amountMinor)}</option>)}</select>
                  <Button size="sm" pending={act.pending} onClick={() => void act.run({ itemId: p.id, invoiceId: invoice[p.id] ?? "" })}>Book it</Button>
                </span>
              ) : "waits for its payment"}</td>
              <td className="r q">{a(p.grossMinor)}</td><td className="r q">{p.feeMinor ? a(-p.feeMinor) : ""}</td><td className="r q b">{a(p.netMinor)}</td>
            </tr>
          ))}
        </tbody>
        <tfoot><tr><th scope="row" colSpan={2}>To the bank</th><td className="r q">{a(sum((p) => p.grossMinor))}</td><td className="r q">{a(-sum((p) => p.feeMinor))}</td><td className="r q b">{a(sum((p) => p.netMinor))}</td></tr></tfoot>
      </table>
      {act.trouble ? <Note tone="stop" live>{act.trouble.text}</Note> : null}
    </section>
  );
}
