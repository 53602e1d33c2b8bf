import "server-only";
import { and, eq, inArray, sql } from "drizzle-orm";
import { estimates, invoices, payments, workOrders } from "@/db/schema";
import { inShop, type ShopContext } from "@/modules/access/context";
import type { OrderMoney } from "../domain/may-leave";

/** The money of several orders in one go. Deposits held are those taken and neither applied to an invoice nor given back. */
export async function moneyOfOrders(ctx: ShopContext, workOrderIds: readonly string[]): Promise<Map<string, OrderMoney>> {
  if (workOrderIds.length === 0) return new Map();
  const ids = [...workOrderIds];
  return inShop(ctx, async (tx) => {
    const agreed = await tx.select({ id: workOrders.id, total: sql<string | null>`${estimates.snapshot} #>> '{totals,totalMinor}'` }).from(workOrders)
      .leftJoin(estimates, and(eq(estimates.shopId, workOrders.shopId), eq(estimates.id, workOrders.agreedEstimateId)))
      .where(and(eq(workOrders.shopId, ctx.shop.id), inArray(workOrders.id, ids)));
    const billed = await tx.select({
      id: invoices.workOrderId, n: sql<number>`count(*) filter (where ${invoices.kind} = 'invoice')::int`,
      total: sql<string>`coalesce(sum(case when ${invoices.kind} = 'invoice' then ${invoices.totalMinor} else 0 end), 0)`,
      open: sql<string>`coalesce(sum(case when ${invoices.kind} = 'invoice' then ${invoices.totalMinor} - ${invoices.depositAppliedMinor} - ${invoices.paidMinor} - ${invoices.creditedMinor} else 0 end), 0)`,
    }).from(invoices).where(and(eq(invoices.shopId, ctx.shop.id), inArray(invoices.workOrderId, ids), eq(invoices.state, "issued"))).groupBy(invoices.workOrderId);
    const deposits = await tx.select({ id: payments.workOrderId, held: sql<string>`coalesce(sum(${payments.amountMinor} - ${payments.appliedMinor} - ${payments.refundedMinor}), 0)` })
      .from(payments).where(and(eq(payments.shopId, ctx.shop.id), inArray(payments.workOrderId, ids), eq(payments.purpose, "deposit"))).groupBy(payments.workOrderId);
    const b = new Map(billed.map((r) => [r.id, r]));
    const d = new Map(deposits.map((r) => [r.id, Number(r.held)]));
    return new Map(agreed.map((a) => [a.id, {
      agreedMinor: Number(a.total ?? 0), invoicedMinor: Number(b.get(a.id)?.total ?? 0), invoices: b.get(a.id)?.n ?? 0, openMinor: Number(b.get(a.id)?.open ?? 0), depositHeldMinor: d.get(a.id) ?? 0,
    }]));
  });
}

/** The money of one order. */
export async function moneyOfOrder(ctx: ShopContext, workOrderId: string): Promise<OrderMoney> {
  return (await moneyOfOrders(ctx, [workOrderId])).get(workOrderId) ?? { agreedMinor: 0, invoicedMinor: 0, invoices: 0, openMinor: 0, depositHeldMinor: 0 };
}
