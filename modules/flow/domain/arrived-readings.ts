import type { RawTest } from "./raw-test";

type Cells = Pick<RawTest, "id" | "cells">;

/** How many cells hold a reading that was not there before: new ones, and ones written over. Cleared cells do not count. */
export function arrivedReadings(before: readonly Cells[], after: readonly Cells[]): number {
  const seen = new Map(before.flatMap((t) => t.cells.map((c) => [`${t.id}/${c.liftUm}/${c.repeatNo}`, c.revision] as const)));
  return after.reduce((n, t) => n + t.cells.filter((c) => c.valueText !== "" && c.revision > (seen.get(`${t.id}/${c.liftUm}/${c.repeatNo}`) ?? 0)).length, 0);
}

/** Said when the bench was asked. */
export const arrivedWords = (n: number): string => (n === 0 ? "Nothing new from the bench." : `${n} reading${n === 1 ? "" : "s"} came from the bench.`);
