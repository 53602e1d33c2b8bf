import { flagWords } from "../../domain/flag-words";
import type { FlowFlag, LiftFlag } from "../../domain/flow-flags";
import { SANITY_LIMITS, shownLimit, type SanityLimits } from "../../domain/sanity-limits";
import type { ComputedCell, TestFigures } from "../../domain/test-figures";
import { typingDoubt } from "../../domain/typing-doubt";
import type { Stuck } from "./reading-queue";

/** Short words that stand in the cell itself, beside a triangle; the most pressing first, because a cell shows one. */
const SHORT: Partial<Record<FlowFlag | LiftFlag, string>> = {
  CD_ABOVE_ONE: "impossible", ABOVE_IDEAL_PORT_LIMIT: "over section", FLOW_AT_ZERO_LIFT: "flows when shut", OUTLIER: "off the line", GAIN_UNUSUAL: "gain unusual", FLOW_FALLS_WITH_LIFT: "flow falls", PRESSURE_OFF_NOMINAL: "pressure off",
  LEAK_HIGH: "leak high", CD_UNUSUAL: "unusual Cd", READING_HIGH_IN_RANGE: "top of scale", READING_LOW_IN_RANGE: "low on scale", PRESSURE_RATIO_LARGE: "far converted", CONVERTED_PRESSURE: "converted", LEAK_SCALED: "leak scaled",
};
const PRESSING = Object.keys(SHORT);
const shortOf = (flag: FlowFlag | LiftFlag, limits: SanityLimits = SANITY_LIMITS): string => (flag === "GAIN_UNUSUAL" ? `gain over ${shownLimit("gainShare", limits.gainShare)} %` : (SHORT[flag] ?? ""));
const STUCK_SHORT: Record<Stuck["kind"], string> = { asked: "sure?", refused: "look again", conflict: "changed" };

export interface CellDoubt {
  readonly short: string;
  readonly words: string;
  /** It does not stand as it is: no number, or asked. */
  readonly isWrong: boolean;
  /** A check it failed and may be kept over, with a reason. */
  readonly isCheck: boolean;
}
const doubt = (short: string, words: string, more: Partial<CellDoubt> = {}): CellDoubt => ({ short, words, isWrong: false, isCheck: false, ...more });

/**
 * What is doubtful about one cell, the most pressing first.
 * @param text what stands in it now. @param isTyping it is being typed: only what no further key can mend is said.
 */
export function cellDoubts({ cell, figures, stuck, liftUm, text, isTyping }: { cell: ComputedCell | null; figures: TestFigures; stuck: Stuck | null; liftUm: number; text: string; isTyping: boolean }): CellDoubt[] {
  const found: CellDoubt[] = [];
  const typed = stuck === null ? typingDoubt(text, cell) : null;
  if (stuck) found.push(doubt(STUCK_SHORT[stuck.kind], stuck.message, { isWrong: stuck.kind !== "conflict" }));
  else if (typed) found.push(doubt(STUCK_SHORT[typed.kind], typed.words, { isWrong: true }));
  else if (cell?.refusal && !isTyping && cell.question === null) found.push(doubt("no figure", cell.refusal.message));
  if (stuck === null && cell?.excludedReason) found.push(doubt("left out", `Left out: ${cell.excludedReason}`));
  else if (stuck === null && cell?.acceptedReason) found.push(doubt("kept", `Kept with a reason: ${cell.acceptedReason}`));
  const here = figures.doubts.filter((d) => d.liftUm === liftUm || (d.flag === "FLOW_AT_ZERO_LIFT" && liftUm === 0)).map((d) => d.flag);
  const flags = [...new Set([...(cell?.flags ?? []), ...here])].filter((f) => SHORT[f] !== undefined).sort((a, b) => PRESSING.indexOf(a) - PRESSING.indexOf(b));
  return [...found, ...flags.map((f) => doubt(shortOf(f, figures.limits), flagWords(f, figures.limits), { isCheck: true }))];
}
