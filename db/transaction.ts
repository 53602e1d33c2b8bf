import "server-only";
import { drizzle } from "drizzle-orm/node-postgres";
import type pg from "pg";
import { isConnectionLost, isOutage, RecordsAway } from "./outage";
import type { Tx } from "./client";

/**
 * One transaction on a connection of its own. Over the query builder's it keeps three promises while the database is being
 * lost: the work's own error is thrown, not that of the ROLLBACK which failed after it; the connection goes back to the
 * pool whatever step failed, and a doubtful one is closed; a COMMIT without an answer is told apart from nothing written.
 * @throws RecordsAway when the database cannot serve; else whatever `work` threw or COMMIT was refused with
 */
export async function transact<T>(pool: pg.Pool, work: (tx: Tx) => Promise<T>): Promise<T> {
  let client: pg.PoolClient;
  try {
    client = await pool.connect();
  } catch (error) {
    throw isOutage(error) ? new RecordsAway("nothing", error) : error;
  }
  let isDone = false;
  let own: { error: unknown } | null = null;
  let isDoubtful = true;
  try {
    const value = await drizzle(client).transaction(async (tx) => {
      try {
        const made = await work(tx);
        isDone = true;
        return made;
      } catch (error) {
        own = { error };
        throw error;
      }
    });
    isDoubtful = false;
    return value;
  } catch (error) {
    const first = own ? (own as { error: unknown }).error : error;
    // Anything but the work's own error came from BEGIN, COMMIT or ROLLBACK: nobody knows what state that connection is in.
    isDoubtful = error !== first || !own || isConnectionLost(first);
    if (isDone && isConnectionLost(error)) throw new RecordsAway("unknown", error);
    throw isOutage(first) && !(first instanceof RecordsAway) ? new RecordsAway("nothing", first) : first;
  } finally {
    client.release(isDoubtful);
  }
}
