import { milli } from "@/modules/kernel/quantity";
import { shareReservations } from "./availability";

/** What a work order still needs of one part, and how much of it was bought for that very order and came in. */
export interface TiedWish {
  readonly id: string;
  /** Promised date `YYYY-MM-DD`; null comes last. */
  readonly promise: string | null;
  readonly needMilli: number;
  readonly tiedMilli: number;
}

/**
 * Goods bought for an order are that order's first; what is left goes to the earlier promise, then the earlier row.
 * Returns thousandths per wish, in the order of the wishes; the sum never exceeds `usableMilli`.
 */
export function shareWithTies(usableMilli: number, wishes: readonly TiedWish[]): number[] {
  const first = shareReservations(milli(usableMilli), wishes.map((w) => ({ workOrderId: w.id, promise: w.promise, needMilli: milli(Math.min(w.needMilli, w.tiedMilli)) })));
  const given = first.map((s) => s.reservedMilli as number);
  const left = usableMilli - given.reduce((a, b) => a + b, 0);
  const rest = shareReservations(milli(left), wishes.map((w, i) => ({ workOrderId: w.id, promise: w.promise, needMilli: milli(w.needMilli - (given[i] ?? 0)) })));
  return wishes.map((_, i) => (given[i] ?? 0) + (rest[i]?.reservedMilli ?? 0));
}
