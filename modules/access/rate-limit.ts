import "server-only";
import { sql } from "drizzle-orm";
import { withSystem } from "@/db/scope";

/**
 * Counts a try under a key in a fixed window, shared by all processes.
 * @returns false when the limit is passed
 */
export async function allowed(key: string, limit: number, windowSeconds: number): Promise<boolean> {
  return withSystem("tries are counted before anybody is known", async (tx) => {
    const { rows } = await tx.execute<{ hits: number }>(sql`
      insert into rate_limits (key, window_start)
      values (${key}, to_timestamp(floor(extract(epoch from now()) / ${windowSeconds}) * ${windowSeconds}))
      on conflict (key, window_start) do update set hits = rate_limits.hits + 1
      returning hits`);
    return (rows[0]?.hits ?? 0) <= limit;
  });
}

/** Whether the limit of a key is reached in the running window, without counting a try. */
export async function reached(key: string, limit: number, windowSeconds: number): Promise<boolean> {
  return withSystem("tries are counted before anybody is known", async (tx) => {
    const { rows } = await tx.execute<{ hits: number }>(sql`
      select hits from rate_limits where key = ${key} and window_start = to_timestamp(floor(extract(epoch from now()) / ${windowSeconds}) * ${windowSeconds})`);
    return (rows[0]?.hits ?? 0) >= limit;
  });
}
