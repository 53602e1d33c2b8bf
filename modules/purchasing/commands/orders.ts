import "server-only";
import { randomUUID } from "node:crypto";
import { and, asc, eq, inArray, isNull, sql } from "drizzle-orm";
import { parts, purchaseOrderLines, purchaseOrders, suppliers, workOrders } from "@/db/schema";
import { changedMeanwhile, defineCommand } from "@/modules/access/command";
import { ableTo, personIdOf, type TxContext } from "@/modules/access/context";
import { leaveJob } from "@/modules/access/jobs";
import { takeYearNumber } from "@/modules/access/numbers";
import { queueMail } from "@/modules/documents/mail";
import { addDays, localDate } from "@/modules/kernel/instant";
import { milliText } from "@/modules/kernel/quantity";
import { ok, refuse, type Result } from "@/modules/kernel/result";
import { isCountedInPieces } from "@/modules/stock/domain/part-words";
import { amountIn } from "@/modules/stock/input";
import { cancelInput, changeOrderInput, draftInput, sendInput, expectInput } from "../input";

interface TypedLine { id: string; partId: string; supplierNumber: string; qty: number; price: string; workOrderId: string }
type Standing = typeof purchaseOrderLines.$inferSelect;
interface GoodLine { id: string; partId: string; supplierNumber: string; qtyMilli: number; unitPriceMinor: number; workOrderId: string | null }

/** Each line against the shop's own parts and open work orders; an empty price is the one that stands, for a new line or another part the last one paid. */
async function goodLines(ctx: TxContext, lines: readonly TypedLine[], notes: string, standing: readonly Standing[] = []): Promise<Result<GoodLine[]>> {
  const { tx, shop } = ctx;
  const partIds = [...new Set(lines.map((l) => l.partId))];
  const orderIds = [...new Set(lines.map((l) => l.workOrderId).filter(Boolean))];
  const known = new Map((partIds.length ? await tx.select().from(parts).where(and(eq(parts.shopId, shop.id), inArray(parts.id, partIds))) : []).map((p) => [p.id, p]));
  const open = new Set((orderIds.length ? await tx.select({ id: workOrders.id }).from(workOrders).where(and(eq(workOrders.shopId, shop.id), inArray(workOrders.id, orderIds), isNull(workOrders.cancelledAt))) : []).map((o) => o.id));
  const good: GoodLine[] = [];
  for (const [i, l] of lines.entries()) {
    const p = known.get(l.partId);
    if (!p) return refuse("PART_UNKNOWN", "Choose a part from the list.", { field: `lines.${i}.partId` });
    if (p.isKit) return refuse("KIT_HAS_NO_SHELF", `${p.sku} is a kit: order its parts.`, { field: `lines.${i}.partId` });
    if (isCountedInPieces(p.stockUnit) && l.qty % 1000 !== 0) return refuse("NOT_WHOLE_PIECES", `${milliText(l.qty)} is not a whole number. ${p.sku} is counted in pieces.`, { field: `lines.${i}.qty` });
    if (l.workOrderId && !open.has(l.workOrderId)) return refuse("ORDER_UNKNOWN", "That work order is not open. Choose another, or leave it for the shelf.", { field: `lines.${i}.workOrderId` });
    const price = l.price === "" ? (standing.find((s) => s.id === l.id && s.partId === p.id)?.unitPriceMinor ?? p.lastPriceMinor ?? 0) : amountIn(l.price, shop.currency);
    if (price === null) return refuse("AMOUNT_DECIMALS", "More decimals than the currency has. Type a price such as 22.00.", { field: `lines.${i}.price` });
    if (l.price !== "" && price === 0 && notes === "") return refuse("FREE_NEEDS_WORDS", "A price of 0 needs a word in the notes: a sample, a replacement.", { field: `lines.${i}.price` });
    good.push({ id: l.id, partId: l.partId, supplierNumber: l.supplierNumber || p.supplierNumber, qtyMilli: l.qty, unitPriceMinor: price, workOrderId: l.workOrderId || null });
  }
  return ok(good);
}

/** Writes a purchase order that nobody was sent yet. */
export const draftPurchaseOrder = defineCommand({
  name: "purchasing.draft",
  act: "purchase.write",
  input: draftInput,
  async run(ctx, input) {
    const { tx, shop } = ctx;
    const [supplier] = await tx.select({ id: suppliers.id, active: suppliers.active }).from(suppliers).where(and(eq(suppliers.shopId, shop.id), eq(suppliers.id, input.supplierId)));
    if (!supplier?.active) return refuse("SUPPLIER_UNKNOWN", "Choose a supplier from the list.", { field: "supplierId" });
    const lines = await goodLines(ctx, input.lines, input.notes);
    if (!lines.ok) return lines;
    const id = randomUUID();
    await tx.insert(purchaseOrders).values({ shopId: shop.id, id, supplierId: supplier.id, neededBy: input.neededBy || null, notes: input.notes, createdAt: ctx.now });
    if (lines.value.length) await tx.insert(purchaseOrderLines).values(lines.value.map((l, i) => ({ shopId: shop.id, ...l, id: randomUUID(), purchaseOrderId: id, lineNo: i + 1 })));
    return ok({ id });
  },
  subject: (_, value) => ({ kind: "purchase-order", id: value.id }),
});

type Order = typeof purchaseOrders.$inferSelect;
async function lockOrder(ctx: TxContext, id: string, version?: number): Promise<Result<Order>> {
  const [order] = await ctx.tx.select().from(purchaseOrders).where(and(eq(purchaseOrders.shopId, ctx.shop.id), eq(purchaseOrders.id, id))).for("update");
  if (!order) return refuse("NOT_FOUND", "This purchase order is not here any more.");
  if (version !== undefined && order.version !== version) return changedMeanwhile("This purchase order");
  return ok(order);
}
const linesOf = (ctx: TxContext, id: string) =>
  ctx.tx.select().from(purchaseOrderLines).where(and(eq(purchaseOrderLines.shopId, ctx.shop.id), eq(purchaseOrderLines.purchaseOrderId, id))).orderBy(asc(purchaseOrderLines.lineNo));
const touch = async (ctx: TxContext, id: string, set: Partial<typeof purchaseOrders.$inferInsert> = {}) => {
  const [row] = await ctx.tx.update(purchaseOrders).set({ ...set, version: sql`${purchaseOrders.version} + 1` }).where(and(eq(purchaseOrders.shopId, ctx.shop.id), eq(purchaseOrders.id, id))).returning({ version: purchaseOrders.version });
  return row?.version ?? 0;
};

/** Changes the lines. After sending, each change is the next revision and goes to the supplier again by mail. */
export const changePurchaseOrder = defineCommand({
  name: "purchasing.change",
  act: "purchase.write",
  input: changeOrderInput,
  async run(ctx, input) {
    const { tx, shop } = ctx;
    const locked = await lockOrder(ctx, input.id, input.version);
    if (!locked.ok) return locked;
    const order = locked.value;
    if (order.state === "cancelled") return refuse("ORDER_CANCELLED", "This purchase order is cancelled. Write a new one.");
    const blank = ableTo(ctx, "cost.see") ? input.lines.findIndex((l) => l.price === "") : -1;
    if (blank >= 0) return refuse("PRICE_MISSING", "Type a price of 0 or more, such as 23.75.", { field: `lines.${blank}.price` });
    const standing = await linesOf(ctx, order.id);
    const lines = await goodLines(ctx, input.lines, input.notes, standing);
    if (!lines.ok) return lines;
    if (order.state === "sent" && lines.value.length === 0) return refuse("ORDER_EMPTY", "A sent order keeps at least one line. Cancel the order instead.", { field: "lines" });
    const byId = new Map(standing.map((s) => [s.id, s]));
    let lineNo = Math.max(0, ...standing.map((s) => s.lineNo));
    for (const [i, l] of lines.value.entries()) {
      const s = l.id ? byId.get(l.id) : undefined;
      if (l.id && !s) return changedMeanwhile("This purchase order");
      if (!s) {
        lineNo += 1;
        await tx.insert(purchaseOrderLines).values({ shopId: shop.id, ...l, id: randomUUID(), purchaseOrderId: order.id, lineNo });
        continue;
      }
      byId.delete(l.id);
      if (s.receivedMilli > 0 && s.partId !== l.partId) return refuse("LINE_RECEIVED", "Some of this line came in, so its part stays. Add a line for the other part.", { field: `lines.${i}.partId` });
      if (l.qtyMilli < s.receivedMilli) return refuse("LINE_RECEIVED", `${milliText(s.receivedMilli)} came in already. Order at least that many.`, { field: `lines.${i}.qty` });
      await tx.update(purchaseOrderLines).set({ partId: l.partId, supplierNumber: l.supplierNumber, qtyMilli: l.qtyMilli, unitPriceMinor: l.unitPriceMinor, workOrderId: l.workOrderId })
        .where(and(eq(purchaseOrderLines.shopId, shop.id), eq(purchaseOrderLines.id, s.id)));
    }
    for (const gone of byId.values()) {
      if (gone.receivedMilli > 0) return refuse("LINE_RECEIVED", `Line ${gone.lineNo} came in already in part and stays. Lower its quantity to what came.`, { field: "lines" });
      await tx.delete(purchaseOrderLines).where(and(eq(purchaseOrderLines.shopId, shop.id), eq(purchaseOrderLines.id, gone.id)));
    }
    const revision = order.state === "sent" ? order.revision + 1 : order.revision;
    const version = await touch(ctx, order.id, { neededBy: input.neededBy || null, notes: input.notes, revision });
    if (order.state === "sent") await leavePaper(ctx, order.id, revision, true);
    return ok({ id: order.id, version, revision });
  },
  subject: (input) => ({ kind: "purchase-order", id: input.id }),
});

const leavePaper = (ctx: TxContext, purchaseOrderId: string, revision: number, mail: boolean) =>
  leaveJob(ctx, "purchasing.paper", { purchaseOrderId, revision, mail }, { dedupeKey: `${purchaseOrderId}:${revision}` });

/** Gives the order its number and sends it: as a PDF by mail, or by hand (printed, telephoned). */
export const sendPurchaseOrder = defineCommand({
  name: "purchasing.send",
  act: "purchase.write",
  input: sendInput,
  async run(ctx, input) {
    const locked = await lockOrder(ctx, input.id, input.version);
    if (!locked.ok) return locked;
    const order = locked.value;
    if (order.state !== "draft") return refuse("ALREADY_SENT", order.state === "sent" ? `${order.number ?? "This order"} was sent already.` : "This purchase order is cancelled. Write a new one.");
    const [supplier] = await ctx.tx.select().from(suppliers).where(and(eq(suppliers.shopId, ctx.shop.id), eq(suppliers.id, order.supplierId)));
    if (!supplier) return refuse("SUPPLIER_UNKNOWN", "This supplier is not here any more.");
    if (input.by === "mail" && supplier.email === "") return refuse("NO_MAIL_ADDRESS", `${supplier.name} has no e-mail address. Add one, or send it by hand.`, { field: "by" });
    const lines = await linesOf(ctx, order.id);
    if (lines.length === 0) return refuse("ORDER_EMPTY", "Add at least one line before it is sent.", { field: "lines" });
    const unpriced = lines.findIndex((l) => l.unitPriceMinor === 0);
    if (unpriced >= 0 && order.notes === "") return refuse("PRICE_MISSING", `Line ${lines[unpriced]?.lineNo ?? 0} has no price. Type one, or say in the notes why it is free.`, { field: `lines.${unpriced}.price` });
    const day = localDate(ctx.now, ctx.shop.zone);
    const expectedOn = input.expectedOn || (supplier.leadDays === null ? null : addDays(day, supplier.leadDays));
    if (expectedOn && expectedOn < day) return refuse("DATE_PAST", "That date has passed. Type the day it should arrive.", { field: "expectedOn" });
    const number = await takeYearNumber(ctx, "PO", day.slice(0, 4), 4);
    const version = await touch(ctx, order.id, { number, state: "sent", orderedAt: ctx.now, orderedBy: personIdOf(ctx), expectedOn });
    await leavePaper(ctx, order.id, order.revision, input.by === "mail");
    return ok({ id: order.id, number, version });
  },
  subject: (input) => ({ kind: "purchase-order", id: input.id }),
});

/** The date the supplier gave. */
export const expectPurchaseOrder = defineCommand({
  name: "purchasing.expect",
  act: "purchase.write",
  input: expectInput,
  async run(ctx, input) {
    const locked = await lockOrder(ctx, input.id, input.version);
    if (!locked.ok) return locked;
    if (locked.value.state !== "sent") return refuse("NOT_SENT", "Only an order that was sent has a date to expect.", { field: "expectedOn" });
    return ok({ id: input.id, version: await touch(ctx, input.id, { expectedOn: input.expectedOn }) });
  },
  subject: (input) => ({ kind: "purchase-order", id: input.id }),
});

/** Cancels what has not come in. When some came in, the order ends with that. A supplier who was mailed is told by mail. */
export const cancelPurchaseOrder = defineCommand({
  name: "purchasing.cancel",
  act: "purchase.write",
  input: cancelInput,
  async run(ctx, input) {
    const { tx, shop } = ctx;
    const locked = await lockOrder(ctx, input.id, input.version);
    if (!locked.ok) return locked;
    const order = locked.value;
    if (order.state === "cancelled") return refuse("ORDER_CANCELLED", "This purchase order is cancelled already.");
    const lines = await linesOf(ctx, order.id);
    const open = lines.filter((l) => l.receivedMilli < l.qtyMilli);
    if (order.state === "sent" && open.length === 0) return refuse("ALL_IN", "Everything on this order came in. There is nothing left to cancel.");
    const someIn = lines.some((l) => l.receivedMilli > 0);
    if (someIn) {
      for (const l of open) {
        const at = and(eq(purchaseOrderLines.shopId, shop.id), eq(purchaseOrderLines.id, l.id));
        if (l.receivedMilli > 0) await tx.update(purchaseOrderLines).set({ qtyMilli: l.receivedMilli }).where(at);
        else await tx.delete(purchaseOrderLines).where(at);
      }
    }
    const notes = [order.notes, `Cancelled ${localDate(ctx.now, shop.zone)}: ${input.reason}`].filter(Boolean).join("\n");
    const version = await touch(ctx, order.id, someIn ? { notes, revision: order.revision + 1 } : { notes, state: "cancelled" });
    if (order.state === "sent") {
      const [supplier] = await tx.select({ name: suppliers.name, email: suppliers.email }).from(suppliers).where(and(eq(suppliers.shopId, shop.id), eq(suppliers.id, order.supplierId)));
      if (supplier?.email) {
        await queueMail(ctx, {
          kind: "purchase-order", to: supplier.email, toName: supplier.name, subject: `${order.number ?? ""} cancelled${someIn ? " in part" : ""}`, about: { kind: "purchase-order", id: order.id },
          paragraphs: [someIn ? `Please do not send what is still open on our purchase order ${order.number ?? ""}.` : `Please cancel our purchase order ${order.number ?? ""}.`, `Reason: ${input.reason}`],
        });
      }
    }
    return ok({ id: order.id, version });
  },
  subject: (input) => ({ kind: "purchase-order", id: input.id }),
});
