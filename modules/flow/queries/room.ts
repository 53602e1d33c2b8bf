import "server-only";
import { and, eq, sql, type SQL } from "drizzle-orm";
import { heads } from "@/db/schema";
import { inShop, mustBeAble, type ShopContext } from "@/modules/access/context";
import { seesCustomers } from "./gain";

export type RoomState = "bench" | "before" | "after" | "proved";
export interface RoomRow { headId: string; mark: string; family: string; customerName: string | null; orderNumber: string | null; state: RoomState; lastAt: string | null; lastBy: string | null; tests: number }
/** `counts`: of all heads that match, on the first page only. */
export interface RoomPage { rows: RoomRow[]; next: string | null; counts: Record<RoomState, number> | null }

const literal = (s: string) => s.replace(/[\\%_]/g, (c) => `\\${c}`);

interface Raw extends Record<string, unknown> { head_id: string; mark: string; family: string; customer_name: string | null; order_number: string | null; state: RoomState; last_at: string | null; last_by: string | null; tests: number; at_key: string }
interface Ask { q: string; state: "" | RoomState; limit: number; after?: string | undefined }
/** Where a page begins: behind this moment and head. */
interface Cursor { at: string; headId: string }

function cursorOf(after: string | undefined): Cursor | null {
  const [at = "", headId = ""] = (after ?? "").split("|");
  return at !== "" && !Number.isNaN(Date.parse(at)) && /^[0-9a-f-]{36}$/.test(headId) ? { at, headId } : null;
}

// A head is in the room while its piece is in the house, and for good once it was flowed.
const IN_HOUSE = sql`p.handed_over_at is null and p.stopped_at is null`;
const PIECE = sql`left join pieces p on p.shop_id = h.shop_id and p.id = h.piece_id`;

/**
 * Heads of the page by the newest test of each, walked down the index of tests from the newest: as long as the page, not as the
 * shop's history. Beside them those in the house that were never flowed.
 */
function newestHeads(s: string, cursor: Cursor | null, rows: number): SQL {
  const behind = (at: SQL, head: SQL) => (cursor ? sql`and ${at} <= ${cursor.at}::timestamptz and (${at}, ${head}) < (${cursor.at}::timestamptz, ${cursor.headId}::uuid)` : sql``);
  return sql`
    (select f.head_id, f.started_at as at from flow_tests f
      where f.shop_id = ${s} and f.state <> 'void' ${behind(sql`f.started_at`, sql`f.head_id`)}
        and not exists (select 1 from flow_tests l where l.shop_id = f.shop_id and l.head_id = f.head_id and l.state <> 'void' and (l.started_at, l.id) > (f.started_at, f.id))
      order by f.started_at desc, f.head_id desc limit ${rows})
    union all
    (select h.id as head_id, coalesce(p.booked_in_at, h.created_at) as at from ${heads} h ${PIECE}
      where h.shop_id = ${s} and ${IN_HOUSE} ${behind(sql`coalesce(p.booked_in_at, h.created_at)`, sql`h.id`)}
        and not exists (select 1 from flow_tests f where f.shop_id = h.shop_id and f.head_id = h.id and f.state <> 'void')
      order by at desc, head_id desc limit ${rows})`;
}

/** Every head of the room with where it stands, in one pass over the tests: for counting, and for a page that is filtered. */
function allHeads(s: string, q: string, sees: boolean): SQL {
  const like = `%${literal(q)}%`;
  const matches = q === "" ? sql`` : sql`and (lower(h.mark) like ${like} or lower(h.family) like ${like} or lower(coalesce(o.number, '')) like ${like} ${sees ? sql`or lower(coalesce(c.name, '')) like ${like}` : sql``})`;
  const order = q === "" ? sql`` : sql`left join work_orders o on o.shop_id = p.shop_id and o.id = p.work_order_id left join customers c on c.shop_id = o.shop_id and c.id = o.customer_id`;
  return sql`
    select h.id as head_id, coalesce(t.last_at, p.booked_in_at, h.created_at) as at,
      case when t.draft then 'bench' when t.proved then 'proved' when t.begun then 'after' else 'before' end as state
    from ${heads} h ${PIECE} ${order}
    left join (
      select f.head_id, max(f.started_at) as last_at, bool_or(f.state = 'draft') as draft, bool_or(f.state = 'complete' and f.purpose = 'after') as proved, bool_or(f.state = 'complete' and f.purpose = 'baseline') as begun
      from flow_tests f where f.shop_id = ${s} and f.state <> 'void' group by f.head_id
    ) t on t.head_id = h.id
    where h.shop_id = ${s} and (t.head_id is not null or (${IN_HOUSE})) ${matches}`;
}

/** Heads that are here or were flowed, newest bench work first, by where they stand. Keyset-paged: the page first, then its facts. */
export async function roomPage(ctx: ShopContext, ask: Ask): Promise<RoomPage> {
  mustBeAble(ctx, "flow.see");
  const s = ctx.shop.id;
  const sees = seesCustomers(ctx);
  const q = ask.q.toLowerCase();
  const cursor = cursorOf(ask.after);
  const rows = ask.limit + 1;
  const found = q === "" && ask.state === ""
    ? newestHeads(s, cursor, rows)
    : sql`select x.head_id, x.at from (${allHeads(s, q, sees)}) x where ${ask.state ? sql`x.state = ${ask.state}` : sql`true`} ${cursor ? sql`and (x.at, x.head_id) < (${cursor.at}::timestamptz, ${cursor.headId}::uuid)` : sql``}`;
  return inShop(ctx, async (tx) => {
    const page = await tx.execute<Raw>(sql`
      with page as materialized (select head_id, at from (${found}) f order by at desc, head_id desc limit ${rows})
      select h.id as head_id, h.mark, h.family, c.name as customer_name, o.number as order_number, t.last_at, n.short_name as last_by, coalesce(t.tests, 0) as tests,
        case when t.drafts > 0 then 'bench' when t.afters > 0 then 'proved' when t.baselines > 0 then 'after' else 'before' end as state,
        to_char(page.at at time zone 'UTC', 'YYYY-MM-DD"T"HH24:MI:SS.US"Z"') as at_key
      from page
      join ${heads} h on h.shop_id = ${s} and h.id = page.head_id
      ${PIECE}
      left join work_orders o on o.shop_id = p.shop_id and o.id = p.work_order_id
      left join customers c on c.shop_id = o.shop_id and c.id = o.customer_id
      left join lateral (
        select count(*)::int as tests, count(*) filter (where f.state = 'draft')::int as drafts, count(*) filter (where f.state = 'complete' and f.purpose = 'after')::int as afters,
          count(*) filter (where f.state = 'complete' and f.purpose = 'baseline')::int as baselines, max(f.started_at) as last_at, (array_agg(f.operator_id order by f.started_at desc, f.id desc))[1] as last_id
        from flow_tests f where f.shop_id = ${s} and f.head_id = h.id and f.state <> 'void'
      ) t on true
      left join people n on n.shop_id = ${s} and n.id = t.last_id
      order by page.at desc, h.id desc`);
    // The counts stand over the first page; those behind it do not ask for them again.
    const counted = cursor ? [] : (await tx.execute<{ state: RoomState; n: number }>(sql`select x.state, count(*)::int as n from (${allHeads(s, q, sees)}) x group by x.state`)).rows;
    const shown = page.rows.slice(0, ask.limit);
    const last = shown.at(-1);
    const counts: Record<RoomState, number> = { bench: 0, before: 0, after: 0, proved: 0 };
    for (const c of counted) counts[c.state] = c.n;
    return {
      rows: shown.map((r) => ({
        headId: r.head_id, mark: r.mark, family: r.family, customerName: sees ? r.customer_name : null, orderNumber: r.order_number, state: r.state,
        lastAt: r.last_at === null ? null : new Date(r.last_at).toISOString(), lastBy: r.last_by, tests: r.tests,
      })),
      next: page.rows.length > ask.limit && last ? `${last.at_key}|${last.head_id}` : null,
      counts: cursor ? null : counts,
    };
  });
}

/** The head of a tag, for starting a sheet; null when no such tag is here. */
export async function headOfTag(ctx: ShopContext, tag: string): Promise<string | null> {
  mustBeAble(ctx, "flow.see");
  const rows = await inShop(ctx, (tx) => tx.select({ id: heads.id }).from(heads).where(and(eq(heads.shopId, ctx.shop.id), sql`lower(${heads.mark}) = lower(${tag.trim()})`)).limit(1));
  return rows[0]?.id ?? null;
}
