import "server-only";
import { and, desc, eq, sql } from "drizzle-orm";
import { stockMovements } from "@/db/schema";
import type { TxContext } from "@/modules/access/context";

/** What of a need is still out with the job, by lot, the newest first. */
export async function netOutByLot(ctx: TxContext, workOrderPartId: string): Promise<{ lotId: string | null; qtyMilli: number }[]> {
  const newest = sql`max(${stockMovements.seq})`;
  const rows = await ctx.tx.select({ lotId: stockMovements.lotId, qty: sql<string>`-sum(${stockMovements.qtyMilli})` }).from(stockMovements)
    .where(and(eq(stockMovements.shopId, ctx.shop.id), eq(stockMovements.workOrderPartId, workOrderPartId)))
    .groupBy(stockMovements.lotId).orderBy(desc(newest));
  return rows.map((r) => ({ lotId: r.lotId, qtyMilli: Number(r.qty) })).filter((r) => r.qtyMilli > 0);
}
