/** What the benchmark asks for: numbers and ids of the demo, and a link a customer holds. */
import { and, desc, eq, isNull, sql } from "drizzle-orm";
import { closeDatabase } from "@/db/client";
import { heads, invoices, links, shops, workOrders } from "@/db/schema";
import { withShop, withSystem } from "@/db/scope";
import { linkAddress } from "@/modules/access/link";

const [shop] = await withSystem("the shop of the benchmark", (tx) => tx.select().from(shops).where(eq(shops.slug, process.env.BENCH_SHOP ?? "ninebark")));
if (!shop) throw new Error("The demo has no such shop.");
const facts = await withShop(shop.id, async (tx) => {
  const [order] = await tx.select({ number: workOrders.number }).from(workOrders).where(and(eq(workOrders.shopId, shop.id), isNull(workOrders.cancelledAt))).orderBy(desc(workOrders.openedAt)).limit(1);
  const [head] = await tx.select({ id: heads.id }).from(heads).where(eq(heads.shopId, shop.id)).limit(1);
  const [link] = await tx.select({ id: links.id }).from(links).where(and(eq(links.shopId, shop.id), eq(links.purpose, "estimate"), isNull(links.revokedAt), sql`${links.expiresAt} > now()`)).orderBy(desc(links.createdAt)).limit(1);
  const [invoice] = await tx.select({ id: invoices.id }).from(invoices).where(and(eq(invoices.shopId, shop.id), eq(invoices.state, "issued"))).limit(1);
  const { rows: [tests] } = await tx.execute<{ n: number }>(sql`select count(*)::int as n from flow_tests where shop_id = ${shop.id} and state = 'complete'`);
  // The largest family (of the load named, so that ladders are alike), and two finished tests of one side in it: what the family picture and the overlay are asked for.
  const { rows: [family] } = await tx.execute<{ name: string }>(sql`select family as name from heads where shop_id = ${shop.id} and family like ${`${process.env.BENCH_FAMILIES ?? ""}%`} group by family order by count(*) desc, family limit 1`);
  const { rows: pair } = await tx.execute<{ id: string }>(sql`
    select t.id from flow_tests t join heads h on h.shop_id = t.shop_id and h.id = t.head_id
    where t.shop_id = ${shop.id} and t.state = 'complete' and h.family = ${family?.name ?? ""} and t.side = 'intake' order by t.id limit 2`);
  const { rows: [gear] } = await tx.execute<{ bench: string; fixture: string }>(sql`
    select bench_id as bench, fixture_id as fixture from flow_tests where shop_id = ${shop.id} and fixture_id is not null order by started_at desc limit 1`);
  // A head that was measured before and waits for its after test: the one to type into.
  const { rows: [waits] } = await tx.execute<{ id: string }>(sql`
    select t.head_id as id from flow_tests t where t.shop_id = ${shop.id} and t.purpose = 'baseline' and t.state = 'complete'
      and not exists (select 1 from flow_tests o where o.shop_id = t.shop_id and o.head_id = t.head_id and o.purpose <> 'baseline') order by t.started_at desc limit 1`);
  // A head nobody flowed yet, whose family has a bore: the one for a whole entry.
  const { rows: [fresh] } = await tx.execute<{ id: string }>(sql`
    select h.id from heads h where h.shop_id = ${shop.id} and h.cylinders = 1 and h.bore_mm is not null and not exists (select 1 from flow_tests t where t.shop_id = h.shop_id and t.head_id = h.id) order by h.mark limit 1`);
  return { freshHeadId: fresh?.id ?? null, gear: gear ?? null, waitingHeadId: waits?.id ?? null, family: family?.name ?? null, pair: pair.map((r) => r.id), order: order?.number ?? null, headId: head?.id ?? null, link: link ? new URL(linkAddress(link.id)).pathname : null, invoiceId: invoice?.id ?? null, tests: tests?.n ?? 0 };
});
await closeDatabase();
console.log(JSON.stringify({ slug: shop.slug, shopId: shop.id, ...facts }));
