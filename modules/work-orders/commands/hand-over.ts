import "server-only";
import { randomUUID } from "node:crypto";
import { and, eq, inArray, isNull, sql } from "drizzle-orm";
import { customers, shipments, workOrders, workPieces } from "@/db/schema";
import { defineCommand } from "@/modules/access/command";
import { ableTo, personIdOf, type TxContext } from "@/modules/access/context";
import { carrierBill } from "@/modules/books/domain/posting-stock";
import { openDateFrom, postEntry } from "@/modules/books/post";
import { TERMS, type Terms } from "@/modules/customers/domain/terms";
import { queueMail } from "@/modules/documents/mail";
import { money } from "@/modules/kernel/format";
import { localDate } from "@/modules/kernel/instant";
import { minor } from "@/modules/kernel/money";
import { ok, refuse, type Result } from "@/modules/kernel/result";
import { owedBeforeLeaving } from "../domain/may-leave";
import { handOverInput, shipInput } from "../input";
import { moneyOfOrder } from "../queries/order-money";
import { releaseReservations } from "../reserve";

interface Leaving {
  order: { id: string; number: string; customerId: string };
  customer: { name: string; email: string | null };
  pieces: (typeof workPieces.$inferSelect)[];
  /** Owed and let go all the same, by a manager. */
  owedMinor: number;
}

/** The pieces that leave, if they may: released, still here, and paid for, or let go by a manager who says so. */
async function mayLeave(ctx: TxContext, workOrderId: string, pieceIds: readonly string[], unpaidOk: boolean): Promise<Result<Leaving>> {
  const { tx, shop } = ctx;
  const [row] = await tx.select({ o: workOrders, c: customers }).from(workOrders).innerJoin(customers, and(eq(customers.shopId, workOrders.shopId), eq(customers.id, workOrders.customerId)))
    .where(and(eq(workOrders.shopId, shop.id), eq(workOrders.id, workOrderId))).for("update", { of: workOrders });
  if (!row) return refuse("NOT_FOUND", "This order is not here.");
  const pieces = await tx.select().from(workPieces).where(and(eq(workPieces.shopId, shop.id), eq(workPieces.workOrderId, workOrderId), inArray(workPieces.id, [...pieceIds]))).for("update");
  if (pieces.length !== new Set(pieceIds).size) return refuse("NOT_FOUND", "One of these pieces is not on this order.", { field: "pieceIds" });
  for (const p of pieces) {
    const name = p.tag ?? `piece ${p.pieceNo}`;
    if (p.handedOverAt) return refuse("GONE_ALREADY", `${name} has left already.`, { field: "pieceIds" });
    if (!p.bookedInAt) return refuse("NOT_BOOKED_IN", `${name} never came in.`, { field: "pieceIds" });
    if (!p.releasedAt && !p.stoppedAt) return refuse("NOT_RELEASED", `${name} is not released. Final inspection comes first.`, { field: "pieceIds" });
  }
  const owed = owedBeforeLeaving(await moneyOfOrder(ctx, workOrderId), TERMS.find((t): t is Terms => t === row.c.terms) ?? "receipt");
  if (owed !== null && !(unpaidOk && ableTo(ctx, "handover.unpaid"))) {
    const sum = money(owed, shop);
    return refuse("MONEY_OWED", ableTo(ctx, "handover.unpaid")
      ? `${sum} is still to pay. Tick that it leaves unpaid, and it is recorded under your name.`
      : `${sum} is still to pay. Take the payment first; only a manager lets a piece go unpaid.`, { field: "unpaidOk", data: { owedMinor: owed } });
  }
  return ok({ order: row.o, customer: row.c, pieces, owedMinor: owed ?? 0 });
}

async function markGone(ctx: TxContext, leaving: Leaving, to: string): Promise<void> {
  const { tx, shop } = ctx;
  await tx.update(workPieces).set({ handedOverAt: ctx.now, handedOverTo: to, place: "", version: sql`${workPieces.version} + 1` })
    .where(and(eq(workPieces.shopId, shop.id), inArray(workPieces.id, leaving.pieces.map((p) => p.id))));
  const [still] = await tx.select({ id: workPieces.id }).from(workPieces).where(and(eq(workPieces.shopId, shop.id), eq(workPieces.workOrderId, leaving.order.id), isNull(workPieces.handedOverAt))).limit(1);
  if (still) return;
  await tx.update(workOrders).set({ closedAt: ctx.now, version: sql`${workOrders.version} + 1` }).where(and(eq(workOrders.shopId, shop.id), eq(workOrders.id, leaving.order.id)));
  await releaseReservations(ctx, leaving.order.id);
}

/** Fetched at the counter: who took it, when. The order closes with its last piece. */
export const handOver = defineCommand({
  name: "pieces.hand-over",
  act: "ship",
  input: handOverInput,
  async run(ctx, input) {
    const leaving = await mayLeave(ctx, input.workOrderId, input.pieceIds, input.unpaidOk);
    if (!leaving.ok) return leaving;
    await markGone(ctx, leaving.value, input.to);
    return ok({ pieces: leaving.value.pieces.length, owedMinor: leaving.value.owedMinor });
  },
  subject: (input) => ({ kind: "work-order", id: input.workOrderId }),
});

/** Sent by carrier, insured at the declared value unless typed otherwise; the carrier's cost goes to the books. */
export const shipPieces = defineCommand({
  name: "pieces.ship",
  act: "ship",
  input: shipInput,
  async run(ctx, input) {
    const may = await mayLeave(ctx, input.workOrderId, input.pieceIds, input.unpaidOk);
    if (!may.ok) return may;
    const leaving = may.value;
    const declared = leaving.pieces.reduce((sum, p) => sum + (p.declaredValueMinor ?? 0), 0);
    const insuredMinor = input.insured ?? declared;
    const id = randomUUID();
    await ctx.tx.insert(shipments).values({
      shopId: ctx.shop.id, id, workOrderId: input.workOrderId, carrier: input.carrier, service: input.service, tracking: input.tracking, insuredMinor, costMinor: input.cost, at: ctx.now, personId: personIdOf(ctx),
    });
    await markGone(ctx, leaving, `${input.carrier}${input.tracking ? ` ${input.tracking}` : ""}`);
    if (leaving.customer.email) {
      await queueMail(ctx, {
        kind: "shipped", to: leaving.customer.email, toName: leaving.customer.name, subject: `${leaving.order.number} is on its way`,
        paragraphs: [
          `${leaving.pieces.map((p) => `${p.family} (tag ${p.tag ?? ""})`).join(", ")} left today with ${input.carrier}${input.service ? `, ${input.service}` : ""}.`,
          ...(input.tracking ? [`Tracking number: ${input.tracking}`] : []), `Insured for ${money(insuredMinor, ctx.shop)}. Look it over when it comes, and keep the packing until you have.`,
        ],
        workOrderId: leaving.order.id, about: { kind: "shipment", id },
      });
    }
    if (input.cost > 0) {
      const posted = await postEntry(ctx, {
        date: await openDateFrom(ctx, localDate(ctx.now, ctx.shop.zone)), text: `${input.carrier} for ${leaving.order.number}`, rule: "carrierBill", sourceKind: "shipment", sourceId: id,
        workOrderId: leaving.order.id, customerId: leaving.order.customerId, lines: carrierBill({ amountMinor: minor(input.cost) }),
      });
      if (!posted.ok) return posted;
    }
    return ok({ shipmentId: id, insuredMinor, owedMinor: leaving.owedMinor });
  },
  subject: (input) => ({ kind: "work-order", id: input.workOrderId }),
});
