"use client";
import { useRouter } from "next/navigation";
import { useCallback, useState } from "react";
import { Button } from "@/modules/ui/button";
import { DialogClose, TaskDialog } from "@/modules/ui/dialog";
import { CommandForm } from "@/modules/ui/form/command-form";
import { DateInput } from "@/modules/ui/form/date-input";
import { MoneyInput } from "@/modules/ui/form/money-input";
import { NumberInput } from "@/modules/ui/form/number-input";
import { SelectInput } from "@/modules/ui/form/select-input";
import { SubmitButton } from "@/modules/ui/form/submit-button";
import { TextInput } from "@/modules/ui/form/text-input";
import { useCommandForm } from "@/modules/ui/form/use-command-form";
import { usePlace } from "@/modules/ui/place";
import { useToast } from "@/modules/ui/toast";
import { openStockAction, reverseMovementAction, scrapStockAction } from "../actions";
import { unitMark } from "../domain/part-words";
import { qtyText } from "../domain/qty-text";
import { openingInput, reverseInput, scrapInput } from "../input";
import type { PartDetail } from "../queries/get-part";
import type { LedgerRow } from "../queries/ledger";
import { LedgerTable } from "./ledger-table";

/** Closes the dialog, says what was done, and fetches the page anew. */
function useDone(close: () => void) {
  const router = useRouter();
  const toast = useToast();
  return (text: string) => { toast({ text }); close(); router.refresh(); };
}

/** Opening stock of a part: what the shop brings with it. */
export function OpeningDialog({ part }: { part: PartDetail }) {
  const [open, setOpen] = useState(false);
  return (
    <TaskDialog open={open} onOpenChange={setOpen} trigger={<Button variant="lo" size="sm">Opening stock</Button>} title={`Opening stock of ${part.sku}`} description="What was there before these books began, with what it cost.">
      <OpeningForm part={part} close={() => setOpen(false)} />
    </TaskDialog>
  );
}
function OpeningForm({ part, close }: { part: PartDetail; close: () => void }) {
  const { slug, currency } = usePlace();
  const done = useDone(close);
  const form = useCommandForm({
    schema: openingInput, defaultValues: { partId: part.id, qty: "", value: "", lotCode: "", expiresOn: "", reason: "" }, guard: false,
    action: (sent) => openStockAction(slug, sent), onDone: () => done(`Opening stock of ${part.sku} is in`),
  });
  return (
    <CommandForm form={form} label="Opening stock" toFix="before it goes on the shelf">
      <div className="fields">
        <NumberInput name="qty" label="How much" unit={unitMark(part.stockUnit) || "pieces"} alignEnd />
        <MoneyInput name="value" label="Worth, all of it" currency={currency} />
        {part.lotTracked ? <><TextInput name="lotCode" label="Lot" /><DateInput name="expiresOn" label="Expires" /></> : null}
        <TextInput name="reason" label="Note" optional className="full" />
      </div>
      <div className="dlg-act"><DialogClose>Not now</DialogClose><SubmitButton pendingText="Putting it in…">Put it on the shelf</SubmitButton></div>
    </CommandForm>
  );
}

/** Throwing out, with a reason. */
export function ScrapDialog({ part }: { part: PartDetail }) {
  const [open, setOpen] = useState(false);
  return (
    <TaskDialog open={open} onOpenChange={setOpen} trigger={<Button variant="lo" size="sm">Throw out</Button>} title={`Throw out ${part.sku}`} description={`There are ${qtyText(part.onHandMilli, part.stockUnit)} on the shelf. What is thrown out is posted to scrap.`}>
      <ScrapForm part={part} close={() => setOpen(false)} />
    </TaskDialog>
  );
}
function ScrapForm({ part, close }: { part: PartDetail; close: () => void }) {
  const { slug } = usePlace();
  const done = useDone(close);
  const lots = part.lots.filter((l) => l.onHandMilli > 0);
  const worst = lots.find((l) => l.state === "expired") ?? lots[0];
  const form = useCommandForm({
    schema: scrapInput, defaultValues: { partId: part.id, lotId: worst?.id ?? "", qty: "", reason: "" }, guard: false,
    action: (sent) => scrapStockAction(slug, sent), onDone: (v) => done(`Thrown out: ${qtyText(v.qtyMilli, part.stockUnit)} ${v.sku}`),
  });
  return (
    <CommandForm form={form} label="Throw out" toFix="before it is thrown out">
      <div className="fields">
        {lots.length ? <SelectInput name="lotId" label="Lot" options={lots.map((l) => ({ value: l.id, label: `${l.code}, ${qtyText(l.onHandMilli, part.stockUnit)}${l.state === "expired" ? ", expired" : ""}` }))} /> : null}
        <NumberInput name="qty" label="How much" unit={unitMark(part.stockUnit) || "pieces"} alignEnd />
        <TextInput name="reason" label="Why" className="full" />
      </div>
      <div className="dlg-act"><DialogClose>Keep it</DialogClose><SubmitButton pendingText="Throwing out…">Throw it out</SubmitButton></div>
    </CommandForm>
  );
}

const TURNS = new Set(["opening", "count difference", "scrap"]);

/** The ledger with the key to take a row back. The row stays; another one turns it round. */
export function PartLedger({ part, first, seesCost, canReverse }: { part: PartDetail; first: { rows: LedgerRow[]; next: number | null }; seesCost: boolean; canReverse: boolean }) {
  const [row, setRow] = useState<LedgerRow | null>(null);
  const act = useCallback((r: LedgerRow) => (TURNS.has(r.kind) && r.reversedById === null && r.qtyMilli !== 0 ? <button type="button" className="lk sm" onClick={() => setRow(r)}>Reverse</button> : null), []);
  return (
    <>
      <LedgerTable key={first.rows[0]?.id ?? "none"} partId={part.id} stockUnit={part.stockUnit} first={first} seesCost={seesCost} {...(canReverse ? { act } : {})} />
      {row ? (
        <TaskDialog open onOpenChange={(o) => (o ? undefined : setRow(null))} title="Reverse this movement" description="It stays in the ledger, and a row of the other sign takes it back.">
          <ReverseForm row={row} close={() => setRow(null)} />
        </TaskDialog>
      ) : null}
    </>
  );
}
function ReverseForm({ row, close }: { row: LedgerRow; close: () => void }) {
  const { slug } = usePlace();
  const done = useDone(close);
  const form = useCommandForm({ schema: reverseInput, defaultValues: { movementId: row.id, reason: "" }, guard: false, action: (sent) => reverseMovementAction(slug, sent), onDone: (v) => done(`${v.sku}: movement reversed`) });
  return (
    <CommandForm form={form} label="Reverse this movement" toFix="before it is reversed">
      <div className="fields one"><TextInput name="reason" label="Why" /></div>
      <div className="dlg-act"><DialogClose>Leave it</DialogClose><SubmitButton pendingText="Reversing…">Reverse it</SubmitButton></div>
    </CommandForm>
  );
}
