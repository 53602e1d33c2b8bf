import { localMinute } from "@/modules/kernel/instant";
import { elapsedMinutes, minuteOf } from "./elapsed";

/** Steps a shop may round pay time to. 1 = exact minutes, the default. Never used on the bench clock. */
export const ROUNDING_STEPS = [1, 5, 6, 15] as const;
export type RoundingStep = (typeof ROUNDING_STEPS)[number];

/**
 * Nearest step of whole minutes; an exact tie goes up. The same rule for in and out.
 * Source: 29 CFR 785.48(b) (5 minutes, tenth or quarter of an hour); the tie rule is ours. State law may restrict it.
 */
const roundMinutes = (minutes: number, step: RoundingStep): number =>
  Math.floor((2 * minutes + step) / (2 * step)) * step;

/** A punch rounded on the wall clock of its zone. 23:58 at 5 minutes is 00:00 of the next day. */
export function roundPunch(instant: Date, step: RoundingStep, zone: string): Date {
  const local = localMinute(instant, zone);
  const minuteOfDay = Number(local.slice(11, 13)) * 60 + Number(local.slice(14, 16));
  return new Date((minuteOf(instant) + roundMinutes(minuteOfDay, step) - minuteOfDay) * 60_000);
}

export interface Neutrality {
  readonly exactMinutes: number;
  readonly roundedMinutes: number;
  /** Rounded less exact: below 0 the person was paid too little over the period. */
  readonly differenceMinutes: number;
}

/** What rounding did to one person over a period; printed each period, because it may not underpay over time. */
export function roundingNeutrality(
  shifts: readonly { readonly in: Date; readonly out: Date }[],
  step: RoundingStep,
  zone: string,
): Neutrality {
  const exactMinutes = shifts.reduce((sum, s) => sum + elapsedMinutes(s.in, s.out), 0);
  const roundedMinutes = shifts.reduce(
    (sum, s) => sum + elapsedMinutes(roundPunch(s.in, step, zone), roundPunch(s.out, step, zone)),
    0,
  );
  return { exactMinutes, roundedMinutes, differenceMinutes: roundedMinutes - exactMinutes };
}
