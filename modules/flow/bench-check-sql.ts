import { sql } from "drizzle-orm";
import { benchChecks } from "@/db/schema";

/** A check that counts: no row that puts one out of use, and none that was put out of use. */
export const standingCheck = sql`${benchChecks.strikes} is null and not exists (select 1 from bench_checks later where later.shop_id = ${benchChecks.shopId} and later.strikes = ${benchChecks.id})`;
