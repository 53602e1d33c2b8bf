/** A work order that cannot have all it needs. Quantities in thousandths. */
export interface ShortOrder {
  readonly workOrderId: string;
  readonly number: string;
  readonly promise: string | null;
  readonly shortMilli: number;
  /** Bought for this very order and still to come, drafts included. */
  readonly comingMilli: number;
}

export interface StandingOfPart {
  readonly partId: string;
  /** On hand less expired less promised; below 0 when orders are short. */
  readonly freeMilli: number;
  readonly reorderPointMilli: number | null;
  readonly orderQtyMilli: number | null;
  /** Bought for the shelf and still to come, drafts included. */
  readonly comingForShelfMilli: number;
  /** Earlier promises first. */
  readonly short: readonly ShortOrder[];
}

export interface Suggestion {
  readonly partId: string;
  readonly qtyMilli: number;
  readonly why: "short" | "reorder";
  readonly workOrderId: string | null;
  readonly workOrderNumber: string | null;
}

/**
 * What to buy: for each short order what is not on its way yet, in order of promise, then for the shelf when free and
 * coming stock is at or below the reorder point. A list to tick, never an order. Quantities are whole stock units.
 * Source: reorder point as in the standard inventory texts; the shares are a shop rule.
 */
export function suggestFor(part: StandingOfPart): Suggestion[] {
  let shelf = part.comingForShelfMilli;
  const list: Suggestion[] = [];
  for (const o of part.short) {
    let need = Math.max(0, o.shortMilli - o.comingMilli);
    const fromShelf = Math.min(shelf, need);
    shelf -= fromShelf;
    need -= fromShelf;
    if (need > 0) list.push({ partId: part.partId, qtyMilli: wholeUnits(need), why: "short", workOrderId: o.workOrderId, workOrderNumber: o.number });
  }
  if (part.reorderPointMilli === null) return list;
  // What is short is bought for its order above; the shelf itself stands at 0 then, not below.
  const position = Math.max(0, part.freeMilli) + shelf;
  if (position > part.reorderPointMilli) return list;
  const qty = part.orderQtyMilli ?? part.reorderPointMilli - position;
  if (qty > 0) list.push({ partId: part.partId, qtyMilli: wholeUnits(qty), why: "reorder", workOrderId: null, workOrderNumber: null });
  return list;
}

const wholeUnits = (milli: number): number => Math.ceil(milli / 1000) * 1000;
