import "server-only";
import { and, eq } from "drizzle-orm";
import type { benches, camshafts, checkPlates, engineFamilies, fixtures, heads, liftDevices } from "@/db/schema";
import { changedMeanwhile } from "@/modules/access/command";
import type { TxContext } from "@/modules/access/context";
import { refuse, type Refused } from "@/modules/kernel/result";

type Editable = typeof benches | typeof checkPlates | typeof fixtures | typeof liftDevices | typeof camshafts | typeof engineFamilies | typeof heads;

/** Why an edit with a version changed no row: somebody was faster, or there is no such record in this shop. */
export async function staleOrGone(ctx: TxContext, table: Editable, id: string, what: string): Promise<Refused> {
  const there = await ctx.tx.select({ id: table.id }).from(table).where(and(eq(table.shopId, ctx.shop.id), eq(table.id, id)));
  return there.length ? changedMeanwhile(what) : refuse("NOT_FOUND", `${what} is not here any more.`);
}
