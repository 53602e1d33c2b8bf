import "server-only";
import { sql } from "drizzle-orm";
import { withSystem } from "@/db/scope";

/** Does the database answer? */
export const isHealthy = (): Promise<boolean> =>
  withSystem("health", async (tx) => { await tx.execute(sql`select 1`); return true; }).catch(() => false);
