import "server-only";
import { and, asc, desc, eq, isNull, sql } from "drizzle-orm";
import { flowTests, heads, holds, operations, people, receivingChecks, timeEntries, workPieces } from "@/db/schema";
import { inShop, NotFound, type ShopContext } from "@/modules/access/context";

export interface ReleaseState {
  isBookedIn: boolean;
  isReleased: boolean;
  openOperations: { code: string; name: string }[];
  holds: string[];
  flowMissing: string[];
  /** Loose parts that came in, by kind. */
  came: Record<string, number>;
  isOwnPorting: boolean;
  isAlone: boolean;
}

/** What final inspection goes by, from the facts; the inspection's own operation is done by the release itself. */
export async function releaseFactsOf(ctx: ShopContext, pieceId: string, releaserId: string): Promise<ReleaseState> {
  return inShop(ctx, async (tx) => {
    const s = ctx.shop.id;
    const [piece] = await tx.select().from(workPieces).where(and(eq(workPieces.shopId, s), eq(workPieces.id, pieceId)));
    if (!piece) throw new NotFound("piece");
    const ops = await tx.select().from(operations).where(and(eq(operations.shopId, s), eq(operations.pieceId, pieceId), isNull(operations.removedAt))).orderBy(asc(operations.sequence));
    const held = await tx.select({ reason: holds.reason }).from(holds).where(and(eq(holds.shopId, s), eq(holds.pieceId, pieceId), isNull(holds.endedAt)));
    const [check] = await tx.select({ counts: receivingChecks.counts }).from(receivingChecks).where(and(eq(receivingChecks.shopId, s), eq(receivingChecks.pieceId, pieceId))).orderBy(desc(receivingChecks.at)).limit(1);
    const purposes = new Set((await tx.select({ purpose: flowTests.purpose }).from(flowTests).innerJoin(heads, and(eq(heads.shopId, flowTests.shopId), eq(heads.id, flowTests.headId)))
      .where(and(eq(flowTests.shopId, s), eq(heads.pieceId, pieceId), eq(flowTests.state, "complete")))).map((t) => t.purpose));
    const ported = await tx.select({ id: timeEntries.id }).from(timeEntries).innerJoin(operations, and(eq(operations.shopId, timeEntries.shopId), eq(operations.id, timeEntries.operationId)))
      .where(and(eq(timeEntries.shopId, s), eq(timeEntries.clock, "bench"), eq(timeEntries.personId, releaserId), isNull(timeEntries.voidedAt), eq(operations.pieceId, pieceId), eq(operations.station, "Porting"))).limit(1);
    const [{ n } = { n: 0 }] = await tx.select({ n: sql<number>`count(*)::int` }).from(people).where(and(eq(people.shopId, s), isNull(people.leftAt)));
    const done = ops.filter((o) => o.doneAt !== null);
    const needs = (station: string, purpose: string) => done.filter((o) => o.station === station && o.skill === "flow bench" && !purposes.has(purpose)).map((o) => o.name);
    return {
      isBookedIn: piece.bookedInAt !== null, isReleased: piece.releasedAt !== null,
      openOperations: ops.filter((o) => !o.doneAt && !o.skippedAt && o.skill !== "inspection").map((o) => ({ code: o.code, name: o.name })),
      holds: held.map((h) => h.reason), flowMissing: [...needs("Bench before", "baseline"), ...needs("Bench after", "after")],
      came: (check?.counts ?? {}) as Record<string, number>, isOwnPorting: ported.length > 0, isAlone: n === 1,
    };
  });
}
