import type { RawTest } from "./raw-test";

/** A draft that is about to be finished, and what it lacks. */
export interface UnreadLifts {
  readonly test: Pick<RawTest, "id" | "version" | "side" | "purpose">;
  /** Planned lifts without a reading that counts, increasing. */
  readonly liftsUm: readonly number[];
  /** Nothing was read at all. */
  readonly isEmpty: boolean;
}

/** What each draft lacks; those that are whole are left out. A cleared cell is unread, one left out was read. */
export function unreadLifts(drafts: readonly Pick<RawTest, "id" | "version" | "side" | "purpose" | "lifts" | "cells">[]): UnreadLifts[] {
  return drafts.flatMap((t) => {
    const read = new Set(t.cells.filter((c) => c.valueText.trim() !== "").map((c) => c.liftUm));
    const liftsUm = t.lifts.map((l) => l.liftUm).filter((um) => !read.has(um)).sort((a, b) => a - b);
    return liftsUm.length === 0 && read.size > 0 ? [] : [{ test: { id: t.id, version: t.version, side: t.side, purpose: t.purpose }, liftsUm, isEmpty: read.size === 0 }];
  });
}
