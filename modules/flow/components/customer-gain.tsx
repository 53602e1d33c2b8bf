import { Fragment } from "react";
import { date, decimal } from "@/modules/kernel/format";
import { localDate } from "@/modules/kernel/instant";
import { Bay } from "@/modules/ui/bay";
import { gainHeadline } from "../domain/gain-headline";
import { NOISE_WORDS } from "../domain/noise";
import { historyUsed, isAssessed } from "../domain/noise-summary";
import { AIRFLOW_WORDS } from "../domain/report-snapshot";
import type { ComparableGain, GainOfPiece, PortGain, SideGain, WithheldGain } from "../domain/side-gain";
import { crossoverWords } from "./comparison-words";
import { differenceText, flowText, liftWords } from "./flow-words";
import { withheldWords } from "./gain-words";
import { unitWords } from "./unit-words";
import { noiseWords } from "./noise-verdicts";
import { MiniCurve } from "./mini-curve";

interface At { locale: string; zone: string }

/** The heading: more air only when every side that was compared flows more, and the change is larger than the noise of the measurement. */
export function gainHeading(gain: GainOfPiece): string {
  const sides = gain.ports.flatMap((p) => [p.intake, p.exhaust]);
  const compared = sides.filter((s): s is ComparableGain => s.comparable);
  const heads = compared.map(gainHeadline);
  const isHigher = compared.length > 0 && compared.every((s) => s.meanGainCfm > 0) && heads.every((h) => h.gainCfm > 0);
  if (isHigher && heads.every((h) => h.verdict === "larger_than_noise")) return "Your head flows more air";
  if (isHigher) return "Your head read higher after the work";
  if (compared.length > 0) return "Your head, before and after";
  return "Your head on the flow bench";
}

/** What stands under the heading where a change was not shown to be larger than the noise; null where all were. */
function doubtWords(gain: GainOfPiece): string | null {
  const verdicts = gain.ports.flatMap((p) => [p.intake, p.exhaust]).flatMap((s) => (s.comparable ? [gainHeadline(s).verdict] : []));
  if (verdicts.includes("not_assessed")) return "Whether the change is larger than the noise of the measurement was not assessed.";
  return verdicts.includes("within_noise") ? "Not all of the change can be told from the noise of the measurement." : null;
}

function Figure({ gain, locale, isFirst }: { gain: ComparableGain; locale: string; isFirst: boolean }) {
  const head = gainHeadline(gain);
  // A flow is told to a tenth; the mean of the lifts read has two decimals, as on the invoice.
  const digits = head.basis === "cam" ? 1 : 2;
  return (
    <div className={isFirst && head.gainCfm > 0 ? "fl" : undefined}>
      <span className="num">{differenceText(head.gainCfm, locale, digits)}</span>
      <p>
        <b>CFM {gain.side}{head.gainCfm < 0 ? ", a loss" : ""}</b><br />
        {decimal(head.beforeCfm, digits, locale)} to {decimal(head.afterCfm, digits, locale)} {head.liftUm === null ? (gain.rows.length === 1 ? "at the one lift read" : `on the mean of the ${gain.rows.length} lifts read`) : `at your cam's full lift, ${liftWords(head.liftUm, gain.liftUnit, locale)}`}<br />
        {NOISE_WORDS[head.verdict]}{head.verdict === "not_assessed" ? " against the noise" : ""}
      </p>
    </div>
  );
}

const SHORT = { intake: "Intake", exhaust: "Exh." } as const;
type Told = ComparableGain | WithheldGain;

function PortTable({ port, locale }: { port: PortGain; locale: string }) {
  const sides = [port.intake, port.exhaust].filter((g): g is Told => g.state !== "absent");
  const [first] = sides;
  if (!first) return null;
  const lifts = [...new Set(sides.flatMap((g) => g.rows.map((r) => r.liftUm)))].sort((a, b) => a - b);
  const text = (v: number | null | undefined) => (v === null || v === undefined ? "" : flowText(v, locale));
  return (
    <table>
      <caption className="sr-only">Readings by lift, CFM at {first.atInH2O} inches of water</caption>
      <thead>
        <tr>
          <th scope="col">Lift, {first.liftUnit}</th>
          {sides.map((g) => g.comparable
            ? <Fragment key={g.side}><th scope="col" className="r">{SHORT[g.side]}</th><th scope="col" className="r">Gain</th></Fragment>
            : <Fragment key={g.side}><th scope="col" className="r">{SHORT[g.side]} before</th><th scope="col" className="r">After</th></Fragment>)}
        </tr>
      </thead>
      <tbody>
        {lifts.map((um) => (
          <tr key={um}>
            <th scope="row" className="q mid">{liftWords(um, first.liftUnit, locale)}</th>
            {sides.map((g) => {
              if (g.comparable) {
                const row = g.rows.find((r) => r.liftUm === um);
                return <Fragment key={g.side}><td className="r q">{text(row?.afterCfm)}</td><td className="r q b">{row === undefined ? "" : row.gainCfm < 0 ? `▼ ${differenceText(row.gainCfm, locale)}` : differenceText(row.gainCfm, locale)}</td></Fragment>;
              }
              const row = g.rows.find((r) => r.liftUm === um);
              return <Fragment key={g.side}><td className="r q">{text(row?.beforeCfm)}</td><td className="r q">{text(row?.afterCfm)}</td></Fragment>;
            })}
          </tr>
        ))}
      </tbody>
    </table>
  );
}

function sideNotes(gain: SideGain, at: At): string[] {
  const withheld = withheldWords(gain);
  if (withheld) return [withheld];
  if (!gain.comparable) return [];
  const name = gain.side === "intake" ? "The intake" : "The exhaust";
  const noise = noiseWords(gain, at.locale);
  const day = (iso: string) => date(localDate(new Date(iso), at.zone), at.locale);
  return [
    `${name} averages ${differenceText(gain.meanGainCfm, at.locale, 2)} CFM${gain.meanPercent === null ? "" : ` (${decimal(gain.meanPercent, 2, at.locale)} %)`} over the ${gain.rows.length === 1 ? "one lift" : `${gain.rows.length} lifts`} read.`,
    ...(gain.losses.length > 0 ? [`${name} reads lower at ${gain.losses.map((l) => `${liftWords(l.liftUm, gain.liftUnit, at.locale)} (${differenceText(l.gainCfm, at.locale)})`).join(", ")}.`] : []),
    ...[crossoverWords(gain, unitWords("read", gain.liftUnit, at.locale))].flatMap((words) => (words === null ? [] : [`${name} ${words[0]?.toLowerCase() ?? ""}${words.slice(1)}`])),
    ...(noise === null ? [] : [`${name}: ${noise[0]?.toLowerCase() ?? ""}${noise.slice(1)}`]),
    `Before ${day(gain.before.takenAt)} by ${gain.before.operator}, after ${day(gain.after.takenAt)} by ${gain.after.operator}. Seats before: ${gain.before.seat}; after: ${gain.after.seat}.`,
  ];
}

/** The customer's page of the gain, below the page's masthead: heading, figures, curve, table, conditions. Server-rendered. */
export function CustomerGain({ gain, locale, zone }: { gain: GainOfPiece } & At) {
  const stated = gain.ports.flatMap((p) => [p.intake, p.exhaust]).find((s): s is Told => s.state !== "absent");
  const at = { locale, zone };
  const doubt = doubtWords(gain);
  return (
    <>
      <h1>{gainHeading(gain)}</h1>
      <p className="lead">{stated ? `Measured on our bench at ${stated.atInH2O} inches of water.` : "No test is finished yet."}{doubt === null ? "" : ` ${doubt}`}</p>
      {gain.ports.map((port) => {
        const compared = [port.intake, port.exhaust].filter((g): g is ComparableGain => g.comparable);
        const portWords = gain.ports.length > 1 ? `, port ${port.cylinder}` : "";
        const cam = stated?.camLiftUm ?? null;
        const told = [port.intake, port.exhaust].filter((g): g is Told => g.state !== "absent");
        // Only what holds for both sides is said of both.
        const shared = told[0]?.conditions.filter((words) => told.every((g) => g.conditions.includes(words))) ?? [];
        return (
          <Fragment key={port.cylinder}>
            {compared.length === 0 ? null : <div className="bigg">{compared.map((g, i) => <Figure key={g.side} gain={g} locale={locale} isFirst={i === 0} />)}</div>}
            <Bay label={`Before and after${portWords}`} className="mt-7">
              <MiniCurve port={port} locale={locale} width={360} height={300} />
              <p className="hint">Thick lines: after. Thin lines: before. Solid: intake. Dashed: exhaust.{compared.length > 0 ? " The filled part is your gain." : ""}{compared.some((g) => isAssessed(g.noise)) ? " The dotted band about before is the noise of the measurement: inside it no change can be told." : ""}{compared.some((g) => historyUsed(g.noise) !== null) ? " Where a lift was read once, that noise is what this bench's repeats showed in 12 months." : ""}</p>
            </Bay>
            <section className="mt-7">
              <PortTable port={port} locale={locale} />
              {[port.intake, port.exhaust].flatMap((g) => sideNotes(g, at)).map((words) => <p key={words} className="hint mt-2">{words}</p>)}
              {cam === null || !stated ? null : <p className="hint mt-2">Your cam lifts {liftWords(cam, stated.liftUnit, locale)} {stated.liftUnit}.</p>}
              {shared.length > 0 ? <p className="hint mt-2">Tested at {shared.join(", ")}.</p> : null}
            </section>
          </Fragment>
        );
      })}
      <p className="hint mt-4">{AIRFLOW_WORDS}</p>
    </>
  );
}
