import "server-only";
import { randomUUID } from "node:crypto";
import { and, asc, eq, inArray, isNull, sql } from "drizzle-orm";
import { estimateLines, kitLines, menuOperations, operations, parts, workOrderParts } from "@/db/schema";
import type { TxContext } from "@/modules/access/context";
import { mergeNeeds, routingChange, type NeededPart, type WantedOperation } from "../domain/routing";
import { reserveForWorkOrder } from "../reserve";

/**
 * Puts an agreed version to work: operations on each piece from the labor lines, needed parts from the part lines with
 * kits opened, reservations from the shelf. Operations that were started, done or skipped stay whatever the version says.
 */
export async function putToWork(ctx: TxContext, workOrderId: string, estimateId: string): Promise<{ added: number; kept: number; removed: number }> {
  const { tx, shop } = ctx;
  const lines = await tx.select().from(estimateLines).where(and(eq(estimateLines.shopId, shop.id), eq(estimateLines.estimateId, estimateId))).orderBy(asc(estimateLines.lineNo));

  const wanted: WantedOperation[] = lines.flatMap((l) => (l.kind === "labor" && l.operationCode && l.pieceId
    ? [{ pieceId: l.pieceId, code: l.operationCode, name: l.description, qtyMilli: l.qtyMilli, bookMinutes: l.bookMinutes, priceMinor: l.amountMinor, lineId: l.id }] : []));
  const standing = await tx.select().from(operations).where(and(eq(operations.shopId, shop.id), eq(operations.workOrderId, workOrderId), isNull(operations.removedAt))).orderBy(asc(operations.sequence));
  const change = routingChange(standing.map((o) => ({ id: o.id, pieceId: o.pieceId, code: o.code, isTouched: Boolean(o.startedAt ?? o.doneAt ?? o.skippedAt) })), wanted);
  const menu = new Map((await tx.select().from(menuOperations).where(eq(menuOperations.shopId, shop.id))).map((m) => [m.code, m]));
  if (change.add.length > 0) {
    await tx.insert(operations).values(change.add.map((w) => {
      const m = menu.get(w.code);
      return {
        shopId: shop.id, id: randomUUID(), workOrderId, pieceId: w.pieceId, sequence: m?.sequence ?? 9999, code: w.code, name: w.name, station: m?.station ?? "Tear-down",
        skill: m?.skill ?? "", qtyMilli: w.qtyMilli, bookMinutes: w.bookMinutes, priceMinor: w.priceMinor, estimateLineId: w.lineId, needsBefore: m?.needsBefore ?? [], hazards: m?.hazards ?? [],
      };
    }));
  }
  for (const { id, to } of change.keep) {
    await tx.update(operations).set({ name: to.name, qtyMilli: to.qtyMilli, bookMinutes: to.bookMinutes, priceMinor: to.priceMinor, estimateLineId: to.lineId, version: sql`${operations.version} + 1` })
      .where(and(eq(operations.shopId, shop.id), eq(operations.id, id)));
  }
  if (change.remove.length > 0) {
    await tx.update(operations).set({ removedAt: ctx.now, version: sql`${operations.version} + 1` }).where(and(eq(operations.shopId, shop.id), inArray(operations.id, [...change.remove])));
  }

  await needParts(ctx, workOrderId, lines.flatMap((l) => (l.kind === "part" && l.partId ? [{ pieceId: l.pieceId, partId: l.partId, neededMilli: l.qtyMilli, lineId: l.id }] : [])));
  await reserveForWorkOrder(ctx, workOrderId);
  return { added: change.add.length, kept: change.keep.length, removed: change.remove.length };
}

/** Sold as one, issued as parts: a kit's line becomes the needs of its parts. */
async function withKitsOpened(ctx: TxContext, needs: readonly NeededPart[]): Promise<NeededPart[]> {
  const ids = [...new Set(needs.map((n) => n.partId))];
  if (ids.length === 0) return [];
  const known = await ctx.tx.select({ id: parts.id, isKit: parts.isKit, partClass: parts.partClass }).from(parts).where(and(eq(parts.shopId, ctx.shop.id), inArray(parts.id, ids)));
  const kits = new Set(known.filter((p) => p.isKit).map((p) => p.id));
  // Epoxy is sold by the fill and used by the gram: what it takes is known when it is mixed, and becomes a need then.
  const byUse = new Set(known.filter((p) => p.partClass === "epoxy").map((p) => p.id));
  const inside = kits.size === 0 ? [] : await ctx.tx.select().from(kitLines).where(and(eq(kitLines.shopId, ctx.shop.id), inArray(kitLines.kitPartId, [...kits])));
  return needs.filter((n) => !byUse.has(n.partId)).flatMap((n) => (kits.has(n.partId)
    ? inside.filter((k) => k.kitPartId === n.partId).map((k) => ({ ...n, partId: k.partId, neededMilli: Math.round((k.qtyMilli * n.neededMilli) / 1000) }))
    : [n]));
}

async function needParts(ctx: TxContext, workOrderId: string, lineNeeds: readonly NeededPart[]): Promise<void> {
  const { tx, shop } = ctx;
  const needs = mergeNeeds(await withKitsOpened(ctx, lineNeeds));
  const standing = await tx.select().from(workOrderParts).where(and(eq(workOrderParts.shopId, shop.id), eq(workOrderParts.workOrderId, workOrderId), isNull(workOrderParts.removedAt)));
  const key = (p: { pieceId: string | null; partId: string }) => `${p.pieceId ?? ""} ${p.partId}`;
  const byKey = new Map(standing.filter((s) => s.estimateLineId !== null).map((s) => [key(s), s]));
  for (const n of needs) {
    const s = byKey.get(key(n));
    byKey.delete(key(n));
    if (s) {
      await tx.update(workOrderParts).set({ neededMilli: Math.max(n.neededMilli, s.issuedMilli), estimateLineId: n.lineId, version: sql`${workOrderParts.version} + 1` })
        .where(and(eq(workOrderParts.shopId, shop.id), eq(workOrderParts.id, s.id)));
    } else {
      await tx.insert(workOrderParts).values({ shopId: shop.id, id: randomUUID(), workOrderId, pieceId: n.pieceId, partId: n.partId, neededMilli: n.neededMilli, estimateLineId: n.lineId });
    }
  }
  // No longer wanted: gone, unless some of it is in the job already. Parts added by hand (no line) are left alone.
  for (const s of byKey.values()) {
    await tx.update(workOrderParts).set(s.issuedMilli > 0 ? { neededMilli: s.issuedMilli } : { removedAt: ctx.now }).where(and(eq(workOrderParts.shopId, shop.id), eq(workOrderParts.id, s.id)));
  }
}
