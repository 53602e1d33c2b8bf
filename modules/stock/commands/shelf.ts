import "server-only";
import { randomUUID } from "node:crypto";
import { and, asc, eq, gt, inArray, sql } from "drizzle-orm";
import { lots, parts, stockBalances, stockMovements, workOrderParts } from "@/db/schema";
import { NotFound, personIdOf, type TxContext } from "@/modules/access/context";
import { localDate } from "@/modules/kernel/instant";
import { minor } from "@/modules/kernel/money";
import { milli, milliText } from "@/modules/kernel/quantity";
import { refuse } from "@/modules/kernel/result";
import type { StockValue } from "../domain/moving-average";
import { unitMark, type MovementKind } from "../domain/part-words";

/** A part as it stands on the shelf, locked for this transaction. */
export interface ShelfPart {
  partId: string; sku: string; description: string; stockUnit: string; bin: string; isKit: boolean; lotTracked: boolean; active: boolean;
  onHandMilli: number; valueMinor: number; reservedMilli: number;
}

/**
 * Locks the balances of parts in the order of their ids, so that two acts over the same parts wait and never deadlock.
 * Lock every part of an act at once, before anything else is written. @throws NotFound for a part of another shop
 */
export async function lockShelf(ctx: TxContext, partIds: readonly string[]): Promise<Map<string, ShelfPart>> {
  const ids = [...new Set(partIds)].sort();
  if (ids.length === 0) return new Map();
  const locked = await heldRows(ctx, ids);
  if (locked.length === ids.length) return new Map(locked.map((p) => [p.partId, p]));
  // A part that never moved has no balance yet. The foreign key refuses a part of another shop; say "not found" first.
  const { tx, shop } = ctx;
  const known = await tx.select({ id: parts.id }).from(parts).where(and(eq(parts.shopId, shop.id), inArray(parts.id, ids)));
  if (known.length !== ids.length) throw new NotFound("part");
  await tx.insert(stockBalances).values(ids.map((partId) => ({ shopId: shop.id, partId }))).onConflictDoNothing();
  return new Map((await heldRows(ctx, ids)).map((p) => [p.partId, p]));
}

const heldRows = (ctx: TxContext, ids: readonly string[]): Promise<ShelfPart[]> =>
  ctx.tx.select({
    partId: parts.id, sku: parts.sku, description: parts.description, stockUnit: parts.stockUnit, bin: parts.bin, isKit: parts.isKit, lotTracked: parts.lotTracked, active: parts.active,
    onHandMilli: stockBalances.onHandMilli, valueMinor: stockBalances.valueMinor, reservedMilli: stockBalances.reservedMilli,
  }).from(stockBalances).innerJoin(parts, and(eq(parts.shopId, stockBalances.shopId), eq(parts.id, stockBalances.partId)))
    .where(and(eq(stockBalances.shopId, ctx.shop.id), inArray(stockBalances.partId, [...ids]))).orderBy(asc(stockBalances.partId)).for("update", { of: stockBalances });

export async function lockOne(ctx: TxContext, partId: string): Promise<ShelfPart> {
  const part = (await lockShelf(ctx, [partId])).get(partId);
  if (!part) throw new NotFound("part");
  return part;
}

export const stockOf = (part: ShelfPart): StockValue => ({ qtyMilli: milli(part.onHandMilli), valueMinor: minor(part.valueMinor) });

export interface NewMovement {
  partId: string; lotId?: string | null; qtyMilli: number; valueMinor: number; kind: MovementKind;
  workOrderId?: string | null; workOrderPartId?: string | null; receiptLineId?: string | null; reversesId?: string | null; reason?: string;
}

/** Writes one row of the ledger; the need of the work order it names moves with it. Returns the row's id. */
export async function writeMovement(ctx: TxContext, m: NewMovement): Promise<string> {
  const id = randomUUID();
  await ctx.tx.insert(stockMovements).values({
    shopId: ctx.shop.id, id, partId: m.partId, lotId: m.lotId ?? null, qtyMilli: m.qtyMilli, valueMinor: m.valueMinor, kind: m.kind, workOrderId: m.workOrderId ?? null,
    workOrderPartId: m.workOrderPartId ?? null, receiptLineId: m.receiptLineId ?? null, reversesId: m.reversesId ?? null, reason: m.reason ?? "", at: ctx.now, personId: personIdOf(ctx),
  });
  if (m.workOrderPartId) {
    await ctx.tx.update(workOrderParts).set({
      issuedMilli: sql`${workOrderParts.issuedMilli} - ${m.qtyMilli}`, issuedValueMinor: sql`${workOrderParts.issuedValueMinor} - ${m.valueMinor}`, version: sql`${workOrderParts.version} + 1`,
    }).where(and(eq(workOrderParts.shopId, ctx.shop.id), eq(workOrderParts.id, m.workOrderPartId)));
  }
  return id;
}

export interface LotRow { id: string; code: string; expiresOn: string | null; onHandMilli: number }

/** Lots of a part that hold something. The part's balance is locked already, which keeps them still. */
export const lotsOnHand = (ctx: TxContext, partId: string): Promise<LotRow[]> =>
  ctx.tx.select({ id: lots.id, code: lots.code, expiresOn: lots.expiresOn, onHandMilli: lots.onHandMilli }).from(lots)
    .where(and(eq(lots.shopId, ctx.shop.id), eq(lots.partId, partId), gt(lots.onHandMilli, 0))).orderBy(asc(lots.expiresOn), asc(lots.createdAt));

export const today = (ctx: TxContext): string => localDate(ctx.now, ctx.shop.zone);

/** `6`, `42.5 g`. */
export const qtyWords = (qtyMilli: number, unit: string): string => [milliText(qtyMilli), unitMark(unit)].filter(Boolean).join(" ");

/** Refusal that names the real number and where it lies. */
export function notEnough(part: ShelfPart, usableMilli: number, wantedMilli: number, more = "") {
  const at = part.bin ? ` at ${part.bin}` : "";
  const have = qtyWords(usableMilli, part.stockUnit);
  return refuse("INSUFFICIENT_STOCK",
    usableMilli > 0
      ? `There ${usableMilli === 1000 ? "is" : "are"} ${have} of ${part.sku} on the shelf${at}, not ${qtyWords(wantedMilli, part.stockUnit)}.${more} Take ${have} or less, or take in more first.`
      : `There is no ${part.sku} on the shelf${at}.${more} Take in more first.`,
    { field: "qty", data: { onHandMilli: usableMilli, wantedMilli, bin: part.bin } });
}
