import "server-only";
import { randomUUID } from "node:crypto";
import { and, asc, eq, isNull, or, lt, sql } from "drizzle-orm";
import { epoxyFills, operations, workOrderParts, workOrders, workPieces } from "@/db/schema";
import { defineCommand } from "@/modules/access/command";
import { personIdOf, type TxContext } from "@/modules/access/context";
import { ok, refuse } from "@/modules/kernel/result";
import { issueStock } from "@/modules/stock/commands/issue-stock";
import { lockShelf } from "@/modules/stock/commands/shelf";
import { cureReadyAt } from "@/modules/time/domain/cure";
import { typedInstant } from "@/modules/time/domain/typed-time";
import { epoxyInput } from "../parts-input";

/** The need of the order that epoxy is issued against; made when the estimate had none, widened when the pot takes more. */
async function needFor(ctx: TxContext, p: { workOrderId: string; pieceId: string; partId: string; grams: number }): Promise<string> {
  const [need] = await ctx.tx.select().from(workOrderParts).where(and(
    eq(workOrderParts.shopId, ctx.shop.id), eq(workOrderParts.workOrderId, p.workOrderId), eq(workOrderParts.partId, p.partId), isNull(workOrderParts.removedAt),
    or(isNull(workOrderParts.pieceId), eq(workOrderParts.pieceId, p.pieceId)),
  )).orderBy(asc(workOrderParts.pieceId), asc(workOrderParts.id)).limit(1).for("update");
  if (!need) {
    const id = randomUUID();
    await ctx.tx.insert(workOrderParts).values({ shopId: ctx.shop.id, id, workOrderId: p.workOrderId, pieceId: p.pieceId, partId: p.partId, neededMilli: p.grams });
    return id;
  }
  const takes = need.issuedMilli + p.grams;
  if (takes > need.neededMilli) await ctx.tx.update(workOrderParts).set({ neededMilli: takes }).where(and(eq(workOrderParts.shopId, ctx.shop.id), eq(workOrderParts.id, need.id)));
  return need.id;
}

/**
 * Epoxy mixed and put into a port: lots and grams leave the shelf (what stays in the pot too), first to expire first,
 * expired never. The cure is elapsed time from mixing; porting on the piece may not start before it is over.
 */
export const recordEpoxyFill = defineCommand({
  name: "workOrders.epoxyFill",
  act: "work.record",
  input: epoxyInput,
  async run(ctx, input) {
    const { tx, shop } = ctx;
    const mixed = typedInstant(input.mixedAt, shop.zone, input.which || undefined);
    if (!mixed.ok) return refuse(mixed.refusal.code, mixed.refusal.message, { field: mixed.refusal.code === "TIME_EXISTS_TWICE" ? "which" : "mixedAt", ...(mixed.refusal.data ? { data: mixed.refusal.data } : {}) });
    if (mixed.value.getTime() > ctx.now.getTime() + 5 * 60_000) return refuse("TIME_AHEAD", "This time has not come yet. Type when it was mixed.", { field: "mixedAt" });
    const [row] = await tx.select({ op: operations, releasedAt: workPieces.releasedAt, bookedInAt: workPieces.bookedInAt, closedAt: workOrders.closedAt, cancelledAt: workOrders.cancelledAt, owner: workPieces.ownerKind }).from(operations)
      .innerJoin(workPieces, and(eq(workPieces.shopId, operations.shopId), eq(workPieces.id, operations.pieceId)))
      .innerJoin(workOrders, and(eq(workOrders.shopId, operations.shopId), eq(workOrders.id, operations.workOrderId)))
      .where(and(eq(operations.shopId, shop.id), eq(operations.id, input.operationId), eq(operations.pieceId, input.pieceId), isNull(operations.removedAt)));
    if (!row) return refuse("NOT_FOUND", "This operation is not on that head. Choose another.", { field: "operationId" });
    if (row.closedAt ?? row.cancelledAt) return refuse("ORDER_CLOSED", "This order is closed. Open it again before work is recorded.");
    if (row.releasedAt) return refuse("RELEASED", "This head is released. A lead reopens it before more work is done.");
    if (!row.bookedInAt) return refuse("NOT_BOOKED_IN", "This head is not booked in. Nothing can be done on it yet.");

    const grams = input.gramsInPort + input.gramsWaste;
    const part = (await lockShelf(ctx, [input.partId])).get(input.partId);
    if (part?.stockUnit !== "gram") return refuse("NOT_BY_WEIGHT", "Choose an epoxy that is kept in grams.", { field: "partId" });
    const workOrderPartId = await needFor(ctx, { workOrderId: row.op.workOrderId, pieceId: input.pieceId, partId: input.partId, grams });
    const taken = await issueStock(ctx, {
      partId: input.partId, qtyMilli: grams, lotId: input.lotId || null, purpose: row.owner === "shop" ? "development" : "work order", workOrderId: row.op.workOrderId, workOrderPartId, reason: `epoxy, ${input.port} port`,
    });
    if (!taken.ok) return refuse(taken.refusal.code, taken.refusal.message, { field: taken.refusal.field === "lotId" ? "lotId" : "gramsInPort", ...(taken.refusal.data ? { data: taken.refusal.data } : {}) });

    const readyAt = cureReadyAt(mixed.value, input.cureHours);
    const id = randomUUID();
    await tx.insert(epoxyFills).values({
      shopId: shop.id, id, pieceId: input.pieceId, operationId: input.operationId, port: input.port, gramsInPortMilli: input.gramsInPort, gramsWasteMilli: input.gramsWaste, ratioText: input.ratio,
      surfacePrepared: input.surfacePrepared, mixedAt: mixed.value, cureMinutes: input.cureHours, readyAt, personId: personIdOf(ctx), at: ctx.now,
    });
    // The vise holds one head: while a port cures, the head is not ground at any port.
    await tx.update(operations).set({ notBefore: readyAt, notBeforeReason: `Epoxy in the ${input.port} port cures`, version: sql`${operations.version} + 1` }).where(and(
      eq(operations.shopId, shop.id), eq(operations.pieceId, input.pieceId), eq(operations.station, "Porting"), isNull(operations.doneAt), isNull(operations.skippedAt), isNull(operations.removedAt),
      sql`${operations.id} <> ${input.operationId}`, or(isNull(operations.notBefore), lt(operations.notBefore, readyAt))));
    return ok({ epoxyFillId: id, pieceId: input.pieceId, readyAt: readyAt.toISOString(), lots: taken.value.lots.map((l) => ({ lotCode: l.lotCode, qtyMilli: l.qtyMilli })) });
  },
  subject: (_, value) => ({ kind: "piece", id: value.pieceId }),
});
