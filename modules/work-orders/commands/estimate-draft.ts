import "server-only";
import { randomUUID } from "node:crypto";
import { and, asc, desc, eq, inArray, isNull, sql } from "drizzle-orm";
import { customers, estimateLines, estimates, findings, menuOperations, parts, workOrders, workPieces } from "@/db/schema";
import { changedMeanwhile, defineCommand } from "@/modules/access/command";
import { ableTo, settingsOf, type TxContext } from "@/modules/access/context";
import { extend } from "@/modules/kernel/money";
import { ok, refuse, type Result } from "@/modules/kernel/result";
import { saveEstimateInput, startEstimateInput, type SaveEstimateInput } from "../input";

/** A counter may go this far below the menu or the customer's own discount; further is the manager's. */
const COUNTER_LIMIT_BP = 500;

/**
 * The draft of the next version: the one that is open already, or a new one that begins as a copy of the newest version
 * (an empty one for the first). Findings named are tied to it, so that their answer comes with the version's answer.
 */
export async function draftOf(ctx: TxContext, workOrderId: string, findingIds: readonly string[] = []): Promise<Result<{ estimateId: string; version: number; estimateNo: number }>> {
  const { tx, shop } = ctx;
  const [order] = await tx.select().from(workOrders).where(and(eq(workOrders.shopId, shop.id), eq(workOrders.id, workOrderId))).for("update");
  if (!order) return refuse("NOT_FOUND", "This order is not here.");
  if (order.closedAt || order.cancelledAt) return refuse("ORDER_CLOSED", "This order is closed. Nothing more is estimated on it.");
  const [newest] = await tx.select().from(estimates).where(and(eq(estimates.shopId, shop.id), eq(estimates.workOrderId, workOrderId))).orderBy(desc(estimates.estimateNo)).limit(1);
  let draft = newest?.state === "draft" ? { id: newest.id, version: newest.version, estimateNo: newest.estimateNo } : null;
  if (!draft) {
    const settings = await settingsOf(ctx);
    const id = randomUUID();
    const estimateNo = (newest?.estimateNo ?? 0) + 1;
    await tx.insert(estimates).values({
      shopId: shop.id, id, workOrderId, estimateNo,
      laborDiscountBasisPoints: newest?.laborDiscountBasisPoints ?? order.laborDiscountBasisPoints,
      freightMinor: newest?.freightMinor ?? 0, exclusions: newest?.exclusions ?? "", message: "",
      estimatedReadyOn: newest?.estimatedReadyOn ?? order.promisedOn, depositBasisPoints: newest?.depositBasisPoints ?? settings.depositBasisPoints,
    });
    if (newest) {
      const lines = await tx.select().from(estimateLines).where(and(eq(estimateLines.shopId, shop.id), eq(estimateLines.estimateId, newest.id))).orderBy(asc(estimateLines.lineNo));
      if (lines.length > 0) await tx.insert(estimateLines).values(lines.map((l) => ({ ...l, id: randomUUID(), estimateId: id })));
    }
    draft = { id, version: 1, estimateNo };
  }
  if (findingIds.length > 0) {
    await tx.update(findings).set({ estimateId: draft.id, version: sql`${findings.version} + 1` })
      .where(and(eq(findings.shopId, shop.id), eq(findings.workOrderId, workOrderId), inArray(findings.id, [...findingIds]), isNull(findings.withdrawnAt)));
  }
  return ok({ estimateId: draft.id, version: draft.version, estimateNo: draft.estimateNo });
}

export const startEstimate = defineCommand({
  name: "estimates.start",
  act: "estimate.write",
  input: startEstimateInput,
  run: (ctx, input) => draftOf(ctx, input.workOrderId, input.findingIds),
  subject: (_, value) => ({ kind: "estimate", id: value.estimateId }),
});

interface PricedLine {
  kind: string; pieceId: string | null; operationCode: string | null; partId: string | null; description: string; qtyMilli: number; unitPriceMinor: number;
  amountMinor: number; bookMinutes: number; findingId: string | null;
}

/** Looks each line up on the menu or the shelf, so that hours, codes and the least price come from the shop and not from the form. */
async function pricedLines(ctx: TxContext, workOrderId: string, input: SaveEstimateInput): Promise<Result<PricedLine[]>> {
  const { tx, shop } = ctx;
  const pieces = await tx.select({ id: workPieces.id, pieceNo: workPieces.pieceNo }).from(workPieces).where(and(eq(workPieces.shopId, shop.id), eq(workPieces.workOrderId, workOrderId)));
  const menu = new Map((await tx.select().from(menuOperations).where(eq(menuOperations.shopId, shop.id))).map((m) => [m.code, m]));
  const partIds = [...new Set(input.lines.flatMap((l) => (l.kind === "part" && l.partId ? [l.partId] : [])))];
  const shelf = new Map((partIds.length === 0 ? [] : await tx.select({ id: parts.id, price: parts.salePriceMinor }).from(parts).where(and(eq(parts.shopId, shop.id), inArray(parts.id, partIds)))).map((p) => [p.id, p]));
  const mayGoLow = ableTo(ctx, "discount.large");
  const out: PricedLine[] = [];
  for (const [i, l] of input.lines.entries()) {
    const at = (field: string) => `lines.${i}.${field}`;
    const piece = l.pieceNo === null ? (pieces.length === 1 ? pieces[0] : undefined) : pieces.find((p) => p.pieceNo === l.pieceNo);
    if (l.kind !== "note" && l.kind !== "outside" && !piece) {
      return refuse("PIECE_MISSING", `Say which piece this is for: 1 to ${pieces.length}.`, { field: at("pieceNo") });
    }
    let bookMinutes = 0;
    let usual = l.unitPrice as number;
    if (l.kind === "labor") {
      const op = menu.get(l.operationCode ?? "");
      if (!op) return refuse("OPERATION_UNKNOWN", "This operation is not on the menu. Pick one from the list, or put it on the menu first.", { field: at("description") });
      bookMinutes = Math.round((op.bookMinutes * l.qty) / 1000);
      usual = op.priceMinor;
    } else if (l.kind === "part") {
      const part = shelf.get(l.partId ?? "");
      if (!part) return refuse("PART_UNKNOWN", "This part is not known. Pick one from the list.", { field: at("description") });
      usual = part.price;
    }
    // 5 % below the price, rounded down, is still the counter's.
    if (!mayGoLow && l.unitPrice * 10_000 < usual * (10_000 - COUNTER_LIMIT_BP)) {
      return refuse("PRICE_TOO_LOW", "This is more than 5 % below the price. Only a manager may go there.", { field: at("unitPrice") });
    }
    const note = l.kind === "note";
    out.push({
      kind: l.kind, pieceId: piece?.id ?? null, operationCode: l.kind === "labor" ? l.operationCode : null, partId: l.kind === "part" ? l.partId : null,
      description: l.description, qtyMilli: l.qty, unitPriceMinor: note ? 0 : l.unitPrice, amountMinor: note ? 0 : extend(l.unitPrice, l.qty), bookMinutes, findingId: l.findingId,
    });
  }
  return ok(out);
}

/** Saves a draft whole, as typed. A sent version is fixed. */
export const saveEstimate = defineCommand({
  name: "estimates.save",
  act: "estimate.write",
  input: saveEstimateInput,
  async run(ctx, input) {
    const { tx, shop } = ctx;
    const at = and(eq(estimates.shopId, shop.id), eq(estimates.id, input.estimateId));
    const [found] = await tx.select({ id: estimates.id, workOrderId: estimates.workOrderId, state: estimates.state, version: estimates.version, customerBp: customers.laborDiscountBasisPoints })
      .from(estimates).innerJoin(workOrders, and(eq(workOrders.shopId, estimates.shopId), eq(workOrders.id, estimates.workOrderId)))
      .innerJoin(customers, and(eq(customers.shopId, workOrders.shopId), eq(customers.id, workOrders.customerId))).where(at).for("update", { of: estimates });
    if (!found) return refuse("NOT_FOUND", "This estimate is not here.");
    if (found.state !== "draft") return refuse("ESTIMATE_FIXED", "This version was sent and is fixed. Begin the next version to change it.");
    if (found.version !== input.version) return changedMeanwhile("This draft");
    if (input.laborDiscountPercent > Math.max(COUNTER_LIMIT_BP, found.customerBp) && !ableTo(ctx, "discount.large")) {
      return refuse("DISCOUNT_TOO_LARGE", "A discount above 5 % is the manager's to give.", { field: "laborDiscountPercent" });
    }
    const lines = await pricedLines(ctx, found.workOrderId, input);
    if (!lines.ok) return lines;
    await tx.delete(estimateLines).where(and(eq(estimateLines.shopId, shop.id), eq(estimateLines.estimateId, input.estimateId)));
    if (lines.value.length > 0) {
      await tx.insert(estimateLines).values(lines.value.map((l, i) => ({ ...l, shopId: shop.id, id: randomUUID(), estimateId: input.estimateId, lineNo: i + 1 })));
    }
    const [row] = await tx.update(estimates).set({
      laborDiscountBasisPoints: input.laborDiscountPercent, freightMinor: input.freight, depositBasisPoints: input.depositPercent, exclusions: input.exclusions,
      message: input.message, estimatedReadyOn: input.readyOn, version: sql`${estimates.version} + 1`,
    }).where(at).returning({ version: estimates.version });
    return ok({ version: row?.version ?? input.version, savedAt: ctx.now.toISOString() });
  },
  subject: (input) => ({ kind: "estimate", id: input.estimateId }),
});
