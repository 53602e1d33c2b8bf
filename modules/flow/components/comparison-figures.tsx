import { decimal } from "@/modules/kernel/format";
import { Lane } from "@/modules/ui/lane";
import type { ComparisonMeans } from "../domain/comparison-means";
import { noiseSummary } from "../domain/noise-summary";
import type { ComparableGain, SideGain } from "../domain/side-gain";
import { camWords, crossoverWords, lossWords, meanRows, noCamWords } from "./comparison-words";
import { withheldWords } from "./gain-words";
import type { UnitWords } from "./unit-words";

const SIDE_WORDS = { intake: "Intake", exhaust: "Exhaust" } as const;

/** Means and cam lift of two tests as a table: before, after, the difference with its sign, and percent. */
export function MeansTable({ gain, means, w, caption, heads = ["Before", "After", "Gain"] }: { gain: Parameters<typeof meanRows>[0]; means: ComparisonMeans | undefined; w: UnitWords; caption: string; heads?: readonly [string, string, string] }) {
  return (
    <Lane label={caption}><table className="calm">
      <caption className="sr-only">{caption}</caption>
      <thead><tr><th scope="col">{w.flowUnit}</th>{heads.map((h) => <th key={h} scope="col" className="r">{h}</th>)}<th scope="col" className="r">%</th></tr></thead>
      <tbody>{meanRows(gain, means, w).map((r) => (
        <tr key={r.name}><th scope="row" className="wr">{r.name}</th><td className="r q">{r.before}</td><td className="r q">{r.after}</td><td className="r q nw"><b>{r.isLoss ? "▼ " : ""}{r.gain}</b>{r.isLoss ? <span className="sr-only"> a loss</span> : null}</td><td className="r q nw">{r.percent}</td></tr>
      ))}</tbody>
    </table></Lane>
  );
}

/** What before and after come to, beside what they do not tell: losses and crossovers as plainly as gains, and the noise. */
export function comparisonSentences(gain: Pick<ComparableGain, "losses" | "crossovers" | "noise" | "notes" | "atCamLift" | "camLiftUm">, means: ComparisonMeans | undefined, w: UnitWords, locale: string): string[] {
  return [
    gain.atCamLift === "not_tested" ? "Not read up to cam lift." : gain.atCamLift === "not_given" ? "No cam lift is recorded." : null,
    camWords(means, (v) => decimal(v, 0, locale)), noCamWords(means),
    lossWords(gain, w) ?? "No lift read lower after than before.", crossoverWords(gain, w) ?? "Before and after do not cross.",
    gain.noise ? noiseSummary(gain.noise, w.lift) : null, ...gain.notes.map((n) => n.words),
  ].filter((words) => words !== null);
}

/** One side of a port: the table of means and what stands beside it, or why nothing is compared. */
export function ComparisonFigures({ gain, means, w, locale }: { gain: SideGain; means: ComparisonMeans | null; w: UnitWords; locale: string }) {
  const name = SIDE_WORDS[gain.side];
  if (!gain.comparable) return <section aria-label={name} className="p-3"><h3>{name}</h3><p className="mid">{withheldWords(gain)}</p></section>;
  return (
    <section aria-label={name}>
      <h3 className="px-3 pt-3">{name}</h3>
      <MeansTable gain={gain} means={means ?? undefined} w={w} caption={`${name}: means before and after`} />
      <p className="hint p-3">{comparisonSentences(gain, means ?? undefined, w, locale).join(" ")}</p>
    </section>
  );
}
