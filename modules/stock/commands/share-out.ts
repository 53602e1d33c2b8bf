import "server-only";
import { and, asc, eq, gt, inArray, isNotNull, lt, sql } from "drizzle-orm";
import { lots, purchaseOrderLines, stockBalances, workOrderParts, workOrders } from "@/db/schema";
import type { TxContext } from "@/modules/access/context";
import { shareWithTies } from "../domain/share-with-ties";
import { lockShelf, today, type ShelfPart } from "./shelf";

/**
 * Shares what can be used of parts among the open work orders that need them: goods bought for an order go to that
 * order, the rest to the earlier promise. Run after every change of the shelf or of a need; it may take a
 * reservation from a later promise.
 */
export async function shareOut(ctx: TxContext, partIds: readonly string[]): Promise<void> {
  const shelf = await lockShelf(ctx, partIds);
  for (const part of shelf.values()) if (!part.isKit) await shareOne(ctx, part);
}

async function shareOne(ctx: TxContext, part: ShelfPart): Promise<void> {
  const { tx, shop } = ctx;
  const rows = await tx.select({
    id: workOrderParts.id, workOrderId: workOrderParts.workOrderId, neededMilli: workOrderParts.neededMilli, reservedMilli: workOrderParts.reservedMilli,
    issuedMilli: workOrderParts.issuedMilli, removedAt: workOrderParts.removedAt, promisedOn: workOrders.promisedOn, openedAt: workOrders.openedAt,
    closedAt: workOrders.closedAt, cancelledAt: workOrders.cancelledAt,
  }).from(workOrderParts)
    .innerJoin(workOrders, and(eq(workOrders.shopId, workOrderParts.shopId), eq(workOrders.id, workOrderParts.workOrderId)))
    .where(and(eq(workOrderParts.shopId, shop.id), eq(workOrderParts.partId, part.partId),
      sql`(${workOrderParts.reservedMilli} > 0 or (${workOrderParts.removedAt} is null and ${workOrders.closedAt} is null and ${workOrders.cancelledAt} is null and ${workOrderParts.neededMilli} > ${workOrderParts.issuedMilli}))`))
    .orderBy(asc(workOrders.openedAt), asc(workOrderParts.id)).for("update", { of: workOrderParts });
  if (rows.length === 0) {
    if (part.reservedMilli !== 0) await setReserved(ctx, part.partId, 0);
    return;
  }

  const expiredMilli = await expiredOf(ctx, part);
  const tied = await tx.select({ workOrderId: purchaseOrderLines.workOrderId, cameMilli: sql<string>`sum(${purchaseOrderLines.receivedMilli})` }).from(purchaseOrderLines)
    .where(and(eq(purchaseOrderLines.shopId, shop.id), eq(purchaseOrderLines.partId, part.partId), isNotNull(purchaseOrderLines.workOrderId),
      inArray(purchaseOrderLines.workOrderId, [...new Set(rows.map((r) => r.workOrderId))])))
    .groupBy(purchaseOrderLines.workOrderId);
  const cameFor = new Map(tied.map((t) => [t.workOrderId ?? "", Number(t.cameMilli)]));

  const isOpen = (r: (typeof rows)[number]) => !r.removedAt && !r.closedAt && !r.cancelledAt && r.neededMilli > r.issuedMilli;
  const shares = shareWithTies(Math.max(0, part.onHandMilli - expiredMilli), rows.map((r) => ({
    id: r.id, promise: r.promisedOn, needMilli: isOpen(r) ? r.neededMilli - r.issuedMilli : 0,
    tiedMilli: isOpen(r) ? Math.max(0, (cameFor.get(r.workOrderId) ?? 0) - r.issuedMilli) : 0,
  })));
  let sum = 0;
  for (const [i, r] of rows.entries()) {
    const reserved = shares[i] ?? 0;
    sum += reserved;
    if (reserved === r.reservedMilli) continue;
    await tx.update(workOrderParts).set({ reservedMilli: reserved }).where(and(eq(workOrderParts.shopId, shop.id), eq(workOrderParts.id, r.id)));
  }
  if (sum !== part.reservedMilli) await setReserved(ctx, part.partId, sum);
}

const setReserved = (ctx: TxContext, partId: string, reservedMilli: number) =>
  ctx.tx.update(stockBalances).set({ reservedMilli }).where(and(eq(stockBalances.shopId, ctx.shop.id), eq(stockBalances.partId, partId)));

/** What lies on the shelf but may not be used: lots past their last day. */
export async function expiredOf(ctx: TxContext, part: Pick<ShelfPart, "partId" | "lotTracked">): Promise<number> {
  if (!part.lotTracked) return 0;
  const [row] = await ctx.tx.select({ qty: sql<string>`coalesce(sum(${lots.onHandMilli}), 0)` }).from(lots)
    .where(and(eq(lots.shopId, ctx.shop.id), eq(lots.partId, part.partId), gt(lots.onHandMilli, 0), lt(lots.expiresOn, today(ctx))));
  return Number(row?.qty ?? 0);
}

/** Parts an order needs or needed, for sharing out after the order changed. */
export async function partsNeededBy(ctx: TxContext, workOrderId: string): Promise<string[]> {
  const rows = await ctx.tx.selectDistinct({ partId: workOrderParts.partId }).from(workOrderParts)
    .where(and(eq(workOrderParts.shopId, ctx.shop.id), eq(workOrderParts.workOrderId, workOrderId)));
  return rows.map((r) => r.partId);
}
