import type { BenchScale, ValueUnit } from "../../domain/raw-test";

/** What is typed on each kind of scale. */
export const SCALE_WORDS: Readonly<Record<BenchScale, string>> = { direct: "CFM", percent_linear: "percent of the range", orifice_head: "head on the manometer" };
/** How a bench is read, beside its name. */
export const SCALE_READ: Readonly<Record<BenchScale, string>> = { direct: "reads CFM", percent_linear: "range and percent", orifice_head: "range and head" };
/** Unit beside a field. */
export const SCALE_SIGN: Readonly<Record<BenchScale, string>> = { direct: "CFM", percent_linear: "%", orifice_head: "head" };

/** Unit of a reading, beside it. */
export const VALUE_SIGN: Readonly<Record<ValueUnit, string>> = { cfm: "CFM", "L/s": "L/s", "m3/h": "m³/h", percent: "%", head: "head" };

/** Heading of the grid, short enough for a telephone: what is typed, and CFM, which stands under it where the two are not the same. */
export function readingsLabel(scales: readonly BenchScale[]): string {
  const typed = [...new Set(scales.filter((s) => s !== "direct").map((s) => SCALE_SIGN[s]))];
  return typed.length === 0 ? "Readings, CFM" : `Readings, ${typed.join(", ")} and CFM`;
}
