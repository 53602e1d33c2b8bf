import "server-only";
import { and, eq } from "drizzle-orm";
import { estimates, invoices, workOrders } from "@/db/schema";
import { ableTo, inShop, type ShopContext } from "@/modules/access/context";
import { balanceFor } from "@/modules/books/balances";
import { decimal } from "@/modules/kernel/format";
import { leftToPay } from "@/modules/work-orders/domain/may-leave";
import { depositOf } from "@/modules/work-orders/queries/deposit";
import { moneyOfOrder } from "@/modules/work-orders/queries/order-money";
import type { EstimateSnapshot } from "@/modules/work-orders/domain/estimate-snapshot";
import { invoicesOfOrder } from "./queries";

export interface OrderMoneyView {
  leftMinor: number; isBilled: boolean; sums: { name: string; minor: number; strong?: boolean }[]; depositMinor: number; paidMinor: number; costMinor: number | null; seesBooks: boolean;
  invoices: { id: string; number: string | null; kind: string; state: string; totalMinor: number; openMinor: number }[];
}

/** The money of one order for its page; null for who may not see prices, or when nothing was agreed. */
export async function orderMoneyOf(ctx: ShopContext, workOrderId: string): Promise<OrderMoneyView | null> {
  if (!ableTo(ctx, "prices.see")) return null;
  return inShop(ctx, async (tx) => {
    const inner = { ...ctx, tx };
    const [row] = await tx.select({ snapshot: estimates.snapshot }).from(workOrders).innerJoin(estimates, and(eq(estimates.shopId, workOrders.shopId), eq(estimates.id, workOrders.agreedEstimateId)))
      .where(and(eq(workOrders.shopId, ctx.shop.id), eq(workOrders.id, workOrderId)));
    const snapshot = row?.snapshot as EstimateSnapshot | undefined;
    if (!snapshot) return null;
    const t = snapshot.totals;
    const order = await moneyOfOrder(inner, workOrderId);
    const deposit = await depositOf(inner, workOrderId);
    const rows = await tx.select({ paid: invoices.paidMinor }).from(invoices).where(and(eq(invoices.shopId, ctx.shop.id), eq(invoices.workOrderId, workOrderId), eq(invoices.state, "issued")));
    const minutes = snapshot.lines.reduce((a, l) => a + l.bookMinutes, 0);
    const sums = [
      { name: `Labor, ${decimal(minutes / 60, 1, ctx.shop.locale)} h book`, minor: t.laborMinor },
      ...(t.laborDiscountMinor ? [{ name: "Discount", minor: -t.laborDiscountMinor }] : []),
      ...(t.partsMinor ? [{ name: "Parts", minor: t.partsMinor }] : []),
      ...(t.suppliesMinor + t.freightMinor + t.outsideMinor ? [{ name: "Supplies, freight, outside", minor: t.suppliesMinor + t.freightMinor + t.outsideMinor }] : []),
      ...(t.taxMinor ? [{ name: snapshot.rules.taxName, minor: t.taxMinor }] : []),
      { name: "Approved", minor: t.totalMinor, strong: true },
    ];
    const depositMinor = deposit?.paidMinor ?? 0;
    return {
      leftMinor: leftToPay(order), isBilled: order.invoices > 0, sums, depositMinor, paidMinor: rows.reduce((a, r) => a + r.paid, 0),
      costMinor: ableTo(ctx, "cost.see") ? await balanceFor(inner, "1250", { workOrderId }) : null, seesBooks: ableTo(ctx, "books.see"), invoices: await invoicesOfOrder(inner, workOrderId),
    };
  });
}
