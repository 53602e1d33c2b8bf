import { addDays } from "@/modules/kernel/instant";
import { milli, type Milli } from "@/modules/kernel/quantity";

export interface LotOnHand {
  readonly lot: string;
  /** Last day of use, `YYYY-MM-DD`; null for a lot that does not expire. */
  readonly expiry: string | null;
  readonly availableMilli: Milli;
  readonly isRecalled?: boolean;
}

export type LotBlock = "expired" | "too few days left" | "recalled";

export interface LotPicks {
  readonly picks: readonly { readonly lot: string; readonly qtyMilli: Milli }[];
  readonly blocked: readonly { readonly lot: string; readonly why: LotBlock }[];
  /** What could not be covered; 0 when all is there. */
  readonly shortMilli: Milli;
}

/** Why a lot may not be used on `today`, or null. A lot is good through its expiry day. */
export function lotBlock(lot: LotOnHand, today: string, daysLeftMin: number): LotBlock | null {
  if (lot.isRecalled) return "recalled";
  if (lot.expiry === null) return null;
  if (lot.expiry < today) return "expired";
  return lot.expiry < addDays(today, daysLeftMin) ? "too few days left" : null;
}

/**
 * First expired, first out. Expired and recalled lots are never offered; a lot without a date comes last.
 * `daysLeftMin`: days the lot must still be good after `today` for this job.
 * Source: common practice, no source.
 */
export function pickFirstExpired(p: {
  readonly lots: readonly LotOnHand[];
  readonly needMilli: Milli;
  readonly today: string;
  readonly daysLeftMin: number;
}): LotPicks {
  const blocked: { lot: string; why: LotBlock }[] = [];
  const good: LotOnHand[] = [];
  for (const lot of p.lots) {
    const why = lotBlock(lot, p.today, p.daysLeftMin);
    if (why) blocked.push({ lot: lot.lot, why });
    else good.push(lot);
  }
  const LAST = "9999-12-31";
  good.sort((a, b) => (a.expiry ?? LAST).localeCompare(b.expiry ?? LAST));
  let need: number = p.needMilli;
  const picks: { lot: string; qtyMilli: Milli }[] = [];
  for (const lot of good) {
    const taken = Math.min(need, lot.availableMilli);
    if (taken <= 0) continue;
    picks.push({ lot: lot.lot, qtyMilli: milli(taken) });
    need -= taken;
  }
  return { picks, blocked, shortMilli: milli(Math.max(0, need)) };
}

/** Second expiry after opening: whichever comes first, the printed date or opened + days. */
export function expiryAfterOpening(printed: string | null, opened: string, daysOpen: number): string {
  const open = addDays(opened, daysOpen);
  return printed !== null && printed < open ? printed : open;
}
