import "server-only";
import { and, desc, eq, isNull } from "drizzle-orm";
import { customers, workOrders } from "@/db/schema";
import { inShop, mustBeAble, type ShopContext } from "@/modules/access/context";

/** Open work orders, the newest first: what a line can be bought for. */
export async function openWorkOrders(ctx: ShopContext): Promise<{ id: string; number: string; customerName: string }[]> {
  mustBeAble(ctx, "purchase.write");
  return inShop(ctx, (tx) => tx.select({ id: workOrders.id, number: workOrders.number, customerName: customers.name }).from(workOrders)
    .innerJoin(customers, and(eq(customers.shopId, workOrders.shopId), eq(customers.id, workOrders.customerId)))
    .where(and(eq(workOrders.shopId, ctx.shop.id), isNull(workOrders.closedAt), isNull(workOrders.cancelledAt))).orderBy(desc(workOrders.openedAt)).limit(200));
}
