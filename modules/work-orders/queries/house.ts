import "server-only";
import { and, asc, desc, eq, inArray, isNull, sql, type SQL } from "drizzle-orm";
import { customers, estimates, holds, links, operations, parts, people, timeEntries, workOrderParts, workOrders, workPieces } from "@/db/schema";
import type { TxContext } from "@/modules/access/context";
import { localDate } from "@/modules/kernel/instant";
import { STATIONS, type OperationState, type Station } from "../domain/floor-station";
import { leftToPay } from "../domain/may-leave";
import { pieceStatus, type PieceStatus } from "../domain/piece-status";
import { moneyOfOrders } from "./order-money";

export interface HousePiece {
  readonly id: string;
  readonly pieceNo: number;
  readonly tag: string | null;
  readonly family: string;
  readonly castingNumber: string;
  readonly serial: string;
  readonly place: string;
  readonly bookedInAt: string | null;
  readonly handedOverAt: string | null;
  readonly status: PieceStatus;
  readonly running: { readonly person: string; readonly since: string; readonly name: string } | null;
  /** Name of the operation in hand or next, with its minutes. */
  readonly next: { readonly id: string; readonly code: string; readonly name: string; readonly station: Station; readonly workedMinutes: number; readonly bookMinutes: number; readonly notBefore: string | null } | null;
  readonly bookMinutes: number;
  readonly workedMinutes: number;
  /** Book minutes of what is still open, less what was worked on it. */
  readonly leftMinutes: number;
}

export interface HouseOrder {
  readonly id: string;
  readonly number: string;
  readonly customerId: string;
  readonly customer: string;
  readonly openedAt: string;
  readonly openedBy: string;
  readonly promisedOn: string | null;
  readonly use: string;
  readonly isClosed: boolean;
  readonly isCancelled: boolean;
  readonly pieces: readonly HousePiece[];
  readonly waiting: { readonly estimateId: string; readonly version: number; readonly since: string; readonly totalMinor: number; readonly isOpened: boolean; readonly changeMinor: number | null } | null;
  readonly agreedMinor: number;
  readonly leftToPayMinor: number;
  readonly invoices: number;
  readonly short: readonly { readonly sku: string; readonly description: string; readonly shortMilli: number }[];
}

const stationWord = (s: string): Station => STATIONS.find((x) => x === s) ?? "Tear-down";
const stateOf = (o: { startedAt: Date | null; doneAt: Date | null; skippedAt: Date | null }, isRunning: boolean): OperationState =>
  o.skippedAt ? "skipped" : o.doneAt ? "done" : isRunning ? "running" : "open";
/** Minutes counted from shown minute to shown minute, as the clock counts them. */
const minutesSql = sql<number>`coalesce(sum(floor(extract(epoch from ${timeEntries.endedAt}) / 60) - floor(extract(epoch from ${timeEntries.startedAt}) / 60)), 0)::int`;

/** Orders with all that tells where their heads are: a few wide reads, then pure functions. */
export async function houseOrders(ctx: TxContext, which: SQL | undefined): Promise<HouseOrder[]> {
  const { tx, shop } = ctx;
  const s = shop.id;
  const orders = await tx.select({ o: workOrders, customer: customers.name, by: people.shortName }).from(workOrders)
    .innerJoin(customers, and(eq(customers.shopId, workOrders.shopId), eq(customers.id, workOrders.customerId)))
    .leftJoin(people, and(eq(people.shopId, workOrders.shopId), eq(people.id, workOrders.openedBy)))
    .where(and(eq(workOrders.shopId, s), which)).orderBy(desc(workOrders.number));
  const ids = orders.map((r) => r.o.id);
  if (ids.length === 0) return [];
  const pieces = await tx.select().from(workPieces).where(and(eq(workPieces.shopId, s), inArray(workPieces.workOrderId, ids))).orderBy(asc(workPieces.pieceNo));
  const ops = await tx.select().from(operations).where(and(eq(operations.shopId, s), inArray(operations.workOrderId, ids), isNull(operations.removedAt))).orderBy(asc(operations.sequence));
  const worked = new Map((await tx.select({ id: timeEntries.operationId, minutes: minutesSql }).from(timeEntries)
    .where(and(eq(timeEntries.shopId, s), inArray(timeEntries.workOrderId, ids), eq(timeEntries.clock, "bench"), isNull(timeEntries.voidedAt), sql`${timeEntries.endedAt} is not null`)).groupBy(timeEntries.operationId)).map((r) => [r.id, r.minutes]));
  const running = new Map((await tx.select({ id: timeEntries.operationId, since: timeEntries.startedAt, person: people.shortName }).from(timeEntries)
    .innerJoin(people, and(eq(people.shopId, timeEntries.shopId), eq(people.id, timeEntries.personId)))
    .where(and(eq(timeEntries.shopId, s), inArray(timeEntries.workOrderId, ids), eq(timeEntries.clock, "bench"), isNull(timeEntries.voidedAt), isNull(timeEntries.endedAt)))).map((r) => [r.id, { person: r.person, since: r.since.toISOString() }]));
  const held = await tx.select().from(holds).innerJoin(workPieces, and(eq(workPieces.shopId, holds.shopId), eq(workPieces.id, holds.pieceId)))
    .where(and(eq(holds.shopId, s), isNull(holds.endedAt), inArray(workPieces.workOrderId, ids))).orderBy(asc(holds.since));
  const versions = await tx.select({ id: estimates.id, orderId: estimates.workOrderId, no: estimates.estimateNo, state: estimates.state, sentAt: estimates.sentAt, openedAt: links.firstOpenedAt,
    total: sql<string | null>`${estimates.snapshot} #>> '{totals,totalMinor}'`, change: sql<string | null>`${estimates.snapshot} #>> '{change,changeMinor}'` })
    .from(estimates).leftJoin(links, and(eq(links.shopId, estimates.shopId), eq(links.subjectId, estimates.id), eq(links.purpose, "estimate"), isNull(links.revokedAt)))
    .where(and(eq(estimates.shopId, s), inArray(estimates.workOrderId, ids), inArray(estimates.state, ["draft", "sent"])));
  const short = await tx.select({ orderId: workOrderParts.workOrderId, pieceId: workOrderParts.pieceId, sku: parts.sku, description: parts.description, partClass: parts.partClass, shortMilli: sql<number>`(${workOrderParts.neededMilli} - ${workOrderParts.issuedMilli} - ${workOrderParts.reservedMilli})::float8` })
    .from(workOrderParts).innerJoin(parts, and(eq(parts.shopId, workOrderParts.shopId), eq(parts.id, workOrderParts.partId)))
    .where(and(eq(workOrderParts.shopId, s), inArray(workOrderParts.workOrderId, ids), isNull(workOrderParts.removedAt), sql`${workOrderParts.neededMilli} > ${workOrderParts.issuedMilli} + ${workOrderParts.reservedMilli}`));
  const money = await moneyOfOrders(ctx, ids);
  const today = localDate(ctx.now, shop.zone);
  const nowIso = ctx.now.toISOString();

  return orders.map(({ o, customer, by }): HouseOrder => {
    const sent = versions.find((v) => v.orderId === o.id && v.state === "sent");
    const m = money.get(o.id);
    const left = m ? leftToPay(m) : 0;
    const missing = o.closedAt || o.cancelledAt ? [] : short.filter((x) => x.orderId === o.id);
    return {
      id: o.id, number: o.number, customerId: o.customerId, customer, openedAt: o.openedAt.toISOString(), openedBy: by ?? "", promisedOn: o.promisedOn, use: o.use,
      isClosed: o.closedAt !== null, isCancelled: o.cancelledAt !== null,
      waiting: sent?.sentAt ? { estimateId: sent.id, version: sent.no, since: sent.sentAt.toISOString(), totalMinor: Number(sent.total ?? 0), isOpened: sent.openedAt !== null, changeMinor: sent.change === null ? null : Number(sent.change) } : null,
      agreedMinor: m?.agreedMinor ?? 0, leftToPayMinor: left, invoices: m?.invoices ?? 0,
      short: missing.map(({ sku, description, shortMilli }) => ({ sku, description, shortMilli })),
      pieces: pieces.filter((p) => p.workOrderId === o.id).map((p): HousePiece => {
        const own = ops.filter((x) => x.pieceId === p.id);
        const routed = own.map((x) => ({ sequence: x.sequence, station: stationWord(x.station), state: stateOf(x, running.has(x.id)), notBefore: x.notBefore?.toISOString() ?? null, op: x }));
        const inHand = routed.find((x) => x.state === "running") ?? routed.find((x) => x.state === "open");
        const clock = inHand ? running.get(inHand.op.id) : undefined;
        const hold = held.find((h) => h.holds.pieceId === p.id)?.holds;
        const shortHere = missing.find((x) => x.pieceId === p.id || x.pieceId === null);
        const open = routed.filter((x) => x.state === "open" || x.state === "running");
        return {
          id: p.id, pieceNo: p.pieceNo, tag: p.tag, family: p.family, castingNumber: p.castingNumber, serial: p.serial, place: p.place,
          bookedInAt: p.bookedInAt?.toISOString() ?? null, handedOverAt: p.handedOverAt?.toISOString() ?? null,
          running: inHand && clock ? { ...clock, name: inHand.op.name } : null,
          next: inHand ? { id: inHand.op.id, code: inHand.op.code, name: inHand.op.name, station: inHand.station, workedMinutes: worked.get(inHand.op.id) ?? 0, bookMinutes: inHand.op.bookMinutes, notBefore: inHand.notBefore } : null,
          bookMinutes: own.reduce((sum, x) => sum + (x.skippedAt ? 0 : x.bookMinutes), 0), workedMinutes: own.reduce((sum, x) => sum + (worked.get(x.id) ?? 0), 0) + (clock ? Math.max(0, Math.floor((ctx.now.getTime() - Date.parse(clock.since)) / 60_000)) : 0),
          leftMinutes: open.reduce((sum, x) => sum + Math.max(0, x.op.bookMinutes - (worked.get(x.op.id) ?? 0)), 0),
          status: pieceStatus({
            isBookedIn: p.bookedInAt !== null, isReleased: p.releasedAt !== null, isGone: p.handedOverAt !== null, isApproved: o.agreedEstimateId !== null,
            waitingSince: sent?.sentAt?.toISOString() ?? null, hasDraft: versions.some((v) => v.orderId === o.id && v.state === "draft"), operations: routed, running: clock ?? null,
            hold: hold ? { reason: hold.reason, since: hold.since.toISOString() } : null, shortOf: shortHere ? sentenceCase(shortHere.partClass) : null, isPaid: left <= 0,
            promisedOn: o.promisedOn, bookedInAt: p.bookedInAt?.toISOString() ?? null, releasedAt: p.releasedAt?.toISOString() ?? null,
          }, today, nowIso),
        };
      }),
    };
  });
}

const sentenceCase = (s: string) => `${s.slice(0, 1).toUpperCase()}${s.slice(1)}`;
