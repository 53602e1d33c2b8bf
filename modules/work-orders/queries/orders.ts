import "server-only";
import { and, asc, desc, eq, inArray, sql, type SQL } from "drizzle-orm";
import { customers, people, workOrders } from "@/db/schema";
import { ableTo, inShop, mustBeAble, type ShopContext } from "@/modules/access/context";
import { nameKey } from "@/modules/customers/domain/search-key";
import { addDays, localDate } from "@/modules/kernel/instant";
import type { z } from "@/modules/kernel/zod";
import { orderStatus, type StateDial } from "../domain/piece-status";
import { ORDER_VIEWS, type findOrdersInput } from "../input";
import { houseOrders } from "./house";

export type OrderView = (typeof ORDER_VIEWS)[number];
export type OrdersAsk = z.output<typeof findOrdersInput>;
export interface OrderRow {
  number: string; customer: string; job: string; tags: string[]; station: string | null; dial: StateDial; word: string; since: string | null; due: "today" | "late" | null;
  promisedOn: string | null; workedMinutes: number; bookMinutes: number; totalMinor: number | null; by: string; person: string | null;
}
export interface OrdersPage { rows: OrderRow[]; next: string | null; counts: Record<OrderView, number>; people: string[]; now: string; today: string }

const o = workOrders;
const literal = (s: string) => s.replace(/[\\%_]/g, (c) => `\\${c}`);
const open = sql`${o.closedAt} is null and ${o.cancelledAt} is null`;
const workedSql = sql`coalesce((select sum(floor(extract(epoch from t.ended_at) / 60) - floor(extract(epoch from t.started_at) / 60)) from time_entries t where t.shop_id = ${o.shopId} and t.work_order_id = ${o.id} and t.clock = 'bench' and t.voided_at is null and t.ended_at is not null), 0)`;
const bookSql = sql`coalesce((select sum(x.book_minutes) from operations x where x.shop_id = ${o.shopId} and x.work_order_id = ${o.id} and x.removed_at is null and x.skipped_at is null), 0)`;

/** What a saved view holds, as a condition on orders. */
function viewSql(view: OrderView, today: string): SQL {
  switch (view) {
    case "open": return open;
    case "due": return sql`${open} and ${o.promisedOn} <= ${addDays(today, 6)}`;
    case "approval": return sql`${open} and exists (select 1 from estimates e where e.shop_id = ${o.shopId} and e.work_order_id = ${o.id} and e.state = 'sent')`;
    case "short": return sql`${open} and exists (select 1 from work_order_parts w where w.shop_id = ${o.shopId} and w.work_order_id = ${o.id} and w.removed_at is null and w.needed_milli > w.issued_milli + w.reserved_milli)`;
    case "over": return sql`${open} and ${bookSql} > 0 and ${workedSql} > ${bookSql}`;
    case "to-invoice": return sql`${o.cancelledAt} is null and exists (select 1 from pieces p where p.shop_id = ${o.shopId} and p.work_order_id = ${o.id} and p.released_at is not null)
      and not exists (select 1 from pieces p where p.shop_id = ${o.shopId} and p.work_order_id = ${o.id} and p.released_at is null and p.stopped_at is null)
      and not exists (select 1 from invoices i where i.shop_id = ${o.shopId} and i.work_order_id = ${o.id} and i.state = 'issued')`;
    case "gone": return sql`${o.closedAt} is not null`;
  }
}

/** Station of the next open operation of any piece in the house; as the floor shows it, but for the counter. */
const nextStationSql = sql`(select x.station from operations x join pieces p on p.shop_id = x.shop_id and p.id = x.piece_id
  where x.shop_id = ${o.shopId} and x.work_order_id = ${o.id} and x.removed_at is null and x.done_at is null and x.skipped_at is null and p.booked_in_at is not null and p.released_at is null order by x.sequence limit 1)`;

function filterSql(ask: OrdersAsk, today: string): SQL | undefined {
  const q = nameKey(ask.q);
  const like = `%${literal(q)}%`;
  return and(
    q === "" ? undefined : sql`(lower(${o.number}) like ${like} or ${customers.nameKey} like ${like} or lower(${o.customerReference}) like ${like}
      or exists (select 1 from pieces p where p.shop_id = ${o.shopId} and p.work_order_id = ${o.id} and (lower(p.family) like ${like} or lower(p.tag) like ${like} or lower(p.casting_number) like ${like} or lower(p.serial) like ${like})))`,
    ask.station === "" ? undefined : ask.station === "Counter out"
      ? sql`exists (select 1 from pieces p where p.shop_id = ${o.shopId} and p.work_order_id = ${o.id} and p.released_at is not null and p.handed_over_at is null)`
      : ask.station === "Counter in"
        ? sql`exists (select 1 from pieces p where p.shop_id = ${o.shopId} and p.work_order_id = ${o.id} and p.booked_in_at is not null and p.released_at is null) and not exists (select 1 from operations x where x.shop_id = ${o.shopId} and x.work_order_id = ${o.id} and x.removed_at is null and (x.started_at is not null or x.done_at is not null))`
        : sql`${nextStationSql} = ${ask.station}`,
    ask.person === "" ? undefined : sql`exists (select 1 from time_entries t join people w on w.shop_id = t.shop_id and w.id = t.person_id where t.shop_id = ${o.shopId} and t.work_order_id = ${o.id} and t.voided_at is null and w.short_name = ${ask.person})`,
    ask.promised === "" ? undefined : ask.promised === "today" ? sql`${o.promisedOn} = ${today}` : ask.promised === "week" ? sql`${o.promisedOn} between ${today} and ${addDays(today, 6)}`
      : ask.promised === "late" ? sql`${o.promisedOn} < ${today}` : sql`${o.promisedOn} is null`,
  );
}

/** Orders of a saved view: filtered, sorted, paged by key so that a page never skips or repeats a row. */
export async function findOrders(ctx: ShopContext, ask: OrdersAsk): Promise<OrdersPage> {
  mustBeAble(ctx, "orders.see");
  const seesPrices = ableTo(ctx, "prices.see");
  return inShop(ctx, async (tx) => {
    const inner = { ...ctx, tx };
    const today = localDate(ctx.now, ctx.shop.zone);
    const down = ask.descending === "true";
    // Undated promises come last whichever way it is sorted.
    const key = ask.sort === "customer" ? sql<string>`${customers.nameKey}` : ask.sort === "promised" ? sql<string>`coalesce(${o.promisedOn}::text, ${down ? "0000" : "9999"})` : sql<string>`${o.number}`;
    const [afterKey, afterNumber] = ask.after ? (JSON.parse(Buffer.from(ask.after, "base64url").toString() || "[]") as [string, string]) : [];
    const way = down ? sql`<` : sql`>`;
    const found = await tx.select({ id: o.id, number: o.number, key }).from(o).innerJoin(customers, and(eq(customers.shopId, o.shopId), eq(customers.id, o.customerId)))
      .where(and(eq(o.shopId, ctx.shop.id), viewSql(ask.view, today), filterSql(ask, today), afterKey === undefined ? undefined : sql`(${key}, ${o.number}) ${way} (${afterKey}, ${afterNumber})`))
      .orderBy(down ? desc(key) : asc(key), down ? desc(o.number) : asc(o.number)).limit(ask.limit + 1);
    const page = found.slice(0, ask.limit);
    const house = new Map((page.length === 0 ? [] : await houseOrders(inner, inArray(o.id, page.map((r) => r.id)))).map((h) => [h.id, h]));
    const [counts] = await tx.select(Object.fromEntries(ORDER_VIEWS.map((v) => [v, sql<number>`count(*) filter (where ${viewSql(v, today)})::int`])) as Record<OrderView, SQL<number>>).from(o).where(eq(o.shopId, ctx.shop.id));
    const workers = await tx.select({ name: people.shortName }).from(people).where(and(eq(people.shopId, ctx.shop.id), sql`${people.leftAt} is null`, sql`${people.roles} && array['technician','lead','inspector','receiving']`)).orderBy(asc(people.shortName));
    const last = page.at(-1);
    return {
      rows: page.flatMap((r): OrderRow[] => {
        const h = house.get(r.id);
        if (!h) return [];
        const status = orderStatus(h.pieces.map((p) => p.status));
        const families = [...new Set(h.pieces.map((p) => p.family))];
        return [{
          number: h.number, customer: h.customer, job: `${families.join(", ")}${h.pieces.length === 1 ? "" : h.pieces.length === 2 ? ", pair" : `, ${h.pieces.length} heads`}`, tags: h.pieces.flatMap((p) => (p.tag ? [p.tag] : [])),
          station: status?.station ?? null, dial: h.isCancelled ? "out" : (status?.dial ?? "draft"), word: h.isCancelled ? "Called off" : (status?.word ?? ""), since: status?.since ?? null, due: h.isClosed || h.isCancelled ? null : (status?.due ?? null),
          promisedOn: h.promisedOn, workedMinutes: h.pieces.reduce((sum, p) => sum + p.workedMinutes, 0), bookMinutes: h.pieces.reduce((sum, p) => sum + p.bookMinutes, 0),
          totalMinor: seesPrices ? (h.agreedMinor || h.waiting?.totalMinor || null) : null, by: h.openedBy, person: h.pieces.find((p) => p.running)?.running?.person ?? null,
        }];
      }),
      next: found.length > ask.limit && last ? Buffer.from(JSON.stringify([last.key, last.number])).toString("base64url") : null,
      counts: counts ?? (Object.fromEntries(ORDER_VIEWS.map((v) => [v, 0])) as Record<OrderView, number>),
      people: workers.map((w) => w.name), now: ctx.now.toISOString(), today,
    };
  });
}
