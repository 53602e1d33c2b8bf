import { fixedText, ratio } from "@/modules/kernel/fraction";

/** Unexplained minutes a day that are let pass (shop rule, settable). More is asked next morning, never deducted. */
const UNEXPLAINED_MINUTES_DEFAULT = 15;

export interface DaySummary {
  readonly doorMinutes: number;
  readonly directMinutes: number;
  readonly indirectMinutes: number;
  readonly paidBreakMinutes: number;
  /** Door less all of the above; below 0 when the bench clock ran longer than the person was in. */
  readonly unexplainedMinutes: number;
  readonly asks: "none" | "what was done" | "bench beyond door";
}

/** One person's day: door hours = bench direct + indirect + paid breaks + unexplained. Whole minutes, none negative. */
export function daySummary(p: {
  readonly doorMinutes: number;
  readonly directMinutes: number;
  readonly indirectMinutes: number;
  readonly paidBreakMinutes: number;
  readonly toleranceMinutes?: number;
}): DaySummary {
  const unexplainedMinutes = p.doorMinutes - p.directMinutes - p.indirectMinutes - p.paidBreakMinutes;
  const tolerance = p.toleranceMinutes ?? UNEXPLAINED_MINUTES_DEFAULT;
  const asks = unexplainedMinutes < 0 ? "bench beyond door" : unexplainedMinutes > tolerance ? "what was done" : "none";
  return {
    doorMinutes: p.doorMinutes,
    directMinutes: p.directMinutes,
    indirectMinutes: p.indirectMinutes,
    paidBreakMinutes: p.paidBreakMinutes,
    unexplainedMinutes,
    asks,
  };
}

/** Bench direct / door hours as percent text with two decimals, or null when nobody was in. */
export const utilisationPercent = (directMinutes: number, doorMinutes: number): string | null =>
  doorMinutes === 0 ? null : fixedText(ratio(directMinutes * 100, doorMinutes), 2);
