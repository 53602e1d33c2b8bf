import "server-only";
import { and, asc, desc, eq, inArray, isNull, sql } from "drizzle-orm";
import { epoxyFills, lots, operations, parts, people, purchaseOrderLines, purchaseOrders, workOrderParts, workOrders, workPieces } from "@/db/schema";
import { ableTo, inShop, mustBeAble, NotFound, type ShopContext } from "@/modules/access/context";
import { localDate } from "@/modules/kernel/instant";
import { milli } from "@/modules/kernel/quantity";
import { pickFirstExpired } from "@/modules/stock/domain/first-expired";

export type NeedState = "issued" | "ready" | "partly" | "short";
export interface OrderPart {
  id: string; partId: string; sku: string; description: string; stockUnit: string; bin: string; hazard: string; pieceId: string | null; pieceNo: number | null; byHand: boolean; version: number;
  neededMilli: number; reservedMilli: number; issuedMilli: number; shortMilli: number;
  /** issued: all out. ready: the rest is reserved. partly: some of it is. short: none is. */
  state: NeedState;
  /** For what is short: where it comes from and when. */
  arriving: { number: string | null; expectedOn: string | null } | null;
  /** "Take 30 of lot E-2602": what goes first of the reserved quantity. */
  take: { lotCode: string; qtyMilli: number }[];
  /** What left the shelf; only for roles that see cost. */
  costMinor: number | null;
}

const stateOf = (needed: number, reserved: number, issued: number): NeedState =>
  issued >= needed ? "issued" : reserved >= needed - issued ? "ready" : reserved > 0 ? "partly" : "short";

/** Parts of a work order: needed, reserved, issued, short, and what arrives when. @throws NotFound */
export async function partsOf(ctx: ShopContext, workOrderId: string): Promise<OrderPart[]> {
  mustBeAble(ctx, "stock.see");
  return inShop(ctx, async (tx) => {
    const shopId = ctx.shop.id;
    const [order] = await tx.select({ id: workOrders.id }).from(workOrders).where(and(eq(workOrders.shopId, shopId), eq(workOrders.id, workOrderId)));
    if (!order) throw new NotFound("work order");
    const rows = await tx.select({
      id: workOrderParts.id, partId: workOrderParts.partId, pieceId: workOrderParts.pieceId, pieceNo: workPieces.pieceNo, estimateLineId: workOrderParts.estimateLineId, version: workOrderParts.version,
      neededMilli: workOrderParts.neededMilli, reservedMilli: workOrderParts.reservedMilli, issuedMilli: workOrderParts.issuedMilli, issuedValueMinor: workOrderParts.issuedValueMinor,
      sku: parts.sku, description: parts.description, stockUnit: parts.stockUnit, bin: parts.bin, lotTracked: parts.lotTracked, hazard: parts.hazard,
    }).from(workOrderParts)
      .innerJoin(parts, and(eq(parts.shopId, workOrderParts.shopId), eq(parts.id, workOrderParts.partId)))
      .leftJoin(workPieces, and(eq(workPieces.shopId, workOrderParts.shopId), eq(workPieces.id, workOrderParts.pieceId)))
      .where(and(eq(workOrderParts.shopId, shopId), eq(workOrderParts.workOrderId, workOrderId), isNull(workOrderParts.removedAt)))
      .orderBy(asc(workPieces.pieceNo), asc(parts.sku));
    const ids = [...new Set(rows.map((r) => r.partId))];
    if (ids.length === 0) return [];
    const coming = await tx.select({ partId: purchaseOrderLines.partId, number: purchaseOrders.number, expectedOn: purchaseOrders.expectedOn, workOrderId: purchaseOrderLines.workOrderId }).from(purchaseOrderLines)
      .innerJoin(purchaseOrders, and(eq(purchaseOrders.shopId, purchaseOrderLines.shopId), eq(purchaseOrders.id, purchaseOrderLines.purchaseOrderId)))
      .where(and(eq(purchaseOrderLines.shopId, shopId), inArray(purchaseOrderLines.partId, ids), eq(purchaseOrders.state, "sent"), sql`${purchaseOrderLines.qtyMilli} > ${purchaseOrderLines.receivedMilli}`))
      .orderBy(desc(sql`coalesce(${purchaseOrderLines.workOrderId} = ${workOrderId}, false)`), asc(purchaseOrders.expectedOn));
    const lotRows = await tx.select({ partId: lots.partId, code: lots.code, expiresOn: lots.expiresOn, onHandMilli: lots.onHandMilli }).from(lots)
      .where(and(eq(lots.shopId, shopId), inArray(lots.partId, ids), sql`${lots.onHandMilli} > 0`)).orderBy(asc(lots.createdAt));
    const today = localDate(ctx.now, ctx.shop.zone);
    const seesCost = ableTo(ctx, "cost.see");
    return rows.map((r) => {
      const short = Math.max(0, r.neededMilli - r.issuedMilli - r.reservedMilli);
      const first = short > 0 ? coming.find((c) => c.partId === r.partId) : undefined;
      const picks = r.lotTracked && r.reservedMilli > 0
        ? pickFirstExpired({ lots: lotRows.filter((l) => l.partId === r.partId).map((l) => ({ lot: l.code, expiry: l.expiresOn, availableMilli: milli(l.onHandMilli) })), needMilli: milli(r.reservedMilli), today, daysLeftMin: 0 }).picks : [];
      return {
        id: r.id, partId: r.partId, sku: r.sku, description: r.description, stockUnit: r.stockUnit, bin: r.bin, hazard: r.hazard, pieceId: r.pieceId, pieceNo: r.pieceNo, byHand: r.estimateLineId === null, version: r.version,
        neededMilli: r.neededMilli, reservedMilli: r.reservedMilli, issuedMilli: r.issuedMilli, shortMilli: short, state: stateOf(r.neededMilli, r.reservedMilli, r.issuedMilli),
        arriving: first ? { number: first.number, expectedOn: first.expectedOn } : null,
        take: picks.map((p) => ({ lotCode: p.lot, qtyMilli: p.qtyMilli })), costMinor: seesCost ? r.issuedValueMinor : null,
      };
    });
  });
}

export interface EpoxyView { id: string; port: string; gramsInPortMilli: number; gramsWasteMilli: number; ratio: string; mixedAt: string; readyAt: string; cureMinutes: number; personName: string | null }
export interface EpoxySheet {
  workOrderId: string; number: string; pieceId: string; pieceNo: number; tag: string | null; family: string; released: boolean;
  operations: { id: string; code: string; name: string }[];
  /** Epoxies kept in grams, with the lots that may be used and those that may not. */
  epoxies: { partId: string; sku: string; description: string; usableMilli: number; lots: { id: string; code: string; expiresOn: string | null; onHandMilli: number; expired: boolean }[] }[];
  fills: EpoxyView[];
}

/** What the epoxy form of a head needs. @throws NotFound */
export async function epoxySheetFor(ctx: ShopContext, number: string, pieceNo: number): Promise<EpoxySheet> {
  mustBeAble(ctx, "work.record");
  return inShop(ctx, async (tx) => {
    const shopId = ctx.shop.id;
    const [piece] = await tx.select({ id: workPieces.id, workOrderId: workPieces.workOrderId, pieceNo: workPieces.pieceNo, tag: workPieces.tag, family: workPieces.family, releasedAt: workPieces.releasedAt, number: workOrders.number }).from(workPieces)
      .innerJoin(workOrders, and(eq(workOrders.shopId, workPieces.shopId), eq(workOrders.id, workPieces.workOrderId)))
      .where(and(eq(workPieces.shopId, shopId), eq(workOrders.number, number), eq(workPieces.pieceNo, pieceNo)));
    if (!piece) throw new NotFound("piece");
    const ops = await tx.select({ id: operations.id, code: operations.code, name: operations.name, station: operations.station }).from(operations)
      .where(and(eq(operations.shopId, shopId), eq(operations.pieceId, piece.id), eq(operations.station, "Porting"), isNull(operations.removedAt))).orderBy(asc(operations.sequence));
    const epoxies = await tx.select({ partId: parts.id, sku: parts.sku, description: parts.description }).from(parts)
      .where(and(eq(parts.shopId, shopId), eq(parts.partClass, "epoxy"), eq(parts.stockUnit, "gram"), eq(parts.active, true))).orderBy(asc(parts.sku)).limit(40);
    const lotRows = epoxies.length ? await tx.select({ id: lots.id, partId: lots.partId, code: lots.code, expiresOn: lots.expiresOn, onHandMilli: lots.onHandMilli }).from(lots)
      .where(and(eq(lots.shopId, shopId), inArray(lots.partId, epoxies.map((e) => e.partId)), sql`${lots.onHandMilli} > 0`)).orderBy(asc(lots.expiresOn)) : [];
    const today = localDate(ctx.now, ctx.shop.zone);
    return {
      workOrderId: piece.workOrderId, number: piece.number, pieceId: piece.id, pieceNo: piece.pieceNo, tag: piece.tag, family: piece.family, released: piece.releasedAt !== null,
      operations: ops.map(({ station: _, ...o }) => o),
      epoxies: epoxies.map((e) => {
        const of = lotRows.filter((l) => l.partId === e.partId).map(({ partId: _, ...l }) => ({ ...l, expired: l.expiresOn !== null && l.expiresOn < today }));
        return { ...e, usableMilli: of.filter((l) => !l.expired).reduce((a, l) => a + l.onHandMilli, 0), lots: of };
      }),
      fills: await epoxyFillsOf({ ...ctx, tx }, piece.id),
    };
  });
}

/** Epoxy put into a head, newest first. */
export async function epoxyFillsOf(ctx: ShopContext, pieceId: string): Promise<EpoxyView[]> {
  mustBeAble(ctx, "orders.see");
  const rows = await inShop(ctx, (tx) => tx.select({ f: epoxyFills, personName: people.shortName }).from(epoxyFills)
    .leftJoin(people, and(eq(people.shopId, epoxyFills.shopId), eq(people.id, epoxyFills.personId)))
    .where(and(eq(epoxyFills.shopId, ctx.shop.id), eq(epoxyFills.pieceId, pieceId))).orderBy(desc(epoxyFills.mixedAt)));
  return rows.map(({ f, personName }) => ({
    id: f.id, port: f.port, gramsInPortMilli: f.gramsInPortMilli, gramsWasteMilli: f.gramsWasteMilli, ratio: f.ratioText, mixedAt: f.mixedAt.toISOString(), readyAt: f.readyAt.toISOString(), cureMinutes: f.cureMinutes, personName,
  }));
}
