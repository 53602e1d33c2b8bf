import type pg from "pg";

/** Ledgers of which a backup keeps a digest, so that a restored one can be told from one that only has as many rows. */
const LEDGERS = ["journal_entries", "journal_lines", "audit_log", "stock_movements", "punches", "payments", "invoices", "command_log"];

export interface Tables { readonly rows: Record<string, number>; readonly digests: Record<string, string> }

/** Rows of every table and digests of the ledgers, as this connection sees them. */
export async function tablesOf(client: pg.Client | pg.PoolClient): Promise<Tables> {
  const { rows: names } = await client.query<{ t: string }>("select relname as t from pg_class where relnamespace = 'public'::regnamespace and relkind = 'r' order by 1");
  const rows: Record<string, number> = {};
  const digests: Record<string, string> = {};
  for (const { t } of names) {
    const { rows: [found] } = await client.query<{ n: number }>(`select count(*)::int as n from "${t}"`);
    rows[t] = found?.n ?? 0;
  }
  for (const t of LEDGERS) {
    const { rows: [found] } = await client.query<{ d: string }>(`select md5(coalesce(string_agg(md5(r::text), '' order by md5(r::text)), '')) as d from "${t}" r`);
    digests[t] = found?.d ?? "";
  }
  return { rows, digests };
}

/** What differs between two pictures, in words; empty when they are alike. */
export function differences(then: Tables, now: Tables): string[] {
  const said: string[] = [];
  for (const t of new Set([...Object.keys(then.rows), ...Object.keys(now.rows)])) {
    if (then.rows[t] !== now.rows[t]) said.push(`${t}: ${then.rows[t] ?? "no table"} rows in the backup, ${now.rows[t] ?? "no table"} restored`);
  }
  for (const [t, digest] of Object.entries(then.digests)) if (now.digests[t] !== digest) said.push(`${t}: the rows are not the same`);
  return said;
}
