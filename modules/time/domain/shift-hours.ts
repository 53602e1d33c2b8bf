import { ok, refuse, type Result } from "@/modules/kernel/result";
import { elapsedMinutes } from "./elapsed";
import { typedInstant } from "./typed-time";

/** A stretch away from work. It is paid unless the person was completely relieved of duty for 30 minutes or more. */
export interface Break {
  readonly minutes: number;
  readonly isRelievedOfDuty: boolean;
}

/**
 * Whether a break counts as work time. Rest up to about 20 minutes counts; a meal of ordinarily 30 minutes or more
 * does not, if the person did nothing else in it. Between the two it counts here, in the person's favour.
 * Source: 29 CFR 785.18, 785.19.
 */
export const isPaidBreak = (b: Break): boolean => !b.isRelievedOfDuty || b.minutes < 30;

/**
 * Paid minutes of a shift typed as wall-clock times: elapsed time, so a night with a clock change is an hour shorter
 * or longer. Refuses times as `typedInstant` does, `OUT_BEFORE_IN`, and `BREAKS_TOO_LONG`.
 * Source: US Department of Labor, hours worked (7 and 9 hours for the 23:00 to 07:30 shift with a 30 minute meal).
 */
export function shiftMinutes(p: {
  readonly start: string;
  readonly end: string;
  readonly zone: string;
  readonly breaks: readonly Break[];
}): Result<number> {
  const from = typedInstant(p.start, p.zone);
  if (!from.ok) return from;
  const to = typedInstant(p.end, p.zone);
  if (!to.ok) return to;
  const all = elapsedMinutes(from.value, to.value);
  if (all < 0) return refuse("OUT_BEFORE_IN", "The end lies before the start. Type an end after it.", { field: "end" });
  const unpaid = p.breaks.filter((b) => !isPaidBreak(b)).reduce((sum, b) => sum + b.minutes, 0);
  return unpaid > all
    ? refuse("BREAKS_TOO_LONG", "The breaks are longer than the shift.", { field: "breaks" })
    : ok(all - unpaid);
}
