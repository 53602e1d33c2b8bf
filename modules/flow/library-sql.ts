import "server-only";
import { sql, type SQL } from "drizzle-orm";
import { flowTests } from "@/db/schema";

/** Complete and not replaced by a finished correction. */
export const standsInLibrary = (shopId: string): SQL => sql`${flowTests.state} = 'complete' and not exists (
  select 1 from flow_tests later where later.shop_id = ${shopId} and later.corrects_test_id = ${flowTests.id} and later.state = 'complete')`;
