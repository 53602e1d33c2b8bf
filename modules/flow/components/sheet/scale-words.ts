import type { BenchScale } from "../../domain/raw-test";

/** What is typed on each kind of scale. */
export const SCALE_WORDS: Readonly<Record<BenchScale, string>> = { direct: "CFM", percent_linear: "percent of the range", orifice_head: "head on the manometer" };
/** How a bench is read, beside its name. */
export const SCALE_READ: Readonly<Record<BenchScale, string>> = { direct: "reads CFM", percent_linear: "range and percent", orifice_head: "range and head" };
/** Unit beside a field. */
export const SCALE_SIGN: Readonly<Record<BenchScale, string>> = { direct: "CFM", percent_linear: "%", orifice_head: "head" };

/** Heading of the grid: what is typed, and that the flow stands under it where the two are not the same. */
export function readingsLabel(scales: readonly BenchScale[]): string {
  const other = [...new Set(scales.filter((s) => s !== "direct"))];
  if (other.length === 0) return "Readings, CFM";
  return `Readings, ${[...(scales.includes("direct") ? ["CFM"] : []), ...other.map((s) => SCALE_WORDS[s])].join(" or ")}; CFM beside it`;
}
