import "server-only";
import { and, eq, inArray, sql } from "drizzle-orm";
import { estimates, invoices, workOrders } from "@/db/schema";
import { inShop, type ShopContext } from "@/modules/access/context";
import { depositsHeld } from "@/modules/books/balances";
import { openOf } from "@/modules/books/domain/open-sum";
import type { OrderMoney } from "../domain/may-leave";

/**
 * The money of several orders in one go: what is open on their issued invoices, and the deposits the books hold for them.
 * The one rule for it: floor, order page, invoices and hand-over ask here.
 */
export async function moneyOfOrders(ctx: ShopContext, workOrderIds: readonly string[]): Promise<Map<string, OrderMoney>> {
  if (workOrderIds.length === 0) return new Map();
  const ids = [...workOrderIds];
  return inShop(ctx, async (tx) => {
    const agreed = await tx.select({ id: workOrders.id, total: sql<string | null>`${estimates.snapshot} #>> '{totals,totalMinor}'` }).from(workOrders)
      .leftJoin(estimates, and(eq(estimates.shopId, workOrders.shopId), eq(estimates.id, workOrders.agreedEstimateId)))
      .where(and(eq(workOrders.shopId, ctx.shop.id), inArray(workOrders.id, ids)));
    const issued = await tx.select().from(invoices).where(and(eq(invoices.shopId, ctx.shop.id), inArray(invoices.workOrderId, ids), eq(invoices.kind, "invoice"), eq(invoices.state, "issued")));
    const held = await depositsHeld({ ...ctx, tx }, ids);
    return new Map(agreed.map((a) => {
      const own = issued.filter((i) => i.workOrderId === a.id);
      return [a.id, {
        agreedMinor: Number(a.total ?? 0), invoicedMinor: own.reduce((sum, i) => sum + i.totalMinor - i.creditedMinor, 0), invoices: own.length,
        openMinor: own.reduce((sum, i) => sum + openOf(i), 0), depositHeldMinor: held.get(a.id) ?? 0,
      }];
    }));
  });
}

/** The money of one order. */
export async function moneyOfOrder(ctx: ShopContext, workOrderId: string): Promise<OrderMoney> {
  return (await moneyOfOrders(ctx, [workOrderId])).get(workOrderId) ?? { agreedMinor: 0, invoicedMinor: 0, invoices: 0, openMinor: 0, depositHeldMinor: 0 };
}
