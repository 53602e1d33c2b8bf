/** Each element with the one after it: `[1,2,3]` -> `[[1,2],[2,3]]`. */
export const neighbours = <T>(list: readonly T[]): readonly (readonly [T, T])[] =>
  list.slice(1).map((next, i) => [list[i] as T, next] as const);

/** Two lists of one length, element by element; null when the lengths differ. */
export const paired = <A, B>(a: readonly A[], b: readonly B[]): readonly (readonly [A, B])[] | null =>
  a.length === b.length ? a.map((x, i) => [x, b[i] as B] as const) : null;

/** True when every number is greater than the one before it. */
export const isIncreasing = (list: readonly number[]): boolean => neighbours(list).every(([a, b]) => b > a);
