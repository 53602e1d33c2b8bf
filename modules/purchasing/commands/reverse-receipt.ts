import "server-only";
import { and, asc, eq, inArray, sql } from "drizzle-orm";
import { lots, purchaseOrderLines, purchaseOrders, receiptLines, receipts, stockMovements } from "@/db/schema";
import { defineCommand } from "@/modules/access/command";
import { postEntry } from "@/modules/books/post";
import { localDate } from "@/modules/kernel/instant";
import { timesFraction } from "@/modules/kernel/money";
import { ok, refuse } from "@/modules/kernel/result";
import { shareOut } from "@/modules/stock/commands/share-out";
import { lockShelf, writeMovement } from "@/modules/stock/commands/shelf";
import { reverseReceiptInput } from "../input";

/**
 * Takes a receipt back, as far as its goods are still on the shelf: what was issued meanwhile stays taken in. The goods
 * leave at what they came in for; what the average moved meanwhile is variance.
 */
export const reverseReceipt = defineCommand({
  name: "purchasing.reverseReceipt",
  act: "goods.receive",
  input: reverseReceiptInput,
  async run(ctx, input) {
    const { tx, shop } = ctx;
    const [seen] = await tx.select({ purchaseOrderId: receipts.purchaseOrderId, number: receipts.number }).from(receipts).where(and(eq(receipts.shopId, shop.id), eq(receipts.id, input.receiptId)));
    if (!seen) return refuse("NOT_FOUND", "This receipt is not here.");
    await tx.select({ id: purchaseOrders.id }).from(purchaseOrders).where(and(eq(purchaseOrders.shopId, shop.id), eq(purchaseOrders.id, seen.purchaseOrderId))).for("update");
    const rows = await tx.select({ line: receiptLines, movement: stockMovements }).from(receiptLines)
      .innerJoin(stockMovements, and(eq(stockMovements.shopId, receiptLines.shopId), eq(stockMovements.receiptLineId, receiptLines.id), eq(stockMovements.kind, "receipt")))
      .where(and(eq(receiptLines.shopId, shop.id), eq(receiptLines.receiptId, input.receiptId))).orderBy(asc(stockMovements.seq));
    const shelf = await lockShelf(ctx, rows.map((r) => r.movement.partId));
    const turned = new Set((rows.length ? await tx.select({ id: stockMovements.reversesId }).from(stockMovements).where(and(eq(stockMovements.shopId, shop.id), inArray(stockMovements.reversesId, rows.map((r) => r.movement.id)))) : []).map((r) => r.id));
    let cleared = 0;
    let left = 0;
    const kept: string[] = [];
    for (const { line, movement } of rows) {
      const part = shelf.get(movement.partId);
      if (!part || turned.has(movement.id)) continue;
      const [lot] = movement.lotId ? await tx.select({ onHandMilli: lots.onHandMilli }).from(lots).where(and(eq(lots.shopId, shop.id), eq(lots.id, movement.lotId))) : [];
      const qty = Math.min(movement.qtyMilli, part.onHandMilli, lot?.onHandMilli ?? part.onHandMilli);
      if (qty < movement.qtyMilli) kept.push(part.sku);
      if (qty <= 0) continue;
      const came = qty === movement.qtyMilli ? movement.valueMinor : timesFraction(movement.valueMinor, qty, movement.qtyMilli);
      const value = qty === part.onHandMilli ? part.valueMinor : Math.min(came, part.valueMinor);
      await writeMovement(ctx, { partId: part.partId, lotId: movement.lotId, qtyMilli: -qty, valueMinor: -value, kind: "receipt reversal", receiptLineId: line.id, reversesId: movement.id, reason: input.reason });
      await tx.update(purchaseOrderLines).set({ receivedMilli: sql`${purchaseOrderLines.receivedMilli} - ${qty}` }).where(and(eq(purchaseOrderLines.shopId, shop.id), eq(purchaseOrderLines.id, line.purchaseOrderLineId)));
      part.onHandMilli -= qty;
      part.valueMinor -= value;
      cleared += came;
      left += value;
    }
    if (left === 0 && cleared === 0) return refuse("NOTHING_LEFT", turned.size ? `${seen.number} was reversed already.` : "Nothing of this receipt is on the shelf any more, so it cannot be reversed.");
    const posted = await postEntry(ctx, {
      date: localDate(ctx.now, shop.zone), text: `Reversed ${seen.number}: ${input.reason}`, rule: "receiptReversed", sourceKind: "receipt", sourceId: input.receiptId,
      lines: [{ account: "2050", amountMinor: cleared }, { account: "1200", amountMinor: -left }, { account: "5050", amountMinor: left - cleared }].filter((l) => l.amountMinor !== 0),
    });
    if (!posted.ok) return posted;
    await tx.update(purchaseOrders).set({ version: sql`${purchaseOrders.version} + 1` }).where(and(eq(purchaseOrders.shopId, shop.id), eq(purchaseOrders.id, seen.purchaseOrderId)));
    await shareOut(ctx, [...shelf.keys()]);
    return ok({ purchaseOrderId: seen.purchaseOrderId, kept });
  },
  subject: (_, value) => ({ kind: "purchase-order", id: value.purchaseOrderId }),
});
