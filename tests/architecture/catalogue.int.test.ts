import { describe, expect, it } from "vitest";
import { behindTheCurtain } from "@/tests/support/database";

/** Tables that belong to no shop, each with the reason. */
const SHOPLESS: Record<string, string> = {
  shops: "public facts, needed to find a shop",
  users: "a person may sign in to several shops",
  sessions: "belong to a user",
  provider_events: "arrive before their shop is known; raw inbox",
  rate_limits: "count tries before anybody is known",
  applied_steps: "bookkeeping of set-up",
};

const rows = (sql: string) => behindTheCurtain(sql);

describe("the database catalogue", () => {
  it("has a shop in every table but the listed ones", async () => {
    const without = await rows(`select relname from pg_class c where relnamespace = 'public'::regnamespace and relkind = 'r'
      and not exists (select 1 from pg_attribute a where a.attrelid = c.oid and attname = 'shop_id' and not attisdropped) order by 1`);
    expect(without).toEqual(Object.keys(SHOPLESS).sort());
  });
  it("has row security on and forced on every shop table, with a check for reads and writes", async () => {
    expect(await rows(`select relname from pg_class c join pg_attribute a on a.attrelid = c.oid and attname = 'shop_id'
      where relnamespace = 'public'::regnamespace and relkind = 'r' and not (relrowsecurity and relforcerowsecurity)`)).toEqual([]);
    expect(await rows(`select c.relname from pg_class c join pg_attribute a on a.attrelid = c.oid and attname = 'shop_id'
      where relnamespace = 'public'::regnamespace and relkind = 'r' and not exists
        (select 1 from pg_policies p where p.tablename = c.relname and policyname = 'one_shop' and cmd = 'ALL' and qual is not null and with_check is not null)`)).toEqual([]);
  });
  it("lets no working role own, create or bypass", async () => {
    expect(await rows(`select rolname from pg_roles where rolname in ('vk_app','vk_job') and (rolsuper or rolbypassrls or rolcreatedb or rolcreaterole)`)).toEqual([]);
    expect(await rows(`select relname from pg_class c join pg_roles r on r.oid = c.relowner where relnamespace = 'public'::regnamespace and rolname in ('vk_app','vk_job','vk_backup')`)).toEqual([]);
    expect(await rows(`select has_schema_privilege('vk_app','public','create')::text`)).toEqual(["false"]);
    expect(await rows(`select roleid::regrole::text from pg_auth_members where member in ('vk_app'::regrole,'vk_job'::regrole)`)).toEqual([]);
  });
  it("carries the shop in every key: primary keys, foreign keys between shop tables, unique constraints", async () => {
    const shopTable = `exists (select 1 from pg_attribute a where a.attrelid = c.conrelid and attname = 'shop_id' and not attisdropped)`;
    const first = `(select attname from pg_attribute a where a.attrelid = c.conrelid and a.attnum = c.conkey[1])`;
    expect(await rows(`select conname from pg_constraint c where contype in ('p','u') and connamespace = 'public'::regnamespace and ${shopTable} and ${first} <> 'shop_id' and conname not in ('links_token_hash_unique') order by 1`)).toEqual([]);
    expect(await rows(`select conname from pg_constraint c where contype = 'f' and connamespace = 'public'::regnamespace and ${shopTable}
      and exists (select 1 from pg_attribute a where a.attrelid = c.confrelid and attname = 'shop_id' and not attisdropped) and ${first} <> 'shop_id'`)).toEqual([]);
  });
  it("keeps money in whole units and instants with their zone, never in floats", async () => {
    const col = (where: string) => rows(`select table_name || '.' || column_name from information_schema.columns where table_schema = 'public' and ${where} order by 1`);
    expect(await col(`column_name like '%\\_minor' and data_type <> 'bigint'`)).toEqual([]);
    expect(await col(`column_name like '%\\_milli' and data_type <> 'bigint'`)).toEqual([]);
    expect(await col(`column_name like '%\\_at' and data_type <> 'timestamp with time zone'`)).toEqual([]);
    expect(await col(`column_name like '%\\_on' and data_type <> 'date'`)).toEqual([]);
    expect(await col(`data_type in ('real','double precision') and (column_name like '%minor%' or column_name like '%amount%' or column_name like '%price%' or column_name like '%minutes%')`)).toEqual([]);
  });
  it("has no view, materialised view or definer function that could look past row security", async () => {
    expect(await rows(`select relname from pg_class where relnamespace = 'public'::regnamespace and relkind in ('m') `)).toEqual([]);
    expect(await rows(`select relname from pg_class where relnamespace = 'public'::regnamespace and relkind = 'v' and not coalesce(array_to_string(reloptions, ',') like '%security_invoker=true%', false)`)).toEqual([]);
    expect(await rows(`select proname from pg_proc where pronamespace = 'public'::regnamespace and prosecdef`)).toEqual([]);
  });
  it("gives working roles no way to change or remove a ledger's rows", async () => {
    const ledgers = ["audit_log", "journal_entries", "journal_lines", "stock_movements", "punches", "approvals", "flow_readings", "command_log"];
    for (const t of ledgers) {
      expect(await rows(`select (has_table_privilege('vk_app','${t}','update') or has_table_privilege('vk_app','${t}','delete') or has_table_privilege('vk_app','${t}','truncate')
        or has_table_privilege('vk_job','${t}','update') or has_table_privilege('vk_job','${t}','delete'))::text`), t).toEqual(["false"]);
    }
  });
});
