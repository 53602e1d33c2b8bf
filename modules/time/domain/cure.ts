import { minuteOf } from "./elapsed";

/** Instant at which resin is through: mixed at + cure time of its data sheet. Elapsed time; clocks do not matter. */
export const cureReadyAt = (mixedAt: Date, cureMinutes: number): Date => new Date(mixedAt.getTime() + cureMinutes * 60_000);

/** Whole minutes still to wait; 0 when the cure is over. */
export const cureMinutesLeft = (readyAt: Date, now: Date): number =>
  now.getTime() >= readyAt.getTime() ? 0 : Math.max(1, minuteOf(readyAt) - minuteOf(now));
