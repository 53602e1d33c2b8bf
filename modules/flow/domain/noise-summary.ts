import { NOISE_WORDS } from "./noise";
import type { GainNoise, NoiseRow } from "./noise-rows";

/** Lifts of a verdict as words; neighbours in the table close up: `.050 to .200, .300`. */
function liftsWords(rows: readonly NoiseRow[], verdict: NoiseRow["verdict"], lift: (um: number) => string): string {
  const runs: number[][] = [];
  rows.forEach((row, i) => {
    if (row.verdict !== verdict) return;
    if (rows[i - 1]?.verdict === verdict) runs.at(-1)?.push(row.liftUm);
    else runs.push([row.liftUm]);
  });
  return runs.map((run) => {
    const [first, last] = [run[0] ?? 0, run.at(-1) ?? 0];
    return run.length < 3 ? run.map(lift).join(", ") : `${lift(first)} to ${lift(last)}`;
  }).join(", ");
}

/** `pressure held, reading and lift`. */
export const listed = (names: readonly string[]): string => (names.length < 2 ? names.join("") : `${names.slice(0, -1).join(", ")} and ${names.at(-1) ?? ""}`);

/** True when some lift was read twice on both sides, so that there is a verdict to show. */
export const isAssessed = (noise: GainNoise | undefined): noise is GainNoise => noise?.rows.some((r) => r.verdict !== "not_assessed") === true;

/**
 * Is the change larger than the noise? In words, for a line under the table of one side. Null without a common lift.
 * @param lift lift in micrometres as words.
 */
export function noiseSummary(noise: GainNoise, lift: (um: number) => string): string | null {
  const { rows } = noise;
  if (rows.length === 0) return null;
  if (!isAssessed(noise)) return `Against the measurement noise: ${NOISE_WORDS.not_assessed}, no lift was read twice both before and after.`;
  const parts = (["larger_than_noise", "within_noise", "not_assessed"] as const).flatMap((verdict) => {
    const count = rows.filter((r) => r.verdict === verdict).length;
    if (count === 0) return [];
    return [`${NOISE_WORDS[verdict]} at ${count === rows.length ? (count === 1 ? "the one lift" : `all ${count} lifts`) : liftsWords(rows, verdict, lift)}`];
  });
  return `Change ${parts.join("; ")}.`;
}

/** What the verdict could not take into account; null when the bench states everything or nothing was judged. */
export const notStatedWords = (noise: GainNoise | undefined): string | null =>
  isAssessed(noise) && noise.notStated.length > 0 ? `Uncertainty of ${listed(noise.notStated)} is not stated for this bench and counts as nothing in the verdict.` : null;
