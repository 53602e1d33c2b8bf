import "server-only";
import { randomUUID } from "node:crypto";
import { and, eq, isNull, ne, sql } from "drizzle-orm";
import { customers, promises, workOrders, workPieces } from "@/db/schema";
import { defineCommand } from "@/modules/access/command";
import { personIdOf, type TxContext } from "@/modules/access/context";
import { takeYearNumber } from "@/modules/access/numbers";
import { addCustomer } from "@/modules/customers/commands";
import { localDate } from "@/modules/kernel/instant";
import { ok, refuse, type Refused } from "@/modules/kernel/result";
import { addPieceInput, openOrderInput } from "../input";

type Marks = { castingNumber: string; serial: string };

/**
 * A piece stands on one open order at most: the same casting and serial number on a second one is refused, naming the
 * first. A lock on the pair keeps two counters that type at the same moment apart.
 */
async function onAnotherOrder(ctx: TxContext, piece: Marks, field: string, exceptPieceId?: string): Promise<Refused | null> {
  if (piece.castingNumber === "" || piece.serial === "") return null;
  const key = `${ctx.shop.id}:piece:${piece.castingNumber}:${piece.serial}`.toLowerCase();
  await ctx.tx.execute(sql`select pg_advisory_xact_lock(hashtextextended(${key}, 2))`);
  const [found] = await ctx.tx.select({ number: workOrders.number, name: customers.name })
    .from(workPieces)
    .innerJoin(workOrders, and(eq(workOrders.shopId, workPieces.shopId), eq(workOrders.id, workPieces.workOrderId)))
    .innerJoin(customers, and(eq(customers.shopId, workOrders.shopId), eq(customers.id, workOrders.customerId)))
    .where(and(
      eq(workPieces.shopId, ctx.shop.id), isNull(workPieces.handedOverAt), isNull(workOrders.closedAt), isNull(workOrders.cancelledAt),
      eq(sql`lower(${workPieces.castingNumber})`, piece.castingNumber.toLowerCase()), eq(sql`lower(${workPieces.serial})`, piece.serial.toLowerCase()),
      exceptPieceId ? ne(workPieces.id, exceptPieceId) : undefined,
    )).limit(1);
  return found
    ? refuse("PIECE_ON_OPEN_ORDER", `${piece.castingNumber} ${piece.serial} is on open order ${found.number} for ${found.name}. Open that one, or check the numbers.`, { field, data: { number: found.number } })
    : null;
}
export { onAnotherOrder };

/** Opens a work order: customer known or added in the same act, its pieces, what is wanted, the promise. */
export const openOrder = defineCommand({
  name: "orders.open",
  act: "orders.open",
  input: openOrderInput,
  async run(ctx, input) {
    const today = localDate(ctx.now, ctx.shop.zone);
    if (input.promisedOn !== null && input.promisedOn < today) {
      return refuse("PROMISE_IN_THE_PAST", "The promise is in the past. Give today or a later day, or leave it open.", { field: "promisedOn" });
    }
    const seen = new Set<string>();
    for (const [i, p] of input.pieces.entries()) {
      const key = `${p.castingNumber} ${p.serial}`.toLowerCase();
      if (p.castingNumber !== "" && p.serial !== "" && seen.has(key)) {
        return refuse("PIECE_TWICE", "This casting and serial number stands twice on this order.", { field: `pieces.${i}.serial` });
      }
      seen.add(key);
      const elsewhere = await onAnotherOrder(ctx, p, `pieces.${i}.serial`);
      if (elsewhere) return elsewhere;
    }
    let customerId = input.customerId;
    if (customerId === "" && input.newCustomer) {
      const added = await addCustomer(ctx, input.newCustomer);
      if (!added.ok) return added;
      customerId = added.value.id;
    }
    const [customer] = await ctx.tx.select({ bp: customers.laborDiscountBasisPoints }).from(customers).where(and(eq(customers.shopId, ctx.shop.id), eq(customers.id, customerId)));
    if (!customer) return refuse("CUSTOMER_GONE", "This customer is not here any more. Pick another or add a new one.", { field: "customerId" });

    const id = randomUUID();
    const number = await takeYearNumber(ctx, "WO", today.slice(0, 4), 4);
    await ctx.tx.insert(workOrders).values({
      shopId: ctx.shop.id, id, number, customerId, customerReference: input.customerReference, wants: input.wants, use: input.use, promisedOn: input.promisedOn,
      laborDiscountBasisPoints: customer.bp, openedAt: ctx.now, openedBy: personIdOf(ctx),
    });
    if (input.promisedOn !== null) {
      await ctx.tx.insert(promises).values({ shopId: ctx.shop.id, id: randomUUID(), workOrderId: id, promisedOn: input.promisedOn, reason: "First promise", at: ctx.now, personId: personIdOf(ctx) });
    }
    const pieces = input.pieces.map((p, i) => ({ ...columnsOfPiece(p), shopId: ctx.shop.id, id: randomUUID(), workOrderId: id, pieceNo: i + 1 }));
    await ctx.tx.insert(workPieces).values(pieces);
    return ok({ id, number, customerId, pieces: pieces.map((p) => ({ id: p.id, pieceNo: p.pieceNo })) });
  },
  subject: (_, value) => ({ kind: "work-order", id: value.id }),
});

const columnsOfPiece = (p: { family: string; castingNumber: string; serial: string; declaredValue: number | null; description: string; ownerKind: string }) => ({
  family: p.family, castingNumber: p.castingNumber, serial: p.serial, declaredValueMinor: p.declaredValue, description: p.description, ownerKind: p.ownerKind,
});

/** More came than was announced: one more piece on the order. */
export const addPiece = defineCommand({
  name: "pieces.add",
  act: "pieces.receive",
  input: addPieceInput,
  async run(ctx, { workOrderId, ...piece }) {
    const [order] = await ctx.tx.select({ closedAt: workOrders.closedAt, cancelledAt: workOrders.cancelledAt }).from(workOrders)
      .where(and(eq(workOrders.shopId, ctx.shop.id), eq(workOrders.id, workOrderId))).for("update");
    if (!order) return refuse("NOT_FOUND", "This order is not here.");
    if (order.closedAt || order.cancelledAt) return refuse("ORDER_CLOSED", "This order is closed. Open a new one for the piece.");
    const elsewhere = await onAnotherOrder(ctx, piece, "serial");
    if (elsewhere) return elsewhere;
    const [{ top } = { top: 0 }] = await ctx.tx.select({ top: sql<number>`coalesce(max(${workPieces.pieceNo}), 0)::int` }).from(workPieces)
      .where(and(eq(workPieces.shopId, ctx.shop.id), eq(workPieces.workOrderId, workOrderId)));
    const id = randomUUID();
    await ctx.tx.insert(workPieces).values({ ...columnsOfPiece(piece), shopId: ctx.shop.id, id, workOrderId, pieceNo: top + 1 });
    return ok({ id, pieceNo: top + 1 });
  },
  subject: (input) => ({ kind: "work-order", id: input.workOrderId }),
});
