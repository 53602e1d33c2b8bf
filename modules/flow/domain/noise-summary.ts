import { HISTORY_PAIRS_MIN, historyWords, isHistoryUsable, NOISE_WORDS, type BenchHistory } from "./noise";
import type { GainNoise, NoiseRow } from "./noise-rows";

/** Lifts of the rows that are meant, as words; neighbours in the table close up: `.050 to .200, .300`. */
function liftsWords(rows: readonly NoiseRow[], isMeant: (row: NoiseRow) => boolean, lift: (um: number) => string): string {
  const runs: number[][] = [];
  rows.forEach((row, i) => {
    if (!isMeant(row)) return;
    const last = rows[i - 1];
    if (last && isMeant(last)) runs.at(-1)?.push(row.liftUm);
    else runs.push([row.liftUm]);
  });
  return runs.map((run) => {
    const [first, last] = [run[0] ?? 0, run.at(-1) ?? 0];
    return run.length < 3 ? run.map(lift).join(", ") : `${lift(first)} to ${lift(last)}`;
  }).join(", ");
}

/** `pressure held, reading and lift`. */
export const listed = (names: readonly string[]): string => (names.length < 2 ? names.join("") : `${names.slice(0, -1).join(", ")} and ${names.at(-1) ?? ""}`);

/** True when some lift was judged, so that there is a verdict to show. */
export const isAssessed = (noise: GainNoise | undefined): noise is GainNoise => noise?.rows.some((r) => r.verdict !== "not_assessed") === true;

/** The history some verdict rests on; null where every judged lift has repeats of its own. */
export const historyUsed = (noise: GainNoise | undefined): BenchHistory | null => (noise?.rows.some((r) => r.byHistory) ? (noise.history ?? null) : null);

/** Why the bench's history does not stand in, to go on a sentence; empty where it does or was not asked for. */
export function noHistoryWords(history: BenchHistory | undefined): string {
  if (history === undefined || isHistoryUsable(history)) return "";
  if (history.pairs >= HISTORY_PAIRS_MIN) return ", and the repeats of this bench in 12 months never differed, so its history says nothing of the noise";
  return `, and this bench has ${history.pairs} of the ${HISTORY_PAIRS_MIN} repeat pairs in 12 months that could stand in`;
}

/**
 * Is the change larger than the noise? In words, for a line under the table of one side. Null without a common lift.
 * Lifts judged by the bench's history come last, named as such, apart from those with repeats of their own.
 * @param lift lift in micrometres as words.
 */
export function noiseSummary(noise: GainNoise, lift: (um: number) => string): string | null {
  const { rows, history } = noise;
  if (rows.length === 0) return null;
  if (!isAssessed(noise)) return `Against the measurement noise: ${NOISE_WORDS.not_assessed}, no lift was read twice both before and after${noHistoryWords(history)}.`;
  const told = (byHistory: boolean) => (["larger_than_noise", "within_noise", "not_assessed"] as const).flatMap((verdict) => {
    const isMeant = (r: NoiseRow) => r.verdict === verdict && (r.byHistory ?? false) === byHistory;
    const count = rows.filter(isMeant).length;
    if (count === 0) return [];
    return [`${NOISE_WORDS[verdict]} at ${count === rows.length ? (count === 1 ? "the one lift" : `all ${count} lifts`) : liftsWords(rows, isMeant, lift)}`];
  }).join("; ");
  const [own, used] = [told(false), historyUsed(noise)];
  const lent = used ? `${historyWords(used)}: ${told(true)}` : "";
  return own === "" ? `Change, ${lent}.` : `Change ${[own, lent].filter(Boolean).join("; ")}.`;
}

/** What the verdict could not take into account; null when the bench states everything or nothing was judged. */
export const notStatedWords = (noise: GainNoise | undefined): string | null =>
  isAssessed(noise) && noise.notStated.length > 0 ? `Uncertainty of ${listed(noise.notStated)} is not stated for this bench and counts as nothing in the verdict.` : null;
