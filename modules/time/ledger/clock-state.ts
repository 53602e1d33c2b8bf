import "server-only";
import { and, desc, eq, gt, inArray, isNull, notLike, or } from "drizzle-orm";
import { operations, punches, timeEntries, workPieces } from "@/db/schema";
import type { TxContext } from "@/modules/access/context";
import type { OpenBenchEntry } from "../domain/bench-clock";
import { DOOR_PUNCHES, type DoorState } from "../domain/door-clock";
import type { IndirectWork } from "../domain/indirect-work";

/** Begins the flag of a punch that does not count before somebody looked at it. */
export const DOUBT = "to be checked";

export interface ClockState {
  readonly door: { readonly state: DoorState; readonly since: Date | null; readonly entryId: string | null };
  readonly bench: (OpenBenchEntry & { readonly entryId: string }) | null;
}

/** Where a person's two clocks stand. */
export async function clockState(ctx: TxContext, personId: string): Promise<ClockState> {
  const mine = and(eq(timeEntries.shopId, ctx.shop.id), eq(timeEntries.personId, personId));
  const open = await ctx.tx.select({
    id: timeEntries.id, clock: timeEntries.clock, startedAt: timeEntries.startedAt, operationId: timeEntries.operationId, indirectCode: timeEntries.indirectCode,
    opName: operations.name, tag: workPieces.tag,
  }).from(timeEntries)
    .leftJoin(operations, and(eq(operations.shopId, timeEntries.shopId), eq(operations.id, timeEntries.operationId)))
    .leftJoin(workPieces, and(eq(workPieces.shopId, timeEntries.shopId), eq(workPieces.id, timeEntries.pieceId)))
    .where(and(mine, isNull(timeEntries.endedAt), isNull(timeEntries.voidedAt)));
  const door = open.find((e) => e.clock === "door");
  const bench = open.find((e) => e.clock === "bench");
  return {
    door: door ? { state: "in", since: door.startedAt, entryId: door.id } : await doorOut(ctx, personId),
    bench: bench ? {
      entryId: bench.id, startedAt: bench.startedAt,
      work: bench.operationId
        ? { kind: "operation", operationId: bench.operationId, label: workLabel(bench.opName, bench.tag) }
        : { kind: "indirect", work: bench.indirectCode as IndirectWork },
    } : null,
  };
}

/** `Exhaust porting, 260224-07`. */
export const workLabel = (operation: string | null, tag: string | null): string => [operation, tag].filter(Boolean).join(", ") || "This operation";

async function doorOut(ctx: TxContext, personId: string): Promise<ClockState["door"]> {
  const [last] = await ctx.tx.select({ kind: punches.kind, at: punches.at }).from(punches)
    .where(and(eq(punches.shopId, ctx.shop.id), eq(punches.personId, personId), inArray(punches.kind, [...DOOR_PUNCHES]), or(isNull(punches.flag), notLike(punches.flag, `${DOUBT}%`))))
    .orderBy(desc(punches.at), desc(punches.seq)).limit(1);
  return { state: last?.kind === "meal out" ? "at meal" : "out", since: last?.at ?? null, entryId: null };
}

/** Whether this person's clock holds facts later than an instant; then a late punch before them needs somebody to look. */
export async function hasLaterTimes(ctx: TxContext, personId: string, at: Date): Promise<boolean> {
  const [later] = await ctx.tx.select({ id: timeEntries.id }).from(timeEntries).where(and(
    eq(timeEntries.shopId, ctx.shop.id), eq(timeEntries.personId, personId), isNull(timeEntries.voidedAt), or(gt(timeEntries.startedAt, at), gt(timeEntries.endedAt, at)))).limit(1);
  return later !== undefined;
}
