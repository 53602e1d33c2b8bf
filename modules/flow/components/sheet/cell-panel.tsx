"use client";
import { Button } from "@/modules/ui/button";
import { SCALE_UNIT } from "../../domain/computed-reading";
import { liftWords, flowText } from "../flow-words";
import { cellDoubts } from "./cell-words";
import { AirOfReading, HeldField, LeaveOut, RangeKeys, ReasonField, type ToolSheet } from "./reading-tools";
import { cellId, posOf } from "./reading-grid";
import { VALUE_SIGN } from "./scale-words";
import { cellAt, flowAt, repeatsRead, type SheetColumn } from "./sheet-figures";
import type { Pos, Sheet } from "./use-sheet";

/** What the panel needs of the sheet's state. */
export type PanelSheet = ToolSheet & Pick<Sheet, "stuckAt" | "keptAt" | "type" | "commit" | "keepWithReason" | "discard" | "insist" | "takeFromBench">;

export const repeatId = (pos: Pos): string => (pos.repeatNo === 1 ? cellId(pos.side, pos.when, pos.liftUm) : `${cellId(pos.side, pos.when, pos.liftUm)}-r${pos.repeatNo}`);
const MOST_REPEATS = 9;

interface PanelProps {
  sheet: PanelSheet;
  /** The cell in hand, or a repeat of it. */
  pos: Pos;
  col: SheetColumn;
  locale: string;
  /** Readings of this lift that were asked for, read yet or not. */
  asked: number;
  /** Left out at the bench, where it stands over the keypad with range and pressure. */
  onAgain?: () => void;
  onActive?: (pos: Pos) => void;
}

/** What belongs to the cell in hand: range, pressure held, repeats, doubts and how to settle them. */
export function CellPanel({ sheet, pos: inHand, col, locale, asked, onAgain, onActive }: PanelProps) {
  const { test } = col;
  const pos = posOf(col, inHand.liftUm);
  const stuck = sheet.stuckAt(pos);
  const computed = cellAt(col, pos.liftUm);
  const flow = flowAt(col, pos.liftUm) ?? (stuck ? (computed?.flowCfm ?? null) : null);
  const typedText = sheet.textAt(pos);
  const doubts = cellDoubts({ cell: computed, figures: col.figures, stuck, liftUm: pos.liftUm, text: typedText, isTyping: sheet.keptAt(pos)?.isReady === false });
  const reading = col.figures.readings.find((r) => r.liftUm === pos.liftUm);
  const shownRepeats = Array.from({ length: Math.min(MOST_REPEATS, Math.max(repeatsRead(col, pos.liftUm), asked)) }, (_, i) => i + 1);
  const name = `${pos.side} ${liftWords(pos.liftUm, test.liftUnit, locale)} ${col.head.toLowerCase()}`;
  const unit = computed?.valueUnit ?? SCALE_UNIT[test.bench.scale];
  const ofRange = unit === "percent" || unit === "head" ? ` of range ${sheet.rangeAt(pos) ?? "not chosen"}` : "";
  const asRead = unit === "cfm" || typedText === "" ? null : `${typedText} ${VALUE_SIGN[unit]}${ofRange} =`;
  const isDraft = test.state === "draft";
  const settled = shownRepeats.map((n) => posOf(col, pos.liftUm, n)).flatMap((at) => { const cell = cellAt(col, at.liftUm, at.repeatNo); return cell && !sheet.stuckAt(at) ? [{ at, cell }] : []; });
  const isKeptOver = doubts.some((d) => d.isCheck) && computed !== null && !stuck && computed.acceptedReason === null && computed.excludedReason === null;
  const held = shownRepeats.slice(1).map((n) => posOf(col, pos.liftUm, n)).flatMap((at) => { const s = sheet.stuckAt(at); return s ? [{ at, stuck: s }] : []; });
  return (
    <section className="cp" aria-label={`Reading in hand: ${name}`}>
      <p className="cp-h"><b className="capitalize">{name}</b> {asRead === null ? null : <span className="mid">{asRead}</span>} {flow === null ? <span className="mid">{typedText === "" ? "not read" : "no figure"}</span> : <span><b className="num">{flowText(flow, locale)}</b> <span className="unit">CFM at {test.nominalInH2O} in H₂O</span></span>}
        {reading && reading.count > 1 ? <span className="mid"> mean of {reading.count}{reading.agrees ? "" : ", more than 1 % apart: read again"}</span> : null}
      </p>
      <div className="flex flex-wrap items-center gap-3">
        {onAgain ? <><RangeKeys sheet={sheet} pos={inHand} col={col} /><HeldField sheet={sheet} pos={inHand} col={col} /></> : null}
        {test.bench.kind === "absolute_meter" || !isDraft ? null : <AirOfReading key={computed?.revision ?? 0} port={computed?.portTemperatureText ?? ""} orifice={computed?.orificeTemperatureText ?? ""} mayMark={typedText !== ""} onMark={(air) => sheet.mark(pos, air)} />}
        {shownRepeats.slice(1).map((n) => {
          const at = posOf(col, pos.liftUm, n);
          return (
            <span key={n} className="in" style={{ width: 92 }}>
              <input id={repeatId(at)} aria-label={`Repeat ${n}, ${name}`} inputMode={onAgain ? "decimal" : "none"} value={sheet.textAt(at)} placeholder={`again ${n}`} autoComplete="off" maxLength={20} aria-invalid={sheet.stuckAt(at) ? true : undefined}
                onFocus={(e) => { e.currentTarget.select(); onActive?.(at); }} onChange={(e) => sheet.type(at, e.target.value)} onBlur={() => sheet.commit(at)} onKeyDown={(e) => { if (e.key === "Enter") sheet.commit(at); }} />
            </span>
          );
        })}
        {isDraft && onAgain && shownRepeats.length < MOST_REPEATS ? <Button size="sm" variant="lo" icon="plus" onClick={onAgain}>Read again</Button> : null}
        {isDraft ? settled.filter(({ cell }) => cell.excludedReason !== null).map(({ at }) => <Button key={at.repeatNo} size="sm" variant="lo" onClick={() => sheet.mark(at, { excludedReason: null })}>{at.repeatNo === 1 ? "Count it again" : `Count reading ${at.repeatNo} again`}</Button>) : null}
        {isDraft ? <LeaveOut repeats={settled.filter(({ cell }) => cell.excludedReason === null).map(({ at }) => at.repeatNo)} onLeaveOut={(n, reason) => sheet.mark(posOf(col, pos.liftUm, n), { excludedReason: reason })} /> : null}
      </div>
      {doubts.map((d) => <p key={d.words} className="sm"><span aria-hidden="true">▲ </span>{d.words}</p>)}
      {isDraft && isKeptOver ? <details className="sm"><summary className="lk">Keep it with a reason</summary><div className="mt-2"><ReasonField onKeep={(reason) => sheet.keepWithReason(pos, reason)} /></div></details> : null}
      {[...(stuck ? [{ at: pos, stuck }] : []), ...held].map(({ at, stuck: s }) => (
        <div key={at.repeatNo} className="grid gap-2">
          {at.repeatNo === 1 ? null : <p className="sm"><span aria-hidden="true">▲ </span>Reading {at.repeatNo}: {s.message}</p>}
          {s.askReason ? <ReasonField onKeep={(reason) => sheet.keepWithReason(at, reason)} onForget={() => sheet.discard(at)} /> : null}
          {s.theirs ? (
            <div className="flex gap-3">
              <Button size="sm" onClick={() => sheet.insist(at)}>Write mine over it</Button>
              <Button size="sm" variant="lo" onClick={() => { sheet.discard(at); void sheet.takeFromBench(); }}>Take {s.theirs.valueText || "theirs"}</Button>
            </div>
          ) : null}
        </div>
      ))}
    </section>
  );
}
