import "server-only";
import { and, asc, desc, eq, inArray, sql } from "drizzle-orm";
import { flowComparisons, people } from "@/db/schema";
import { inShop, mustBeAble, type ShopContext } from "@/modules/access/context";
import type { ReplacedReport } from "../domain/report-replaces";

export interface IssuedReport { id: string; headId: string; cylinder: number; comparisonNo: number; issuedAt: string; issuedBy: string; replaces: ReplacedReport | null }

/** Every report issued of the heads, by port, newest first. */
export async function issuedReports(ctx: ShopContext, headIds: readonly string[]): Promise<IssuedReport[]> {
  mustBeAble(ctx, "flow.see");
  if (headIds.length === 0) return [];
  const rows = await inShop(ctx, (tx) => tx.select({
    id: flowComparisons.id, headId: flowComparisons.headId, cylinder: flowComparisons.cylinder, comparisonNo: flowComparisons.comparisonNo, issuedAt: flowComparisons.issuedAt, issuedBy: people.shortName,
    replaces: sql<ReplacedReport | null>`${flowComparisons.snapshot} -> 'replaces'`,
  }).from(flowComparisons)
    .innerJoin(people, and(eq(people.shopId, flowComparisons.shopId), eq(people.id, flowComparisons.issuedBy)))
    .where(and(eq(flowComparisons.shopId, ctx.shop.id), inArray(flowComparisons.headId, [...headIds]))).orderBy(asc(flowComparisons.cylinder), desc(flowComparisons.comparisonNo)));
  return rows.map((r) => ({ ...r, issuedAt: r.issuedAt.toISOString() }));
}
