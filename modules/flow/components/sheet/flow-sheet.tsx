"use client";
import Link from "next/link";
import { useRouter } from "next/navigation";
import { useState, type KeyboardEvent } from "react";
import { KeyHints } from "@/modules/ui/key-hints";
import { Bay } from "@/modules/ui/bay";
import { ToggleChip } from "@/modules/ui/chip";
import { usePlace } from "@/modules/ui/place";
import { useToast } from "@/modules/ui/toast";
import { decimal } from "@/modules/kernel/format";
import { arrivedWords } from "../../domain/arrived-readings";
import { leftOutWords } from "../../domain/one-pressure";
import { nextRange } from "../../domain/range-choice";
import type { PortSide } from "../../domain/comparison-reasons";
import type { BenchGear, FlowSheet } from "../../queries/sheet";
import { CautionNote } from "../caution-note";
import { flowMeasure, type Units } from "../../domain/curve-measure";
import { scaledLines } from "../curve-lines";
import { CurveReader } from "../curve-reader";
import { liftWords } from "../flow-words";
import { unitViews, unitWords } from "../unit-words";
import { NoiseLines } from "../noise-verdicts";
import { AddLiftDialog, RemoveLift } from "./add-lift-dialog";
import { BenchKeypad } from "./bench-keypad";
import { BenchLine } from "./bench-line";
import { CellPanel, repeatId } from "./cell-panel";
import { ConditionStrip } from "./condition-strip";
import { ConditionsDialog } from "./conditions-form";
import { NextStep } from "./next-step";
import { PassCurves, sidesWithPasses } from "./pass-curves";
import { cellId, posOf, ReadingGrid } from "./reading-grid";
import { readingsLabel } from "./scale-words";
import { SaveState } from "./save-state";
import { notesOf, SheetNotes } from "./sheet-notes";
import { meanText, SheetSummary } from "./sheet-summary";
import { linesAt, repeatsRead, statedColumns, type SheetColumn } from "./sheet-figures";
import { useFirstCell, useNextKey } from "./use-next-key";
import { useSheet, type Pos } from "./use-sheet";

const HINTS = [
  { keys: ["0–9"], does: "reading" }, { keys: ["Enter"], does: "next lift" }, { keys: ["→"], does: "exhaust" }, { keys: ["Shift", "Enter"], does: "back" },
];
const RANGE_HINT = { keys: ["Alt", "↑", "↓"], does: "range" };
const MORE_HINTS = [
  { keys: ["PgDn"], does: "next port" }, { keys: ["*"], does: "take from bench" }, { keys: ["Ctrl", "Z"], does: "undo" }, { keys: ["Ctrl", "Enter"], does: "next step" },
];

/** The flow sheet of one port pair: grid, live curve, doubts and the next step. With `isBench` a keypad for gloves stands by. */
export function FlowSheetScreen({ sheet: given, gear, isBench }: { sheet: FlowSheet; gear: BenchGear; isBench: boolean }) {
  const place = usePlace();
  const { slug, locale } = place;
  const router = useRouter();
  const sheet = useSheet(given, slug);
  const [active, setActive] = useState<Pos | null>(null);
  const toast = useToast();
  const [again, setAgain] = useState<{ cell: string; count: number } | null>(null);
  const [drawAt, setDrawAt] = useState<number | null>(null);
  const [everyPass, setEveryPass] = useState(false);
  const [units, setUnits] = useState<Units>("read");
  useNextKey();
  const { figures } = sheet;
  const columns = figures.sides.flatMap((s) => [s.before, s.after]).filter((c): c is SheetColumn => c !== null);
  const drafts = columns.filter((c) => c.test.state === "draft");
  const unit = columns[0]?.test.liftUnit ?? (locale.endsWith("US") ? "in" : "mm");
  const [newest = columns[0]?.test.nominalInH2O ?? given.nominalInH2O] = figures.pressures;
  const atInH2O = drawAt !== null && figures.pressures.includes(drawAt) ? drawAt : newest;
  const inH2O = (v: number) => decimal(v, Number.isInteger(v) ? 0 : 1, locale);
  const notDrawn = leftOutWords(statedColumns(figures.sides), atInH2O, inH2O);
  const cam = columns.find((c) => c.test.camLiftUm !== null)?.test.camLiftUm ?? null;
  const activeColumn = active ? (columns.find((c) => c.test.id === active.testId) ?? null) : null;
  const notes = notesOf(figures, given.benchCheckHours, locale);
  const [intake, exhaust] = figures.sides;

  const focus = (side: PortSide, when: "before" | "after", liftUm: number) => document.getElementById(cellId(side, when, liftUm))?.focus();
  const step = (pos: Pos, by: 1 | -1) => {
    const next = figures.liftsUm[figures.liftsUm.indexOf(pos.liftUm) + by];
    if (next !== undefined) {
      focus(pos.side, pos.when, next);
      return;
    }
    sheet.commit(pos);
    // Past the last intake lift comes the first of the exhaust; past that, the step that finishes.
    const other = drafts.find((c) => c.when === pos.when && c.side === (by === 1 ? "exhaust" : "intake") && c.side !== pos.side);
    const end = by === 1 ? figures.liftsUm[0] : figures.liftsUm.at(-1);
    if (other && end !== undefined) focus(other.side, other.when, end);
    else if (by === 1 && !isBench) document.querySelector<HTMLButtonElement>(".flow-sheet .commit-bar button.go")?.focus();
    else if (document.activeElement instanceof HTMLInputElement) document.activeElement.select();
  };
  const across = (pos: Pos, side: PortSide) => {
    const at = figures.sides.find((s) => s.side === side);
    const col = [at?.after, at?.before].find((c) => c?.test.state === "draft");
    if (col) focus(side, col.when, pos.liftUm);
  };
  const goToPort = (by: 1 | -1) => {
    const to = given.cylinder + by;
    if (to >= 1 && to <= given.head.cylinders) router.push(`/s/${slug}/flow/${given.head.id}?port=${to}${isBench ? "&bench=1" : ""}`);
  };
  const fromBench = () => void sheet.takeFromBench().then((n) => toast({ text: n === null ? "No link to the shop's records." : arrivedWords(n) }));
  const stepRange = (pos: Pos, by: 1 | -1) => {
    const ranges = columns.find((c) => c.test.id === pos.testId)?.test.bench.ranges ?? [];
    const to = nextRange(ranges, sheet.rangeAt(pos), by);
    if (to !== null && sheet.rangeAt(pos) !== null) sheet.pressRange(pos, to);
  };
  const readAgain = (pos: Pos) => {
    const col = columns.find((c) => c.test.id === pos.testId);
    if (!col) return;
    const count = Math.min(9, repeatsRead(col, pos.liftUm) + 1);
    setActive({ ...pos, repeatNo: 1 });
    setAgain({ cell: `${pos.testId}${pos.liftUm}`, count });
    // The field is there after this press has been drawn.
    requestAnimationFrame(() => document.getElementById(repeatId({ ...pos, repeatNo: count }))?.focus());
  };
  const undo = (pos: Pos | null) => {
    const where = sheet.undo(pos);
    if (where) focus(where.side, where.when, where.liftUm);
  };

  const onKey = (pos: Pos, e: KeyboardEvent<HTMLInputElement>) => {
    const { selectionStart, selectionEnd, value } = e.currentTarget;
    const all = selectionStart === 0 && selectionEnd === value.length;
    const act: (() => void) | undefined =
      e.altKey && (e.key === "ArrowUp" || e.key === "ArrowDown") ? () => stepRange(pos, e.key === "ArrowUp" ? 1 : -1)
      : e.key === "Enter" ? () => step(pos, e.shiftKey ? -1 : 1)
      : e.key === "ArrowDown" ? () => step(pos, 1)
      : e.key === "ArrowUp" ? () => step(pos, -1)
      : e.key === "ArrowRight" && (all || selectionStart === value.length) ? () => across(pos, "exhaust")
      : e.key === "ArrowLeft" && (all || selectionEnd === 0) ? () => across(pos, "intake")
      : e.key === "PageDown" ? () => goToPort(1)
      : e.key === "PageUp" ? () => goToPort(-1)
      : e.key === "*" ? fromBench
      : (e.ctrlKey || e.metaKey) && e.key.toLowerCase() === "z" ? () => undo(pos)
      : undefined;
    if (!act) return;
    e.preventDefault();
    act();
  };
  const digit = (d: string) => {
    if (!active || !activeColumn) return;
    const input = document.activeElement;
    const isWhole = input instanceof HTMLInputElement && input.id === repeatId(active) && input.selectionStart === 0 && input.selectionEnd === input.value.length;
    sheet.type(active, (isWhole ? "" : sheet.textAt(active)) + d);
  };

  const means = ([["in", intake], ["ex", exhaust]] as const).flatMap(([short, side]) => { const mean = meanText(side, locale); return mean ? [`${mean} mean ${short}`] : []; }).join(", ");
  const name = active && activeColumn ? `${active.side} ${liftWords(active.liftUm, unit, locale)} ${activeColumn.head.toLowerCase()}` : "no cell yet";
  const firstDraft = drafts[0];
  useFirstCell(firstDraft && given.canRecord && drafts.every((c) => c.test.cells.length === 0) ? cellId(firstDraft.side, firstDraft.when, figures.liftsUm[0] ?? 0) : null);
  // Before a cell is in hand, range and pressure are those of the first that will be.
  const inHand = active && activeColumn?.test.state === "draft" ? active : firstDraft ? posOf(firstDraft, figures.liftsUm[0] ?? 0) : null;
  const inHandColumn = inHand ? (columns.find((c) => c.test.id === inHand.testId) ?? null) : null;
  const live = drafts.some((c) => c.when === "before") && !drafts.some((c) => c.when === "after") ? "typing-before" : "typing-after";
  const draftOf = (i: 0 | 1) => { const s = figures.sides[i]; return [s?.after, s?.before].find((c) => c?.test.state === "draft")?.test ?? null; };
  const change = drafts.length > 0 && given.canRecord ? <ConditionsDialog gear={gear} valves={given.head.valves} drafts={{ intake: draftOf(0), exhaust: draftOf(1) }} onChanged={() => router.refresh()} /> : undefined;
  // At the bench it stands over the grid, so that the keypad keeps its place.
  const caution = drafts.length > 0 ? <CautionNote hazards={given.cautions} workOrderId={given.head.workOrderId} headId={given.head.id} step="bench session" /> : null;
  const canAddLift = drafts.length > 0 && given.canRecord && !isBench;
  // At the bench with nothing to type, the next step takes the keypad's place.
  const keysWork = !isBench || drafts.length > 0;
  const next = <NextStep sheet={given} gear={gear} figures={figures} settle={sheet.settle} onChanged={() => router.refresh()} />;
  const passed = sidesWithPasses(sheet.tests);
  const w = unitWords(units, unit, locale);
  const curve = { lines: scaledLines(linesAt(figures.sides, atInH2O), w.perCfm), measure: flowMeasure(units, w.pressure(atInH2O)), unit: w.liftUnit, atInH2O, camLiftUm: cam, locale, label: "Read the curve point by point" } as const;

  return (
    <div className={`flow-sheet ${live}${isBench ? " bench" : ""}`}>
      {isBench || caution === null ? null : <div className="mb-5 empty:hidden">{caution}</div>}
      <ConditionStrip figures={figures} valves={given.head.valves} locale={locale} change={change} />
      <div className="fl">
        <div className="fl-l">
          {isBench && caution !== null ? <div className="empty:hidden">{caution}</div> : null}
          {columns.length === 0 ? <Bay label="Readings, CFM"><p className="mid">No test of this port yet. The before test is read before any work is done.</p></Bay> : (
            <Bay label={readingsLabel(columns.map((c) => c.test.bench.scale))} flush className="fg" aside={canAddLift ? <AddLiftDialog drafts={drafts.map((c) => c.test)} settle={sheet.settle} onAdded={() => router.refresh()} /> : undefined}>
              <ReadingGrid sheet={sheet} unit={unit} locale={locale} port={given.cylinder} canRecord={given.canRecord} isBench={isBench} active={active} onActive={setActive} onKey={onKey} />
              {active && activeColumn?.test.state === "draft" ? <CellPanel key={`${active.testId}${active.liftUm}`} sheet={sheet} pos={active} col={activeColumn} locale={locale} asked={again?.cell === `${active.testId}${active.liftUm}` ? again.count : 1} onActive={setActive} {...(isBench ? {} : { onAgain: () => readAgain(active) })} /> : null}
              {active && canAddLift ? <RemoveLift key={active.liftUm} drafts={drafts.map((c) => c.test)} liftUm={active.liftUm} name={liftWords(active.liftUm, unit, locale)} settle={sheet.settle} onRemoved={() => router.refresh()} /> : null}
              {isBench ? null : <NoiseLines gains={figures.sides.map((s) => s.gain)} locale={locale} />}
            </Bay>
          )}
          {isBench ? (notes.length === 0 ? null : (
            <details className="chk2"><summary><b>{notes.length} {notes.length === 1 ? "check" : "checks"}.</b> {notes.map((n) => n.title).join(" ")}</summary><SheetNotes notes={notes} /></details>
          )) : <SheetNotes notes={notes} />}
          {keysWork ? next : null}
        </div>
        <div className="fl-r">
          <Bay label="Live curve" aside={isBench ? <>{means === "" ? null : <span className="mr-3">{means}</span>}<Link className="lk" href={`/s/${slug}/flow/${given.head.id}?port=${given.cylinder}`}>Desk view</Link></> : undefined}>
            {figures.pressures.length > 1 && !(everyPass && !isBench) ? (
              <div role="group" aria-label="Pressure that is drawn" className="mb-2 flex flex-wrap gap-1">{figures.pressures.map((p) => <ToggleChip key={p} on={p === atInH2O} onChange={() => setDrawAt(p)}>{`At ${inH2O(p)} in H₂O`}</ToggleChip>)}</div>
            ) : null}
            {isBench || everyPass || columns.length === 0 ? null : (
              <div role="group" aria-label="Units of the curve" className="mb-2 flex flex-wrap gap-1">{unitViews(unit, (u) => u).map((v) => <ToggleChip key={v.key} on={units === v.key} onChange={() => setUnits(v.key)}>{v.label}</ToggleChip>)}</div>
            )}
            {passed.length > 0 && !isBench ? (
              <div role="group" aria-label="What the curve shows" className="mb-2 flex flex-wrap gap-1">
                <ToggleChip on={!everyPass} onChange={() => setEveryPass(false)}>Before and newest</ToggleChip>
                <ToggleChip on={everyPass} onChange={() => setEveryPass(true)}>Every pass</ToggleChip>
              </div>
            ) : null}
            {everyPass && passed.length > 0 && !isBench ? <PassCurves tests={sheet.tests} place={place} sides={passed} /> : (
              <>
                <div className="only-wide"><CurveReader {...curve} width={560} height={isBench ? (keysWork ? 172 : 300) : 366} /></div>
                <div className="only-narrow"><CurveReader {...curve} width={350} height={290} mini /></div>
                {notDrawn === "" ? null : <p className="sm mt-2" role="note"><span aria-hidden="true">▲ </span>{notDrawn}</p>}
              </>
            )}
            {isBench ? null : <SheetSummary figures={figures} locale={locale} />}
          </Bay>
          {keysWork ? null : next}
          {isBench && keysWork && inHand && inHandColumn ? <BenchLine sheet={sheet} pos={inHand} col={inHandColumn} onAgain={() => readAgain(inHand)} /> : null}
          {isBench && keysWork ? (
            <BenchKeypad
              name={name} onDigit={digit} onBack={() => { if (active) sheet.type(active, sheet.textAt(active).slice(0, -1)); }} onBench={fromBench}
              onBackLift={() => { if (active) step(active, -1); else if (firstDraft) focus(firstDraft.side, firstDraft.when, figures.liftsUm[0] ?? 0); }}
              onNextLift={() => { if (active) step(active, 1); else if (firstDraft) focus(firstDraft.side, firstDraft.when, figures.liftsUm[0] ?? 0); }}
              onDoubt={() => { if (active && activeColumn && sheet.textAt(active) !== "") sheet.keepWithReason(posOf(activeColumn, active.liftUm), "doubtful, said at the bench"); }}
            />
          ) : null}
        </div>
      </div>
      <div className="fl-foot">
        {isBench ? null : <KeyHints hints={[...HINTS, ...(drafts.some((c) => c.test.bench.scale !== "direct") ? [RANGE_HINT] : []), ...MORE_HINTS]} />}
        <SaveState state={sheet.state} savedAt={sheet.savedAt} place={place} />
        {isBench ? null : <Link className="lk" href={`/s/${slug}/flow/${given.head.id}?port=${given.cylinder}&bench=1`}>Bench view</Link>}
      </div>
    </div>
  );
}
