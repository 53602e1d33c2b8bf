import { FLOW_FLAGS, LIFT_FLAGS, type FlowFlag, type LiftFlag } from "../../domain/flow-flags";
import type { ComputedCell, TestFigures } from "../../domain/test-figures";
import type { Stuck } from "./reading-queue";

/** Short words that stand in the cell itself, beside a triangle. */
const SHORT: Partial<Record<FlowFlag | LiftFlag, string>> = {
  READING_LOW_IN_RANGE: "low on scale", READING_HIGH_IN_RANGE: "top of scale", CONVERTED_PRESSURE: "converted", PRESSURE_OFF_NOMINAL: "pressure off", PRESSURE_RATIO_LARGE: "far converted",
  LEAK_HIGH: "leak high", LEAK_SCALED: "leak scaled", FLOW_FALLS_WITH_LIFT: "flow falls", OUTLIER: "off the line", FLOW_AT_ZERO_LIFT: "flows shut",
};
const STUCK_SHORT: Record<Stuck["kind"], string> = { asked: "sure?", refused: "look again", conflict: "changed" };

export interface CellDoubt { readonly short: string; readonly words: string }

/** What is doubtful about one cell, the most pressing first. */
export function cellDoubts(cell: ComputedCell | null, figures: TestFigures, stuck: Stuck | null, liftUm: number): CellDoubt[] {
  const found: CellDoubt[] = [];
  if (stuck) found.push({ short: STUCK_SHORT[stuck.kind], words: stuck.message });
  if (stuck === null && cell?.excludedReason) found.push({ short: "left out", words: `Left out: ${cell.excludedReason}` });
  else if (stuck === null && cell?.acceptedReason) found.push({ short: "kept", words: `Kept with a reason: ${cell.acceptedReason}` });
  for (const flag of cell?.flags ?? []) if (SHORT[flag]) found.push({ short: SHORT[flag] ?? "", words: FLOW_FLAGS[flag] });
  for (const d of figures.doubts) {
    const isHere = d.liftUm === liftUm || (d.flag === "FLOW_AT_ZERO_LIFT" && liftUm === 0);
    if (isHere && SHORT[d.flag]) found.push({ short: SHORT[d.flag] ?? "", words: d.flag in LIFT_FLAGS ? LIFT_FLAGS[d.flag as LiftFlag] : FLOW_FLAGS[d.flag as FlowFlag] });
  }
  return found;
}
