import "server-only";
import { and, asc, eq, inArray, isNotNull, isNull, sql } from "drizzle-orm";
import { approvals, auditLog, estimates, findings, holds, inspections, operations, parts, payments, people, promises, receivingChecks, shipments, stockMovements, timeEntries, workOrders, workPieces } from "@/db/schema";
import { ableTo, type TxContext } from "@/modules/access/context";
import { money } from "@/modules/kernel/format";

export interface TimelineItem {
  readonly at: string;
  readonly who: string;
  readonly words: string;
  /** Still going on. */
  readonly isNow: boolean;
}

/** What happened on an order, newest first, read from its facts and, for what leaves no other mark, from the audit trail. */
export async function timelineOf(ctx: TxContext, workOrderId: string): Promise<TimelineItem[]> {
  const { tx, shop } = ctx;
  const s = shop.id;
  const seesPrices = ableTo(ctx, "prices.see");
  const seesCustomer = ableTo(ctx, "customers.see");
  const out: TimelineItem[] = [];
  const add = (at: Date | null, who: string | null, words: string, isNow = false) => { if (at) out.push({ at: at.toISOString(), who: who ?? "", words, isNow }); };
  const names = new Map((await tx.select({ id: people.id, name: people.shortName }).from(people).where(eq(people.shopId, s))).map((p) => [p.id, p.name]));
  const name = (id: string | null) => (id === null ? null : (names.get(id) ?? null));
  const [o] = await tx.select().from(workOrders).where(and(eq(workOrders.shopId, s), eq(workOrders.id, workOrderId)));
  if (!o) return [];
  add(o.openedAt, name(o.openedBy), "opened the order");
  add(o.cancelledAt, null, `Called off: ${o.cancelReason ?? ""}`);
  const pieces = await tx.select().from(workPieces).where(and(eq(workPieces.shopId, s), eq(workPieces.workOrderId, workOrderId)));
  const ids = pieces.map((p) => p.id);
  const tag = (id: string) => pieces.find((p) => p.id === id)?.tag ?? "";
  const versions = await tx.select().from(estimates).where(and(eq(estimates.shopId, s), eq(estimates.workOrderId, workOrderId)));
  for (const e of versions) add(e.sentAt, null, `Estimate version ${e.estimateNo} sent${!e.sentTo ? " in print" : seesCustomer ? ` to ${e.sentTo}` : ""}`);
  const answered = versions.length === 0 ? [] : await tx.select().from(approvals).where(and(eq(approvals.shopId, s), inArray(approvals.estimateId, versions.map((v) => v.id))));
  for (const a of answered) {
    const e = versions.find((v) => v.id === a.estimateId);
    add(a.at, a.name, `${a.answer} version ${e?.estimateNo ?? ""} ${a.via === "link" ? "by link" : a.via === "phone" ? `by phone, taken by ${name(a.takenBy) ?? ""}` : "at the counter"}${seesPrices ? `, ${money(a.totalMinor, shop)}` : ""}`);
  }
  for (const p of await tx.select().from(promises).where(and(eq(promises.shopId, s), eq(promises.workOrderId, workOrderId))).orderBy(asc(promises.at)).offset(1)) add(p.at, name(p.personId), `moved the promise to ${p.promisedOn}: ${p.reason}`);
  if (ids.length > 0) {
    for (const r of await tx.select().from(receivingChecks).where(and(eq(receivingChecks.shopId, s), inArray(receivingChecks.pieceId, ids)))) add(r.at, name(r.personId), `booked in ${tag(r.pieceId)}${r.damage ? `, damage seen: ${r.damage}` : ""}${r.missing ? `, missing: ${r.missing}` : ""}`);
    for (const h of await tx.select().from(holds).where(and(eq(holds.shopId, s), inArray(holds.pieceId, ids)))) {
      add(h.since, name(h.setBy), `put ${tag(h.pieceId)} on hold, ${h.reason}${h.words ? `: ${h.words}` : ""}`, h.endedAt === null);
      add(h.endedAt, name(h.endedBy), `ended the hold, ${h.reason}`);
    }
    for (const i of await tx.select().from(inspections).where(and(eq(inspections.shopId, s), inArray(inspections.pieceId, ids)))) add(i.at, name(i.personId), i.outcome === "released" ? `released ${tag(i.pieceId)}${i.alone ? ", alone" : ""}` : `did not release ${tag(i.pieceId)}: ${i.reason}`);
    for (const p of pieces) add(p.handedOverAt, null, `${p.tag ?? ""} left with ${p.handedOverTo ?? ""}`);
    for (const a of await tx.select({ at: auditLog.at, who: auditLog.actorName, command: auditLog.command, subjectId: auditLog.subjectId, detail: auditLog.detail }).from(auditLog)
      .where(and(eq(auditLog.shopId, s), eq(auditLog.subjectKind, "piece"), inArray(auditLog.subjectId, ids), inArray(auditLog.command, ["pieces.print-tag", "pieces.reopen"])))) {
      add(a.at, a.who, a.command === "pieces.reopen" ? `opened ${tag(a.subjectId ?? "")} again: ${String((a.detail as { input?: { reason?: string } }).input?.reason ?? "")}` : `printed the tag ${tag(a.subjectId ?? "")}`);
    }
  }
  for (const f of await tx.select().from(findings).where(and(eq(findings.shopId, s), eq(findings.workOrderId, workOrderId)))) add(f.foundAt, name(f.foundBy), `found: ${f.words}`);
  for (const x of await tx.select().from(operations).where(and(eq(operations.shopId, s), eq(operations.workOrderId, workOrderId), isNull(operations.removedAt)))) {
    add(x.doneAt, name(x.doneBy), `${x.doneBy ? "finished" : "Finished:"} ${x.name.toLowerCase()}`);
    add(x.skippedAt, null, `Skipped ${x.name.toLowerCase()}: ${x.skipReason ?? ""}`);
  }
  for (const t of await tx.select({ since: timeEntries.startedAt, who: people.shortName, what: operations.name }).from(timeEntries)
    .innerJoin(people, and(eq(people.shopId, timeEntries.shopId), eq(people.id, timeEntries.personId))).innerJoin(operations, and(eq(operations.shopId, timeEntries.shopId), eq(operations.id, timeEntries.operationId)))
    .where(and(eq(timeEntries.shopId, s), eq(timeEntries.workOrderId, workOrderId), eq(timeEntries.clock, "bench"), isNull(timeEntries.endedAt), isNull(timeEntries.voidedAt)))) add(t.since, t.who, `clocked on, ${t.what.toLowerCase()}`, true);
  for (const m of await tx.select({ at: sql<string>`max(${stockMovements.at})`, who: stockMovements.personId, n: sql<number>`count(distinct ${stockMovements.partId})::int`, first: sql<string>`min(${parts.description})` }).from(stockMovements)
    .innerJoin(parts, and(eq(parts.shopId, stockMovements.shopId), eq(parts.id, stockMovements.partId)))
    .where(and(eq(stockMovements.shopId, s), eq(stockMovements.workOrderId, workOrderId), eq(stockMovements.kind, "issue"))).groupBy(sql`date_trunc('hour', ${stockMovements.at})`, stockMovements.personId)) {
    add(new Date(m.at), name(m.who), m.n === 1 ? `issued ${m.first}` : `issued ${m.n} parts`);
  }
  if (seesPrices) {
    for (const p of await tx.select().from(payments).where(and(eq(payments.shopId, s), eq(payments.workOrderId, workOrderId), isNotNull(payments.receivedAt)))) add(p.receivedAt, null, `${p.purpose === "deposit" ? "Deposit" : "Payment"} ${money(p.amountMinor, shop)} by ${p.method}`);
  }
  for (const x of await tx.select().from(shipments).where(and(eq(shipments.shopId, s), eq(shipments.workOrderId, workOrderId)))) add(x.at, name(x.personId), `shipped by ${x.carrier}${x.tracking ? `, ${x.tracking}` : ""}`);
  return out.sort((a, b) => Number(b.isNow) - Number(a.isNow) || b.at.localeCompare(a.at));
}
