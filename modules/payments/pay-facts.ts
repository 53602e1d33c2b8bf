import "server-only";
import { and, eq } from "drizzle-orm";
import { invoices, links } from "@/db/schema";
import { inShop, mustBeAble, type ShopContext } from "@/modules/access/context";
import { openOf } from "@/modules/books/domain/open-sum";
import { depositOf } from "@/modules/work-orders/queries/deposit";

export interface PayFacts { purpose: "deposit" | "invoice"; openMinor: number; paidMinor: number }

/** What a customer's link may pay, as it stands now; null when it is for something else. */
export async function payFacts(ctx: ShopContext): Promise<PayFacts | null> {
  mustBeAble(ctx, "customer.pay");
  const { actor } = ctx;
  if (actor.kind !== "customer") return null;
  return inShop(ctx, async (tx) => {
    if (actor.purpose === "invoice") {
      const [i] = await tx.select().from(invoices).where(and(eq(invoices.shopId, ctx.shop.id), eq(invoices.id, actor.subjectId), eq(invoices.state, "issued"), eq(invoices.kind, "invoice")));
      return i ? { purpose: "invoice" as const, openMinor: openOf(i), paidMinor: i.paidMinor } : null;
    }
    if (actor.purpose !== "estimate") return null;
    const [link] = await tx.select({ workOrderId: links.workOrderId }).from(links).where(and(eq(links.shopId, ctx.shop.id), eq(links.id, actor.linkId)));
    if (!link?.workOrderId) return null;
    const deposit = await depositOf({ ...ctx, tx }, link.workOrderId);
    const [issued] = await tx.select({ id: invoices.id }).from(invoices).where(and(eq(invoices.shopId, ctx.shop.id), eq(invoices.workOrderId, link.workOrderId), eq(invoices.state, "issued"))).limit(1);
    return deposit ? { purpose: "deposit" as const, openMinor: issued ? 0 : deposit.openMinor, paidMinor: deposit.paidMinor } : null;
  });
}
