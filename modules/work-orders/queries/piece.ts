import "server-only";
import { and, asc, desc, eq } from "drizzle-orm";
import { customers, inspections, people, receivingChecks, workOrders, workPieces } from "@/db/schema";
import { inShop, mustBeAble, NotFound, personIdOf, type ShopContext } from "@/modules/access/context";
import { filesOf } from "@/modules/documents/files";
import { missingForRelease } from "../domain/release-check";
import { releaseFactsOf, type ReleaseState } from "./release-facts";

export interface PiecePage {
  id: string; version: number; pieceNo: number; orderNumber: string; orderId: string; customer: string; customerEmail: string; family: string; castingNumber: string; serial: string; description: string; ownerKind: string;
  declaredValueMinor: number | null; tag: string | null; place: string; promisedOn: string | null; use: string; wants: string; bookedInAt: string | null; releasedAt: string | null; handedOverAt: string | null; isOrderOpen: boolean;
  check: { at: string; by: string; parcelCondition: string; counts: Record<string, number>; missing: string; damage: string; notes: string } | null;
  inspections: { at: string; by: string; outcome: string; reason: string; alone: boolean }[];
  photos: { id: string; at: string; note: string }[];
  siblings: { pieceNo: number; tag: string | null; family: string; isBookedIn: boolean }[];
  now: string;
}

/** One piece of an order. @throws NotFound */
export async function piecePage(ctx: ShopContext, number: string, pieceNo: number): Promise<PiecePage> {
  mustBeAble(ctx, "orders.see");
  return inShop(ctx, async (tx) => {
    const s = ctx.shop.id;
    const [row] = await tx.select({ p: workPieces, o: workOrders, c: customers }).from(workPieces)
      .innerJoin(workOrders, and(eq(workOrders.shopId, workPieces.shopId), eq(workOrders.id, workPieces.workOrderId)))
      .innerJoin(customers, and(eq(customers.shopId, workOrders.shopId), eq(customers.id, workOrders.customerId)))
      .where(and(eq(workPieces.shopId, s), eq(workOrders.number, number), eq(workPieces.pieceNo, pieceNo)));
    if (!row) throw new NotFound("piece");
    const { p, o, c } = row;
    const [check] = await tx.select({ r: receivingChecks, by: people.shortName }).from(receivingChecks).leftJoin(people, and(eq(people.shopId, receivingChecks.shopId), eq(people.id, receivingChecks.personId)))
      .where(and(eq(receivingChecks.shopId, s), eq(receivingChecks.pieceId, p.id))).orderBy(desc(receivingChecks.at)).limit(1);
    const looked = await tx.select({ i: inspections, by: people.shortName }).from(inspections).leftJoin(people, and(eq(people.shopId, inspections.shopId), eq(people.id, inspections.personId)))
      .where(and(eq(inspections.shopId, s), eq(inspections.pieceId, p.id))).orderBy(desc(inspections.at));
    const photos = await filesOf({ ...ctx, tx }, "photo", [p.id]);
    const all = await tx.select().from(workPieces).where(and(eq(workPieces.shopId, s), eq(workPieces.workOrderId, o.id))).orderBy(asc(workPieces.pieceNo));
    return {
      id: p.id, version: p.version, pieceNo: p.pieceNo, orderNumber: o.number, orderId: o.id, customer: c.name, customerEmail: c.email ?? "", family: p.family, castingNumber: p.castingNumber, serial: p.serial, description: p.description, ownerKind: p.ownerKind,
      declaredValueMinor: p.declaredValueMinor, tag: p.tag, place: p.place, promisedOn: o.promisedOn, use: o.use, wants: o.wants, bookedInAt: p.bookedInAt?.toISOString() ?? null, releasedAt: p.releasedAt?.toISOString() ?? null, handedOverAt: p.handedOverAt?.toISOString() ?? null,
      isOrderOpen: !o.closedAt && !o.cancelledAt,
      check: check ? { at: check.r.at.toISOString(), by: check.by ?? "", parcelCondition: check.r.parcelCondition, counts: check.r.counts as Record<string, number>, missing: check.r.missing, damage: check.r.damage, notes: check.r.notes } : null,
      inspections: looked.map(({ i, by }) => ({ at: i.at.toISOString(), by: by ?? "", outcome: i.outcome, reason: i.reason, alone: i.alone })),
      photos: photos.map((f) => ({ id: f.id, at: f.at, note: f.note })), siblings: all.map((x) => ({ pieceNo: x.pieceNo, tag: x.tag, family: x.family, isBookedIn: x.bookedInAt !== null })), now: ctx.now.toISOString(),
    };
  });
}

/** What still stands between this piece and its release, for the one who looks; without the ticks and counts of the form. */
export async function releaseSheet(ctx: ShopContext, pieceId: string): Promise<{ facts: ReleaseState; missing: string[] }> {
  mustBeAble(ctx, "orders.see");
  const facts = await releaseFactsOf(ctx, pieceId, personIdOf(ctx) ?? "00000000-0000-0000-0000-000000000000");
  return { facts, missing: missingForRelease({ ...facts, tray: [], unchecked: [] }) };
}
