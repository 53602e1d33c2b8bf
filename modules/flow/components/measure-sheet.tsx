"use client";

import Link from "next/link";
import { useState, useSyncExternalStore } from "react";
import { dateTime, decimal } from "@/modules/kernel/format";
import { Bay, Bays } from "@/modules/ui/bay";
import { Button, LinkButton } from "@/modules/ui/button";
import { ToggleChip } from "@/modules/ui/chip";
import { KeyHints } from "@/modules/ui/key-hints";
import { Lane } from "@/modules/ui/lane";
import { Note } from "@/modules/ui/note";
import { usePlace } from "@/modules/ui/place";
import { cylinderFigures, headFigures, valveFigures, type Derived } from "../domain/measure-derived";
import { DERIVED_KINDS, GROUP_WORDS, MEASURE_KINDS, measureKind, UNITS_OF, type MeasureGroup, type MeasureKind } from "../domain/measure-kinds";
import { lineKey, type LinePlace, type Stage } from "../domain/measure-line";
import { againstLimit, limitWords } from "../domain/measure-value";
import { proposeFinding } from "../domain/proposed-finding";
import type { LimitView, MeasurementSheet } from "../queries/measurements";
import { MeasureCell } from "./measure-cell";
import { MeasureLimitDialog } from "./measure-limit-dialog";
import { MeasureSaveState } from "./measure-save-state";
import { useMeasureLines } from "./measure-state";

const GROUPS = Object.keys(GROUP_WORDS) as MeasureGroup[];
/** Which figures stand under which group. */
const FIGURES_OF: Readonly<Record<MeasureGroup, RegExp>> = { springs: /Coil|Rate|load/, lash: /Shim to fit|Lash/, clearances: /piston|Retainer/, seats: /Seat (width|offset)|Vacuum/, guides: /Stem/, ports: /^$/, chamber: /Chamber|Compression/, deck: /Deck/ };
interface Column { place: LinePlace; head: string; liftMm: number | null }

const never = () => () => undefined;

/** The measurements of one head, by port and place, before and after. Every line is kept as it is left. */
export function MeasureSheet({ sheet }: { sheet: MeasurementSheet }) {
  const place = usePlace();
  const { slug, locale } = place;
  // Until the page answers to keys nothing can be typed that it would not know of.
  const ready = useSyncExternalStore(never, () => true, () => false);
  const [stage, setStage] = useState<Stage>("before");
  const [cylinder, setCylinder] = useState(1);
  const [inch, setInch] = useState(false);
  const [instrument, setInstrument] = useState("");
  const { entries, state, savedAt, type, leave, measured, keepAsTyped, forget, tryAgain } = useMeasureLines(sheet, instrument);
  const { head } = sheet;
  const unitOf = (key: string) => { const units = UNITS_OF[measureKind(key)?.dimension ?? "length"]; return (inch ? units[1] : units[0]) ?? units[0] ?? ""; };
  const limitFor = (key: string, side: string): LimitView | null => sheet.limits.find((l) => l.kind === key && l.side === side) ?? sheet.limits.find((l) => l.kind === key && l.side === "") ?? null;
  const lift = (side: string) => { const um = side === "intake" ? head.camLiftIntakeUm : head.camLiftExhaustUm; return um === null ? null : um / 1000; };
  const columnsOf = (scope: MeasureKind["scope"]): Column[] => scope === "valve"
    ? sheet.valves.map((v) => ({ place: { cylinder, ...v }, head: `${v.side === "intake" ? "In" : "Ex"} ${v.position === "single" ? "" : v.position}`.trim(), liftMm: lift(v.side) }))
    : [{ place: { cylinder: scope === "head" ? 1 : cylinder, side: "", position: "" }, head: scope === "head" ? "Head" : `Cylinder ${cylinder}`, liftMm: null }];
  const figuresOf = (scope: MeasureKind["scope"], c: Column): Derived[] => {
    const values = measured(stage, c.place);
    if (scope === "valve") return valveFigures(values, c.liftMm, (key) => limitFor(key, c.place.side));
    return scope === "cylinder" ? cylinderFigures(values, head.boreMm, head.strokeMm) : headFigures(values);
  };
  const out: { what: string; where: string; words: string }[] = [];
  const placeWords = (c: Column) => (c.place.side === "" ? c.head.toLowerCase() : `${head.cylinders > 1 ? `cylinder ${cylinder} ` : ""}${c.place.side}${c.place.position === "single" ? "" : ` ${c.place.position}`}`);
  const order = sheet.orderNumber;

  const groups = GROUPS.map((group) => {
    const kinds = MEASURE_KINDS.filter((k) => k.group === group);
    const scope = kinds[0]?.scope ?? "valve";
    const columns = columnsOf(scope);
    const rows = kinds.map((kind) => ({
      kind, cells: columns.map((c) => {
        const key = lineKey(stage, c.place, kind.key);
        const limit = limitFor(kind.key, c.place.side);
        const base = measured(stage, c.place).get(kind.key);
        const judged = base === undefined || limit === null ? null : againstLimit(base, limit);
        const verdict = judged === null ? null : { out: judged === "below" || judged === "above", words: limitWords(judged, limit) };
        if (verdict?.out) out.push({ what: `${kind.label}, ${placeWords(c)}: ${entries.get(key)?.text.trim()}`, where: placeWords(c), words: verdict.words });
        return { c, key, verdict };
      }),
    }));
    const derived = columns.map((c) => figuresOf(scope, c).filter((d) => FIGURES_OF[group].test(d.label)));
    const labels = [...new Set(derived.flat().map((d) => d.label))];
    const lines = labels.map((label) => ({
      label, key: derived.flat().find((d) => d.label === label)?.key ?? null, cells: columns.map((c, i) => {
        const figure = derived[i]?.find((d) => d.label === label);
        if (!figure) return null;
        const limit = figure.key === null ? null : limitFor(figure.key, c.place.side);
        const judged = figure.key === null ? null : againstLimit(figure.value, limit);
        const isOut = judged === "below" || judged === "above";
        const words = [...figure.words, ...(judged === null ? [] : [limitWords(judged, limit)])];
        if (isOut) out.push({ what: `${label}, ${placeWords(c)}: ${decimal(figure.value, figure.digits, locale)} ${figure.unit}`, where: placeWords(c), words: limitWords(judged, limit) });
        return { figure, isOut, words };
      }),
    }));
    return { group, scope, columns, rows, lines };
  });

  const dialog = (key: string, label: string, dimension: keyof typeof UNITS_OF, scope: MeasureKind["scope"]) => {
    const sides = scope === "valve" ? (["intake", "exhaust"] as const).filter((s) => sheet.valves.some((v) => v.side === s)) : ([""] as const);
    const set = (side: "" | "intake" | "exhaust", limit: LimitView | null) => (sheet.canSetUp ? <> <MeasureLimitDialog key={`${side}${limit?.version ?? 0}`} family={head.family} kind={key} label={label} side={side} units={UNITS_OF[dimension]} limit={limit} /></> : null);
    const stated = sides.flatMap((side) => { const limit = limitFor(key, side); return limit ? [{ side, limit }] : []; });
    const open = sides.filter((side) => !stated.some((x) => x.side === side));
    return (
      <>
        {stated.map(({ side, limit }) => <div key={side} className="sm">{side ? <span className="dim">{side === "intake" ? "in " : "ex "}</span> : null}<span className="nw">{[limit.minText, limit.maxText].filter(Boolean).join(" to ")} {limit.unit}</span>, <span className="dim">{limit.source}</span>{set(side, limit.side === side ? limit : null)}</div>)}
        {open.length === 0 ? null : <div className="sm"><span className="dim">defer to the service manual</span>{open.map((side) => <span key={side} className="nw">{set(side, null)}</span>)}</div>}
      </>
    );
  };
  const asked = (c: Column, kind: string) => ({ stage, place: c.place, kind, unit: unitOf(kind) });
  const elsewhere = [...new Set([...state.lines.values()].filter((l) => l.stuck !== null && l.headId !== head.id).map((l) => l.headId))];
  const noLift = (["intake", "exhaust"] as const).filter((s) => lift(s) === null && sheet.valves.some((v) => v.side === s));

  return (
    <>
      <div className="bar noprint mb-4">
        <ToggleChip on={stage === "before"} onChange={() => setStage("before")}>Before work</ToggleChip>
        <ToggleChip on={stage === "after"} onChange={() => setStage("after")}>After work</ToggleChip>
        {head.cylinders > 1 ? Array.from({ length: head.cylinders }, (_, i) => <ToggleChip key={i} on={cylinder === i + 1} onChange={() => setCylinder(i + 1)}>{`Cylinder ${i + 1}`}</ToggleChip>) : null}
        <ToggleChip on={inch} onChange={setInch}>Inch units</ToggleChip>
        <label className="in sm !w-64"><span className="dim sm">Instrument</span><input value={instrument} maxLength={80} onChange={(e) => setInstrument(e.target.value)} /></label>
        {sheet.canRecord ? <MeasureSaveState state={state} savedAt={savedAt} place={place} /> : null}
        <KeyHints hints={[{ keys: ["Enter"], does: "next line" }, { keys: ["Shift", "Enter"], does: "back" }, { keys: ["Tab"], does: "next valve" }]} />
      </div>
      {sheet.valvesGuessed ? <Note tone="info" className="mb-4" title="One valve a side.">{head.family} has no valve list yet; add it under Bench gear, Families, and its places appear here.</Note> : null}
      {state.waiting > 0 && state.link !== "up" ? <Note className="mb-4" live title={`${state.waiting} line${state.waiting === 1 ? " is" : "s are"} kept on this device.`} action={<Button size="sm" onClick={tryAgain}>Try again</Button>}>{state.link === "down" ? "No link. They are sent as soon as it is back, also after the page was closed." : "Sign in again, then they are sent."}</Note> : null}
      {elsewhere.length > 0 ? <Note tone="info" className="mb-4" title="Lines of another head wait for you.">{elsewhere.map((id, i) => <span key={id}>{i > 0 ? ", " : ""}<Link className="lk" href={`/s/${slug}/flow/measure/${id}`}>{elsewhere.length === 1 ? "Open its sheet" : `Open sheet ${i + 1}`}</Link></span>)}</Note> : null}
      {noLift.length > 0 ? <Note tone="info" className="mb-4" title={`No cam lift on record, ${noLift.join(" and ")}.`}>Without it neither coil-bind clearance nor retainer to seal is worked out. It stands with the family under Bench gear.</Note> : null}
      <div className="split" style={{ "--side": "320px" } as React.CSSProperties}>
        <Bays>
          {groups.map((g) => (
            <Bay key={g.group} label={GROUP_WORDS[g.group]} flush>
              <Lane label={GROUP_WORDS[g.group]}><table className="calm">
                <caption className="sr-only">{GROUP_WORDS[g.group]}, {stage} work</caption>
                <thead><tr><th scope="col">{inch ? "in, lbf" : "mm, N"}</th>{g.columns.map((c) => <th key={c.head} scope="col">{c.head}</th>)}<th scope="col">Limit</th></tr></thead>
                <tbody>
                  {g.rows.map(({ kind, cells }) => (
                    <tr key={kind.key}>
                      <th scope="row" className="border-b border-line align-middle normal-case tracking-normal text-ink">{kind.label}</th>
                      {cells.map(({ c, key, verdict }, i) => (
                        <td key={key} className="py-1 align-top"><MeasureCell
                          id={`${g.scope}-${i}|${key}`} label={`${kind.label}, ${placeWords(c)}`} entry={entries.get(key)} unit={unitOf(kind.key)} verdict={verdict} mayWrite={sheet.canRecord && ready} link={state.link}
                          onType={(text) => type(asked(c, kind.key), text)} onLeave={() => leave(asked(c, kind.key))} onKeep={() => keepAsTyped(asked(c, kind.key))} onForget={() => forget(asked(c, kind.key))} /></td>
                      ))}
                      <td>{dialog(kind.key, kind.label, kind.dimension, g.scope)}</td>
                    </tr>
                  ))}
                  {g.lines.map((line) => (
                    <tr key={line.label}>
                      <th scope="row" className="border-b border-line align-middle normal-case tracking-normal text-ink">{line.label}</th>
                      {line.cells.map((cell, i) => <td key={i} className="py-1 align-top">{cell ? <><b className="q">{decimal(cell.figure.value, cell.figure.digits, locale)}</b> <span className="unit">{cell.figure.unit}</span><span className={`sm block ${cell.isOut ? "b" : "dim"}`}>{cell.isOut ? "▲ " : ""}{cell.words.join("; ")}</span></> : null}</td>)}
                      <td>{line.key === null ? null : dialog(line.key, line.label, DERIVED_KINDS.find((d) => d.key === line.key)?.dimension ?? "length", g.scope)}</td>
                    </tr>
                  ))}
                </tbody>
              </table></Lane>
            </Bay>
          ))}
        </Bays>
        <Bays>
          <Bay label="Out of limit" aside={out.length === 0 ? undefined : String(out.length)}>
            {out.length === 0 ? <p className="mid">Nothing is outside a limit entered here. Where none is entered, defer to the service manual.</p> : (
              <ul className="grid gap-3">{out.map((o) => (
                <li key={o.what}><b>▲ {o.what}</b><span className="mid block">{o.words}</span>
                  {sheet.canFind && order ? <LinkButton size="sm" icon="flag" href={proposeFinding(`/s/${slug}/orders/${order}`, { pieceId: sheet.pieceId ?? "", words: `${o.what}, ${o.words}.`, position: o.where })}>Write a finding</LinkButton> : null}
                </li>
              ))}</ul>
            )}
          </Bay>
          <Bay label="Epoxy in the ports">
            {sheet.epoxy.length === 0 ? <p className="mid">No fill is on record.</p> : <ul>{sheet.epoxy.map((e) => <li key={`${e.port}${e.mixedAt}`}><b>{e.port}</b>: {e.state === "cured" ? "cure time is over" : <>curing, not before <time dateTime={e.readyAt}>{dateTime(e.readyAt, place)}</time></>}</li>)}</ul>}
          </Bay>
        </Bays>
      </div>
    </>
  );
}
