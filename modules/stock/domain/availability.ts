import { milli, type Milli } from "@/modules/kernel/quantity";

/** Quantities of one part, all in thousandths of its stock unit, none negative. */
export interface Holdings {
  readonly onHandMilli: Milli;
  readonly reservedMilli: Milli;
  readonly expiredMilli: Milli;
  readonly blockedMilli: Milli;
}

/** Available = on hand - reserved - expired - blocked. Negative when more is promised than is there. */
export const availableMilli = (h: Holdings): Milli =>
  milli(h.onHandMilli - h.reservedMilli - h.expiredMilli - h.blockedMilli);

/** A wish for parts by one work order. `promise` is the promised date `YYYY-MM-DD`; null comes last. */
export interface ReservationWish {
  readonly workOrderId: string;
  readonly promise: string | null;
  readonly needMilli: Milli;
}

export interface ReservationShare {
  readonly workOrderId: string;
  readonly reservedMilli: Milli;
  readonly shortMilli: Milli;
}

/**
 * Shares what can be used among the work orders that need it: the earlier promise first, then the earlier row.
 * The answer keeps the order of the wishes.
 */
export function shareReservations(usableMilli: Milli, wishes: readonly ReservationWish[]): ReservationShare[] {
  const LAST = "9999-12-31";
  const byPromise = wishes.map((w, i) => ({ w, i })).sort((a, b) => (a.w.promise ?? LAST).localeCompare(b.w.promise ?? LAST) || a.i - b.i);
  let left: number = Math.max(0, usableMilli);
  const shares = new Map<number, number>();
  for (const { w, i } of byPromise) {
    const got = Math.min(left, w.needMilli);
    shares.set(i, got);
    left -= got;
  }
  return wishes.map((w, i) => {
    const got = shares.get(i) ?? 0;
    return { workOrderId: w.workOrderId, reservedMilli: milli(got), shortMilli: milli(w.needMilli - got) };
  });
}
