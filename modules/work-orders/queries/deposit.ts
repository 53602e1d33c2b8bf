import "server-only";
import { and, eq, sql } from "drizzle-orm";
import { estimates, payments, workOrders } from "@/db/schema";
import { inShop, type ShopContext } from "@/modules/access/context";
import type { EstimateSnapshot } from "../domain/estimate-snapshot";

export interface OrderDeposit {
  /** The agreed version that asks for it; null while nothing is agreed. */
  readonly estimateId: string | null;
  readonly customerId: string;
  readonly dueMinor: number;
  readonly paidMinor: number;
  /** Still to pay of the deposit; never below 0. */
  readonly openMinor: number;
}

/** The deposit of an order: asked once, with the first agreed version; a later version never asks for a second. */
export async function depositOf(ctx: ShopContext, workOrderId: string): Promise<OrderDeposit | null> {
  return inShop(ctx, async (tx) => {
    const [order] = await tx.select({ estimateId: workOrders.agreedEstimateId, customerId: workOrders.customerId }).from(workOrders)
      .where(and(eq(workOrders.shopId, ctx.shop.id), eq(workOrders.id, workOrderId)));
    if (!order) return null;
    const [agreed] = order.estimateId
      ? await tx.select({ snapshot: estimates.snapshot }).from(estimates).where(and(eq(estimates.shopId, ctx.shop.id), eq(estimates.id, order.estimateId)))
      : [];
    const [{ paid } = { paid: 0 }] = await tx.select({ paid: sql<number>`coalesce(sum(${payments.amountMinor} - ${payments.refundedMinor}), 0)::float8` }).from(payments)
      .where(and(eq(payments.shopId, ctx.shop.id), eq(payments.workOrderId, workOrderId), eq(payments.purpose, "deposit")));
    const dueMinor = (agreed?.snapshot as EstimateSnapshot | undefined)?.depositMinor ?? 0;
    return { estimateId: order.estimateId, customerId: order.customerId, dueMinor, paidMinor: paid, openMinor: Math.max(0, dueMinor - paid) };
  });
}
