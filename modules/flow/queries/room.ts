import "server-only";
import { and, eq, sql } from "drizzle-orm";
import { heads } from "@/db/schema";
import { inShop, mustBeAble, type ShopContext } from "@/modules/access/context";
import { seesCustomers } from "./gain";

export type RoomState = "bench" | "before" | "after" | "proved";
export interface RoomRow { headId: string; mark: string; family: string; customerName: string | null; orderNumber: string | null; state: RoomState; lastAt: string | null; lastBy: string | null; tests: number }
export interface RoomPage { rows: RoomRow[]; next: string | null; counts: Record<RoomState, number> }

const literal = (s: string) => s.replace(/[\\%_]/g, (c) => `\\${c}`);

interface Raw extends Record<string, unknown> { head_id: string; mark: string; family: string; customer_name: string | null; order_number: string | null; state: RoomState; last_at: string | null; last_by: string | null; tests: number; at_key: string }

/** Heads that are here or were flowed, newest bench work first, by where they stand. Keyset-paged. */
export async function roomPage(ctx: ShopContext, ask: { q: string; state: "" | RoomState; limit: number; after?: string | undefined }): Promise<RoomPage> {
  mustBeAble(ctx, "flow.see");
  const s = ctx.shop.id;
  const sees = seesCustomers(ctx);
  // A head is in the room while its piece is in the house, and for good once it was flowed.
  const standing = sql`
    select h.id as head_id, h.mark, h.family, c.name as customer_name, o.number as order_number, t.last_at, t.last_by, coalesce(t.tests, 0) as tests,
      coalesce(t.last_at, p.booked_in_at, h.created_at) as at,
      case when t.drafts > 0 then 'bench' when t.afters > 0 then 'proved' when t.baselines > 0 then 'after' else 'before' end as state
    from ${heads} h
    left join pieces p on p.shop_id = h.shop_id and p.id = h.piece_id
    left join work_orders o on o.shop_id = p.shop_id and o.id = p.work_order_id
    left join customers c on c.shop_id = o.shop_id and c.id = o.customer_id
    left join lateral (
      select count(*)::int as tests, count(*) filter (where f.state = 'draft')::int as drafts, count(*) filter (where f.state = 'complete' and f.purpose = 'after')::int as afters,
        count(*) filter (where f.state = 'complete' and f.purpose = 'baseline')::int as baselines, max(f.started_at) as last_at,
        (array_agg(w.short_name order by f.started_at desc))[1] as last_by
      from flow_tests f join people w on w.shop_id = f.shop_id and w.id = f.operator_id
      where f.shop_id = h.shop_id and f.head_id = h.id and f.state <> 'void'
    ) t on true
    where h.shop_id = ${s} and (t.tests > 0 or (p.handed_over_at is null and p.stopped_at is null))`;
  const q = ask.q.toLowerCase();
  const like = `%${literal(q)}%`;
  const matches = q === "" ? sql`true` : sql`(lower(mark) like ${like} or lower(family) like ${like} or lower(coalesce(order_number, '')) like ${like} ${sees ? sql`or lower(coalesce(customer_name, '')) like ${like}` : sql``})`;
  const [afterAt, afterId] = (ask.after ?? "").split("|");
  const isPaged = Boolean(afterAt && afterId && !Number.isNaN(Date.parse(afterAt)) && /^[0-9a-f-]{36}$/.test(afterId));
  return inShop(ctx, async (tx) => {
    const page = await tx.execute<Raw>(sql`select *, to_char(at at time zone 'UTC', 'YYYY-MM-DD"T"HH24:MI:SS.US"Z"') as at_key from (${standing}) x
      where ${matches} ${ask.state ? sql`and state = ${ask.state}` : sql``} ${isPaged ? sql`and (at, head_id) < (${afterAt}::timestamptz, ${afterId}::uuid)` : sql``}
      order by at desc, head_id desc limit ${ask.limit + 1}`);
    const counted = await tx.execute<{ state: RoomState; n: number }>(sql`select state, count(*)::int as n from (${standing}) x where ${matches} group by state`);
    const rows = page.rows.slice(0, ask.limit);
    const last = rows.at(-1);
    const counts: Record<RoomState, number> = { bench: 0, before: 0, after: 0, proved: 0 };
    for (const c of counted.rows) counts[c.state] = c.n;
    return {
      rows: rows.map((r) => ({
        headId: r.head_id, mark: r.mark, family: r.family, customerName: sees ? r.customer_name : null, orderNumber: r.order_number, state: r.state,
        lastAt: r.last_at === null ? null : new Date(r.last_at).toISOString(), lastBy: r.last_by, tests: r.tests,
      })),
      next: page.rows.length > ask.limit && last ? `${last.at_key}|${last.head_id}` : null,
      counts,
    };
  });
}

/** The head of a tag, for starting a sheet; null when no such tag is here. */
export async function headOfTag(ctx: ShopContext, tag: string): Promise<string | null> {
  mustBeAble(ctx, "flow.see");
  const rows = await inShop(ctx, (tx) => tx.select({ id: heads.id }).from(heads).where(and(eq(heads.shopId, ctx.shop.id), sql`lower(${heads.mark}) = lower(${tag.trim()})`)).limit(1));
  return rows[0]?.id ?? null;
}
