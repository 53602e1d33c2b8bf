import "server-only";
import { and, asc, eq } from "drizzle-orm";
import { menuOperations } from "@/db/schema";
import { inShop, mustBeAble, type ShopContext } from "@/modules/access/context";

export interface MenuRow {
  id: string; code: string; name: string; customerWords: string; station: string; skill: string; sequence: number; bookMinutes: number; priceMinor: number;
  billing: string; needsBefore: string[]; mustRecord: string; hazards: string[]; active: boolean; version: number;
}

/** The priced menu in the order of the routing. For writing estimates; retired operations only when asked for. */
export async function menuOf(ctx: ShopContext, options: { withRetired?: boolean } = {}): Promise<MenuRow[]> {
  mustBeAble(ctx, "prices.see");
  const rows = await inShop(ctx, (tx) => tx.select().from(menuOperations)
    .where(and(eq(menuOperations.shopId, ctx.shop.id), options.withRetired ? undefined : eq(menuOperations.active, true)))
    .orderBy(asc(menuOperations.sequence), asc(menuOperations.code)));
  return rows.map(({ shopId: _, createdAt: __, ...r }) => r);
}
