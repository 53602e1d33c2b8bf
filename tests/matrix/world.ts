import { randomUUID } from "node:crypto";
import pg from "pg";
import type { ShopContext } from "@/modules/access/context";
import type { Role } from "@/modules/access/roles";
import { addPart } from "@/modules/stock/commands/parts";
import { currentDatabase } from "@/tests/support/database";
import { fillTables, digestOf } from "@/tests/support/fill-tables";
import { furnish, type FurnishedShop } from "@/tests/support/furnished-shop";
import { must, testShop } from "@/tests/support/shop";

/** Stands in B's words and nowhere else. */
export const CANARY = "Quillfinch";
export const NOW = "2026-03-20T17:00:00Z";

export interface Row { id: string; version: number }
type Rows = Record<string, Row[]>;

export interface World {
  a: FurnishedShop;
  b: FurnishedShop;
  /** Sees all; for digests and for looking ids up. */
  all: pg.Client;
  own: Rows;
  theirs: Rows;
  digestOfB(): Promise<Record<string, string>>;
  close(): Promise<void>;
}

async function rowsOf(client: pg.Client, shopId: string): Promise<Rows> {
  const { rows: tables } = await client.query<{ t: string; versioned: boolean }>(`select c.relname as t, exists (select 1 from pg_attribute v where v.attrelid = c.oid and v.attname = 'version' and not v.attisdropped) as versioned
    from pg_class c join pg_attribute a on a.attrelid = c.oid and a.attname = 'shop_id' join pg_attribute i on i.attrelid = c.oid and i.attname = 'id'
    where c.relnamespace = 'public'::regnamespace and c.relkind = 'r'`);
  const found: Rows = {};
  for (const { t, versioned } of tables) {
    found[t] = (await client.query<Row>(`select id, ${versioned ? "version::int" : "1"} as version from ${t} where shop_id = $1 order by id limit 50`, [shopId])).rows;
  }
  return found;
}

/** Shop A, whose people ask, and shop B, which has a row in every table and a canary in its words. */
export async function twoShops(): Promise<World> {
  const a = await furnish(await testShop("first"));
  const b = await furnish(await testShop("second", { zone: "Europe/London", currency: "GBP", locale: "en-GB", numbersFrom: { "WO-2026": 900, "TAG-260224": 90 } }));
  must(await addPart(b.as("owner", NOW), { sku: "QF-900", description: "Only here", partClass: "valve", salePrice: "9.00" }));
  const all = new pg.Client({ connectionString: currentDatabase().superuserUrl });
  await all.connect();
  await fillTables(all, b.shop.id, CANARY);
  return { a, b, all, own: await rowsOf(all, a.shop.id), theirs: await rowsOf(all, b.shop.id), digestOfB: () => digestOf(all, b.shop.id), close: () => all.end() };
}

/** Somebody of the shop with these roles and no others. */
export const inRole = (shop: FurnishedShop, ...roles: Role[]): ShopContext =>
  ({ ...shop.as("owner", NOW), actor: { kind: "person", id: shop.people.owner ?? "", name: "Somebody", roles, sessionId: null } });

/** Where an id stands in an input, and whose it is in this call. `mine` names the row of A that stands here while another place is tried. */
export type At = (table: string, mine?: string) => Row;

/** Fills positions: "theirs" everywhere, or at one position with A's own elsewhere; `nobody` gives ids that never were. */
export function positions(world: World, whose: "theirs" | "nobody", only: number | null): { at: At; seen: () => { table: string; id: string }[] } {
  const seen: { table: string; id: string }[] = [];
  const at: At = (table, mineId) => {
    const n = seen.length;
    const b = world.theirs[table]?.[0];
    if (!b) throw new Error(`shop B has no row in ${table}`);
    // A shop's own id at the other places, so that the call gets as far as it can; another one where A has none.
    const mine = world.own[table]?.find((r) => !mineId || r.id === mineId) ?? { id: randomUUID(), version: 1 };
    const row = only !== null && only !== n ? mine : whose === "theirs" ? b : { id: randomUUID(), version: b.version };
    seen.push({ table, id: row.id });
    return row;
  };
  return { at, seen: () => seen };
}
