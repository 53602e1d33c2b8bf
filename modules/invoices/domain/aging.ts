import { daysBetween } from "@/modules/kernel/instant";
import { minor, sumMinor, type Minor } from "@/modules/kernel/money";

export const AGING_BUCKETS = ["not due", "1-30", "31-60", "61-90", "over 90"] as const;
export type AgingBucket = (typeof AGING_BUCKETS)[number];

/** Bucket of days past due; the due day itself is not late. Source: common practice, no source. */
export function bucketOf(due: string, asOf: string): AgingBucket {
  const late = daysBetween(due, asOf);
  if (late <= 0) return "not due";
  if (late <= 30) return "1-30";
  if (late <= 60) return "31-60";
  return late <= 90 ? "61-90" : "over 90";
}

export interface OpenItem {
  readonly due: string;
  readonly openMinor: Minor;
}

export interface Aging {
  readonly buckets: Readonly<Record<AgingBucket, Minor>>;
  readonly totalMinor: Minor;
}

/** Open items by days past due on `asOf` (`YYYY-MM-DD`). Money not yet applied to a document is no open item. */
export function agingOf(items: readonly OpenItem[], asOf: string): Aging {
  const buckets: Record<AgingBucket, Minor> = { "not due": minor(0), "1-30": minor(0), "31-60": minor(0), "61-90": minor(0), "over 90": minor(0) };
  for (const item of items) {
    const b = bucketOf(item.due, asOf);
    buckets[b] = minor(buckets[b] + item.openMinor);
  }
  return { buckets, totalMinor: sumMinor(items.map((i) => i.openMinor)) };
}
