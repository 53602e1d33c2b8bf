import "server-only";
import { sql } from "drizzle-orm";
import { inShop, mustBeAble, type ShopContext } from "@/modules/access/context";
import { addDays, localDate } from "@/modules/kernel/instant";
import { EXPIRING_DAYS, partFigures, type FigureRow } from "@/modules/stock/queries/part-figures";
import { suggestFor, type ShortOrder, type Suggestion } from "../domain/suggest";
import { seesPrices } from "./orders";

export interface SuggestionRow extends Suggestion { key: string; sku: string; description: string; stockUnit: string; supplierNumber: string; freeMilli: number; lastPriceMinor: number | null }
export interface SuggestionGroup { supplierId: string | null; supplierName: string; leadDays: number | null; rows: SuggestionRow[] }

interface PartFacts extends FigureRow { id: string; sku: string; description: string; stock_unit: string; supplier_number: string; reorder_point_milli: string | null; order_qty_milli: string | null; last_price_minor: string | null; supplier_id: string | null; supplier_name: string | null; lead_days: number | null }
interface ShortRow extends Record<string, unknown> { part_id: string; work_order_id: string; number: string; promised_on: string | null; short: string }
interface ComingRow extends Record<string, unknown> { part_id: string; work_order_id: string | null; coming: string }

/** What is short or at its reorder point and not on its way yet, by preferred supplier: a list to tick. */
export async function suggestionsFor(ctx: ShopContext): Promise<SuggestionGroup[]> {
  mustBeAble(ctx, "purchase.see");
  const day = localDate(ctx.now, ctx.shop.zone);
  const shopId = ctx.shop.id;
  return inShop(ctx, async (tx) => {
    const { rows: found } = await tx.execute<PartFacts>(sql`
      select p.id, p.sku, p.description, p.stock_unit, p.supplier_number, p.reorder_point_milli, p.order_qty_milli, p.last_price_minor, s.id as supplier_id, s.name as supplier_name, s.lead_days, f.*
      from parts p join (${partFigures(shopId, day, addDays(day, EXPIRING_DAYS))}) f on f.part_id = p.id
      left join suppliers s on s.shop_id = p.shop_id and s.id = p.preferred_supplier_id and s.active
      where p.shop_id = ${shopId} and p.active and not p.is_kit and (f.short > 0 or (p.reorder_point_milli is not null and f.free <= p.reorder_point_milli)) order by s.name nulls last, p.sku limit 1000`);
    const { rows: short } = await tx.execute<ShortRow>(sql`
      select n.part_id, o.id as work_order_id, o.number, o.promised_on, sum(n.needed_milli - n.issued_milli - n.reserved_milli) as short
      from work_order_parts n join work_orders o on o.shop_id = n.shop_id and o.id = n.work_order_id
      where n.shop_id = ${shopId} and n.removed_at is null and o.closed_at is null and o.cancelled_at is null and n.needed_milli > n.issued_milli + n.reserved_milli
      group by n.part_id, o.id, o.number, o.promised_on, o.opened_at order by o.promised_on nulls last, o.opened_at`);
    const { rows: coming } = await tx.execute<ComingRow>(sql`
      select l.part_id, l.work_order_id, sum(l.qty_milli - l.received_milli) as coming from purchase_order_lines l join purchase_orders q on q.shop_id = l.shop_id and q.id = l.purchase_order_id
      where l.shop_id = ${shopId} and q.state in ('draft', 'sent') and l.qty_milli > l.received_milli group by l.part_id, l.work_order_id`);
    const comingOf = (partId: string, orderId: string | null) => Number(coming.find((c) => c.part_id === partId && c.work_order_id === orderId)?.coming ?? 0);
    const groups = new Map<string, SuggestionGroup>();
    for (const p of found) {
      const orders: ShortOrder[] = short.filter((s) => s.part_id === p.id).map((s) => ({ workOrderId: s.work_order_id, number: s.number, promise: s.promised_on, shortMilli: Number(s.short), comingMilli: comingOf(p.id, s.work_order_id) }));
      const list = suggestFor({
        partId: p.id, freeMilli: Number(p.free), reorderPointMilli: p.reorder_point_milli === null ? null : Number(p.reorder_point_milli), orderQtyMilli: p.order_qty_milli === null ? null : Number(p.order_qty_milli),
        comingForShelfMilli: comingOf(p.id, null), short: orders,
      });
      if (list.length === 0) continue;
      const key = p.supplier_id ?? "";
      const group = groups.get(key) ?? { supplierId: p.supplier_id, supplierName: p.supplier_name ?? "No supplier chosen", leadDays: p.lead_days, rows: [] };
      groups.set(key, group);
      for (const s of list) {
        group.rows.push({ ...s, key: `${s.partId}:${s.workOrderId ?? "shelf"}`, sku: p.sku, description: p.description, stockUnit: p.stock_unit, supplierNumber: p.supplier_number, freeMilli: Number(p.free), lastPriceMinor: seesPrices(ctx) && p.last_price_minor !== null ? Number(p.last_price_minor) : null });
      }
    }
    return [...groups.values()];
  });
}
