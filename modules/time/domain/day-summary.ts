/** Unexplained minutes a day that are let pass (shop rule, settable). More is asked next morning, never deducted. */
export const UNEXPLAINED_MINUTES_DEFAULT = 15;

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

/** Percent with two decimals, or null when there is nothing to divide by. */
const percent = (part: number, whole: number): number | null =>
  whole === 0 ? null : Math.round((part * 10_000) / whole) / 100;

/** Bench direct / door hours. */
export const utilisationPercent = (directMinutes: number, doorMinutes: number): number | null => percent(directMinutes, doorMinutes);
/** Book hours earned / bench direct hours. Rework adds minutes and earns no book hours. */
export const efficiencyPercent = (bookMinutes: number, directMinutes: number): number | null => percent(bookMinutes, directMinutes);
/** Book hours earned / door hours = efficiency * utilisation. */
export const productivityPercent = (bookMinutes: number, doorMinutes: number): number | null => percent(bookMinutes, doorMinutes);
