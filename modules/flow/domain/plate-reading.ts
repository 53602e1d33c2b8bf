import { ok, refuse, type Result } from "@/modules/kernel/result";
import type { BenchRange, BenchScale } from "./raw-test";
import { flowFromDirect, flowFromOrificeHead, flowFromRangePercent } from "./reading-to-flow";
import { typedNumber } from "./typed-number";

/**
 * Flow of a check plate as the bench shows it before any factor, cfm: typed on the bench's own scale under a range, or as
 * flow where no range is named. Errors: NUMBER_NOT_FINITE, READING_OUT_OF_RANGE with the field `indicated` or `range`.
 */
export function plateFlowCfm(bench: { readonly scale: BenchScale; readonly ranges: readonly BenchRange[] }, typed: { readonly indicated: string; readonly range: string }): Result<number> {
  const value = typedNumber(typed.indicated, "indicated");
  if (!value.ok) return value;
  const outside = (words: string) => refuse("READING_OUT_OF_RANGE", words, { field: "indicated" });
  if (value.value <= 0) return outside("A number above zero, such as 28 or 27,9.");
  if (bench.scale === "direct" || typed.range === "") {
    const direct = flowFromDirect({ valueCfm: value.value });
    return direct.ok ? ok(direct.value.flowCfm) : direct;
  }
  const range = bench.ranges.find((r) => r.label === typed.range);
  if (!range) return refuse("READING_OUT_OF_RANGE", `This bench has no range ${typed.range}. Choose one of its own.`, { field: "range" });
  if (bench.scale === "percent_linear") {
    const made = flowFromRangePercent({ rangeCfm: range.fullScaleCfm, percent: value.value });
    return made.ok ? ok(made.value.flowCfm) : outside("A percent above 0 and up to 100 of the range.");
  }
  if (range.fullScaleHead === undefined) return refuse("READING_OUT_OF_RANGE", "This range has no head at full scale. Choose another, or complete the bench's ranges.", { field: "range" });
  const made = flowFromOrificeHead({ rangeCfm: range.fullScaleCfm, head: value.value, fullScaleHead: range.fullScaleHead });
  return made.ok ? ok(made.value.flowCfm) : outside(`A head above 0 and up to ${range.fullScaleHead}, the end of this range.`);
}
