import "server-only";
import { randomUUID } from "node:crypto";
import { and, eq, isNull } from "drizzle-orm";
import { punches, timeEntries } from "@/db/schema";
import type { TxContext } from "@/modules/access/context";
import type { Acting } from "../identity/acting";

export interface PunchFacts {
  readonly kind: string;
  readonly operationId?: string | null;
  readonly indirectCode?: string | null;
  readonly flags?: readonly string[];
  readonly note?: string;
}

/** Writes what was pressed. Never changed afterwards. */
export async function writePunch(ctx: TxContext, acting: Acting, facts: PunchFacts): Promise<string> {
  const id = randomUUID();
  const flags = [...(facts.flags ?? []), ...acting.flags];
  await ctx.tx.insert(punches).values({
    shopId: ctx.shop.id, id, personId: acting.person.id, kind: facts.kind, at: acting.at, deviceAt: acting.deviceAt, receivedAt: ctx.now, source: acting.source,
    deviceId: acting.deviceId, operationId: facts.operationId ?? null, indirectCode: facts.indirectCode ?? null, flag: flags.length ? flags.join("; ") : null, note: facts.note ?? "",
  });
  return id;
}

export interface EntryFacts {
  readonly personId: string;
  readonly clock: "door" | "bench";
  readonly startedAt: Date;
  readonly endedAt?: Date;
  readonly source: string;
  readonly operation?: { readonly id: string; readonly workOrderId: string; readonly pieceId: string; readonly isRework: boolean } | null;
  readonly indirectCode?: string | null;
  readonly reason?: string;
  readonly enteredBy?: string | null;
  readonly acceptedBy?: string | null;
}

/** Begins or records an interval. The database refuses an overlap and a second open one. */
export async function writeEntry(ctx: TxContext, e: EntryFacts): Promise<string> {
  const id = randomUUID();
  await ctx.tx.insert(timeEntries).values({
    shopId: ctx.shop.id, id, personId: e.personId, clock: e.clock, startedAt: e.startedAt, endedAt: e.endedAt ?? null, source: e.source,
    operationId: e.operation?.id ?? null, workOrderId: e.operation?.workOrderId ?? null, pieceId: e.operation?.pieceId ?? null, rework: e.operation?.isRework ?? false,
    indirectCode: e.indirectCode ?? null, reason: e.reason ?? "", enteredBy: e.enteredBy ?? null, acceptedBy: e.acceptedBy ?? null,
  });
  return id;
}

export async function endEntry(ctx: TxContext, entryId: string, endedAt: Date, reason = ""): Promise<void> {
  await ctx.tx.update(timeEntries).set({ endedAt, ...(reason ? { reason } : {}) }).where(and(eq(timeEntries.shopId, ctx.shop.id), eq(timeEntries.id, entryId), isNull(timeEntries.endedAt)));
}
