import "server-only";
import { and, desc, eq, or, sql } from "drizzle-orm";
import { customers, parts, workOrders, workPieces } from "@/db/schema";
import { ableTo, inShop, mustBeAble, type ShopContext } from "@/modules/access/context";
import { findCustomers } from "@/modules/customers/queries";
import { nameKey } from "@/modules/customers/domain/search-key";

export type FoundKind = "piece" | "order" | "customer" | "part";
export interface Found { kind: FoundKind; id: string; title: string; detail: string; href: string }
export interface FoundAll {
  rows: Found[];
  /** A scanned tag, order or part number that names exactly one thing: go there at once. */
  exact: string | null;
}

const literal = (s: string) => s.replace(/[\\%_]/g, (c) => `\\${c}`);
const EACH = 8;

/** Anything of the shop by any scrap: tag, order number, name, telephone tail, casting, serial, family, part. */
export async function findAnything(ctx: ShopContext, text: string): Promise<FoundAll> {
  mustBeAble(ctx, "orders.see");
  // A tag's square code holds the address of its piece.
  const onTag = /\/orders\/([A-Z]{2,4}-\d{4}-\d{4,9})\/pieces\/(\d{1,2})\s*$/.exec(text);
  if (onTag) {
    const [piece] = await inShop(ctx, (tx) => tx.select({ pieceNo: workPieces.pieceNo }).from(workPieces).innerJoin(workOrders, and(eq(workOrders.shopId, workPieces.shopId), eq(workOrders.id, workPieces.workOrderId)))
      .where(and(eq(workPieces.shopId, ctx.shop.id), eq(workOrders.number, onTag[1] ?? ""), eq(workPieces.pieceNo, Number(onTag[2])))));
    return { rows: [], exact: piece ? `/s/${ctx.shop.slug}/orders/${onTag[1] ?? ""}/pieces/${piece.pieceNo}` : null };
  }
  const q = nameKey(text);
  if (q === "") return { rows: [], exact: null };
  const like = `%${literal(q)}%`;
  const base = `/s/${ctx.shop.slug}`;
  const rows: Found[] = [];
  let exact: string | null = null;
  await inShop(ctx, async (tx) => {
    const pieces = await tx.select({ p: workPieces, number: workOrders.number, customer: customers.name }).from(workPieces)
      .innerJoin(workOrders, and(eq(workOrders.shopId, workPieces.shopId), eq(workOrders.id, workPieces.workOrderId)))
      .innerJoin(customers, and(eq(customers.shopId, workOrders.shopId), eq(customers.id, workOrders.customerId)))
      .where(and(eq(workPieces.shopId, ctx.shop.id), or(sql`lower(${workPieces.tag}) like ${like}`, sql`lower(${workPieces.castingNumber}) like ${like}`, sql`lower(${workPieces.serial}) like ${like}`)))
      .orderBy(desc(workPieces.bookedInAt)).limit(EACH);
    for (const { p, number, customer } of pieces) {
      const href = `${base}/orders/${number}/pieces/${p.pieceNo}`;
      if (p.tag?.toLowerCase() === q) exact = href;
      rows.push({ kind: "piece", id: p.id, title: p.tag ?? `${p.castingNumber} ${p.serial}`.trim(), detail: `${customer}, ${p.family}${p.castingNumber ? `, ${p.castingNumber} ${p.serial}` : ""}${p.handedOverAt ? ", gone" : ""}`, href });
    }
    const orders = await tx.select({ id: workOrders.id, number: workOrders.number, customer: customers.name, wants: workOrders.wants, closedAt: workOrders.closedAt }).from(workOrders)
      .innerJoin(customers, and(eq(customers.shopId, workOrders.shopId), eq(customers.id, workOrders.customerId)))
      .where(and(eq(workOrders.shopId, ctx.shop.id), or(sql`lower(${workOrders.number}) like ${like}`, sql`${customers.nameKey} like ${like}`, sql`lower(${workOrders.customerReference}) like ${like}`,
        sql`exists (select 1 from pieces p where p.shop_id = ${workOrders.shopId} and p.work_order_id = ${workOrders.id} and lower(p.family) like ${like})`)))
      .orderBy(sql`${workOrders.closedAt} is not null`, desc(workOrders.number)).limit(EACH);
    for (const r of orders) {
      const href = `${base}/orders/${r.number}`;
      if (r.number.toLowerCase() === q) exact ??= href;
      rows.push({ kind: "order", id: r.id, title: r.number, detail: `${r.customer}${r.closedAt ? ", gone" : r.wants ? `, ${r.wants.slice(0, 60)}` : ""}`, href });
    }
    if (ableTo(ctx, "customers.see")) {
      for (const c of (await findCustomers({ ...ctx, tx }, { q: text, limit: EACH })).rows) {
        rows.push({ kind: "customer", id: c.id, title: c.name, detail: [c.phone, c.email].filter(Boolean).join(", "), href: `${base}/customers/${c.id}` });
      }
    }
    if (ableTo(ctx, "stock.see")) {
      const found = await tx.select({ id: parts.id, sku: parts.sku, description: parts.description }).from(parts)
        .where(and(eq(parts.shopId, ctx.shop.id), or(sql`lower(${parts.sku}) like ${like}`, sql`${parts.descriptionKey} like ${like}`))).orderBy(parts.sku).limit(EACH);
      for (const p of found) {
        const href = `${base}/parts/${encodeURIComponent(p.sku)}`;
        if (p.sku.toLowerCase() === q) exact ??= href;
        rows.push({ kind: "part", id: p.id, title: p.sku, detail: p.description, href });
      }
    }
  });
  return { rows, exact };
}
