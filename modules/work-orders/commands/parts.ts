import "server-only";
import { randomUUID } from "node:crypto";
import { and, asc, eq, gt, isNull, ne, sql } from "drizzle-orm";
import { parts, workOrderParts, workOrders, workPieces } from "@/db/schema";
import { changedMeanwhile, defineCommand } from "@/modules/access/command";
import type { TxContext } from "@/modules/access/context";
import type { IssuePurpose } from "@/modules/books/domain/posting-stock";
import { ok, refuse, type Result } from "@/modules/kernel/result";
import { checkTakeable, issueStock, returnFromJob, type Taken } from "@/modules/stock/commands/issue-stock";
import { expiredOf, shareOut } from "@/modules/stock/commands/share-out";
import { lockShelf, qtyWords, type ShelfPart } from "@/modules/stock/commands/shelf";
import { explodeKit } from "@/modules/stock/domain/kit";
import { milli } from "@/modules/kernel/quantity";
import { kitLinesOf } from "@/modules/stock/queries/kits";
import { dropNeedInput, issueInput, issueReadyInput, needPartInput, returnInput } from "../parts-input";
import { reserveForWorkOrder } from "../reserve";

interface Need {
  id: string; workOrderId: string; partId: string; neededMilli: number; reservedMilli: number; issuedMilli: number; issuedValueMinor: number; version: number; byHand: boolean; purpose: IssuePurpose;
}
const NO_NEED = refuse("NOT_FOUND", "This part is not on the order any more.");

/** A need whose part is locked on the shelf, with its order still open. */
async function lockNeed(ctx: TxContext, id: string): Promise<Result<{ need: Need; part: ShelfPart }>> {
  const [seen] = await ctx.tx.select({ partId: workOrderParts.partId }).from(workOrderParts).where(and(eq(workOrderParts.shopId, ctx.shop.id), eq(workOrderParts.id, id)));
  if (!seen) return NO_NEED;
  const part = (await lockShelf(ctx, [seen.partId])).get(seen.partId);
  const [row] = await ctx.tx.select({ n: workOrderParts, closedAt: workOrders.closedAt, cancelledAt: workOrders.cancelledAt, owner: workPieces.ownerKind, released: workPieces.releasedAt }).from(workOrderParts)
    .innerJoin(workOrders, and(eq(workOrders.shopId, workOrderParts.shopId), eq(workOrders.id, workOrderParts.workOrderId)))
    .leftJoin(workPieces, and(eq(workPieces.shopId, workOrderParts.shopId), eq(workPieces.id, workOrderParts.pieceId)))
    .where(and(eq(workOrderParts.shopId, ctx.shop.id), eq(workOrderParts.id, id))).for("update", { of: workOrderParts });
  if (!row || !part || row.n.removedAt) return NO_NEED;
  if (row.cancelledAt) return refuse("ORDER_CANCELLED", "This order is cancelled. Parts still out with it come back to the shelf.");
  if (row.closedAt) return refuse("ORDER_CLOSED", "This order is closed. Open it again before parts move.");
  return ok({ need: { ...row.n, byHand: row.n.estimateLineId === null, purpose: row.owner === "shop" ? "development" : "work order" }, part });
}

/** Who else the shelf is promised to, for the refusal. */
async function othersWith(ctx: TxContext, partId: string, needId: string): Promise<string[]> {
  const rows = await ctx.tx.select({ number: workOrders.number }).from(workOrderParts).innerJoin(workOrders, and(eq(workOrders.shopId, workOrderParts.shopId), eq(workOrders.id, workOrderParts.workOrderId)))
    .where(and(eq(workOrderParts.shopId, ctx.shop.id), eq(workOrderParts.partId, partId), ne(workOrderParts.id, needId), gt(workOrderParts.reservedMilli, 0))).orderBy(asc(workOrders.promisedOn)).limit(4);
  return rows.map((r) => r.number);
}

async function issueNeed(ctx: TxContext, need: Need, part: ShelfPart, qtyMilli: number, lotId: string | null): Promise<Result<Taken>> {
  const usable = Math.max(0, part.onHandMilli - (await expiredOf(ctx, part)));
  const promised = part.reservedMilli - need.reservedMilli;
  if (qtyMilli <= usable && qtyMilli > usable - promised) {
    const left = Math.max(0, usable - promised);
    const others = await othersWith(ctx, part.partId, need.id);
    return refuse("PROMISED_TO_OTHERS",
      `${qtyWords(promised, part.stockUnit)} of the ${qtyWords(usable, part.stockUnit)} ${part.sku} on the shelf are promised to ${others.join(", ") || "other orders"}. ${left > 0 ? `Take ${qtyWords(left, part.stockUnit)} or less` : "Order more"}, or change a promise date.`,
      { field: "qty", data: { leftMilli: left } });
  }
  return issueStock(ctx, { partId: part.partId, qtyMilli, lotId, purpose: need.purpose, workOrderId: need.workOrderId, workOrderPartId: need.id });
}

const wordsOf = (taken: Taken) => taken.lots.map((l) => ({ qtyMilli: l.qtyMilli, lotCode: l.lotCode }));

/** Issues a part to its order: off the shelf at moving average, into the work in process. The answer holds no cost. */
export const issueToWorkOrder = defineCommand({
  name: "workOrders.issuePart",
  act: "stock.issue",
  input: issueInput,
  async run(ctx, input) {
    const held = await lockNeed(ctx, input.workOrderPartId);
    if (!held.ok) return held;
    const { need, part } = held.value;
    const fit = checkTakeable(part, input.qty);
    if (!fit.ok) return fit;
    const open = need.neededMilli - need.issuedMilli;
    if (input.qty > open && !input.moreThanNeeded) {
      return refuse("MORE_THAN_NEEDED", `The order needs ${qtyWords(Math.max(0, open), part.stockUnit)} more of ${part.sku}, not ${qtyWords(input.qty, part.stockUnit)}. Issue that, or say that it takes more.`, { field: "qty", data: { openMilli: open } });
    }
    const taken = await issueNeed(ctx, need, part, input.qty, input.lotId || null);
    return taken.ok ? ok({ workOrderId: need.workOrderId, sku: part.sku, lots: wordsOf(taken.value) }) : taken;
  },
  subject: (_, value) => ({ kind: "work-order", id: value.workOrderId }),
});

/** Issues everything that is reserved for the order, in one go. What is short stays short and is named. */
export const issueAllReady = defineCommand({
  name: "workOrders.issueReady",
  act: "stock.issue",
  input: issueReadyInput,
  async run(ctx, input) {
    const rows = await ctx.tx.select({ id: workOrderParts.id, partId: workOrderParts.partId }).from(workOrderParts)
      .where(and(eq(workOrderParts.shopId, ctx.shop.id), eq(workOrderParts.workOrderId, input.workOrderId), isNull(workOrderParts.removedAt), gt(workOrderParts.neededMilli, workOrderParts.issuedMilli))).orderBy(asc(workOrderParts.id));
    await lockShelf(ctx, rows.map((r) => r.partId));
    const issued: { sku: string; qtyMilli: number; lots: { qtyMilli: number; lotCode: string | null }[] }[] = [];
    const short: string[] = [];
    for (const row of rows) {
      const held = await lockNeed(ctx, row.id);
      if (!held.ok) return held;
      const { need, part } = held.value;
      const ready = Math.min(need.reservedMilli, need.neededMilli - need.issuedMilli);
      if (ready < need.neededMilli - need.issuedMilli) short.push(part.sku);
      if (ready <= 0) continue;
      const taken = await issueNeed(ctx, need, part, ready, null);
      if (!taken.ok) return taken;
      issued.push({ sku: part.sku, qtyMilli: ready, lots: wordsOf(taken.value) });
    }
    if (issued.length === 0) return refuse("NOTHING_READY", short.length ? `Nothing is ready: ${short.join(", ")} ${short.length === 1 ? "is" : "are"} short.` : "Everything this order needs is issued.");
    return ok({ workOrderId: input.workOrderId, issued, short });
  },
  subject: (input) => ({ kind: "work-order", id: input.workOrderId }),
});

/** Unused parts go back to the shelf and the lots they came from, at the cost they left at. */
export const returnUnused = defineCommand({
  name: "workOrders.returnPart",
  act: "stock.issue",
  input: returnInput,
  async run(ctx, input) {
    const [seen] = await ctx.tx.select({ partId: workOrderParts.partId }).from(workOrderParts).where(and(eq(workOrderParts.shopId, ctx.shop.id), eq(workOrderParts.id, input.workOrderPartId)));
    if (!seen) return NO_NEED;
    await lockShelf(ctx, [seen.partId]);
    const [row] = await ctx.tx.select({ n: workOrderParts, closedAt: workOrders.closedAt, owner: workPieces.ownerKind }).from(workOrderParts)
      .innerJoin(workOrders, and(eq(workOrders.shopId, workOrderParts.shopId), eq(workOrders.id, workOrderParts.workOrderId)))
      .leftJoin(workPieces, and(eq(workPieces.shopId, workOrderParts.shopId), eq(workPieces.id, workOrderParts.pieceId)))
      .where(and(eq(workOrderParts.shopId, ctx.shop.id), eq(workOrderParts.id, input.workOrderPartId))).for("update", { of: workOrderParts });
    if (!row) return NO_NEED;
    if (row.closedAt) return refuse("ORDER_CLOSED", "This order is closed, and its parts are in its cost. Open it again before parts move.");
    const back = await returnFromJob(ctx, {
      partId: row.n.partId, workOrderId: row.n.workOrderId, workOrderPartId: row.n.id, issuedMilli: row.n.issuedMilli, issuedValueMinor: row.n.issuedValueMinor, qtyMilli: input.qty,
      purpose: row.owner === "shop" ? "development" : "work order", reason: input.reason,
    });
    return back.ok ? ok({ workOrderId: row.n.workOrderId, partId: row.n.partId, qtyMilli: input.qty }) : back;
  },
  subject: (_, value) => ({ kind: "work-order", id: value.workOrderId }),
});

/** Puts a part on the order by hand, beside what was agreed; a kit comes as its parts. It is reserved if it is there. */
export const needPart = defineCommand({
  name: "workOrders.needPart",
  act: "stock.issue",
  input: needPartInput,
  async run(ctx, input) {
    const { tx, shop } = ctx;
    const [order] = await tx.select({ id: workOrders.id, closedAt: workOrders.closedAt, cancelledAt: workOrders.cancelledAt }).from(workOrders).where(and(eq(workOrders.shopId, shop.id), eq(workOrders.id, input.workOrderId)));
    if (!order) return refuse("NOT_FOUND", "This order is not here any more.");
    if (order.closedAt ?? order.cancelledAt) return refuse("ORDER_CLOSED", "This order is closed. Open it again before parts are added.");
    const [part] = await tx.select({ id: parts.id, sku: parts.sku, isKit: parts.isKit, active: parts.active }).from(parts).where(and(eq(parts.shopId, shop.id), eq(parts.id, input.partId)));
    if (!part) return refuse("PART_UNKNOWN", "Choose a part from the list.", { field: "partId" });
    if (!part.active) return refuse("PART_GONE", `${part.sku} is no longer kept. Choose another part.`, { field: "partId" });
    if (input.pieceId) {
      const [piece] = await tx.select({ id: workPieces.id }).from(workPieces).where(and(eq(workPieces.shopId, shop.id), eq(workPieces.id, input.pieceId), eq(workPieces.workOrderId, input.workOrderId)));
      if (!piece) return refuse("PIECE_UNKNOWN", "That head is not on this order.", { field: "pieceId" });
    }
    if (part.isKit && input.qty % 1000 !== 0) return refuse("NOT_WHOLE_PIECES", "Kits are counted in whole numbers.", { field: "qty" });
    const kit = part.isKit ? await kitLinesOf(ctx, [part.id]) : [];
    if (part.isKit && kit.length === 0) return refuse("KIT_EMPTY", `${part.sku} has no contents yet. Say what the kit is made of first.`, { field: "partId" });
    const needs = part.isKit ? explodeKit(kit.map((k) => ({ partId: k.partId, needMilli: milli(k.qtyMilli) })), input.qty / 1000) : [{ partId: part.id, needMilli: input.qty }];
    await lockShelf(ctx, needs.map((n) => n.partId));
    const ids = needs.map(() => randomUUID());
    await tx.insert(workOrderParts).values(needs.map((n, i) => ({ shopId: shop.id, id: ids[i] ?? "", workOrderId: input.workOrderId, pieceId: input.pieceId || null, partId: n.partId, neededMilli: n.needMilli })));
    await reserveForWorkOrder(ctx, input.workOrderId);
    return ok({ workOrderPartIds: ids });
  },
  subject: (input) => ({ kind: "work-order", id: input.workOrderId }),
});

/** Takes a part added by hand off the order again; its reservation goes to those who wait. */
export const dropNeed = defineCommand({
  name: "workOrders.dropPart",
  act: "stock.issue",
  input: dropNeedInput,
  async run(ctx, input) {
    const held = await lockNeed(ctx, input.workOrderPartId);
    if (!held.ok) return held;
    const { need, part } = held.value;
    if (!need.byHand) return refuse("PART_AGREED", "The customer agreed to this part. Change the estimate to leave it out.");
    if (need.version !== input.version) return changedMeanwhile("This part of the order");
    if (need.issuedMilli > 0) return refuse("PART_ISSUED", `${qtyWords(need.issuedMilli, part.stockUnit)} of ${part.sku} went out to the order. Bring them back first.`);
    await ctx.tx.update(workOrderParts).set({ removedAt: ctx.now, version: sql`${workOrderParts.version} + 1` }).where(and(eq(workOrderParts.shopId, ctx.shop.id), eq(workOrderParts.id, need.id)));
    await shareOut(ctx, [need.partId]);
    return ok({ workOrderId: need.workOrderId });
  },
  subject: (_, value) => ({ kind: "work-order", id: value.workOrderId }),
});
