import "server-only";
import { and, asc, eq, gt, isNull, or } from "drizzle-orm";
import { operations, people, timeEntries, workOrders, workPieces } from "@/db/schema";
import { inShop, mustBeAble, type ShopContext } from "@/modules/access/context";
import { localDate, startOfDay } from "@/modules/kernel/instant";
import { minutesWithin } from "../domain/clipped-minutes";
import { isOutMissing } from "../domain/missing-out";

export interface PersonNow {
  readonly personId: string;
  readonly name: string;
  readonly shortName: string;
  readonly isIn: boolean;
  readonly inSince: string | null;
  readonly isOutMissing: boolean;
  /** Door minutes of today, up to now. */
  readonly todayMinutes: number;
  readonly on: { readonly words: string; readonly tag: string | null; readonly orderNumber: string | null; readonly operationId: string | null; readonly since: string } | null;
}

/** Who is in, on what, since when; those who are in come first. */
export async function peopleAt(ctx: ShopContext): Promise<PersonNow[]> {
  mustBeAble(ctx, "floor.see");
  const dayStart = startOfDay(localDate(ctx.now, ctx.shop.zone), ctx.shop.zone);
  const { staff, entries } = await inShop(ctx, async (tx) => ({
    staff: await tx.select({ id: people.id, name: people.name, shortName: people.shortName }).from(people).where(and(eq(people.shopId, ctx.shop.id), isNull(people.leftAt))).orderBy(asc(people.shortName)),
    entries: await tx.select({
      personId: timeEntries.personId, clock: timeEntries.clock, startedAt: timeEntries.startedAt, endedAt: timeEntries.endedAt, operationId: timeEntries.operationId, indirect: timeEntries.indirectCode,
      operation: operations.name, tag: workPieces.tag, orderNumber: workOrders.number,
    }).from(timeEntries)
      .leftJoin(operations, and(eq(operations.shopId, timeEntries.shopId), eq(operations.id, timeEntries.operationId)))
      .leftJoin(workPieces, and(eq(workPieces.shopId, timeEntries.shopId), eq(workPieces.id, timeEntries.pieceId)))
      .leftJoin(workOrders, and(eq(workOrders.shopId, timeEntries.shopId), eq(workOrders.id, timeEntries.workOrderId)))
      .where(and(eq(timeEntries.shopId, ctx.shop.id), isNull(timeEntries.voidedAt), or(isNull(timeEntries.endedAt), gt(timeEntries.endedAt, dayStart)))),
  }));
  return staff.map((p): PersonNow => {
    const mine = entries.filter((e) => e.personId === p.id);
    const door = mine.find((e) => e.clock === "door" && e.endedAt === null);
    const bench = mine.find((e) => e.clock === "bench" && e.endedAt === null);
    return {
      personId: p.id, name: p.name, shortName: p.shortName, isIn: door !== undefined, inSince: door?.startedAt.toISOString() ?? null,
      isOutMissing: door !== undefined && isOutMissing(door.startedAt, ctx.now, ctx.shop.zone), todayMinutes: minutesWithin(mine.filter((e) => e.clock === "door"), dayStart, ctx.now),
      on: bench ? { words: bench.operation ?? bench.indirect ?? "", tag: bench.tag, orderNumber: bench.orderNumber, operationId: bench.operationId, since: bench.startedAt.toISOString() } : null,
    };
  }).sort((a, b) => Number(b.isIn) - Number(a.isIn));
}
