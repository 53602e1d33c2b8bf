import "server-only";
import { and, asc, eq, gt, sql } from "drizzle-orm";
import { lots, parts } from "@/db/schema";
import { inShop, mustBeAble, type ShopContext } from "@/modules/access/context";

export interface CountLine { partId: string; sku: string; description: string; bin: string; stockUnit: string; lotId: string | null; lotCode: string | null }

/** What to count: a shelf, one part, or all shelves; parts kept by lot come lot by lot. No expected number leaves the server. */
export async function countSheetFor(ctx: ShopContext, ask: { bin?: string | undefined; part?: string | undefined }): Promise<{ lines: CountLine[]; bins: string[] }> {
  mustBeAble(ctx, "stock.adjust");
  return inShop(ctx, async (tx) => {
    const mine = and(eq(parts.shopId, ctx.shop.id), eq(parts.active, true), eq(parts.isKit, false));
    const bins = await tx.selectDistinct({ bin: parts.bin }).from(parts).where(and(mine, sql`${parts.bin} <> ''`)).orderBy(asc(parts.bin)).limit(500);
    if (ask.bin === undefined && ask.part === undefined) return { lines: [], bins: bins.map((b) => b.bin) };
    const rows = await tx.select({ partId: parts.id, sku: parts.sku, description: parts.description, bin: parts.bin, stockUnit: parts.stockUnit, lotTracked: parts.lotTracked, lotId: lots.id, lotCode: lots.code }).from(parts)
      .leftJoin(lots, and(eq(lots.shopId, parts.shopId), eq(lots.partId, parts.id), gt(lots.onHandMilli, 0)))
      .where(and(mine, ask.part !== undefined ? eq(parts.sku, ask.part) : eq(parts.bin, ask.bin ?? ""))).orderBy(asc(parts.bin), asc(parts.sku), asc(lots.expiresOn)).limit(200);
    return { lines: rows.filter((r) => !r.lotTracked || r.lotId !== null).map(({ lotTracked: _, ...r }) => r), bins: bins.map((b) => b.bin) };
  });
}
