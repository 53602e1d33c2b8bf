import { randomUUID } from "node:crypto";
import type pg from "pg";

interface Column { name: string; type: string; udt: string; nullable: boolean; hasDefault: boolean; generated: boolean }

/** Free words of a person: what a canary may stand in without changing what a row means. */
const WORDS = new Set([
  "name", "name_key", "description", "description_key", "note", "notes", "words", "wants", "reason", "address", "message", "exclusions", "subject", "body_text", "body_html", "place", "serial",
  "casting_number", "customer_reference", "customer_words", "bench_note", "missing", "damage", "carrier", "tracking", "text", "mark", "bin", "material_note", "supplier_number", "delivery_note",
  "certificate", "head_pattern", "plate", "seat_note", "data_source", "source_text", "must_record", "to_name", "piece_tag", "short_name", "actor_name", "invoice_words", "tax_number", "jurisdiction", "instrument", "cancel_reason", "stop_reason", "credit_reason", "handed_over_to",
]);

async function tablesOf(client: pg.Client): Promise<string[]> {
  const { rows } = await client.query<{ t: string }>(`select c.relname as t from pg_class c join pg_attribute a on a.attrelid = c.oid and a.attname = 'shop_id' and not a.attisdropped
    where c.relnamespace = 'public'::regnamespace and c.relkind = 'r' order by 1`);
  return rows.map((r) => r.t);
}

async function columnsOf(client: pg.Client, table: string): Promise<Column[]> {
  const { rows } = await client.query<Column>(`select column_name as name, data_type as type, udt_name as udt, is_nullable = 'YES' as nullable, column_default is not null or is_identity = 'YES' as "hasDefault",
    is_generated = 'ALWAYS' as generated from information_schema.columns where table_schema = 'public' and table_name = $1 order by ordinal_position`, [table]);
  return rows;
}

/** Columns of a foreign key (without the shop) and where they lead. */
async function linksOf(client: pg.Client, table: string): Promise<Map<string, { table: string; column: string }>> {
  const { rows } = await client.query<{ col: string; target: string; target_col: string }>(`
    select a.attname as col, c.confrelid::regclass::text as target, f.attname as target_col from pg_constraint c
    cross join lateral unnest(c.conkey, c.confkey) as k(own, other) join pg_attribute a on a.attrelid = c.conrelid and a.attnum = k.own join pg_attribute f on f.attrelid = c.confrelid and f.attnum = k.other
    where c.contype = 'f' and c.conrelid = $1::regclass and a.attname <> 'shop_id'`, [table]);
  return new Map(rows.map((r) => [r.col, { table: r.target, column: r.target_col }]));
}

/** Columns for look-up hold lower-case copies. */
const spelt = (column: string, canary: string): string => (column.endsWith("_key") ? canary.toLowerCase() : canary);

async function valueFor(client: pg.Client, shopId: string, c: Column, to: { table: string; column: string } | undefined, canary: string): Promise<unknown> {
  if (to) {
    const shopless = ["shops", "users"].includes(to.table);
    const { rows } = await client.query<{ v: unknown }>(`select ${to.column} as v from ${to.table} ${shopless ? "" : "where shop_id = $1"} limit 1`, shopless ? [] : [shopId]);
    return rows[0]?.v ?? null;
  }
  if (c.type === "uuid") return randomUUID();
  if (c.type === "text") return WORDS.has(c.name) ? spelt(c.name, canary) : `x-${c.name}`;
  if (c.type === "ARRAY") return [];
  // Lists and snapshots of things: an empty one can be read by whoever knows the kind.
  if (c.type === "jsonb") return "[]";
  if (c.type === "boolean") return false;
  if (c.type === "date") return "2026-03-01";
  if (c.type.startsWith("timestamp")) return "2026-03-01T12:00:00Z";
  return 1;
}

/**
 * Gives a shop at least one row in every table, and a canary word in every column that holds a person's words. Done with
 * triggers off: such rows are for being looked for by another shop, not for being worked with.
 * @returns the tables that were empty before
 */
export async function fillTables(client: pg.Client, shopId: string, canary: string): Promise<string[]> {
  const filled: string[] = [];
  await client.query("set session_replication_role = replica");
  const tables = await tablesOf(client);
  for (let round = 0; round < 4; round++) {
    for (const table of tables) {
      const { rows } = await client.query(`select 1 from ${table} where shop_id = $1 limit 1`, [shopId]);
      if (rows.length > 0) continue;
      const links = await linksOf(client, table);
      const names: string[] = [];
      const values: unknown[] = [];
      let waits = false;
      for (const c of await columnsOf(client, table)) {
        if (c.generated || (c.hasDefault && !WORDS.has(c.name)) || (c.nullable && !WORDS.has(c.name))) continue;
        const v = c.name === "shop_id" ? shopId : await valueFor(client, shopId, c, links.get(c.name), canary);
        if (v === null) waits = true;
        names.push(c.name);
        values.push(v);
      }
      if (waits && round < 3) continue;
      await client.query(`insert into ${table} (${names.join(", ")}) values (${names.map((_, i) => `$${i + 1}`).join(", ")})`, values);
      filled.push(table);
    }
  }
  for (const table of tables) {
    for (const c of await columnsOf(client, table)) {
      if (c.type !== "text" || !WORDS.has(c.name) || c.generated) continue;
      const word = spelt(c.name, canary);
      await client.query(`update ${table} set ${c.name} = ${c.name} || ' ${word}' where shop_id = $1 and ${c.name} is not null and position('${word}' in ${c.name}) = 0`, [shopId]);
    }
  }
  await client.query("set session_replication_role = default");
  return filled;
}

/** One hash over every row of a shop, table by table, so that a difference names its table. */
export async function digestOf(client: pg.Client, shopId: string): Promise<Record<string, string>> {
  const tables = await tablesOf(client);
  const { rows } = await client.query<{ t: string; h: string }>(tables.map((t) => `select '${t}' as t, md5(coalesce(string_agg(r::text, '|' order by r::text), '')) as h from ${t} r where shop_id = '${shopId}'`).join(" union all "));
  return Object.fromEntries(rows.map((r) => [r.t, r.h]));
}
