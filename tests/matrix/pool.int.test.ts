import { sql } from "drizzle-orm";
import { drizzle } from "drizzle-orm/node-postgres";
import pg from "pg";
import { afterAll, beforeAll, describe, expect, it } from "vitest";
import { closeDatabase, type Tx } from "@/db/client";
import { withShop, withSystem } from "@/db/scope";
import { addCustomer } from "@/modules/customers/commands";
import { currentDatabase } from "@/tests/support/database";
import { must, testShop, type TestShop } from "@/tests/support/shop";

const CONNECTIONS = 4;
const CALLS = 3000;
let a: TestShop, b: TestShop;
beforeAll(async () => {
  [a, b] = [await testShop("first"), await testShop("second")];
  for (const [shop, n] of [[a, 3], [b, 5]] as const) for (let i = 0; i < n; i++) must(await addCustomer(shop.as("owner"), { name: `Customer ${i}`, phone: "5550000" }));
  await closeDatabase();
  process.env.VK_DATABASE_POOL = String(CONNECTIONS);
});
afterAll(() => { delete process.env.VK_DATABASE_POOL; });

type Scope = <T>(shopId: string, fn: (tx: Tx) => Promise<T>) => Promise<T>;
type Outside = <T>(fn: (tx: Tx) => Promise<T>) => Promise<T>;

/**
 * Two shops' work mixed over a few connections: some throw half-way, some run into a time limit, some are cancelled by the
 * server. Counts rows seen that are not the asker's, and rows seen by those who named no shop.
 */
async function mixed(inShop: Scope, outside: Outside): Promise<{ foreign: number; unnamed: number; right: number }> {
  const seen = { foreign: 0, unnamed: 0, right: 0 };
  const one = async (i: number): Promise<void> => {
    const shop = i % 2 ? a : b;
    if (i % 10 === 9) {
      const { rows } = await outside((tx) => tx.execute<{ shop_id: string }>(sql`select shop_id from customers`));
      seen.unnamed += rows.length;
      return;
    }
    await inShop(shop.shop.id, async (tx) => {
      const { rows } = await tx.execute<{ shop_id: string }>(sql`select shop_id from customers`);
      for (const row of rows) seen[row.shop_id === shop.shop.id ? "right" : "foreign"]++;
      if (i % 20 === 3) throw new Error("half-way");
      if (i % 20 === 7) await tx.execute(sql`set local statement_timeout = 1`).then(() => tx.execute(sql`select pg_sleep(0.05)`));
      if (i % 20 === 11) await tx.execute(sql`select pg_cancel_backend(pg_backend_pid()), pg_sleep(0.05)`);
    }).catch((error: unknown) => {
      if (![3, 7, 11].includes(i % 20)) throw error;
    });
  };
  let next = 0;
  await Promise.all(Array.from({ length: 16 }, async () => { while (next < CALLS) await one(next++); }));
  return seen;
}

describe("a pool shared by two shops", () => {
  it("never shows one the other's rows, nor any row to whoever named no shop", async () => {
    const seen = await mixed(withShop, (fn) => withSystem("a look without a shop", fn));
    expect(seen.foreign).toBe(0);
    expect(seen.unnamed).toBe(0);
    expect(seen.right).toBeGreaterThan(CALLS);
  });
  it("would be noticed if the shop were set for the session instead of the transaction", async () => {
    const pool = new pg.Pool({ connectionString: currentDatabase().appUrl, max: CONNECTIONS });
    const db = drizzle(pool) as unknown as { transaction<T>(fn: (tx: Tx) => Promise<T>): Promise<T> };
    const leaky: Scope = (shopId, fn) => db.transaction(async (tx) => {
      await tx.execute(sql`select set_config('app.shop_id', ${shopId}, false)`);
      return fn(tx);
    });
    const seen = await mixed(leaky, (fn) => db.transaction(fn));
    await pool.end();
    expect(seen.unnamed).toBeGreaterThan(0);
  });
});
