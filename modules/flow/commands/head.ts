import "server-only";
import { randomUUID } from "node:crypto";
import { and, eq } from "drizzle-orm";
import { engineFamilies, heads, workPieces } from "@/db/schema";
import type { TxContext } from "@/modules/access/context";
import { ok, refuse, type Result } from "@/modules/kernel/result";

/**
 * The head record of a work piece, made when it is first asked for. Cylinders, bore and cam lifts are taken from the shop's
 * family of that name, if it has one. Inner: joins the caller's transaction.
 */
export async function headForPiece(ctx: TxContext, pieceId: string): Promise<Result<{ headId: string; isNew: boolean }>> {
  const { tx, shop } = ctx;
  const known = await tx.select({ id: heads.id }).from(heads).where(and(eq(heads.shopId, shop.id), eq(heads.pieceId, pieceId)));
  if (known[0]) return ok({ headId: known[0].id, isNew: false });
  const [piece] = await tx.select().from(workPieces).where(and(eq(workPieces.shopId, shop.id), eq(workPieces.id, pieceId)));
  if (!piece) return refuse("NOT_FOUND", "This piece is not here.");
  const [family] = await tx.select().from(engineFamilies).where(and(eq(engineFamilies.shopId, shop.id), eq(engineFamilies.name, piece.family)));
  const id = randomUUID();
  await tx.insert(heads).values({
    shopId: shop.id, id, pieceId, ownerKind: piece.ownerKind, mark: piece.tag ?? `piece ${piece.pieceNo}`, family: piece.family, castingNumber: piece.castingNumber, seatMaterial: piece.seatMaterial,
    cylinders: family?.cylinders ?? 1, boreMm: family?.boreMm ?? null, strokeMm: family?.strokeMm ?? null,
    camLiftIntakeUm: family?.camLiftIntakeUm ?? null, camLiftExhaustUm: family?.camLiftExhaustUm ?? null,
  });
  return ok({ headId: id, isNew: true });
}
