import "server-only";
import type { NodePgDatabase } from "drizzle-orm/node-postgres";
import pg from "pg";

export type Tx = Parameters<Parameters<NodePgDatabase["transaction"]>[0]>[0];

const kept = globalThis as unknown as { vkPool?: { url: string; pool: pg.Pool } };

/**
 * The pool of this process: the web runs it as `vk_app`, the worker as `vk_job`. Used by scope.ts only.
 * @throws when VK_DATABASE_URL is not set
 */
export function connections(): pg.Pool {
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
    // A terminated backend must not take the process with it: not while its connection rests, and not while it is lent out,
    // when the pool does not listen. Whoever holds it hears of it by the query that fails.
    pool.on("error", () => undefined);
    pool.on("connect", (client) => client.on("error", () => undefined));
    kept.vkPool = { url, pool };
  }
  return kept.vkPool.pool;
}

/** For tests and scripts that must let the process end. */
export async function closeDatabase(): Promise<void> {
  const open = kept.vkPool;
  delete kept.vkPool;
  await open?.pool.end();
}
