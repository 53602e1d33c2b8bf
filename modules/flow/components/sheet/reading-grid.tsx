"use client";
import { Fragment, type KeyboardEvent } from "react";
import { decimal } from "@/modules/kernel/format";
import type { PortSide } from "../../domain/comparison-reasons";
import { SCALE_UNIT } from "../../domain/computed-reading";
import { interpolateFlow } from "../../domain/interpolate-flow";
import type { LiftUnit } from "../../domain/lift-ladder";
import { typedNumber } from "../../domain/typed-number";
import { differenceText, flowText, liftWords } from "../flow-words";
import { NoiseMark } from "../noise-verdicts";
import { cellDoubts } from "./cell-words";
import { ReadingCell } from "./reading-cell";
import { SCALE_SIGN, VALUE_SIGN } from "./scale-words";
import { cellAt, flowAt, type SheetColumn, type SheetSide, type When } from "./sheet-figures";
import type { Pos, Sheet } from "./use-sheet";

export const cellId = (side: PortSide, when: When, liftUm: number): string => `c-${side}-${when}-${liftUm}`;
export const posOf = (col: SheetColumn, liftUm: number, repeatNo = 1): Pos => ({ side: col.side, when: col.when, testId: col.test.id, liftUm, repeatNo });

/** What the grid needs of the sheet's state. */
export type GridSheet = Pick<Sheet, "figures" | "textAt" | "keptAt" | "stuckAt" | "type" | "commit">;

interface GridProps {
  sheet: GridSheet;
  unit: LiftUnit;
  locale: string;
  port: number;
  canRecord: boolean;
  isBench: boolean;
  active: Pos | null;
  onActive: (pos: Pos) => void;
  onKey: (pos: Pos, event: KeyboardEvent<HTMLInputElement>) => void;
}
const SIDE_WORDS = { intake: "Intake", exhaust: "Exhaust" } as const;

/** What is typed in a column that is not typed in CFM. */
const unitOf = (col: SheetColumn | null) => (col === null || col.test.bench.scale === "direct" ? null : <span className="unit"> {SCALE_SIGN[col.test.bench.scale]}</span>);

function GainCell({ side, liftUm, locale, top }: { side: SheetSide; liftUm: number; locale: string; top: number }) {
  const row = side.gain?.comparable ? side.gain.rows.find((r) => r.liftUm === liftUm) : undefined;
  if (!row) return <td className="g" />;
  const mark = <NoiseMark gain={side.gain} liftUm={liftUm} />;
  if (row.gainCfm < 0) return <td className="g">{mark}<span className="flag">▼ {differenceText(row.gainCfm, locale)}</span></td>;
  return (
    <td className="g">
      {row.gainCfm > 0 ? <i style={{ "--g": row.gainCfm / top } as React.CSSProperties} aria-hidden="true" /> : null}
      {mark}<b>{differenceText(row.gainCfm, locale)}</b>
    </td>
  );
}

function CamRow({ sides, locale }: { sides: readonly SheetSide[]; locale: string }) {
  return (
    <tr className="camr">
      <th scope="row"><span className="flag">Cam lift</span></th>
      {sides.map((s) => {
        const cam = (s.after ?? s.before)?.test.camLiftUm ?? null;
        const at = (col: SheetColumn | null) => {
          if (!col || cam === null) return "";
          const flow = interpolateFlow({ lifts: col.figures.readings.map((r) => r.liftUm), flowsCfm: col.figures.readings.map((r) => r.flowCfm) }, cam);
          return flow.ok ? flowText(flow.value, locale) : "";
        };
        const gain = s.gain?.comparable && typeof s.gain.atCamLift !== "string" ? s.gain.atCamLift.gainCfm : null;
        return (
          <Fragment key={s.side}>
            <td className="r bf">{at(s.before)}</td>
            <td className="r af">{at(s.after)}</td>
            <td className="g">{gain === null ? null : gain < 0 ? <span className="flag">▼ {differenceText(gain, locale)}</span> : <b>{differenceText(gain, locale)}</b>}</td>
          </Fragment>
        );
      })}
    </tr>
  );
}

/** The readings of both sides by lift. Enter goes down, Shift+Enter up, arrows across; what is typed is computed at once. */
export function ReadingGrid({ sheet, unit, locale, port, canRecord, isBench, active, onActive, onKey }: GridProps) {
  const { figures } = sheet;
  const { sides, liftsUm } = figures;
  const top = Math.max(1, ...sides.flatMap((s) => (s.gain?.comparable ? s.gain.rows.map((r) => r.gainCfm) : [])));
  const camUm = sides.map((s) => (s.after ?? s.before)?.test.camLiftUm ?? null).find((c) => c !== null) ?? null;
  const camAfter = camUm === null ? null : liftsUm.filter((um) => um < camUm).at(-1);

  // Where the tests are stated at different pressures, each column says its own.
  const apart = new Set(sides.flatMap((s) => [s.before, s.after]).flatMap((c) => (c ? [c.test.nominalInH2O] : []))).size > 1;
  const pressureOf = (col: SheetColumn | null) => (apart && col ? <span className="unit"> at {decimal(col.test.nominalInH2O, Number.isInteger(col.test.nominalInH2O) ? 0 : 1, locale)}<span className="sr-only"> inches of water</span></span> : null);

  const cell = (side: SheetSide, when: When, liftUm: number) => {
    const col = side[when];
    const cls = when === "before" ? "r cell bf" : "r cell af";
    if (!col) return <td className={cls} />;
    const pos = posOf(col, liftUm);
    const computed = cellAt(col, liftUm);
    const flow = flowAt(col, liftUm);
    const repeats = col.figures.readings.find((r) => r.liftUm === liftUm)?.count ?? 0;
    const isEditable = canRecord && col.test.state === "draft";
    const text = sheet.textAt(pos);
    const typed = typedNumber(text);
    const shown = flow !== null && !(typed.ok && (computed?.valueUnit ?? "cfm") === "cfm" && Math.abs(typed.value - flow) < 0.05 && col.test.bench.scale === "direct") ? flowText(flow, locale) : null;
    const isLoss = when === "after" && side.gain?.comparable === true && (side.gain.rows.find((r) => r.liftUm === liftUm)?.gainCfm ?? 0) < 0;
    const isActive = active?.testId === col.test.id && active.liftUm === liftUm;
    const isTyping = isActive && sheet.keptAt(pos)?.isReady === false;
    const doubts = cellDoubts({ cell: computed, figures: col.figures, stuck: sheet.stuckAt(pos), liftUm, text, isTyping }).filter((d) => !isActive || d.short !== "off the line");
    const unitNow = computed?.valueUnit ?? SCALE_UNIT[col.test.bench.scale];
    return (
      <td className={cls}>
        <ReadingCell
          id={cellId(side.side, when, liftUm)} labelledBy={`l-${liftUm} g-${side.side} h-${side.side}-${when}`} text={isEditable || !typed.ok || col.test.bench.scale !== "direct" ? text : decimal(typed.value, Math.max(1, /[.,](\d+)/.exec(text)?.[1]?.length ?? 0), locale)}
          unit={text !== "" && unitNow !== SCALE_UNIT[col.test.bench.scale] ? VALUE_SIGN[unitNow] : null}
          corrected={shown} isLoss={isLoss} isEditable={isEditable} isBench={isBench} doubts={doubts} repeats={repeats}
          onText={(value) => sheet.type(pos, value)} onKey={(e) => onKey(pos, e)} onEnter={() => onActive(pos)} onLeave={() => sheet.commit(pos)}
        />
      </td>
    );
  };

  return (
    <table className="calm">
      <thead>
        <tr className="grp">
          <td />
          {sides.map((s) => <th key={s.side} id={`g-${s.side}`} scope="colgroup" colSpan={3}>{SIDE_WORDS[s.side]}, port {port}</th>)}
        </tr>
        <tr>
          <th scope="col">Lift<span className="sr-only">, {unit}</span></th>
          {sides.map((s) => (
            <Fragment key={s.side}>
              <th scope="col" id={`h-${s.side}-before`} className="r bf">Before{unitOf(s.before)}{pressureOf(s.before)}</th>
              <th scope="col" id={`h-${s.side}-after`} className="r af">{s.after?.head ?? "After"}{unitOf(s.after)}{pressureOf(s.after)}</th>
              {s.gain?.state === "withheld" ? <th scope="col" className="r gh wh">Withheld</th> : <th scope="col" className="r gh">Gain</th>}
            </Fragment>
          ))}
        </tr>
      </thead>
      <tbody>
        {liftsUm.map((um) => (
          <Fragment key={um}>
            <tr className={active?.liftUm === um ? "cur" : undefined}>
              <th scope="row" id={`l-${um}`} className="lift num">{liftWords(um, unit, locale)}</th>
              {sides.map((s) => (
                <Fragment key={s.side}>
                  {cell(s, "before", um)}
                  {cell(s, "after", um)}
                  <GainCell side={s} liftUm={um} locale={locale} top={top} />
                </Fragment>
              ))}
            </tr>
            {camAfter === um ? <CamRow sides={sides} locale={locale} /> : null}
          </Fragment>
        ))}
      </tbody>
    </table>
  );
}
