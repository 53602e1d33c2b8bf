import "server-only";
import { sql } from "drizzle-orm";
import { counters } from "@/db/schema";
import type { TxContext } from "./context";

/**
 * Takes the next number of a series, without gaps: a transaction that fails takes none. Holds the counter's row
 * until commit, so take it late.
 */
export async function takeNumber(ctx: TxContext, series: string): Promise<number> {
  const [row] = await ctx.tx.insert(counters).values({ shopId: ctx.shop.id, series, next: 2 })
    .onConflictDoUpdate({ target: [counters.shopId, counters.series], set: { next: sql`${counters.next} + 1` } })
    .returning({ next: counters.next });
  if (!row) throw new Error(`no counter for ${series}`);
  return row.next - 1;
}

/** `WO-2026-0118`, `INV-2026-00318`: series, business year, number with leading zeros. */
export async function takeYearNumber(ctx: TxContext, prefix: string, year: string, width: number): Promise<string> {
  const n = await takeNumber(ctx, `${prefix}-${year}`);
  return `${prefix}-${year}-${String(n).padStart(width, "0")}`;
}
