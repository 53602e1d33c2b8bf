import { and, eq, isNull } from "drizzle-orm";
import { operations, timeEntries } from "@/db/schema";
import { withShop } from "@/db/scope";
import { doorIn, doorOut } from "@/modules/time/commands/door";
import { stopClock } from "@/modules/time/commands/indirect";
import { operationDone, startOperation } from "@/modules/work-orders/commands/bench-clock";
import { must, type Cast } from "../cast";

/** Agreed operations of a piece by code; the first open one of each. */
export async function operationsOf(cast: Cast, pieceId: string): Promise<Record<string, string>> {
  const rows = await withShop(cast.shop.id, (tx) => tx.select({ id: operations.id, code: operations.code }).from(operations)
    .where(and(eq(operations.shopId, cast.shop.id), eq(operations.pieceId, pieceId), isNull(operations.removedAt))).orderBy(operations.sequence));
  return Object.fromEntries(rows.map((r) => [r.code, r.id]));
}

/** One stretch at the bench; clocks in at the door when the person is not in. */
export async function stretch(cast: Cast, who: string, operationId: string, from: string, to: string, done: boolean): Promise<void> {
  must(await startOperation(cast.as(who, from), { operationId, doorIn: true, outOfOrderReason: "order of the day" }), `${who} starts at ${from}`);
  must(done ? await operationDone(cast.as(who, to), {}) : await stopClock(cast.as(who, to), {}), `${who} at ${to}`);
}

/** Leaves for the day. */
export const goHome = async (cast: Cast, who: string, at: string): Promise<void> => { must(await doorOut(cast.as(who, at), {}), `${who} leaves at ${at}`); };
export const arrive = async (cast: Cast, who: string, at: string): Promise<void> => { must(await doorIn(cast.as(who, at), {}), `${who} arrives at ${at}`); };

/** Minutes on the bench clock of one person on one order. */
export async function benchMinutes(cast: Cast, workOrderId: string, who: string): Promise<number> {
  const rows = await withShop(cast.shop.id, (tx) => tx.select({ from: timeEntries.startedAt, to: timeEntries.endedAt }).from(timeEntries).where(and(
    eq(timeEntries.shopId, cast.shop.id), eq(timeEntries.workOrderId, workOrderId), eq(timeEntries.personId, cast.people[who] ?? ""), isNull(timeEntries.voidedAt))));
  return rows.reduce((sum, r) => sum + Math.round(((r.to?.getTime() ?? r.from.getTime()) - r.from.getTime()) / 60_000), 0);
}
