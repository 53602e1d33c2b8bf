"use client";
import { useState } from "react";
import { useRouter } from "next/navigation";
import { money } from "@/modules/kernel/format";
import { minorText } from "@/modules/kernel/money";
import { Button } from "@/modules/ui/button";
import { DialogClose, TaskDialog } from "@/modules/ui/dialog";
import { Note } from "@/modules/ui/note";
import { usePlace } from "@/modules/ui/place";
import { useToast } from "@/modules/ui/toast";
import { useAct } from "@/modules/ui/use-act";
import { creditInvoiceAction } from "../actions";
import type { InvoicePageView } from "../queries";

/** Takes an issued invoice back, whole or by line: a document of its own that names it. */
export function CreditDialog({ view }: { view: InvoicePageView }) {
  const place = usePlace();
  const router = useRouter();
  const toast = useToast();
  const [open, setOpen] = useState(false);
  const [reason, setReason] = useState("");
  const [whole, setWhole] = useState(view.creditedMinor === 0);
  const [amounts, setAmounts] = useState<Record<string, string>>({});
  const act = useAct(creditInvoiceAction.bind(null, place.slug), (v: { number: string; invoiceId: string }) => {
    setOpen(false);
    toast({ text: `Credit note ${v.number} issued` });
    router.push(`/s/${place.slug}/books/invoices/${v.invoiceId}`);
  });
  const lines = view.snapshot.lines.filter((l) => l.amountMinor > 0);
  const chosen = Object.entries(amounts).filter(([, v]) => v.trim() !== "");
  return (
    <TaskDialog trigger={<Button variant="lo">Credit</Button>} open={open} onOpenChange={setOpen} wide title={`Credit ${view.snapshot.number ?? ""}`} description={`The invoice stays as it is. At most ${money(view.snapshot.totals.totalMinor - view.creditedMinor, place)} can be taken back.`}>
      <form onSubmit={(e) => { e.preventDefault(); void act.run({ invoiceId: view.id, reason, lines: whole ? null : chosen.map(([lineId, amount]) => ({ lineId, amount })) }); }}>
        <div className="field full"><label htmlFor="cr-why">Reason, as printed</label><div className="in"><input id="cr-why" value={reason} onChange={(e) => setReason(e.target.value)} maxLength={240} required minLength={3} /></div></div>
        <fieldset className="mt-3"><legend className="eng">How much</legend>
          <label className="tick"><input type="radio" name="cr" checked={whole} disabled={view.creditedMinor > 0} onChange={() => setWhole(true)} /> All of it</label>
          <label className="tick"><input type="radio" name="cr" checked={!whole} onChange={() => setWhole(false)} /> Some lines</label>
        </fieldset>
        {whole ? null : (
          <div className="mt-2 grid max-h-[40vh] gap-2 overflow-auto">
            {lines.map((l) => (
              <div key={l.id} className="grid grid-cols-[minmax(0,1fr)_130px] items-center gap-2">
                <label htmlFor={`cr-${l.id}`}>{l.description} <span className="dim q">{minorText(l.amountMinor)}</span></label>
                <div className="in"><input id={`cr-${l.id}`} inputMode="decimal" className="q" value={amounts[l.id] ?? ""} onChange={(e) => setAmounts({ ...amounts, [l.id]: e.target.value })} /></div>
              </div>
            ))}
          </div>
        )}
        {act.trouble ? <Note tone="stop" live className="mt-3">{act.trouble.text}</Note> : null}
        <div className="form-act"><DialogClose>Leave it</DialogClose><Button type="submit" variant="go" pending={act.pending} pendingText="Crediting…" {...(!whole && chosen.length === 0 ? { disabledReason: "Type an amount at a line." } : {})}>Issue credit note</Button></div>
      </form>
    </TaskDialog>
  );
}
