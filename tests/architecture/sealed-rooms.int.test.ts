import { randomUUID } from "node:crypto";
import pg from "pg";
import { afterAll, beforeAll, describe, expect, it } from "vitest";
import { behindTheCurtain, currentDatabase } from "@/tests/support/database";
import { must, testShop, type TestShop } from "@/tests/support/shop";
import { addCustomer } from "@/modules/customers/commands";

let a: TestShop, b: TestShop, customerOfB: string, app: pg.Client;
beforeAll(async () => {
  a = await testShop("first");
  b = await testShop("second");
  customerOfB = must(await addCustomer(b.as("owner"), { name: "Canary of B", phone: "5559999" })).id;
  app = new pg.Client({ connectionString: currentDatabase().appUrl });
  await app.connect();
});
afterAll(() => app.end());

async function inRoom<T>(shopId: string | null, work: () => Promise<T>): Promise<T> {
  await app.query("begin");
  try {
    if (shopId) await app.query("select set_config('app.shop_id', $1, true)", [shopId]);
    return await work();
  } finally {
    await app.query("rollback");
  }
}

describe("as the application's own role", () => {
  it("sees no row of any shop table without a shop, also after a shop was set in the same session", async () => {
    await inRoom(b.shop.id, () => app.query("select 1"));
    const tables = await behindTheCurtain(`select c.relname from pg_class c join pg_attribute a on a.attrelid = c.oid and attname = 'shop_id' where relnamespace = 'public'::regnamespace and relkind = 'r'`);
    expect(tables.length).toBeGreaterThan(40);
    for (const t of tables) expect((await inRoom(null, () => app.query(`select count(*)::int as n from ${t}`))).rows, t).toEqual([{ n: 0 }]);
  });
  it("sees nothing of B in A's room, in any table", async () => {
    const tables = await behindTheCurtain(`select c.relname from pg_class c join pg_attribute a on a.attrelid = c.oid and attname = 'shop_id' where relnamespace = 'public'::regnamespace and relkind = 'r'`);
    for (const t of tables) expect((await inRoom(a.shop.id, () => app.query(`select count(*)::int as n from ${t} where shop_id = $1`, [b.shop.id]))).rows, t).toEqual([{ n: 0 }]);
    expect((await inRoom(b.shop.id, () => app.query("select name from customers where id = $1", [customerOfB]))).rows).toEqual([{ name: "Canary of B" }]);
  });
  it("cannot write into B from A's room, nor move a row there, nor refer to one", async () => {
    await expect(inRoom(a.shop.id, () => app.query("insert into customers (shop_id, id, name, name_key) values ($1, $2, 'x', 'x')", [b.shop.id, randomUUID()]))).rejects.toMatchObject({ code: "42501" });
    const mine = must(await addCustomer(a.as("owner"), { name: "Mine", phone: "5550000" })).id;
    await expect(inRoom(a.shop.id, () => app.query("update customers set shop_id = $1 where id = $2", [b.shop.id, mine]))).rejects.toMatchObject({ code: "42501" });
    await expect(inRoom(a.shop.id, () => app.query("insert into work_orders (shop_id, id, number, customer_id, opened_at) values ($1, $2, 'WO-X', $3, now())", [a.shop.id, randomUUID(), customerOfB]))).rejects.toMatchObject({ code: "23503" });
    expect((await inRoom(a.shop.id, () => app.query("update customers set name = 'taken' where id = $1", [customerOfB]))).rowCount).toBe(0);
  });
  it("cannot change the audit trail, and the owner of the database is stopped by the trigger too", async () => {
    await expect(inRoom(b.shop.id, () => app.query("update audit_log set note = 'x'"))).rejects.toMatchObject({ code: "42501" });
    await expect(behindTheCurtain("update audit_log set note = 'x'")).rejects.toThrow(/never changed/);
  });
});
