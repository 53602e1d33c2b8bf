import "server-only";
import { createHash } from "node:crypto";
import { and, asc, eq, gt, inArray, isNotNull, isNull, lt, or, sql } from "drizzle-orm";
import { customers, devices, estimateLines, estimates, operations, people, timeEntries, workOrders, workPieces } from "@/db/schema";
import { inShop, mustBeAble, type ShopContext, type TxContext } from "@/modules/access/context";
import { localDate, startOfDay } from "@/modules/kernel/instant";
import type { BoardJob, BoardPerson, ClockBoard } from "@/modules/time/board";
import { minutesWithin } from "@/modules/time/domain/clipped-minutes";
import { elapsedMinutes } from "@/modules/time/domain/elapsed";
import { sealingKey } from "@/modules/time/identity/seal";
import { clockState } from "@/modules/time/ledger/clock-state";

/** Operations on the list at most: the shop's open work, earliest promise first. */
const JOBS_MAX = 400;

/** Everything a tablet draws: people with their clocks, open operations. */
export async function clockBoard(ctx: ShopContext): Promise<ClockBoard> {
  mustBeAble(ctx, "clock.use");
  return inShop(ctx, async (tx) => {
    const inner: TxContext = { ...ctx, tx };
    const deviceId = ctx.actor.id;
    await tx.update(devices).set({ lastSeenAt: ctx.now }).where(and(
      eq(devices.shopId, ctx.shop.id), eq(devices.id, deviceId), or(isNull(devices.lastSeenAt), lt(devices.lastSeenAt, new Date(ctx.now.getTime() - 60_000)))));
    return {
      shop: { name: ctx.shop.name, zone: ctx.shop.zone, locale: ctx.shop.locale }, device: { id: deviceId, name: ctx.actor.name }, at: ctx.now.toISOString(), sealKey: sealingKey(),
      people: await boardPeople(inner, deviceId), jobs: await openOperations(inner),
    };
  });
}

async function boardPeople(ctx: TxContext, deviceId: string): Promise<BoardPerson[]> {
  const { tx, shop } = ctx;
  const dayStart = startOfDay(localDate(ctx.now, shop.zone), shop.zone);
  const rows = await tx.select({ id: people.id, name: people.shortName, full: people.name, skills: people.skills, badge: people.badgeCode, pin: sql<boolean>`${people.pinHash} is not null` })
    .from(people).where(and(eq(people.shopId, shop.id), isNull(people.leftAt), or(isNotNull(people.badgeCode), isNotNull(people.pinHash)))).orderBy(asc(people.shortName));
  const spans = await tx.select({ personId: timeEntries.personId, startedAt: timeEntries.startedAt, endedAt: timeEntries.endedAt }).from(timeEntries)
    .where(and(eq(timeEntries.shopId, shop.id), eq(timeEntries.clock, "door"), isNull(timeEntries.voidedAt), gt(timeEntries.endedAt, dayStart)));
  const out: BoardPerson[] = [];
  for (const p of rows) {
    const state = await clockState(ctx, p.id);
    const work = state.bench?.work;
    out.push({
      id: p.id, name: p.name, initials: initialsOf(p.full), skills: p.skills, hasPin: p.pin,
      badgeDigest: p.badge ? createHash("sha256").update(`${deviceId}:${p.badge}`).digest("base64url") : null,
      door: state.door.state, doorSince: state.door.since?.toISOString() ?? null, todayMinutes: minutesWithin(spans.filter((s) => s.personId === p.id), dayStart, ctx.now),
      running: state.bench && work ? { operationId: work.kind === "operation" ? work.operationId : null, indirect: work.kind === "indirect" ? work.work : null, since: state.bench.startedAt.toISOString() } : null,
    });
  }
  return out;
}

const initialsOf = (name: string): string => name.split(/\s+/).map((w) => w[0] ?? "").join("").slice(0, 2).toUpperCase();

/** `O. Brennan` for a person, a company as it is. */
const shortCustomer = (name: string, kind: string): string => {
  const words = name.split(/\s+/);
  return kind === "person" && words.length > 1 ? `${words[0]?.[0] ?? ""}. ${words.at(-1) ?? ""}` : name;
};

/** Open operations of heads that are here, in the order of promise, head and routing, with what stands in their way. */
export async function openOperations(ctx: TxContext, only: { personSkills?: readonly string[] } = {}): Promise<BoardJob[]> {
  const { tx, shop } = ctx;
  const agreed = tx.select({ id: estimates.id, no: estimates.estimateNo }).from(estimates).where(eq(estimates.shopId, shop.id)).as("agreed");
  const rows = await tx.select({
    op: operations, tag: workPieces.tag, family: workPieces.family, customer: customers.name, customerKind: customers.kind, promisedOn: workOrders.promisedOn,
    lineNo: estimates.estimateNo, agreedNo: agreed.no,
  }).from(operations)
    .innerJoin(workPieces, and(eq(workPieces.shopId, operations.shopId), eq(workPieces.id, operations.pieceId)))
    .innerJoin(workOrders, and(eq(workOrders.shopId, operations.shopId), eq(workOrders.id, operations.workOrderId)))
    .innerJoin(customers, and(eq(customers.shopId, workOrders.shopId), eq(customers.id, workOrders.customerId)))
    .leftJoin(estimateLines, and(eq(estimateLines.shopId, operations.shopId), eq(estimateLines.id, operations.estimateLineId)))
    .leftJoin(estimates, and(eq(estimates.shopId, estimateLines.shopId), eq(estimates.id, estimateLines.estimateId)))
    .leftJoin(agreed, eq(agreed.id, workOrders.agreedEstimateId))
    .where(and(
      eq(operations.shopId, shop.id), isNull(operations.doneAt), isNull(operations.skippedAt), isNull(operations.removedAt), isNull(workPieces.releasedAt), isNull(workPieces.handedOverAt),
      isNull(workPieces.stoppedAt), isNotNull(workPieces.tag), isNull(workOrders.cancelledAt), isNull(workOrders.closedAt),
      only.personSkills?.length ? inArray(operations.skill, [...only.personSkills]) : undefined))
    .orderBy(sql`${workOrders.promisedOn} asc nulls last`, asc(workPieces.tag), asc(operations.sequence)).limit(JOBS_MAX);
  const ids = rows.map((r) => r.op.id);
  const times = ids.length === 0 ? [] : await tx.select({ operationId: timeEntries.operationId, startedAt: timeEntries.startedAt, endedAt: timeEntries.endedAt }).from(timeEntries)
    .where(and(eq(timeEntries.shopId, shop.id), inArray(timeEntries.operationId, ids), isNotNull(timeEntries.endedAt), isNull(timeEntries.voidedAt)));
  return rows.map(({ op, ...r }) => {
    const before = op.needsBefore.length === 0 ? undefined : rows.find((x) => x.op.pieceId === op.pieceId && op.needsBefore.includes(x.op.code));
    const isAgreed = r.lineNo === null || r.lineNo <= (r.agreedNo ?? 0);
    return {
      operationId: op.id, tag: r.tag ?? "", operation: op.name, customer: shortCustomer(r.customer, r.customerKind), family: r.family, station: op.station, skill: op.skill, bookMinutes: op.bookMinutes,
      doneMinutes: times.filter((t) => t.operationId === op.id && t.endedAt).reduce((n, t) => n + elapsedMinutes(t.startedAt, t.endedAt ?? t.startedAt), 0),
      note: op.benchNote, readyAt: op.notBefore && op.notBefore > ctx.now ? op.notBefore.toISOString() : null, openBefore: before?.op.name ?? null,
      waits: isAgreed ? null : "waits for approval", promisedOn: r.promisedOn,
    };
  });
}
