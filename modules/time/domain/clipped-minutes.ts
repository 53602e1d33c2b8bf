import { elapsedMinutes } from "./elapsed";

export interface Span { readonly startedAt: Date; readonly endedAt: Date | null }

/** Whole minutes of spans inside [from, to). An open span counts up to `to`, which a caller sets no later than now. */
export const minutesWithin = (spans: readonly Span[], from: Date, to: Date): number =>
  spans.reduce((sum, s) => {
    const start = s.startedAt > from ? s.startedAt : from;
    const end = s.endedAt !== null && s.endedAt < to ? s.endedAt : to;
    return end > start ? sum + elapsedMinutes(start, end) : sum;
  }, 0);
