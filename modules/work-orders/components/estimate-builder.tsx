"use client";

import { useRouter } from "next/navigation";
import { useCallback, useEffect, useMemo, useRef, useState } from "react";
import { useFieldArray, type UseFormReturn } from "react-hook-form";
import { basisPointsOf, minorText } from "@/modules/kernel/money";
import { money, time } from "@/modules/kernel/format";
import { Bay, Bays } from "@/modules/ui/bay";
import { Button } from "@/modules/ui/button";
import { CommandForm } from "@/modules/ui/form/command-form";
import { DateInput } from "@/modules/ui/form/date-input";
import { MoneyInput } from "@/modules/ui/form/money-input";
import { TextInput } from "@/modules/ui/form/text-input";
import { TextareaInput } from "@/modules/ui/form/textarea-input";
import { useCommandForm } from "@/modules/ui/form/use-command-form";
import { Note } from "@/modules/ui/note";
import { MoneyNumber } from "@/modules/ui/num";
import { usePlace } from "@/modules/ui/place";
import { saveEstimateAction } from "../actions";
import { LINE_SETS } from "../domain/line-sets";
import { saveEstimateInput } from "../input";
import type { EstimateEditor } from "../queries/estimates";
import type { MenuRow } from "../queries/menu";
import { AddLineBox, type PartChoice } from "./add-line-box";
import { blankLine, formOf, sentOf, totalsOfForm, type EstimateForm } from "./estimate-form-values";
import { EstimateLines } from "./estimate-lines";
import { EstimateSums } from "./estimate-sums";
import { SendEstimateDialog } from "./send-estimate-dialog";
import { useAutosave, type SaveState } from "./use-autosave";

/** The next version of an estimate: lines typed in place, sums as they come, saved when the hand rests. */
export function EstimateBuilder({ editor, menu, maySend }: { editor: EstimateEditor & { draft: NonNullable<EstimateEditor["draft"]> }; menu: readonly MenuRow[]; maySend: boolean }) {
  const place = usePlace();
  const router = useRouter();
  const { draft, pieces, rules, agreed } = editor;
  const addBox = useRef<HTMLInputElement>(null);
  const [skuOf, setSkuOf] = useState<Record<string, string>>(() => Object.fromEntries(draft.lines.flatMap((l) => (l.partId && l.sku ? [[l.partId, l.sku]] : []))));
  const [valves, setValves] = useState("4");
  const form = useCommandForm({
    schema: saveEstimateInput, defaultValues: formOf(draft), guard: false,
    action: async (sent) => saveEstimateAction(place.slug, { ...sent, input: sentOf(sent.input as unknown as EstimateForm) }),
  });
  const rhf = form.rhf as unknown as UseFormReturn<EstimateForm, unknown, never>;
  const lines = useFieldArray({ control: rhf.control, name: "lines" });
  const { getValues, setError, setValue, setFocus, watch, trigger } = rhf;

  const autosave = useAutosave({
    read: useCallback(() => sentOf(getValues()), [getValues]),
    check: useCallback((values: ReturnType<typeof sentOf>) => {
      const parsed = saveEstimateInput.safeParse(values);
      if (parsed.success) return null;
      const first = parsed.error.issues[0];
      const line = first?.path[0] === "lines" ? `Line ${Number(first.path[1]) + 1}: ` : "";
      return `${line}${first?.message ?? "Something is not right."}`;
    }, []),
    send: useCallback((values: ReturnType<typeof sentOf>, requestId: string) => saveEstimateAction(place.slug, { requestId, input: values }), [place.slug]),
    settled: useCallback((value: { version: number }) => setValue("version", value.version), [setValue]),
    wrong: useCallback((path: string, message: string) => setError(path as never, { type: "server", message }), [setError]),
  });
  const { touch, save, state } = autosave;
  useEffect(() => {
    const sub = watch((_, { name }) => { if (name !== "version") touch(); });
    return () => sub.unsubscribe();
  }, [watch, touch]);

  const values = watch();
  const totals = totalsOfForm(values, rules);
  const bookMinutes = useMemo(() => values.lines.reduce((sum, l) => {
    const op = l.kind === "labor" ? menu.find((m) => m.code === l.operationCode) : undefined;
    return sum + (op ? Math.round(op.bookMinutes * (Number(l.qty.replace(",", ".")) || 0)) : 0);
  }, 0), [values.lines, menu]);
  const depositBp = Math.round(Number(values.depositPercent.replace(",", ".")) * 100) || 0;
  const depositMinor = agreed ? agreed.depositMinor : totals ? basisPointsOf(totals.totalMinor, depositBp) : 0;
  const onePiece = pieces.length === 1 ? (pieces[0]?.pieceNo ?? null) : null;
  const lastPiece = () => onePiece ?? getValues("lines").at(-1)?.pieceNo ?? pieces[0]?.pieceNo ?? null;

  const put = (line: ReturnType<typeof blankLine>) => {
    lines.append(line, { shouldFocus: false });
    touch();
    const at = getValues("lines").length - 1;
    setTimeout(() => setFocus(line.kind === "labor" || line.kind === "part" ? `lines.${at}.qty` : `lines.${at}.description`, { shouldSelect: true }), 0);
  };
  const addWork = (m: MenuRow) => put(blankLine("labor", { pieceNo: lastPiece(), operationCode: m.code, description: m.name, unitPrice: minorText(m.priceMinor) }));
  const addPart = (p: PartChoice) => {
    setSkuOf((all) => ({ ...all, [p.id]: p.sku }));
    put(blankLine("part", { pieceNo: lastPiece(), partId: p.id, description: p.description, unitPrice: minorText(p.salePriceMinor ?? 0) }));
  };
  const takeSet = (key: string) => {
    const set = LINE_SETS.find((s) => s.key === key);
    if (!set) return;
    const there = new Set(getValues("lines").filter((l) => l.kind === "labor").map((l) => `${l.pieceNo ?? onePiece ?? ""} ${l.operationCode ?? ""}`));
    const more = pieces.flatMap((p) => set.codes.flatMap(({ code, per }) => {
      const m = menu.find((x) => x.code === code);
      return m && !there.has(`${p.pieceNo} ${code}`) ? [blankLine("labor", { pieceNo: p.pieceNo, operationCode: code, description: m.name, qty: per === "valve" ? valves : "1", unitPrice: minorText(m.priceMinor) })] : [];
    }));
    lines.append(more, { shouldFocus: false });
    touch();
  };

  return (
    <CommandForm form={form} label={`Estimate version ${draft.estimateNo}`}>
      <div className="split" style={{ "--side": "360px" } as React.CSSProperties}>
        <Bays>
          {draft.findings.length === 0 ? null : (
            <Bay label="What was found">
              <ul>{draft.findings.map((f) => <li key={f.id} className="py-1">{f.position === "" ? null : <b className="b">{f.position}: </b>}{f.words}</li>)}</ul>
              <p className="sm dim mt-2">Add the lines that settle it. The customer sees these words and the change in price.</p>
            </Bay>
          )}
          <Bay label={`Version ${draft.estimateNo}, work and parts`} aside={<SaveWord state={state} zone={place} onReload={() => router.refresh()} onRetry={() => void save()} />}>
            <div className="est-sets mb-4">
              <span className="eng">Sets</span>
              {LINE_SETS.map((s) => <Button key={s.key} size="sm" icon="plus" onClick={() => takeSet(s.key)}>{s.label}</Button>)}
              <span className="in"><input aria-label="Valves, for operations priced each" inputMode="numeric" value={valves} onChange={(e) => setValves(e.target.value.replace(/\D/g, "").slice(0, 2))} /><span className="unit">valves</span></span>
            </div>
            <EstimateLines rhf={rhf} lines={lines} pieces={pieces} skuOf={skuOf} onAddNext={() => addBox.current?.focus()} />
            <div className="mt-4 flex flex-wrap items-center gap-2">
              <div className="min-w-0 flex-1" style={{ flexBasis: 300 }}><AddLineBox menu={menu} onWork={addWork} onPart={addPart} inputRef={addBox} /></div>
              <Button size="sm" variant="lo" onClick={() => put(blankLine("outside"))}>Outside service</Button>
              <Button size="sm" variant="lo" onClick={() => put(blankLine("note"))}>Note</Button>
            </div>
          </Bay>
          <Bay label="Words">
            <div className="fields">
              <TextareaInput name="message" label="To the customer" optional rows={3} hint="Stands above the lines, in the mail and on the page." />
              <TextareaInput name="exclusions" label="Not included" optional rows={3} />
            </div>
          </Bay>
        </Bays>
        <div className="sticky-side">
          <Bays>
            <Bay label="Sums">
              {totals ? (
                <>
                  <MoneyNumber size="m">{money(totals.totalMinor, place)}</MoneyNumber>
                  {agreed ? <p className="sm mid mb-2 mt-1">{money(totals.totalMinor - agreed.totalMinor, place)} against version {agreed.estimateNo}</p> : <p className="sm mid mb-2 mt-1">{depositMinor === 0 ? "No deposit" : `Deposit ${money(depositMinor, place)}`}</p>}
                  <EstimateSums totals={totals} rules={rules} discountBp={Math.round(Number(values.laborDiscountPercent.replace(",", ".")) * 100) || 0} bookMinutes={bookMinutes} place={place} />
                </>
              ) : <Note tone="warn">The discount is not a percentage from 0 to 100.</Note>}
            </Bay>
            <Bay label="Terms">
              <div className="fields">
                <TextInput name="laborDiscountPercent" label="Off labor" unit="%" inputMode="decimal" hint={editor.customerDiscountBp > 0 ? `Usual ${editor.customerDiscountBp / 100} %` : undefined} />
                <MoneyInput name="freight" label="Freight" currency={place.currency} />
                <TextInput name="depositPercent" label="Deposit" unit="%" inputMode="decimal" hint={agreed ? "Stands from the first" : undefined} />
                <DateInput name="readyOn" label="Ready about" optional />
              </div>
            </Bay>
            <div className="form-act">
              {maySend ? (
                <SendEstimateDialog
                  editor={editor} totalMinor={totals?.totalMinor ?? 0} depositMinor={agreed ? 0 : depositMinor}
                  before={async () => { const good = await trigger(); return (await save()) && good ? getValues("version") : null; }}
                />
              ) : <Note tone="info">A counter hand or the lead sends it. The draft is kept.</Note>}
              <Button onClick={() => void save()}>Save now</Button>
            </div>
          </Bays>
        </div>
      </div>
    </CommandForm>
  );
}

function SaveWord({ state, zone, onReload, onRetry }: { state: SaveState; zone: { locale: string; zone: string }; onReload: () => void; onRetry: () => void }) {
  const words =
    state.kind === "saved" ? (state.at === null ? "Saved" : `Saved ${time(state.at, zone)}`)
    : state.kind === "saving" ? "Saving…" : state.kind === "unsaved" ? "Not saved yet" : state.kind === "no-link" ? "No link. Kept here." : state.message;
  return (
    <span role="status" className={state.kind === "wrong" || state.kind === "conflict" ? "err" : "dim"} style={{ marginTop: 0 }}>
      {words}
      {state.kind === "conflict" ? <> <button type="button" className="lk" onClick={onReload}>Load theirs</button></> : state.kind === "no-link" ? <> <button type="button" className="lk" onClick={onRetry}>Try again</button></> : null}
    </span>
  );
}
