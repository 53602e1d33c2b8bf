import "server-only";
import { drizzle, type NodePgDatabase } from "drizzle-orm/node-postgres";
import pg from "pg";
import * as schema from "./schema";

export type Database = NodePgDatabase<typeof schema>;
export type Tx = Parameters<Parameters<Database["transaction"]>[0]>[0];

const kept = globalThis as unknown as { vkPool?: { url: string; pool: pg.Pool; db: Database } };

/**
 * The pool of this process: the web runs it as `vk_app`, the worker as `vk_job`. Used by scope.ts only.
 * @throws when VK_DATABASE_URL is not set
 */
export function database(): Database {
  const url = process.env.VK_DATABASE_URL;
  if (!url) throw new Error("VK_DATABASE_URL is not set: the address of the database for the application's role.");
  if (kept.vkPool?.url !== url) {
    const pool = new pg.Pool({
      connectionString: url,
      max: Number(process.env.VK_DATABASE_POOL ?? 12),
      connectionTimeoutMillis: 4_000,
      idleTimeoutMillis: 30_000,
      options: "-c statement_timeout=5000 -c lock_timeout=2000 -c idle_in_transaction_session_timeout=10000",
    });
    // A terminated backend must not take the process with it.
    pool.on("error", () => undefined);
    kept.vkPool = { url, pool, db: drizzle(pool, { schema }) };
  }
  return kept.vkPool.db;
}

/** For tests and scripts that must let the process end. */
export async function closeDatabase(): Promise<void> {
  const open = kept.vkPool;
  delete kept.vkPool;
  await open?.pool.end();
}
