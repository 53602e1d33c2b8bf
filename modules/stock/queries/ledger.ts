import "server-only";
import { and, desc, eq, lt, sql } from "drizzle-orm";
import { alias } from "drizzle-orm/pg-core";
import { lots, parts, people, stockMovements, workOrders } from "@/db/schema";
import { ableTo, inShop, mustBeAble, NotFound, type ShopContext } from "@/modules/access/context";

export interface LedgerRow {
  id: string; seq: number; kind: string; at: string; qtyMilli: number; afterMilli: number; lotCode: string | null; workOrderNumber: string | null; personName: string | null; reason: string;
  /** Only for roles that see cost. */
  valueMinor: number | null;
  /** The row that reversed this one, or that this one reverses. */
  reversedById: string | null; reversesId: string | null;
}

/** Rows of a part's ledger, newest first, with the quantity on the shelf after each. @throws NotFound */
export async function ledgerOf(ctx: ShopContext, ask: { part: string; before?: number | undefined; limit: number }): Promise<{ rows: LedgerRow[]; next: number | null }> {
  mustBeAble(ctx, "stock.see");
  const turned = alias(stockMovements, "turned");
  return inShop(ctx, async (tx) => {
    const [part] = await tx.select({ id: parts.id }).from(parts).where(and(eq(parts.shopId, ctx.shop.id), eq(parts.id, ask.part)));
    if (!part) throw new NotFound("part");
    const rows = await tx.select({
      id: stockMovements.id, seq: stockMovements.seq, kind: stockMovements.kind, at: stockMovements.at, qtyMilli: stockMovements.qtyMilli, valueMinor: stockMovements.valueMinor,
      reason: stockMovements.reason, reversesId: stockMovements.reversesId, lotCode: lots.code, workOrderNumber: workOrders.number, personName: people.shortName, reversedById: turned.id,
      afterMilli: sql<string>`(select coalesce(sum(m.qty_milli), 0) from stock_movements m where m.shop_id = ${ctx.shop.id} and m.part_id = ${ask.part} and m.seq <= "stock_movements"."seq")`,
    }).from(stockMovements)
      .leftJoin(lots, and(eq(lots.shopId, stockMovements.shopId), eq(lots.id, stockMovements.lotId)))
      .leftJoin(workOrders, and(eq(workOrders.shopId, stockMovements.shopId), eq(workOrders.id, stockMovements.workOrderId)))
      .leftJoin(people, and(eq(people.shopId, stockMovements.shopId), eq(people.id, stockMovements.personId)))
      .leftJoin(turned, and(eq(turned.shopId, stockMovements.shopId), eq(turned.reversesId, stockMovements.id)))
      .where(and(eq(stockMovements.shopId, ctx.shop.id), eq(stockMovements.partId, ask.part), ask.before ? lt(stockMovements.seq, ask.before) : undefined))
      .orderBy(desc(stockMovements.seq)).limit(ask.limit + 1);
    const seesCost = ableTo(ctx, "cost.see");
    const page = rows.slice(0, ask.limit);
    return {
      rows: page.map((r) => ({ ...r, at: r.at.toISOString(), afterMilli: Number(r.afterMilli), valueMinor: seesCost ? r.valueMinor : null })),
      next: rows.length > ask.limit ? (page.at(-1)?.seq ?? null) : null,
    };
  });
}
