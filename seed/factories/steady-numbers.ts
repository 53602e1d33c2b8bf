/** Numbers from 0 to 1 that are the same on every machine and in every run: a small linear congruence, not chance. */
export function steadyNumbers(seed: number): () => number {
  let state = seed >>> 0;
  return () => (state = (Math.imul(state, 1_664_525) + 1_013_904_223) >>> 0) / 2 ** 32;
}
