import "server-only";
import { sql, type SQL } from "drizzle-orm";
import { ableTo, inShop, mustBeAble, type ShopContext } from "@/modules/access/context";
import { addDays, localDate } from "@/modules/kernel/instant";
import { minor } from "@/modules/kernel/money";
import { milli } from "@/modules/kernel/quantity";
import { currencyDecimals } from "@/modules/kernel/format";
import { unitCost6 } from "../domain/moving-average";
import type { FindPartsInput, PartView } from "../input";
import { kitStands } from "./kits";
import { EXPIRING_DAYS, partFigures, type FigureRow } from "./part-figures";

/** A part as lists and pickers show it. Quantities in thousandths of the stock unit. */
export interface PartRow {
  id: string; sku: string; description: string; partClass: string; families: string[]; position: string; stockUnit: string; bin: string;
  isKit: boolean; lotTracked: boolean; active: boolean; hazard: string;
  onHandMilli: number; reservedMilli: number; expiredMilli: number;
  /** On hand less promised, expired: negative when orders are short. For a kit: whole kits * 1000. */
  freeMilli: number;
  /** Still needed by open orders, reserved or short. */
  promisedMilli: number;
  shortMilli: number;
  /** Numbers of the work orders that are short. */
  shortFor: string[];
  onOrderMilli: number; nextArrival: string | null;
  reorderPointMilli: number | null; nextExpiry: string | null; expiringMilli: number;
  /** For a kit: what keeps the next one from being put together. */
  kitShort: string[];
  /** Only for roles that see sale prices. */
  salePriceMinor: number | null;
  /** Only for roles that see cost. */
  valueMinor: number | null; unitCost: string | null;
}

interface Raw extends FigureRow {
  id: string; sku: string; description: string; part_class: string; families: string[]; position: string; stock_unit: string; bin: string; is_kit: boolean; lot_tracked: boolean;
  active: boolean; hazard: string; sale_price_minor: string; reorder_point_milli: string | null;
}

const literal = (s: string) => s.replace(/[\\%_]/g, (c) => `\\${c}`);

const VIEW_FILTER: Record<PartView, SQL> = {
  all: sql`true`,
  short: sql`f.short > 0`,
  reorder: sql`p.reorder_point_milli is not null and not p.is_kit and f.free <= p.reorder_point_milli`,
  expiring: sql`f.expiring > 0`,
  "on-order": sql`f.on_order > 0`,
  kits: sql`p.is_kit`,
  lots: sql`p.lot_tracked`,
};

/** Parts by any scrap of number, supplier's number, description or family. Keyset-paged by part number. */
export async function findParts(ctx: ShopContext, ask: FindPartsInput): Promise<{ rows: PartRow[]; next: string | null; counts: Record<PartView, number> }> {
  mustBeAble(ctx, "stock.see");
  const day = localDate(ctx.now, ctx.shop.zone);
  const shopId = ctx.shop.id;
  const words = ask.q.toLowerCase().split(/\s+/).filter(Boolean).slice(0, 6);
  const matches = words.map((w) => {
    const like = `%${literal(w)}%`;
    return sql`(lower(p.sku) like ${like} or p.description_key like ${like} or lower(p.supplier_number) like ${like} or lower(array_to_string(p.families, ' ')) like ${like} or p.part_class like ${like})`;
  });
  const base = sql`from parts p join (${partFigures(shopId, day, addDays(day, EXPIRING_DAYS))}) f on f.part_id = p.id where p.shop_id = ${shopId}
    and ${ask.gone ? sql`true` : sql`p.active`}${ask.partClass ? sql` and p.part_class = ${ask.partClass}` : sql``}${sql.join(matches.map((m) => sql` and ${m}`), sql``)}`;
  return inShop(ctx, async (tx) => {
    const found = await tx.execute<Raw & Record<string, unknown>>(sql`select p.*, f.* ${base} and ${VIEW_FILTER[ask.view]}${ask.after ? sql` and p.sku > ${ask.after}` : sql``} order by p.sku limit ${ask.limit + 1}`);
    const sums = await tx.execute<Record<PartView, string>>(sql`select ${sql.join(
      Object.entries(VIEW_FILTER).map(([view, filter]) => sql`count(*) filter (where ${filter}) as ${sql.identifier(view)}`), sql`, `)} ${base}`);
    const page = found.rows.slice(0, ask.limit);
    const kits = await kitStands({ ...ctx, tx }, page.filter((r) => r.is_kit).map((r) => r.id));
    const first = sums.rows[0];
    const counts = Object.fromEntries(Object.keys(VIEW_FILTER).map((v) => [v, Number(first?.[v as PartView] ?? 0)])) as Record<PartView, number>;
    return { rows: page.map((r) => rowOf(ctx, r, kits)), next: found.rows.length > ask.limit ? (page.at(-1)?.sku ?? null) : null, counts };
  });
}

/** One part as a list row, or null when it is not in this shop. */
export async function getPartRow(ctx: ShopContext, partId: string): Promise<PartRow | null> {
  mustBeAble(ctx, "stock.see");
  const day = localDate(ctx.now, ctx.shop.zone);
  return inShop(ctx, async (tx) => {
    const { rows } = await tx.execute<Raw & Record<string, unknown>>(sql`select p.*, f.* from parts p join (${partFigures(ctx.shop.id, day, addDays(day, EXPIRING_DAYS))}) f on f.part_id = p.id where p.shop_id = ${ctx.shop.id} and p.id = ${partId}`);
    const raw = rows[0];
    return raw ? rowOf(ctx, raw, await kitStands({ ...ctx, tx }, raw.is_kit ? [raw.id] : [])) : null;
  });
}

/** What a role may see of a part: sale price and cost are left out here, not hidden on the screen. */
function rowOf(ctx: ShopContext, r: Raw, kits: ReadonlyMap<string, { kits: number; short: string[] }>): PartRow {
  const onHandMilli = Number(r.on_hand);
  const stand = kits.get(r.id);
  const seesCost = ableTo(ctx, "cost.see");
  return {
    id: r.id, sku: r.sku, description: r.description, partClass: r.part_class, families: r.families, position: r.position, stockUnit: r.stock_unit, bin: r.bin,
    isKit: r.is_kit, lotTracked: r.lot_tracked, active: r.active, hazard: r.hazard,
    onHandMilli, reservedMilli: Number(r.reserved), expiredMilli: Number(r.expired), freeMilli: stand ? stand.kits * 1000 : Number(r.free),
    promisedMilli: Number(r.promised), shortMilli: Number(r.short), shortFor: r.short_orders ? r.short_orders.split(", ") : [],
    onOrderMilli: Number(r.on_order), nextArrival: r.next_arrival, reorderPointMilli: r.reorder_point_milli === null ? null : Number(r.reorder_point_milli),
    nextExpiry: r.next_expiry, expiringMilli: Number(r.expiring), kitShort: stand?.short ?? [],
    salePriceMinor: ableTo(ctx, "prices.see") ? Number(r.sale_price_minor) : null,
    valueMinor: seesCost ? Number(r.value) : null,
    unitCost: seesCost ? unitCost6({ qtyMilli: milli(onHandMilli), valueMinor: minor(Number(r.value)) }, currencyDecimals(ctx.shop.currency)) : null,
  };
}
