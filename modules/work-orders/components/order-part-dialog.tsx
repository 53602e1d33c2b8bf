"use client";
import { useRouter } from "next/navigation";
import { amount, date } from "@/modules/kernel/format";
import { milliText } from "@/modules/kernel/quantity";
import { qtyText } from "@/modules/stock/domain/qty-text";
import { unitMark } from "@/modules/stock/domain/part-words";
import { Button } from "@/modules/ui/button";
import { DialogClose, TaskDialog } from "@/modules/ui/dialog";
import { Checkbox } from "@/modules/ui/form/checkbox";
import { CommandForm } from "@/modules/ui/form/command-form";
import { NumberInput } from "@/modules/ui/form/number-input";
import { SubmitButton } from "@/modules/ui/form/submit-button";
import { TextInput } from "@/modules/ui/form/text-input";
import { useCommandForm } from "@/modules/ui/form/use-command-form";
import { Kv, type Pair } from "@/modules/ui/kv";
import { Note } from "@/modules/ui/note";
import { usePlace } from "@/modules/ui/place";
import { useToast } from "@/modules/ui/toast";
import { dropNeedAction, issueToWorkOrderAction, returnUnusedAction } from "../parts-actions";
import { dropNeedInput, issueInput, returnInput } from "../parts-input";
import type { OrderPart } from "../queries/parts";

/** One part of the order: where it lies, what to take, issue and return as typed. */
export function OrderPartDialog({ row, canIssue, onClose }: { row: OrderPart; canIssue: boolean; onClose: () => void }) {
  const { slug, locale, currency } = usePlace();
  const open = Math.max(0, row.neededMilli - row.issuedMilli);
  const pairs: Pair[] = [
    ["Shelf", row.bin || "no place given"],
    ["Needed", qtyText(row.neededMilli, row.stockUnit)],
    ["Reserved", qtyText(row.reservedMilli, row.stockUnit)],
    ["Issued", qtyText(row.issuedMilli, row.stockUnit)],
    ...(row.take.length ? [["Take", row.take.map((t) => `${qtyText(t.qtyMilli, row.stockUnit)} of lot ${t.lotCode}`).join(", then ")] as Pair] : []),
    ...(row.arriving ? [["Coming", [row.arriving.number, row.arriving.expectedOn ? date(row.arriving.expectedOn, locale) : "no date yet"].filter(Boolean).join(", ")] as Pair] : []),
    ...(row.costMinor === null ? [] : [["Cost out", amount(row.costMinor, { locale, currency })] as Pair]),
  ];
  return (
    <TaskDialog open onOpenChange={(o) => (o ? undefined : onClose())} title={row.description} description={<a className="lk" href={`/s/${slug}/parts/${encodeURIComponent(row.sku)}`}>{row.sku}</a>}>
      <div className="grid gap-4">
        {row.hazard ? <Note title={`${row.hazard[0]?.toUpperCase() ?? ""}${row.hazard.slice(1)}.`}>Read the maker&rsquo;s safety data sheet and your local rules before you grind, drill or handle it.</Note> : null}
        <Kv pairs={pairs} />
        {canIssue && (open > 0 || row.issuedMilli === 0) ? <IssueForm row={row} open={open} onClose={onClose} /> : null}
        {canIssue && row.issuedMilli > 0 ? <ReturnForm row={row} onClose={onClose} /> : null}
        <div className="dlg-act">
          {canIssue && row.byHand && row.issuedMilli === 0 ? <DropButton row={row} onClose={onClose} /> : null}
          <DialogClose>Close</DialogClose>
        </div>
      </div>
    </TaskDialog>
  );
}

function useDone(onClose: () => void) {
  const router = useRouter();
  const toast = useToast();
  return (text: string) => { toast({ text }); onClose(); router.refresh(); };
}

function IssueForm({ row, open, onClose }: { row: OrderPart; open: number; onClose: () => void }) {
  const { slug } = usePlace();
  const done = useDone(onClose);
  const form = useCommandForm({
    schema: issueInput, defaultValues: { workOrderPartId: row.id, qty: milliText(row.reservedMilli > 0 ? Math.min(row.reservedMilli, open) : open), lotId: "", moreThanNeeded: false }, guard: false,
    action: (sent) => issueToWorkOrderAction(slug, sent),
    onDone: (v) => done(`Issued ${v.lots.map((l) => `${qtyText(l.qtyMilli, row.stockUnit)} ${v.sku}${l.lotCode ? ` of lot ${l.lotCode}` : ""}`).join(", ")}`),
  });
  return (
    <CommandForm form={form} label="Issue" toFix="before it is issued">
      <div className="fields">
        <NumberInput name="qty" label="Issue" unit={unitMark(row.stockUnit) || "pieces"} alignEnd />
        <Checkbox name="moreThanNeeded" label="It takes more than agreed" hint="Only when the work really took more." />
      </div>
      <div className="form-act"><SubmitButton pendingText="Issuing…">Issue</SubmitButton></div>
    </CommandForm>
  );
}

function ReturnForm({ row, onClose }: { row: OrderPart; onClose: () => void }) {
  const { slug } = usePlace();
  const done = useDone(onClose);
  const form = useCommandForm({
    schema: returnInput, defaultValues: { workOrderPartId: row.id, qty: "", reason: "" }, guard: false,
    action: (sent) => returnUnusedAction(slug, sent), onDone: (v) => done(`Back on the shelf: ${qtyText(v.qtyMilli, row.stockUnit)} ${row.sku}`),
  });
  return (
    <CommandForm form={form} label="Bring back" toFix="before it goes back">
      <div className="fields">
        <NumberInput name="qty" label="Bring back unused" unit={unitMark(row.stockUnit) || "pieces"} alignEnd />
        <TextInput name="reason" label="Why" optional />
      </div>
      <div className="form-act"><Button variant="lo" type="submit" pending={form.pending} pendingText="Bringing back…">Bring back</Button></div>
    </CommandForm>
  );
}

function DropButton({ row, onClose }: { row: OrderPart; onClose: () => void }) {
  const { slug } = usePlace();
  const done = useDone(onClose);
  const form = useCommandForm({ schema: dropNeedInput, defaultValues: { workOrderPartId: row.id, version: row.version }, guard: false, action: (sent) => dropNeedAction(slug, sent), onDone: () => done(`${row.sku} is off the order`) });
  return (
    <CommandForm form={form} label="Take off the order">
      <Button variant="lo" type="submit" pending={form.pending} pendingText="Taking it off…">Take it off the order</Button>
    </CommandForm>
  );
}
