import "server-only";
import { and, asc, desc, eq, inArray, isNull } from "drizzle-orm";
import { customers, estimates, findings, holds, operations, people, promises, shipments, workOrders, workPieces } from "@/db/schema";
import { ableTo, inShop, mustBeAble, NotFound, type ShopContext } from "@/modules/access/context";
import { filesOf } from "@/modules/documents/files";
import { mailAbout, type MailView } from "@/modules/documents/mail";
import { localDate } from "@/modules/kernel/instant";
import { elapsedMinutes } from "@/modules/time/domain/elapsed";
import { minutesByOperation } from "@/modules/time/queries/minutes";
import { STATIONS, type Station } from "../domain/floor-station";
import { leftToPay, type OrderMoney } from "../domain/may-leave";
import { orderStatus, type PieceStatus } from "../domain/piece-status";
import { depositOf, type OrderDeposit } from "./deposit";
import { versionsOf, type VersionView } from "./estimates";
import { houseOrders, type HousePiece } from "./house";
import { moneyOfOrder } from "./order-money";
import { timelineOf, type TimelineItem } from "./timeline";

export interface OperationRow {
  id: string; pieceId: string; pieceNo: number; sequence: number; code: string; name: string; station: Station; skill: string; qtyMilli: number; bookMinutes: number; workedMinutes: number;
  people: string[]; state: "open" | "running" | "done" | "skipped"; notBefore: string | null; skipReason: string | null; version: number; isPaused: boolean;
}
export interface FindingRow {
  id: string; pieceId: string; pieceNo: number; tag: string | null; words: string; position: string; foundAt: string; foundBy: string; goOnMeanwhile: boolean; version: number;
  state: "open" | "in draft" | "asked" | "approved" | "declined" | "withdrawn"; answeredAt: string | null; estimateNo: number | null; changeMinor: number | null; photoIds: string[];
}
export interface PieceRow extends HousePiece { version: number; declaredValueMinor: number | null; description: string; holds: { id: string; reason: string; words: string; since: string; by: string }[]; photoIds: string[]; releasedAt: string | null; handedOverTo: string | null }
export interface OrderPage {
  id: string; number: string; version: number; customer: { id: string; name: string; phone: string; email: string; mailProblem: string | null; terms: string };
  wants: string; use: string; customerReference: string; notes: string; promisedOn: string | null; openedAt: string; openedBy: string; closedAt: string | null; cancelledAt: string | null; cancelReason: string | null;
  status: PieceStatus | null; pieces: PieceRow[]; operations: OperationRow[]; workedMinutes: number; bookMinutes: number;
  line: { station: Station; note: string }[]; lineNow: number;
  findings: FindingRow[]; versions: VersionView[]; money: (OrderMoney & { leftMinor: number }) | null; deposit: OrderDeposit | null;
  promises: { promisedOn: string; reason: string; at: string; by: string }[];
  shipments: { carrier: string; service: string; tracking: string; insuredMinor: number | null; costMinor: number | null; at: string }[];
  mails: MailView[]; timeline: TimelineItem[];
  may: { estimate: boolean; approve: boolean; receive: boolean; record: boolean; override: boolean; finding: boolean; release: boolean; ship: boolean; unpaid: boolean; edit: boolean; prices: boolean };
  today: string; now: string;
}

/** All of one order for its page. @throws NotFound */
export async function orderPage(ctx: ShopContext, number: string): Promise<OrderPage> {
  mustBeAble(ctx, "orders.see");
  const seesPrices = ableTo(ctx, "prices.see");
  // The bench knows whose head it is, not how to reach them.
  const seesCustomer = ableTo(ctx, "customers.see");
  return inShop(ctx, async (tx) => {
    const inner = { ...ctx, tx };
    const s = ctx.shop.id;
    const [row] = await tx.select({ o: workOrders, c: customers }).from(workOrders).innerJoin(customers, and(eq(customers.shopId, workOrders.shopId), eq(customers.id, workOrders.customerId)))
      .where(and(eq(workOrders.shopId, s), eq(workOrders.number, number)));
    if (!row) throw new NotFound("order");
    const { o, c } = row;
    const [house] = await houseOrders(inner, eq(workOrders.id, o.id));
    if (!house) throw new NotFound("order");
    const rawPieces = new Map((await tx.select().from(workPieces).where(and(eq(workPieces.shopId, s), eq(workPieces.workOrderId, o.id)))).map((p) => [p.id, p]));
    const pieceIds = [...rawPieces.keys()];
    const held = pieceIds.length === 0 ? [] : await tx.select({ h: holds, by: people.shortName }).from(holds).leftJoin(people, and(eq(people.shopId, holds.shopId), eq(people.id, holds.setBy)))
      .where(and(eq(holds.shopId, s), inArray(holds.pieceId, pieceIds), isNull(holds.endedAt))).orderBy(asc(holds.since));
    const found = await tx.select({ f: findings, by: people.shortName, state: estimates.state, no: estimates.estimateNo, snapshot: estimates.snapshot }).from(findings)
      .leftJoin(people, and(eq(people.shopId, findings.shopId), eq(people.id, findings.foundBy))).leftJoin(estimates, and(eq(estimates.shopId, findings.shopId), eq(estimates.id, findings.estimateId)))
      .where(and(eq(findings.shopId, s), eq(findings.workOrderId, o.id))).orderBy(asc(findings.foundAt));
    const photos = [...await filesOf(inner, "photo", [...pieceIds, ...found.map((x) => x.f.id)])];
    const photosOf = (id: string) => photos.filter((p) => p.subjectId === id).map((p) => p.id);
    const versions = seesPrices ? await versionsOf(inner, o.id) : [];
    const pieces = house.pieces.map((p): PieceRow => {
      const raw = rawPieces.get(p.id);
      return {
        ...p, version: raw?.version ?? 1, declaredValueMinor: raw?.declaredValueMinor ?? null, description: raw?.description ?? "", photoIds: photosOf(p.id), releasedAt: raw?.releasedAt?.toISOString() ?? null, handedOverTo: raw?.handedOverTo ?? null,
        holds: held.filter((x) => x.h.pieceId === p.id).map((x) => ({ id: x.h.id, reason: x.h.reason, words: x.h.words, since: x.h.since.toISOString(), by: x.by ?? "" })),
      };
    });
    const ops = await operationsOf(inner, o.id, pieces);
    const money = await moneyOfOrder(inner, o.id);
    return {
      id: o.id, number: o.number, version: o.version, customer: { id: c.id, name: c.name, phone: seesCustomer ? (c.phone ?? "") : "", email: seesCustomer ? (c.email ?? "") : "", mailProblem: seesCustomer ? c.mailProblem : null, terms: c.terms },
      wants: o.wants, use: o.use, customerReference: o.customerReference, notes: o.notes, promisedOn: o.promisedOn, openedAt: o.openedAt.toISOString(), openedBy: house.openedBy,
      closedAt: o.closedAt?.toISOString() ?? null, cancelledAt: o.cancelledAt?.toISOString() ?? null, cancelReason: o.cancelReason,
      status: orderStatus(pieces.map((p) => p.status)), pieces, operations: ops, workedMinutes: ops.reduce((n, x) => n + x.workedMinutes, 0), bookMinutes: ops.reduce((n, x) => n + (x.state === "skipped" ? 0 : x.bookMinutes), 0),
      ...lineOf(pieces, ops), versions,
      findings: found.map(({ f, by, state, no, snapshot }): FindingRow => {
        const answer = versions.find((v) => v.id === f.estimateId)?.answer;
        // A version that was agreed and later replaced still answered this finding with a yes.
        const answered = answer?.answer === "approved" || answer?.answer === "declined" ? answer.answer : state === "approved" || state === "declined" ? state : null;
        return {
          id: f.id, pieceId: f.pieceId, pieceNo: rawPieces.get(f.pieceId)?.pieceNo ?? 1, tag: rawPieces.get(f.pieceId)?.tag ?? null, words: f.words, position: f.position, foundAt: f.foundAt.toISOString(), foundBy: by ?? "", goOnMeanwhile: f.goOnMeanwhile, version: f.version,
          state: f.withdrawnAt ? "withdrawn" : answered ?? (state === "sent" ? "asked" : state === "draft" ? "in draft" : "open"), answeredAt: answer?.at ?? null, estimateNo: no,
          changeMinor: seesPrices ? ((snapshot as { change?: { changeMinor?: number } | null } | null)?.change?.changeMinor ?? null) : null, photoIds: photosOf(f.id),
        };
      }),
      money: seesPrices ? { ...money, leftMinor: leftToPay(money) } : null, deposit: seesPrices ? await depositOf(inner, o.id) : null,
      promises: (await tx.select({ p: promises, by: people.shortName }).from(promises).leftJoin(people, and(eq(people.shopId, promises.shopId), eq(people.id, promises.personId)))
        .where(and(eq(promises.shopId, s), eq(promises.workOrderId, o.id))).orderBy(desc(promises.at))).map(({ p, by }) => ({ promisedOn: p.promisedOn, reason: p.reason, at: p.at.toISOString(), by: by ?? "" })),
      shipments: (await tx.select().from(shipments).where(and(eq(shipments.shopId, s), eq(shipments.workOrderId, o.id))).orderBy(desc(shipments.at)))
        .map((x) => ({ carrier: x.carrier, service: x.service, tracking: x.tracking, insuredMinor: x.insuredMinor, costMinor: ableTo(ctx, "cost.see") ? x.costMinor : null, at: x.at.toISOString() })),
      mails: seesCustomer ? await mailAbout(inner, o.id) : [], timeline: await timelineOf(inner, o.id),
      may: {
        estimate: ableTo(ctx, "estimate.write"), approve: ableTo(ctx, "approval.enter"), receive: ableTo(ctx, "pieces.receive"), record: ableTo(ctx, "work.record"), override: ableTo(ctx, "work.override"), finding: ableTo(ctx, "finding.record"),
        release: ableTo(ctx, "release"), ship: ableTo(ctx, "ship"), unpaid: ableTo(ctx, "handover.unpaid"), edit: ableTo(ctx, "orders.open"), prices: seesPrices,
      },
      today: localDate(ctx.now, ctx.shop.zone), now: ctx.now.toISOString(),
    };
  });
}

async function operationsOf(ctx: ShopContext & { tx: NonNullable<ShopContext["tx"]> }, workOrderId: string, pieces: readonly PieceRow[]): Promise<OperationRow[]> {
  const rows = await ctx.tx.select().from(operations).where(and(eq(operations.shopId, ctx.shop.id), eq(operations.workOrderId, workOrderId), isNull(operations.removedAt))).orderBy(asc(operations.sequence), asc(operations.code));
  const worked = new Map((await minutesByOperation(ctx, workOrderId)).map((m) => [m.operationId, m]));
  const noOf = new Map(pieces.map((p) => [p.id, p.pieceNo]));
  return rows.map((x): OperationRow => {
    const w = worked.get(x.id);
    const isRunning = (w?.running.length ?? 0) > 0;
    const onNow = (w?.running ?? []).reduce((n, r) => n + Math.max(0, elapsedMinutes(new Date(r.since), ctx.now)), 0);
    return {
      id: x.id, pieceId: x.pieceId, pieceNo: noOf.get(x.pieceId) ?? 1, sequence: x.sequence, code: x.code, name: x.name, station: STATIONS.find((st) => st === x.station) ?? "Tear-down", skill: x.skill, qtyMilli: x.qtyMilli,
      bookMinutes: x.bookMinutes, workedMinutes: (w?.minutes ?? 0) + onNow, people: [...(w?.people ?? [])], state: x.skippedAt ? "skipped" : x.doneAt ? "done" : isRunning ? "running" : "open",
      notBefore: x.notBefore?.toISOString() ?? null, skipReason: x.skipReason, version: x.version, isPaused: !x.doneAt && !x.skippedAt && !isRunning && (w?.minutes ?? 0) > 0,
    };
  }).sort((a, b) => a.pieceNo - b.pieceNo || a.sequence - b.sequence);
}

/** The eight stations with a word each, and how far the hindmost piece has come. */
function lineOf(pieces: readonly PieceRow[], ops: readonly OperationRow[]): { line: OrderPage["line"]; lineNow: number } {
  const here = pieces.filter((p) => p.status.station !== null);
  const all = pieces.length > 0 && pieces.every((p) => p.handedOverAt !== null);
  const indexes = here.map((p) => STATIONS.indexOf(p.status.station ?? "Counter in"));
  const lineNow = all ? STATIONS.length : indexes.length === 0 ? -1 : Math.min(...indexes);
  const name = (p: PieceRow) => (pieces.length === 1 ? "" : `${String.fromCharCode(64 + p.pieceNo)} `);
  const line = STATIONS.map((station, i) => {
    const at = here.filter((p) => p.status.station === station);
    if (at.length > 0) return { station, note: at.map((p) => `${name(p)}${p.running ? "running" : p.status.word.toLowerCase()}`).join(", ") };
    const own = ops.filter((x) => x.station === station);
    if (own.length === 0) return { station, note: i > 0 && i < 7 ? "not needed" : "" };
    const done = own.filter((x) => x.state === "done" || x.state === "skipped").length;
    return { station, note: done === own.length ? "done" : done > 0 && i > lineNow ? `${done} of ${own.length} early` : `${own.length} to do` };
  });
  return { line, lineNow };
}
