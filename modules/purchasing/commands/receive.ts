import "server-only";
import { randomUUID } from "node:crypto";
import { and, eq, sql } from "drizzle-orm";
import { parts, purchaseOrderLines, purchaseOrders, receiptLines, receipts } from "@/db/schema";
import { defineCommand } from "@/modules/access/command";
import { personIdOf } from "@/modules/access/context";
import { takeYearNumber } from "@/modules/access/numbers";
import { goodsReceived } from "@/modules/books/domain/posting-stock";
import { postEntry } from "@/modules/books/post";
import { localDate } from "@/modules/kernel/instant";
import { extend, minor, sumMinor } from "@/modules/kernel/money";
import { milli } from "@/modules/kernel/quantity";
import { ok, refuse, type Refused } from "@/modules/kernel/result";
import { receiveStock } from "@/modules/stock/commands/receive-stock";
import { lockShelf, qtyWords } from "@/modules/stock/commands/shelf";
import { landReceipt } from "@/modules/stock/domain/landed-freight";
import { amountIn } from "@/modules/stock/input";
import { takeIn } from "../domain/came-in";
import { receiveInput } from "../input";

const FIELD: Record<string, string> = { qty: "came", lotCode: "lotCode", expiresOn: "expiresOn" };
/** A refusal of the shelf, at the line of the form it belongs to. */
const atLine = (r: Refused, i: number): Refused =>
  refuse(r.refusal.code, r.refusal.message, { field: `lines.${i}.${FIELD[r.refusal.field ?? "qty"] ?? "came"}`, ...(r.refusal.data ? { data: r.refusal.data } : {}) });

/**
 * Takes in a delivery, whole or in part: price plus its share of the freight goes on the shelf, the orders that wait get
 * theirs at once, and the bill is still to come. Dr parts stock / Cr goods received not invoiced.
 */
export const receiveGoods = defineCommand({
  name: "purchasing.receive",
  act: "goods.receive",
  input: receiveInput,
  async run(ctx, input) {
    const { tx, shop } = ctx;
    const freight = input.freight === "" ? 0 : amountIn(input.freight, shop.currency);
    if (freight === null) return refuse("AMOUNT_DECIMALS", "More decimals than the currency has. Type the freight such as 15.00.", { field: "freight" });
    const [order] = await tx.select().from(purchaseOrders).where(and(eq(purchaseOrders.shopId, shop.id), eq(purchaseOrders.id, input.purchaseOrderId))).for("update");
    if (!order) return refuse("NOT_FOUND", "This purchase order is not here any more.");
    if (order.state !== "sent") return refuse("NOT_SENT", order.state === "draft" ? "This order was not sent yet. Send it first, by mail or by hand." : "This purchase order is cancelled. Nothing is taken in on it.");
    const lines = new Map((await tx.select().from(purchaseOrderLines).where(and(eq(purchaseOrderLines.shopId, shop.id), eq(purchaseOrderLines.purchaseOrderId, order.id)))).map((l) => [l.id, l]));
    const shelf = await lockShelf(ctx, [...lines.values()].map((l) => l.partId));

    const coming: { i: number; line: NonNullable<ReturnType<typeof lines.get>>; inMilli: number; lot: { code: string; expiresOn: string | null } | null }[] = [];
    const surplus: string[] = [];
    const twice = new Set<string>();
    for (const [i, typed] of input.lines.entries()) {
      const line = lines.get(typed.lineId);
      if (!line || twice.has(typed.lineId)) return refuse("CHANGED_MEANWHILE", "This purchase order was changed since you opened it. Reload to see it; what you typed is still here.");
      twice.add(typed.lineId);
      if (typed.came === 0) continue;
      const part = shelf.get(line.partId);
      const openMilli = Math.max(0, line.qtyMilli - line.receivedMilli);
      const taken = takeIn(openMilli, typed.came, typed.over);
      const unit = part?.stockUnit ?? "each";
      if (!taken) {
        return refuse("OVER_DELIVERY", `${qtyWords(typed.came, unit)} came and ${qtyWords(openMilli, unit)} ${openMilli === 1000 ? "is" : "are"} still open. Say whether the ${qtyWords(typed.came - openMilli, unit)} over are kept, returned or refused.`, { field: `lines.${i}.over`, data: { openMilli, overMilli: typed.came - openMilli } });
      }
      if (taken.overMilli > 0) surplus.push(`${qtyWords(taken.overMilli, unit)} ${part?.sku ?? ""} over, ${typed.over === "keep" ? "kept" : typed.over === "return" ? "returned" : "refused"}`);
      if (taken.inMilli > 0) coming.push({ i, line, inMilli: taken.inMilli, lot: typed.lotCode ? { code: typed.lotCode, expiresOn: typed.expiresOn || null } : null });
    }
    if (coming.length === 0) return refuse("NOTHING_CAME", "Type how many came on at least one line.", { field: "lines.0.came" });

    const values = coming.map((c) => extend(c.line.unitPriceMinor, c.inMilli));
    const landed = landReceipt(coming.map((c, n) => ({ valueMinor: values[n] ?? minor(0), qtyMilli: milli(c.inMilli), weightGrams: 0 })), minor(freight));
    const day = localDate(ctx.now, shop.zone);
    const receiptId = randomUUID();
    const number = await takeYearNumber(ctx, "REC", day.slice(0, 4), 4);
    await tx.insert(receipts).values({
      shopId: shop.id, id: receiptId, number, purchaseOrderId: order.id, receivedAt: ctx.now, freightMinor: freight, deliveryNote: [input.deliveryNote, ...surplus].filter(Boolean).join("; "), personId: personIdOf(ctx),
    });
    for (const [n, c] of coming.entries()) {
      const receiptLineId = randomUUID();
      await tx.insert(receiptLines).values({
        shopId: shop.id, id: receiptLineId, receiptId, purchaseOrderLineId: c.line.id, qtyMilli: c.inMilli, priceValueMinor: values[n] ?? 0, freightShareMinor: landed[n]?.freightMinor ?? 0,
        lotCode: c.lot?.code ?? null, expiresOn: c.lot?.expiresOn ?? null,
      });
      // First the line, then the shelf: sharing out asks what came in for which order.
      await tx.update(purchaseOrderLines).set({ receivedMilli: sql`${purchaseOrderLines.receivedMilli} + ${c.inMilli}` }).where(and(eq(purchaseOrderLines.shopId, shop.id), eq(purchaseOrderLines.id, c.line.id)));
      await tx.update(parts).set({ lastPriceMinor: c.line.unitPriceMinor }).where(and(eq(parts.shopId, shop.id), eq(parts.id, c.line.partId)));
      const came = await receiveStock(ctx, { partId: c.line.partId, qtyMilli: c.inMilli, landedMinor: landed[n]?.landedMinor ?? 0, lot: c.lot, kind: "receipt", receiptLineId, reason: order.number ?? "" });
      if (!came.ok) return atLine(came, c.i);
    }
    const totalMinor = sumMinor(landed.map((l) => l.landedMinor));
    if (totalMinor !== 0) {
      const posted = await postEntry(ctx, { date: day, text: `Taken in ${number} on ${order.number ?? ""}`, rule: "goodsReceived", sourceKind: "receipt", sourceId: receiptId, lines: goodsReceived({ landedMinor: totalMinor }) });
      if (!posted.ok) return posted;
    }
    await tx.update(purchaseOrders).set({ version: sql`${purchaseOrders.version} + 1` }).where(and(eq(purchaseOrders.shopId, shop.id), eq(purchaseOrders.id, order.id)));
    return ok({ receiptId, number, purchaseOrderId: order.id, surplus });
  },
  subject: (input) => ({ kind: "purchase-order", id: input.purchaseOrderId }),
});
