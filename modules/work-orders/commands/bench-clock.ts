import "server-only";
import { and, asc, eq, inArray, isNull, sql } from "drizzle-orm";
import { estimateLines, estimates, findings, holds, operations, punches, timeEntries, workOrders, workPieces } from "@/db/schema";
import { defineCommand } from "@/modules/access/command";
import type { TxContext } from "@/modules/access/context";
import { can } from "@/modules/access/roles";
import { ok, refuse, type Refused, type Result } from "@/modules/kernel/result";
import { z } from "@/modules/kernel/zod";
import type { BenchWork } from "@/modules/time/domain/bench-clock";
import { stampInput, type Acting } from "@/modules/time/identity/acting";
import { clockState, workLabel, type ClockState } from "@/modules/time/ledger/clock-state";
import { moveBench, moveDoor } from "@/modules/time/ledger/move-clocks";
import { press, type Pressed } from "@/modules/time/ledger/press";
import { writePunch } from "@/modules/time/ledger/write";
import { reopenInput } from "../reopen-input";

const reason = z.string().trim().max(500, "At most 500 characters.").default("");
const startInput = z.strictObject({
  ...stampInput,
  operationId: z.uuid("Choose an operation."),
  /** Clocks in at the door first, in the same second. */
  doorIn: z.boolean().default(false),
  /** A lead's reason to start before a cure is over or against a hold. */
  leadReason: reason,
  /** Why this goes ahead of an operation that comes before it. */
  outOfOrderReason: reason,
});
type StartInput = z.output<typeof startInput>;

/** Holds that stop the work itself; the others only stop the promise. */
const STOPPING_HOLDS = ["safety", "quality"];
const subject = (_: unknown, value: Pressed) => ({ kind: "person", id: value.personId });

/** Starts the bench clock on an operation of a piece. */
export const startOperation = defineCommand({
  name: "workOrders.startOperation", act: "clock.punch", input: startInput, secret: ["proof"],
  run: (ctx, input) => press(ctx, input, { kind: "start", operationId: input.operationId }, (inner, acting, state) => begin(inner, acting, state, input, "start")),
  subject,
});

/** Stops what runs and starts this one in the same second. */
export const switchTo = defineCommand({
  name: "workOrders.switchTo", act: "clock.punch", input: startInput, secret: ["proof"],
  run: (ctx, input) => press(ctx, input, { kind: "switch", operationId: input.operationId }, (inner, acting, state) => begin(inner, acting, state, input, "switch")),
  subject,
});

/** An operation as the bench clock sees it, or why nobody may start it. */
async function workOf(ctx: TxContext, operationId: string): Promise<Result<{ work: Extract<BenchWork, { kind: "operation" }>; workOrderId: string; pieceId: string; isHeld: string | null }>> {
  const { tx, shop } = ctx;
  const [row] = await tx.select({ op: operations, piece: workPieces, order: workOrders }).from(operations)
    .innerJoin(workPieces, and(eq(workPieces.shopId, operations.shopId), eq(workPieces.id, operations.pieceId)))
    .innerJoin(workOrders, and(eq(workOrders.shopId, operations.shopId), eq(workOrders.id, operations.workOrderId)))
    .where(and(eq(operations.shopId, shop.id), eq(operations.id, operationId)));
  if (!row || row.op.removedAt) return refuse("NOT_FOUND", "This operation is not on the routing any more. Choose another.", { field: "operationId" });
  const { op, piece, order } = row;
  if (op.skippedAt) return refuse("OPERATION_SKIPPED", `${op.name} was skipped. Ask the lead to put it back on the routing.`, { field: "operationId" });
  if (order.cancelledAt || piece.stoppedAt) return refuse("PIECE_STOPPED", "Work on this head was stopped. Ask the counter before going on.", { field: "operationId" });
  if (piece.releasedAt && !piece.handedOverAt) return refuse("PIECE_RELEASED", "This head is released. A lead reopens it before more work is done.", { field: "operationId" });
  const barred = await notAgreed(ctx, op.estimateLineId, order.agreedEstimateId, piece.id);
  if (barred) return barred;
  const before = op.needsBefore.length === 0 ? [] : await tx.select({ name: operations.name }).from(operations).where(and(
    eq(operations.shopId, shop.id), eq(operations.pieceId, op.pieceId), inArray(operations.code, op.needsBefore),
    isNull(operations.doneAt), isNull(operations.skippedAt), isNull(operations.removedAt))).orderBy(asc(operations.sequence)).limit(1);
  const held = await tx.select({ reason: holds.reason, words: holds.words }).from(holds)
    .where(and(eq(holds.shopId, shop.id), eq(holds.pieceId, piece.id), isNull(holds.endedAt), inArray(holds.reason, STOPPING_HOLDS))).limit(1);
  return ok({
    work: {
      kind: "operation", operationId: op.id, label: workLabel(op.name, piece.tag), readyAt: op.notBefore, openBefore: before[0]?.name ?? null,
      isPieceGone: piece.handedOverAt !== null || order.closedAt !== null, isDone: op.doneAt !== null,
    },
    workOrderId: op.workOrderId, pieceId: op.pieceId, isHeld: held[0] ? `${held[0].reason}${held[0].words ? `: ${held[0].words}` : ""}` : null,
  });
}

/** Nothing of a finding is started before the customer agreed to the estimate that asks for it. */
async function notAgreed(ctx: TxContext, lineId: string | null, agreedEstimateId: string | null, pieceId: string): Promise<Refused | null> {
  const { tx, shop } = ctx;
  const waiting = () => refuse("NOT_AGREED", "This waits for the customer's approval. Take another operation meanwhile.", { field: "operationId" });
  const number = async (id: string) => (await tx.select({ no: estimates.estimateNo }).from(estimates).where(and(eq(estimates.shopId, shop.id), eq(estimates.id, id))))[0]?.no ?? 0;
  if (lineId) {
    const [line] = await tx.select({ no: estimates.estimateNo }).from(estimateLines)
      .innerJoin(estimates, and(eq(estimates.shopId, estimateLines.shopId), eq(estimates.id, estimateLines.estimateId)))
      .where(and(eq(estimateLines.shopId, shop.id), eq(estimateLines.id, lineId)));
    if (line && line.no > (agreedEstimateId ? await number(agreedEstimateId) : 0)) return waiting();
  }
  const stops = await tx.select({ estimateId: findings.estimateId }).from(findings)
    .where(and(eq(findings.shopId, shop.id), eq(findings.pieceId, pieceId), eq(findings.goOnMeanwhile, false), isNull(findings.withdrawnAt)));
  for (const f of stops) {
    if (!f.estimateId) return waiting();
    const [answered] = await tx.execute<{ n: number }>(sql`select count(*)::int as n from approvals where shop_id = ${shop.id} and estimate_id = ${f.estimateId}`).then((r) => r.rows);
    if (!answered?.n) return waiting();
  }
  return null;
}

async function begin(ctx: TxContext, acting: Acting, before: ClockState, input: StartInput, kind: "start" | "switch"): Promise<Result<readonly string[]>> {
  const found = await workOf(ctx, input.operationId);
  if (!found.ok) return found;
  const { work, isHeld, ...place } = found.value;
  if (input.leadReason && !can({ kind: "person", id: acting.person.id, name: acting.person.name, roles: acting.person.roles, sessionId: null }, "work.override")) {
    return refuse("LEAD_ONLY", "Only a lead may override this. Ask a lead to do it with their badge.", { field: "leadReason" });
  }
  if (isHeld && !input.leadReason) return refuse("ON_HOLD", `This head is held for ${isHeld}. Wait, or let a lead override it with a reason.`, { field: "leadReason" });
  let state = before;
  if (input.doorIn && state.door.state !== "in") {
    const came = await moveDoor(ctx, acting, state, "in");
    if (!came.ok) return came;
    state = await clockState(ctx, acting.person.id);
  }
  const [reopened] = await ctx.tx.select({ id: punches.id }).from(punches).where(and(eq(punches.shopId, ctx.shop.id), eq(punches.operationId, input.operationId), eq(punches.kind, "reopen"))).limit(1);
  const moved = await moveBench(ctx, acting, state, {
    kind, at: acting.at, work, ...(input.leadReason ? { leadReason: input.leadReason } : {}), ...(input.outOfOrderReason ? { outOfOrderReason: input.outOfOrderReason } : {}),
  }, { operation: { id: input.operationId, ...place, isRework: reopened !== undefined }, note: [input.leadReason, input.outOfOrderReason].filter(Boolean).join("; ") });
  if (!moved.ok) return moved;
  await ctx.tx.update(operations).set({ startedAt: acting.at }).where(and(eq(operations.shopId, ctx.shop.id), eq(operations.id, input.operationId), isNull(operations.startedAt)));
  return moved;
}

const doneInput = z.strictObject({
  ...stampInput,
  /** Left out, the operation that runs. */
  operationId: z.uuid().optional(),
});

/** The operation is finished: stops the clock if it runs on it. Others still on it keep their clocks until they stop them. */
export const operationDone = defineCommand({
  name: "workOrders.operationDone", act: "clock.punch", input: doneInput, secret: ["proof"],
  run: (ctx, input) => press(ctx, input, { kind: "done", operationId: input.operationId ?? null }, async (inner, acting, state) => {
    const running = state.bench?.work.kind === "operation" ? state.bench.work.operationId : null;
    const id = input.operationId ?? running;
    let flags: readonly string[] = [];
    if (id === running || id === null) {
      const moved = await moveBench(inner, acting, state, { kind: "done", at: acting.at }, {});
      if (!moved.ok) return moved;
      flags = moved.value;
    } else {
      const worked = await inner.tx.select({ id: timeEntries.id }).from(timeEntries)
        .where(and(eq(timeEntries.shopId, inner.shop.id), eq(timeEntries.operationId, id), isNull(timeEntries.voidedAt))).limit(1);
      if (!worked.length && !can({ kind: "person", ...acting.person, sessionId: null }, "work.override")) {
        return refuse("NEVER_STARTED", "Nobody has worked on this operation yet. Start it first, or let a lead mark it done.", { field: "operationId" });
      }
      await writePunch(inner, acting, { kind: "done", operationId: id });
    }
    if (!id) return ok(flags);
    const changed = await inner.tx.update(operations).set({ doneAt: acting.at, doneBy: acting.person.id, version: sql`${operations.version} + 1` })
      .where(and(eq(operations.shopId, inner.shop.id), eq(operations.id, id), isNull(operations.doneAt), isNull(operations.removedAt))).returning({ id: operations.id });
    return changed.length ? ok(flags) : refuse("OPERATION_DONE", "This operation is done already, or it is not on the routing any more.", { field: "operationId" });
  }),
  subject,
});

/** A lead opens a finished operation again. Time on it from now on is rework: cost, never book hours earned. */
export const reopenOperation = defineCommand({
  name: "workOrders.reopenOperation", act: "work.override", input: reopenInput,
  subject: (input) => ({ kind: "operation", id: input.operationId }),
  run: async (ctx, input) => {
    if (ctx.actor.kind !== "person") return refuse("NOT_A_PERSON", "A lead reopens an operation in person.");
    const [op] = await ctx.tx.select({ pieceId: operations.pieceId, doneAt: operations.doneAt, releasedAt: workPieces.releasedAt }).from(operations)
      .innerJoin(workPieces, and(eq(workPieces.shopId, operations.shopId), eq(workPieces.id, operations.pieceId)))
      .where(and(eq(operations.shopId, ctx.shop.id), eq(operations.id, input.operationId), isNull(operations.removedAt)));
    if (!op) return refuse("NOT_FOUND", "This operation is not on the routing any more.");
    if (!op.doneAt) return refuse("NOT_DONE", "This operation is still open.");
    if (op.releasedAt) return refuse("PIECE_RELEASED", "This head is released. Reopen the head first.");
    await ctx.tx.update(operations).set({ doneAt: null, doneBy: null, version: sql`${operations.version} + 1` }).where(and(eq(operations.shopId, ctx.shop.id), eq(operations.id, input.operationId)));
    const at = new Date(Math.floor(ctx.now.getTime() / 1000) * 1000);
    const lead: Acting = { person: { id: ctx.actor.id, name: ctx.actor.name, roles: ctx.actor.roles }, at, deviceAt: null, deviceId: null, source: "desk", isLate: false, flags: [], doubt: null };
    await writePunch(ctx, lead, { kind: "reopen", operationId: input.operationId, note: input.reason });
    return ok({ operationId: input.operationId });
  },
});
