import "server-only";
import { and, asc, eq, gt, like, or } from "drizzle-orm";
import { customers } from "@/db/schema";
import { inShop, mustBeAble, NotFound, type ShopContext } from "@/modules/access/context";
import { nameKey, phoneDigits } from "./domain/search-key";

export interface CustomerRow { id: string; name: string; kind: string; email: string | null; phone: string | null; terms: string; laborDiscountBasisPoints: number }

const columns = {
  id: customers.id, name: customers.name, kind: customers.kind, email: customers.email, phone: customers.phone, terms: customers.terms,
  laborDiscountBasisPoints: customers.laborDiscountBasisPoints,
};
const literal = (s: string) => s.replace(/[\\%_]/g, (c) => `\\${c}`);

/** Customers by any scrap: part of a name or mail address, the tail of a telephone number. Keyset-paged by name. */
export async function findCustomers(ctx: ShopContext, ask: { q: string; limit: number; after?: string | undefined }): Promise<{ rows: CustomerRow[]; next: string | null }> {
  mustBeAble(ctx, "customers.see");
  const q = nameKey(ask.q);
  const digits = phoneDigits(ask.q);
  const rows = await inShop(ctx, (tx) => tx.select({ ...columns, nameKey: customers.nameKey }).from(customers).where(and(
    eq(customers.shopId, ctx.shop.id),
    q ? or(like(customers.nameKey, `%${literal(q)}%`), like(customers.email, `%${literal(q)}%`), digits.length >= 3 ? like(customers.phoneDigits, `%${digits}%`) : undefined) : undefined,
    ask.after ? gt(customers.nameKey, ask.after) : undefined,
  )).orderBy(asc(customers.nameKey)).limit(ask.limit + 1));
  const page = rows.slice(0, ask.limit);
  return { rows: page.map(({ nameKey: _, ...r }) => r), next: rows.length > ask.limit ? (page.at(-1)?.nameKey ?? null) : null };
}

/** One customer, whole. @throws NotFound */
export async function getCustomer(ctx: ShopContext, id: string) {
  mustBeAble(ctx, "customers.see");
  const [row] = await inShop(ctx, (tx) => tx.select().from(customers).where(and(eq(customers.shopId, ctx.shop.id), eq(customers.id, id))));
  if (!row) throw new NotFound("customer");
  const { shopId: _, nameKey: __, phoneDigits: ___, createdAt, ...rest } = row;
  return { ...rest, since: createdAt.toISOString() };
}
