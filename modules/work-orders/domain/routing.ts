/** One operation as the agreed estimate asks for it. */
export interface WantedOperation {
  readonly pieceId: string;
  readonly code: string;
  readonly name: string;
  readonly qtyMilli: number;
  readonly bookMinutes: number;
  readonly priceMinor: number;
  readonly lineId: string;
}

export interface StandingOperation {
  readonly id: string;
  readonly pieceId: string;
  readonly code: string;
  readonly isTouched: boolean;
}

export interface RoutingChange<W extends WantedOperation> {
  readonly add: readonly W[];
  /** Standing operation and what it is now. */
  readonly keep: readonly { readonly id: string; readonly to: W }[];
  readonly remove: readonly string[];
}

/**
 * What an agreed version changes on the routing: an operation that stands on the same piece under the same code is kept
 * (first come, first matched), what is new is added, what is no longer wanted goes, unless it was started, done or
 * skipped: that has happened and stays.
 */
export function routingChange<W extends WantedOperation>(standing: readonly StandingOperation[], wanted: readonly W[]): RoutingChange<W> {
  const left = [...standing];
  const add: W[] = [];
  const keep: { id: string; to: W }[] = [];
  for (const w of wanted) {
    const at = left.findIndex((s) => s.pieceId === w.pieceId && s.code === w.code);
    const found = at === -1 ? undefined : left.splice(at, 1)[0];
    if (found) keep.push({ id: found.id, to: w });
    else add.push(w);
  }
  return { add, keep, remove: left.filter((s) => !s.isTouched).map((s) => s.id) };
}

export interface NeededPart {
  readonly pieceId: string | null;
  readonly partId: string;
  readonly neededMilli: number;
  readonly lineId: string;
}

/** Needs of one piece and part become one row; the first line that asked names it. */
export function mergeNeeds(needs: readonly NeededPart[]): NeededPart[] {
  const merged = new Map<string, NeededPart>();
  for (const n of needs) {
    const key = `${n.pieceId ?? ""} ${n.partId}`;
    const before = merged.get(key);
    merged.set(key, before ? { ...before, neededMilli: before.neededMilli + n.neededMilli } : n);
  }
  return [...merged.values()];
}
