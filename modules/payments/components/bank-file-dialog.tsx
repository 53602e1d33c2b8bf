"use client";
import { useState } from "react";
import { amount } from "@/modules/kernel/format";
import { Button } from "@/modules/ui/button";
import { DialogClose, TaskDialog } from "@/modules/ui/dialog";
import { postJson } from "@/modules/ui/fetch-json";
import { Note } from "@/modules/ui/note";
import { usePlace } from "@/modules/ui/place";
import { useToast } from "@/modules/ui/toast";
import { useAct } from "@/modules/ui/use-act";
import { takeInBankFileAction } from "../actions";
import type { BankFileLook } from "../bank-import";
import type { BankMapping } from "../domain/bank-file";

/** A bank's file: chosen, looked at by a mapping that a person sets, then taken in whole or not at all. */
export function BankFileDialog() {
  const place = usePlace();
  const toast = useToast();
  const [open, setOpen] = useState(false);
  const [file, setFile] = useState<{ name: string; text: string } | null>(null);
  const [look, setLook] = useState<BankFileLook | null>(null);
  const [balances, setBalances] = useState({ opening: "", closing: "" });
  const [problem, setProblem] = useState<string | null>(null);
  const act = useAct(takeInBankFileAction.bind(null, place.slug), (v: { added: number; knownBefore: number }) => {
    toast({ text: `${v.added} lines taken in${v.knownBefore ? `, ${v.knownBefore} known before` : ""}` });
    setOpen(false); setFile(null); setLook(null);
  });
  const see = async (f: { name: string; text: string }, mapping: BankMapping | null) => {
    setProblem(null);
    try {
      setLook(await postJson<BankFileLook>(`/api/v1/s/${place.slug}/bank-files/look`, { ...f, delimiter: "auto", mapping }, crypto.randomUUID()));
    } catch (error) {
      setProblem(error instanceof Error ? error.message : "The file could not be looked at.");
    }
  };
  const set = (change: Partial<BankMapping>) => { if (file && look) void see(file, { ...look.mapping, ...change }); };
  const m = look?.mapping;
  const column = ({ id, label, value, onChange, none }: { id: string; label: string; value: number | null; onChange: (v: number | null) => void; none?: string }) => (
    <div className="field"><label htmlFor={id}>{label}</label><div className="in"><select id={id} value={value ?? ""} onChange={(e) => onChange(e.target.value === "" ? null : Number(e.target.value))}>{none ? <option value="">{none}</option> : null}{look?.columns.map((c, i) => <option key={i} value={i}>{c}</option>)}</select></div></div>
  );
  return (
    <TaskDialog trigger={<Button icon="plus">Bank file</Button>} open={open} onOpenChange={setOpen} wide title="Take in a bank file" description="Separated values as your bank gives them. Nothing is kept before you say so.">
      <div className="field full"><label htmlFor="bank-file">File</label><div className="in"><input id="bank-file" type="file" accept=".csv,.txt,text/csv" onChange={(e) => { const f = e.target.files?.[0]; if (f) void f.text().then((text) => { const next = { name: f.name, text }; setFile(next); return see(next, null); }); }} /></div></div>
      {look && m ? (
        <>
          <div className="fields mt-3">
            {column({ id: "bf-d", label: "Date", value: m.dateColumn, onChange: (v) => set({ dateColumn: v ?? 0 }) })}
            <div className="field"><label htmlFor="bf-o">Order of the date</label><div className="in"><select id="bf-o" value={m.dateOrder} onChange={(e) => set({ dateOrder: e.target.value as BankMapping["dateOrder"] })}><option value="ymd">year, month, day</option><option value="mdy">month, day, year</option><option value="dmy">day, month, year</option></select></div></div>
            {column({ id: "bf-t", label: "Text", value: m.textColumns[0] ?? 0, onChange: (v) => set({ textColumns: [v ?? 0] }) })}
            {column({ id: "bf-a", label: "Amount, or money in", value: m.amountColumn, onChange: (v) => set({ amountColumn: v ?? 0 }) })}
            {column({ id: "bf-x", label: "Money out", value: m.outColumn, onChange: (v) => set({ outColumn: v }), none: "in the same column" })}
            <div className="field"><label htmlFor="bf-p">Decimals</label><div className="in"><select id="bf-p" value={m.decimalComma ? "comma" : "point"} onChange={(e) => set({ decimalComma: e.target.value === "comma" })}><option value="point">1,910.33</option><option value="comma">1.910,33</option></select></div></div>
            <div className="field"><label htmlFor="bf-op">Opening balance, if the bank gives it</label><div className="in"><input id="bf-op" inputMode="decimal" value={balances.opening} onChange={(e) => setBalances({ ...balances, opening: e.target.value })} /></div></div>
            <div className="field"><label htmlFor="bf-cl">Closing balance</label><div className="in"><input id="bf-cl" inputMode="decimal" value={balances.closing} onChange={(e) => setBalances({ ...balances, closing: e.target.value })} /></div></div>
          </div>
          <table className="mt-3"><caption className="eng text-start">{look.lineCount} lines, together {amount(look.sumMinor, place)}</caption>
            <tbody>{look.lines.slice(0, 5).map((l) => <tr key={l.key}><td className="nw q">{l.date}</td><td>{l.text}</td><td className="r q">{amount(l.amountMinor, place)}</td></tr>)}</tbody>
          </table>
          {look.refused.length ? <Note tone="stop" live title={`${look.refused.length} rows cannot be read`}>{look.refused.slice(0, 6).map((r) => `Row ${r.row}: ${r.message}`).join(" ")}</Note> : null}
        </>
      ) : null}
      {problem ?? act.trouble ? <Note tone="stop" live>{problem ?? act.trouble?.text}</Note> : null}
      <div className="form-act"><DialogClose>Leave it</DialogClose>
        <Button variant="go" pending={act.pending} pendingText="Taking in…" onClick={() => file && m && void act.run({ ...file, delimiter: "auto", mapping: m, ...balances })} {...(!look || look.lineCount === 0 || look.refused.length > 0 ? { disabledReason: look ? "Set the columns so that every row can be read." : "Choose a file first." } : {})}>Take in {look ? look.lineCount : ""} lines</Button>
      </div>
    </TaskDialog>
  );
}
