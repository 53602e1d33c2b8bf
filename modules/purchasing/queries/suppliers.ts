import "server-only";
import { and, asc, eq, sql } from "drizzle-orm";
import { suppliers } from "@/db/schema";
import { inShop, mustBeAble, NotFound, type ShopContext } from "@/modules/access/context";

export interface SupplierRow { id: string; name: string; email: string; phone: string; address: string; terms: string; leadDays: number | null; active: boolean; version: number; openOrders: number; partCount: number }

const columns = {
  id: suppliers.id, name: suppliers.name, email: suppliers.email, phone: suppliers.phone, address: suppliers.address, terms: suppliers.terms, leadDays: suppliers.leadDays, active: suppliers.active, version: suppliers.version,
  openOrders: sql<number>`(select count(*) from purchase_orders o where o.shop_id = "suppliers"."shop_id" and o.supplier_id = "suppliers"."id" and o.state = 'sent' and exists (select 1 from purchase_order_lines l where l.shop_id = o.shop_id and l.purchase_order_id = o.id and l.received_milli < l.qty_milli))::int`,
  partCount: sql<number>`(select count(*) from parts p where p.shop_id = "suppliers"."shop_id" and p.preferred_supplier_id = "suppliers"."id" and p.active)::int`,
};

/** All suppliers by name; those no longer used come last. */
export async function findSuppliers(ctx: ShopContext): Promise<SupplierRow[]> {
  mustBeAble(ctx, "purchase.see");
  return inShop(ctx, (tx) => tx.select(columns).from(suppliers).where(eq(suppliers.shopId, ctx.shop.id)).orderBy(sql`not ${suppliers.active}`, asc(suppliers.name)).limit(500));
}

/** Names for choosing from; also for those who keep parts but buy nothing. */
export async function supplierNames(ctx: ShopContext): Promise<{ id: string; name: string }[]> {
  mustBeAble(ctx, "parts.write");
  return inShop(ctx, (tx) => tx.select({ id: suppliers.id, name: suppliers.name }).from(suppliers).where(and(eq(suppliers.shopId, ctx.shop.id), eq(suppliers.active, true))).orderBy(asc(suppliers.name)).limit(500));
}

/** @throws NotFound */
export async function getSupplier(ctx: ShopContext, id: string): Promise<SupplierRow> {
  mustBeAble(ctx, "purchase.see");
  const [row] = await inShop(ctx, (tx) => tx.select(columns).from(suppliers).where(and(eq(suppliers.shopId, ctx.shop.id), eq(suppliers.id, id))));
  if (!row) throw new NotFound("supplier");
  return row;
}
