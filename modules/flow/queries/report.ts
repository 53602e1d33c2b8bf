import "server-only";
import { and, eq } from "drizzle-orm";
import { flowComparisons } from "@/db/schema";
import { inShop, mustBeAble, NotFound, type ShopContext } from "@/modules/access/context";
import type { ReportSnapshot } from "../domain/report-snapshot";
import { reportPaper } from "../pdf/report-on-one-page";

/** An issued comparison as frozen. @throws NotFound */
export async function issuedReport(ctx: ShopContext, comparisonId: string): Promise<ReportSnapshot> {
  mustBeAble(ctx, "flow.see");
  const [row] = await inShop(ctx, (tx) => tx.select({ snapshot: flowComparisons.snapshot }).from(flowComparisons).where(and(eq(flowComparisons.shopId, ctx.shop.id), eq(flowComparisons.id, comparisonId))));
  if (!row) throw new NotFound("flow report");
  return row.snapshot as ReportSnapshot;
}

/** Its paper, one page; the same snapshot gives the same bytes. @throws NotFound */
export async function flowReportPdf(ctx: ShopContext, comparisonId: string): Promise<{ name: string; mime: string; bytes: Buffer }> {
  const snapshot = await issuedReport(ctx, comparisonId);
  const bytes = await reportPaper(snapshot);
  return { name: `${snapshot.head.mark}-flow-${snapshot.cylinder}-${snapshot.comparisonNo}.pdf`, mime: "application/pdf", bytes };
}
