import { LIFTS_MAX } from "./lift-ladder";
import { isIncreasing } from "./neighbours";

/** Flow above this at one port is a slip of the keys, cfm. Common practice, no source. */
export const FLOW_CFM_MAX = 2000;
/** A step to the next lift above this is asked. Common practice, no source. */
export const JUMP_SHARE_MAX = 0.6;
/** Flow grows at most about as the lift does; so much more than that is asked even at low lift. Our choice. */
const ABOVE_LIFT_SHARE = 0.25;

export type QuestionCode = "FLOW_NEGATIVE" | "FLOW_OVER_2000" | "JUMP_LARGE" | "LIFTS_NOT_ASCENDING" | "MANY_LIFTS";

/** Something doubtful that is asked before it is kept; with a reason it is kept, and the reason with it. */
export interface EntryQuestion {
  readonly code: QuestionCode;
  readonly words: string;
}

/** Refusals no reason can mend: it is no number, or the scale cannot show it, or its air cannot be read. */
const NEVER_KEPT = new Set(["NUMBER_NOT_FINITE", "PRESSURE_NOT_POSITIVE", "LIFT_NOT_READABLE", "TEMPERATURE_PAIR", "UNIT_KIND_MISMATCH", "DENSITY_REQUIRED", "READING_OUT_OF_RANGE"]);
/** May a reading that gives no figure be kept as it was read, with a reason? */
export const mayBeKept = (refusalCode: string): boolean => !NEVER_KEPT.has(refusalCode);

interface At {
  readonly liftUm: number;
  readonly flowCfm: number;
}

/**
 * Does the step between two neighbours need a second look? Up by more than 60 % and by more than the lift itself explains
 * (from .050 to .100 flow about doubles), or down by more than 60 %.
 */
export function jumps(lower: At, upper: At): boolean {
  if (lower.flowCfm <= 0 || upper.flowCfm <= 0) return false;
  const ratio = upper.flowCfm / lower.flowCfm;
  const byLift = lower.liftUm > 0 ? (upper.liftUm / lower.liftUm) * (1 + ABOVE_LIFT_SHARE) : Infinity;
  return ratio > Math.max(1 + JUMP_SHARE_MAX, byLift) || ratio < 1 - JUMP_SHARE_MAX;
}

/** What is asked about one reading. @param others flows at other lifts of the same test, any order. */
export function readingQuestion(reading: At, others: readonly At[]): EntryQuestion | null {
  const { liftUm, flowCfm } = reading;
  if (flowCfm < 0) return { code: "FLOW_NEGATIVE", words: "Flow below zero. Check the sign and the connections, or keep it with a reason." };
  if (flowCfm > FLOW_CFM_MAX) return { code: "FLOW_OVER_2000", words: `More than ${FLOW_CFM_MAX} CFM. Check the digits, or keep it with a reason.` };
  const sorted = [...others].filter((o) => o.liftUm !== liftUm).sort((a, b) => a.liftUm - b.liftUm);
  const below = sorted.filter((o) => o.liftUm < liftUm).at(-1);
  const above = sorted.find((o) => o.liftUm > liftUm);
  const doubtful = (below !== undefined && jumps(below, reading)) || (above !== undefined && jumps(reading, above));
  return doubtful ? { code: "JUMP_LARGE", words: "More than 60 % from its neighbour. Check the digits, or keep it with a reason." } : null;
}

/** What is asked about the list of lifts of a test, micrometres in the order given. */
export function liftsQuestion(liftsUm: readonly number[]): EntryQuestion | null {
  if (liftsUm.length > LIFTS_MAX) return { code: "MANY_LIFTS", words: `${liftsUm.length} lifts; a sheet holds ${LIFTS_MAX}. Take a larger step, or keep them with a reason.` };
  if (!isIncreasing(liftsUm)) return { code: "LIFTS_NOT_ASCENDING", words: "Each lift should be higher than the one before. Check the list, or keep it with a reason." };
  return null;
}
