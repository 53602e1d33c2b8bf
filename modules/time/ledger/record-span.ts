import "server-only";
import { randomUUID } from "node:crypto";
import { and, eq, isNull, sql } from "drizzle-orm";
import { operations, people, punches, timeEntries } from "@/db/schema";
import type { TxContext } from "@/modules/access/context";
import { ok, refuse, type Result } from "@/modules/kernel/result";

export interface SpanToRecord {
  readonly personId: string;
  readonly clock: "door" | "bench";
  readonly operationId: string | null;
  readonly indirect: string | null;
  readonly startedAt: Date;
  readonly endedAt: Date;
  readonly reason: string;
  readonly source: "manager" | "correction";
  readonly enteredBy: string;
  readonly acceptedBy: string | null;
  readonly replacesId: string | null;
  readonly isDone: boolean;
}

/** Puts a stretch of time on record after the fact, in place of another if so. The one it replaces stays readable. */
export async function recordSpan(ctx: TxContext, s: SpanToRecord): Promise<Result<{ id: string }>> {
  const { tx, shop } = ctx;
  const [person] = await tx.select({ id: people.id }).from(people).where(and(eq(people.shopId, shop.id), eq(people.id, s.personId))).for("update");
  if (!person) return refuse("NOT_FOUND", "Nobody of that name works here.", { field: "personId" });
  const [op] = s.operationId ? await tx.select().from(operations).where(and(eq(operations.shopId, shop.id), eq(operations.id, s.operationId), isNull(operations.removedAt))) : [];
  if (s.operationId && !op) return refuse("NOT_FOUND", "This operation is not on the routing any more. Choose another.", { field: "operationId" });
  const id = randomUUID();
  if (s.replacesId) {
    const replaced = await tx.update(timeEntries).set({ voidedAt: ctx.now, replacedById: id, version: sql`${timeEntries.version} + 1` }).where(and(
      eq(timeEntries.shopId, shop.id), eq(timeEntries.id, s.replacesId), eq(timeEntries.personId, s.personId), eq(timeEntries.clock, s.clock), isNull(timeEntries.voidedAt))).returning({ id: timeEntries.id });
    if (!replaced.length) return refuse("CHANGED_MEANWHILE", "This entry was corrected by somebody else since. Look at the sheet again; what you typed is still here.");
  }
  await tx.insert(timeEntries).values({
    shopId: shop.id, id, personId: s.personId, clock: s.clock, startedAt: s.startedAt, endedAt: s.endedAt, source: s.source, operationId: op?.id ?? null, workOrderId: op?.workOrderId ?? null,
    pieceId: op?.pieceId ?? null, indirectCode: s.clock === "bench" ? s.indirect : null, reason: s.reason, enteredBy: s.enteredBy, acceptedBy: s.acceptedBy,
  });
  await tx.insert(punches).values({
    shopId: shop.id, id: randomUUID(), personId: s.personId, kind: "entered", at: s.startedAt, receivedAt: ctx.now, source: s.source, operationId: op?.id ?? null, indirectCode: s.indirect, note: s.reason,
  });
  if (op) {
    const at = and(eq(operations.shopId, shop.id), eq(operations.id, op.id));
    if (!op.startedAt || op.startedAt > s.startedAt) await tx.update(operations).set({ startedAt: s.startedAt }).where(at);
    if (s.isDone && !op.doneAt) await tx.update(operations).set({ doneAt: s.endedAt, doneBy: s.personId, version: sql`${operations.version} + 1` }).where(at);
  }
  return ok({ id });
}
