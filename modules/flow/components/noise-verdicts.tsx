import { decimal } from "@/modules/kernel/format";
import type { LiftUnit } from "../domain/lift-ladder";
import { historyWords, NOISE_WORDS, type BenchHistory } from "../domain/noise";
import type { GainNoise, NoiseRow } from "../domain/noise-rows";
import { historyUsed, isAssessed, listed, noHistoryWords, noiseSummary, notStatedWords } from "../domain/noise-summary";
import type { SideGain } from "../domain/side-gain";
import type { Units } from "../domain/curve-measure";
import { liftWords } from "./flow-words";
import { unitWords } from "./unit-words";
import { Lane } from "@/modules/ui/lane";

/** Filled: larger than the noise; open: within it; dotted: not assessed. */
export const NOISE_MARK: Readonly<Record<NoiseRow["verdict"], string>> = { larger_than_noise: "●", within_noise: "○", not_assessed: "◌" };
/** The same as diamonds where the bench's history was asked instead of repeats. */
const HISTORY_MARK: Readonly<Record<NoiseRow["verdict"], string>> = { ...NOISE_MARK, larger_than_noise: "◆", within_noise: "◇" };
const markOf = (row: NoiseRow): string => (row.byHistory ? HISTORY_MARK : NOISE_MARK)[row.verdict];

export interface NoisePort { noise: readonly NoiseRow[] | null; history?: BenchHistory | undefined; withheld: readonly string[]; notStated: readonly string[]; liftUnit: LiftUnit }

/** Is the change larger than the noise, lift by lift, in words and shape. Without repeats, its own or enough of the bench's, it is not assessed. */
export function NoiseVerdicts({ port, locale, units = "read" }: { port: NoisePort; locale: string; units?: Units }) {
  const w = unitWords(units, port.liftUnit, locale);
  if (port.noise === null) return <p className="mid">No change is judged: {port.withheld.join(" ") || "the two tests cannot be compared."}</p>;
  const used = historyUsed({ rows: port.noise, notStated: port.notStated, ...(port.history ? { history: port.history } : {}) });
  const noHistory = port.noise.some((r) => r.verdict === "not_assessed") ? noHistoryWords(port.history) : "";
  return (
    <>
      <Lane label="The change against the noise"><table className="calm">
        <caption className="sr-only">The change at each lift against the measurement noise</caption>
        <thead><tr><th scope="col">Lift, {w.liftUnit}</th><th scope="col" className="r">Change, {w.flowUnit}</th><th scope="col" className="r">U, 95 %</th><th scope="col" className="r">Readings</th><th scope="col">Verdict</th></tr></thead>
        <tbody>{port.noise.map((r) => (
          <tr key={r.liftUm}><th scope="row">{w.lift(r.liftUm)}</th><td className="r q"><b>{w.difference(r.differenceCfm)}</b></td><td className="r q">{r.expandedCfm === null ? "—" : `±${w.flow(r.expandedCfm)}`}</td><td className="r q">{r.before}, {r.after}</td><td><span aria-hidden="true">{markOf(r)}</span> {r.words}</td></tr>
        ))}</tbody>
      </table></Lane>
      {used === null ? null : <p className="hint px-3 pt-3">Where a lift was read once its noise is taken {historyWords(used)}: pooled standard deviation {decimal(used.pooledCfm * w.perCfm, 2, locale)} {w.flowUnit} at this test pressure.</p>}
      {noHistory === "" ? null : <p className="hint px-3 pt-3">Not assessed: no reading twice in both tests{noHistory}.</p>}
      {port.notStated.length > 0 ? <p className="hint p-3">Uncertainty of {listed(port.notStated)} is not stated for this bench and counts as nothing here.</p> : null}
    </>
  );
}

/** One line for a side whose tests may be compared; null for any other. */
export const noiseWords = (gain: SideGain | null, locale: string): string | null =>
  gain?.comparable && gain.noise ? [noiseSummary(gain.noise, (um) => liftWords(um, gain.liftUnit, locale)), notStatedWords(gain.noise)].filter(Boolean).join(" ") || null : null;

/** The verdict beside a gain: shape for the eye, words for the ear. Nothing where no lift of the side was judged. */
export function NoiseMark({ gain, liftUm }: { gain: SideGain | null; liftUm: number }) {
  if (!gain?.comparable || !isAssessed(gain.noise)) return null;
  const row = gain.noise.rows.find((r) => r.liftUm === liftUm);
  if (!row) return null;
  return <span className="nv" title={row.words}><span aria-hidden="true">{markOf(row)}</span><span className="sr-only">{row.words}, </span></span>;
}

/** What the dotted band on two tests over each other is; null where no lift was judged, and so none is drawn. */
export function bandHint(noise: GainNoise | null, first: string, second: string): string | null {
  if (!isAssessed(noise ?? undefined)) return null;
  const used = historyUsed(noise ?? undefined);
  return `The dotted band about ${first} is the measurement noise (95 %)${used ? `, ${historyWords(used)} where a lift was read once` : ""}: where ${second} stays inside it, no difference can be told.`;
}

const SIDE_WORDS = { intake: "Intake", exhaust: "Exhaust" } as const;

/** The line under a sheet or a curve: what the marks and the band mean, and the verdict of each side in words. */
export function NoiseLines({ gains, locale }: { gains: readonly (SideGain | null)[]; locale: string }) {
  const told = gains.flatMap((gain) => { const words = noiseWords(gain, locale); return gain && words ? [{ side: gain.side, words, hasMarks: gain.comparable && isAssessed(gain.noise), hasHistory: gain.comparable && historyUsed(gain.noise) !== null }] : []; });
  if (told.length === 0) return null;
  const words = new Set(told.map((t) => t.words));
  const hasHistory = told.some((t) => t.hasHistory);
  return (
    <div className="nvl">
      {words.size === 1 && told.length > 1 ? <p>{told[0]?.words}</p> : told.map((t) => <p key={t.side}><b>{SIDE_WORDS[t.side]}.</b> {t.words}</p>)}
      {told.some((t) => t.hasMarks) ? <p className="dim">{NOISE_MARK.larger_than_noise} {NOISE_WORDS.larger_than_noise}. {NOISE_MARK.within_noise} {NOISE_WORDS.within_noise}. {NOISE_MARK.not_assessed} {NOISE_WORDS.not_assessed}.{hasHistory ? ` ${HISTORY_MARK.larger_than_noise} and ${HISTORY_MARK.within_noise} the same, by bench history where a lift was read once.` : ""} The dotted band on the curve is the noise about the before test.</p> : null}
    </div>
  );
}
