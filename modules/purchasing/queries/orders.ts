import "server-only";
import { and, asc, desc, eq, like, or, sql, type SQL } from "drizzle-orm";
import type { z } from "@/modules/kernel/zod";
import { alias } from "drizzle-orm/pg-core";
import { mailMessages, parts, people, purchaseOrderLines, purchaseOrders, receiptLines, receipts, stockMovements, suppliers, workOrderParts, workOrders, workPieces } from "@/db/schema";
import { ableTo, inShop, mustBeAble, NotFound, type ShopContext } from "@/modules/access/context";
import { isUuid } from "@/modules/kernel/id";
import { extend } from "@/modules/kernel/money";
import { howFar, type HowFar } from "../domain/came-in";
import type { findOrdersInput, OrderView } from "../input";

/** What parts are bought for is for those who see cost. The counter and the lead write orders without: a price they leave empty is the one that stands. */
export const seesPrices = (ctx: ShopContext): boolean => ableTo(ctx, "cost.see");

export interface OrderRow {
  id: string; number: string | null; supplierName: string; state: HowFar; createdAt: string; orderedAt: string | null; expectedOn: string | null; neededBy: string | null;
  lineCount: number; openCount: number; forOrders: string[]; totalMinor: number | null;
}

const facts = {
  lineCount: sql<number>`(select count(*) from purchase_order_lines l where l.shop_id = "purchase_orders"."shop_id" and l.purchase_order_id = "purchase_orders"."id")::int`,
  openCount: sql<number>`(select count(*) from purchase_order_lines l where l.shop_id = "purchase_orders"."shop_id" and l.purchase_order_id = "purchase_orders"."id" and l.received_milli < l.qty_milli)::int`,
  someIn: sql<boolean>`exists (select 1 from purchase_order_lines l where l.shop_id = "purchase_orders"."shop_id" and l.purchase_order_id = "purchase_orders"."id" and l.received_milli > 0)`,
  total: sql<string>`(select coalesce(sum(round(l.unit_price_minor::numeric * l.qty_milli / 1000)), 0) from purchase_order_lines l where l.shop_id = "purchase_orders"."shop_id" and l.purchase_order_id = "purchase_orders"."id")`,
  forOrders: sql<string | null>`(select string_agg(distinct w.number, ',') from purchase_order_lines l join work_orders w on w.shop_id = l.shop_id and w.id = l.work_order_id where l.shop_id = "purchase_orders"."shop_id" and l.purchase_order_id = "purchase_orders"."id")`,
};
const openLines = sql`exists (select 1 from purchase_order_lines l where l.shop_id = "purchase_orders"."shop_id" and l.purchase_order_id = "purchase_orders"."id" and l.received_milli < l.qty_milli)`;
const VIEW: Record<OrderView, SQL> = {
  open: sql`("purchase_orders"."state" = 'draft' or ("purchase_orders"."state" = 'sent' and ${openLines}))`,
  drafts: sql`"purchase_orders"."state" = 'draft'`,
  in: sql`("purchase_orders"."state" = 'sent' and not ${openLines})`,
  all: sql`true`,
};
const literal = (s: string) => s.replace(/[\\%_]/g, (c) => `\\${c}`);

/** Purchase orders, the newest first, keyset-paged; found by number, supplier or a part's number. */
export async function findOrders(ctx: ShopContext, ask: z.output<typeof findOrdersInput>): Promise<{ rows: OrderRow[]; next: string | null; counts: Record<OrderView, number> }> {
  mustBeAble(ctx, "purchase.see");
  const q = ask.q.toLowerCase();
  const match = q ? or(like(sql`lower(${purchaseOrders.number})`, `%${literal(q)}%`), like(sql`lower(${suppliers.name})`, `%${literal(q)}%`),
    sql`exists (select 1 from purchase_order_lines l join parts p on p.shop_id = l.shop_id and p.id = l.part_id where l.shop_id = ${ctx.shop.id} and l.purchase_order_id = "purchase_orders"."id" and lower(p.sku) like ${`%${literal(q)}%`})`) : undefined;
  const [at, id] = (ask.after ?? "").split("_");
  const after = at && id && isUuid(id) && !Number.isNaN(Date.parse(at)) ? sql`("purchase_orders"."created_at", "purchase_orders"."id") < (${at}::timestamptz, ${id}::uuid)` : undefined;
  const base = and(eq(purchaseOrders.shopId, ctx.shop.id), match);
  return inShop(ctx, async (tx) => {
    const from = () => tx.select({ ...facts, o: purchaseOrders, supplierName: suppliers.name }).from(purchaseOrders).innerJoin(suppliers, and(eq(suppliers.shopId, purchaseOrders.shopId), eq(suppliers.id, purchaseOrders.supplierId)));
    const rows = await from().where(and(base, VIEW[ask.view], after)).orderBy(desc(purchaseOrders.createdAt), desc(purchaseOrders.id)).limit(ask.limit + 1);
    const [counts] = await tx.select({
      open: sql<number>`count(*) filter (where ${VIEW.open})::int`, drafts: sql<number>`count(*) filter (where ${VIEW.drafts})::int`, in: sql<number>`count(*) filter (where ${VIEW.in})::int`, all: sql<number>`count(*)::int`,
    }).from(purchaseOrders).innerJoin(suppliers, and(eq(suppliers.shopId, purchaseOrders.shopId), eq(suppliers.id, purchaseOrders.supplierId))).where(base);
    const page = rows.slice(0, ask.limit);
    const last = page.at(-1);
    return {
      rows: page.map((r) => ({
        id: r.o.id, number: r.o.number, supplierName: r.supplierName, createdAt: r.o.createdAt.toISOString(), orderedAt: r.o.orderedAt?.toISOString() ?? null, expectedOn: r.o.expectedOn, neededBy: r.o.neededBy,
        state: howFar(r.o.state, r.lineCount === 0 ? [] : [...(r.openCount > 0 ? [{ qtyMilli: 1, receivedMilli: 0 }] : []), ...(r.someIn ? [{ qtyMilli: 1, receivedMilli: 1 }] : [])]),
        lineCount: r.lineCount, openCount: r.openCount, forOrders: r.forOrders ? r.forOrders.split(",") : [], totalMinor: seesPrices(ctx) ? Number(r.total) : null,
      })),
      next: rows.length > ask.limit && last ? `${last.o.createdAt.toISOString()}_${last.o.id}` : null,
      counts: counts ?? { open: 0, drafts: 0, in: 0, all: 0 },
    };
  });
}

export interface OrderLine {
  id: string; lineNo: number; partId: string; sku: string; description: string; stockUnit: string; lotTracked: boolean; supplierNumber: string;
  qtyMilli: number; receivedMilli: number; openMilli: number; workOrderId: string | null; workOrderNumber: string | null;
  /** Orders that are short of this part. */
  waiting: { number: string; shortMilli: number }[];
  unitPriceMinor: number | null; valueMinor: number | null;
}
export interface ReceiptView { id: string; number: string; at: string; personName: string | null; deliveryNote: string; freightMinor: number | null; reversed: boolean; lines: { sku: string; qtyMilli: number; lotCode: string | null; landedMinor: number | null }[] }
export interface OrderDetail {
  id: string; number: string | null; state: HowFar; rawState: string; revision: number; version: number; notes: string; createdAt: string; orderedAt: string | null; orderedBy: string | null; neededBy: string | null; expectedOn: string | null; pdfFileId: string | null;
  supplier: { id: string; name: string; email: string; phone: string; address: string; terms: string; leadDays: number | null };
  lines: OrderLine[]; receipts: ReceiptView[];
  held: { number: string; customerReference: string; promisedOn: string | null; tags: string[] }[];
  mail: { id: string; state: string; to: string; at: string; error: string | null }[];
  partsMinor: number | null; freightMinor: number | null;
}

/** One purchase order, by number or, while it has none, by id. @throws NotFound */
export async function getOrder(ctx: ShopContext, numberOrId: string): Promise<OrderDetail> {
  mustBeAble(ctx, "purchase.see");
  return inShop(ctx, async (tx) => {
    const shopId = ctx.shop.id;
    const [row] = await tx.select({ o: purchaseOrders, s: suppliers, orderedBy: people.shortName }).from(purchaseOrders)
      .innerJoin(suppliers, and(eq(suppliers.shopId, purchaseOrders.shopId), eq(suppliers.id, purchaseOrders.supplierId)))
      .leftJoin(people, and(eq(people.shopId, purchaseOrders.shopId), eq(people.id, purchaseOrders.orderedBy)))
      .where(and(eq(purchaseOrders.shopId, shopId), isUuid(numberOrId) ? eq(purchaseOrders.id, numberOrId) : eq(purchaseOrders.number, numberOrId)));
    if (!row) throw new NotFound("purchase order");
    const prices = seesPrices(ctx);
    const { o, s } = row;
    const lines = await tx.select({ l: purchaseOrderLines, sku: parts.sku, description: parts.description, stockUnit: parts.stockUnit, lotTracked: parts.lotTracked, workOrderNumber: workOrders.number }).from(purchaseOrderLines)
      .innerJoin(parts, and(eq(parts.shopId, purchaseOrderLines.shopId), eq(parts.id, purchaseOrderLines.partId)))
      .leftJoin(workOrders, and(eq(workOrders.shopId, purchaseOrderLines.shopId), eq(workOrders.id, purchaseOrderLines.workOrderId)))
      .where(and(eq(purchaseOrderLines.shopId, shopId), eq(purchaseOrderLines.purchaseOrderId, o.id))).orderBy(asc(purchaseOrderLines.lineNo));
    const shortMilli = sql<number>`sum(${workOrderParts.neededMilli} - ${workOrderParts.issuedMilli} - ${workOrderParts.reservedMilli})::float8`;
    const waiting = lines.length ? await tx.select({ partId: workOrderParts.partId, workOrderId: workOrders.id, number: workOrders.number, customerReference: workOrders.customerReference, promisedOn: workOrders.promisedOn, shortMilli }).from(workOrderParts)
      .innerJoin(workOrders, and(eq(workOrders.shopId, workOrderParts.shopId), eq(workOrders.id, workOrderParts.workOrderId)))
      .where(and(eq(workOrderParts.shopId, shopId), sql`${workOrderParts.partId} in (${sql.join(lines.map((l) => sql`${l.l.partId}`), sql`, `)})`, sql`${workOrderParts.removedAt} is null and ${workOrders.closedAt} is null and ${workOrders.cancelledAt} is null`,
        sql`${workOrderParts.neededMilli} > ${workOrderParts.issuedMilli} + ${workOrderParts.reservedMilli}`))
      .groupBy(workOrderParts.partId, workOrders.id, workOrders.number, workOrders.customerReference, workOrders.promisedOn).orderBy(asc(workOrders.promisedOn)) : [];
    const openParts = new Set(lines.filter((l) => l.l.receivedMilli < l.l.qtyMilli).map((l) => l.l.partId));
    const heldIds = [...new Map(waiting.filter((w) => openParts.has(w.partId)).map((w) => [w.workOrderId, w])).values()];
    const tags = heldIds.length ? await tx.select({ workOrderId: workPieces.workOrderId, tag: workPieces.tag, pieceNo: workPieces.pieceNo }).from(workPieces)
      .where(and(eq(workPieces.shopId, shopId), sql`${workPieces.workOrderId} in (${sql.join(heldIds.map((h) => sql`${h.workOrderId}`), sql`, `)})`)).orderBy(asc(workPieces.pieceNo)) : [];
    const receiptRows = await tx.select({ r: receipts, personName: people.shortName }).from(receipts).leftJoin(people, and(eq(people.shopId, receipts.shopId), eq(people.id, receipts.personId)))
      .where(and(eq(receipts.shopId, shopId), eq(receipts.purchaseOrderId, o.id))).orderBy(desc(receipts.receivedAt));
    const turned = alias(stockMovements, "turned");
    const receiptLineRows = receiptRows.length ? await tx.select({ r: receiptLines, sku: parts.sku, reversedId: turned.id }).from(receiptLines)
      .innerJoin(purchaseOrderLines, and(eq(purchaseOrderLines.shopId, receiptLines.shopId), eq(purchaseOrderLines.id, receiptLines.purchaseOrderLineId)))
      .innerJoin(parts, and(eq(parts.shopId, purchaseOrderLines.shopId), eq(parts.id, purchaseOrderLines.partId)))
      .leftJoin(turned, and(eq(turned.shopId, receiptLines.shopId), eq(turned.receiptLineId, receiptLines.id), eq(turned.kind, "receipt reversal")))
      .where(and(eq(receiptLines.shopId, shopId), sql`${receiptLines.receiptId} in (${sql.join(receiptRows.map((r) => sql`${r.r.id}`), sql`, `)})`)) : [];
    const mail = await tx.select({ id: mailMessages.id, state: mailMessages.state, to: mailMessages.toAddress, at: mailMessages.at, error: mailMessages.error }).from(mailMessages)
      .where(and(eq(mailMessages.shopId, shopId), eq(mailMessages.subjectKind, "purchase-order"), eq(mailMessages.subjectId, o.id))).orderBy(desc(mailMessages.at)).limit(10);
    const value = (l: (typeof lines)[number]) => extend(l.l.unitPriceMinor, l.l.qtyMilli);
    return {
      id: o.id, number: o.number, state: howFar(o.state, lines.map((l) => l.l)), rawState: o.state, revision: o.revision, version: o.version, notes: o.notes, createdAt: o.createdAt.toISOString(),
      orderedAt: o.orderedAt?.toISOString() ?? null, orderedBy: row.orderedBy, neededBy: o.neededBy, expectedOn: o.expectedOn, pdfFileId: prices ? o.pdfFileId : null,
      supplier: { id: s.id, name: s.name, email: s.email, phone: s.phone, address: s.address, terms: s.terms, leadDays: s.leadDays },
      lines: lines.map((l) => ({
        id: l.l.id, lineNo: l.l.lineNo, partId: l.l.partId, sku: l.sku, description: l.description, stockUnit: l.stockUnit, lotTracked: l.lotTracked, supplierNumber: l.l.supplierNumber,
        qtyMilli: l.l.qtyMilli, receivedMilli: l.l.receivedMilli, openMilli: Math.max(0, l.l.qtyMilli - l.l.receivedMilli), workOrderId: l.l.workOrderId, workOrderNumber: l.workOrderNumber,
        waiting: waiting.filter((w) => w.partId === l.l.partId).map((w) => ({ number: w.number, shortMilli: w.shortMilli })),
        unitPriceMinor: prices ? l.l.unitPriceMinor : null, valueMinor: prices ? value(l) : null,
      })),
      receipts: receiptRows.map(({ r, personName }) => {
        const of = receiptLineRows.filter((x) => x.r.receiptId === r.id);
        return {
          id: r.id, number: r.number, at: r.receivedAt.toISOString(), personName, deliveryNote: r.deliveryNote, freightMinor: prices ? r.freightMinor : null, reversed: of.some((x) => x.reversedId !== null),
          lines: of.map((x) => ({ sku: x.sku, qtyMilli: x.r.qtyMilli, lotCode: x.r.lotCode, landedMinor: prices ? x.r.priceValueMinor + x.r.freightShareMinor : null })),
        };
      }),
      held: heldIds.map((h) => ({ number: h.number, customerReference: h.customerReference, promisedOn: h.promisedOn, tags: tags.filter((t) => t.workOrderId === h.workOrderId).map((t) => t.tag ?? `head ${t.pieceNo}`) })),
      mail: mail.map((m) => ({ ...m, at: m.at.toISOString() })),
      partsMinor: prices ? lines.reduce((a, l) => a + value(l), 0) : null, freightMinor: prices ? receiptRows.reduce((a, r) => a + r.r.freightMinor, 0) : null,
    };
  });
}
