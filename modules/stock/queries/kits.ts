import "server-only";
import { and, asc, eq, inArray, sql } from "drizzle-orm";
import { kitLines, parts } from "@/db/schema";
import { inShop, mustBeAble, type ShopContext } from "@/modules/access/context";
import { addDays, localDate } from "@/modules/kernel/instant";
import { milli } from "@/modules/kernel/quantity";
import { kitAvailability } from "../domain/kit";
import { EXPIRING_DAYS, partFigures, type FigureRow } from "./part-figures";

export interface KitLine { kitPartId: string; partId: string; sku: string; description: string; stockUnit: string; bin: string; qtyMilli: number }

/** Contents of kits among the given parts; parts that are no kits have no lines. Quantities are for one kit. */
export async function kitLinesOf(ctx: ShopContext, partIds: readonly string[]): Promise<KitLine[]> {
  mustBeAble(ctx, "stock.see");
  if (partIds.length === 0) return [];
  return inShop(ctx, (tx) => tx.select({
    kitPartId: kitLines.kitPartId, partId: kitLines.partId, sku: parts.sku, description: parts.description, stockUnit: parts.stockUnit, bin: parts.bin, qtyMilli: kitLines.qtyMilli,
  }).from(kitLines).innerJoin(parts, and(eq(parts.shopId, kitLines.shopId), eq(parts.id, kitLines.partId)))
    .where(and(eq(kitLines.shopId, ctx.shop.id), inArray(kitLines.kitPartId, [...partIds]))).orderBy(asc(kitLines.kitPartId), asc(parts.sku)));
}

/** Free quantity of parts (never below 0), for kits and counters. */
export async function freeOf(ctx: ShopContext, partIds: readonly string[]): Promise<Map<string, number>> {
  if (partIds.length === 0) return new Map();
  const day = localDate(ctx.now, ctx.shop.zone);
  const rows = await inShop(ctx, (tx) => tx.execute<FigureRow>(sql`select f.* from (${partFigures(ctx.shop.id, day, addDays(day, EXPIRING_DAYS))}) f where f.part_id in (${sql.join(partIds.map((id) => sql`${id}`), sql`, `)})`));
  return new Map(rows.rows.map((r) => [r.part_id, Math.max(0, Number(r.free))]));
}

/** Whole kits that could be put together now, and by number which part keeps the next one from it. */
export async function kitStands(ctx: ShopContext, kitIds: readonly string[]): Promise<Map<string, { kits: number; short: string[] }>> {
  const lines = await kitLinesOf(ctx, kitIds);
  const free = await freeOf(ctx, [...new Set(lines.map((l) => l.partId))]);
  const skuOf = new Map(lines.map((l) => [l.partId, l.sku]));
  return new Map(kitIds.map((id) => {
    const kit = lines.filter((l) => l.kitPartId === id).map((l) => ({ partId: l.partId, needMilli: milli(l.qtyMilli) }));
    const stand = kitAvailability(kit, free);
    return [id, { kits: stand.kits, short: stand.short.map((s) => skuOf.get(s.partId) ?? "") }];
  }));
}
