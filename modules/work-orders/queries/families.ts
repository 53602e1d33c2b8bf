import "server-only";
import { eq } from "drizzle-orm";
import { engineFamilies, workPieces } from "@/db/schema";
import { inShop, mustBeAble, type ShopContext } from "@/modules/access/context";

/** Engine families the shop knows or has had in: to suggest while typing, never to force. */
export async function familiesOf(ctx: ShopContext): Promise<string[]> {
  mustBeAble(ctx, "orders.see");
  return inShop(ctx, async (tx) => {
    const known = await tx.select({ name: engineFamilies.name }).from(engineFamilies).where(eq(engineFamilies.shopId, ctx.shop.id));
    const seen = await tx.selectDistinct({ name: workPieces.family }).from(workPieces).where(eq(workPieces.shopId, ctx.shop.id)).limit(200);
    return [...new Set([...known, ...seen].map((r) => r.name))].sort();
  });
}
