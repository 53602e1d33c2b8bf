import "server-only";
import { and, asc, desc, eq, gt, isNull, sql } from "drizzle-orm";
import { kitLines, lots, parts, purchaseOrderLines, purchaseOrders, suppliers, workOrderParts, workOrders } from "@/db/schema";
import { ableTo, inShop, mustBeAble, NotFound, type ShopContext } from "@/modules/access/context";
import { currencyDecimals } from "@/modules/kernel/format";
import { addDays, localDate } from "@/modules/kernel/instant";
import { isUuid } from "@/modules/kernel/id";
import { minorText } from "@/modules/kernel/money";
import { milliText } from "@/modules/kernel/quantity";
import { getPartRow, type PartRow } from "./find-parts";
import { kitLinesOf, freeOf, type KitLine } from "./kits";
import { EXPIRING_DAYS } from "./part-figures";

export interface LotView { id: string; code: string; expiresOn: string | null; onHandMilli: number; state: "good" | "soon" | "expired" | "gone" }
export interface PartDetail extends PartRow {
  version: number; materialNote: string; supplierId: string | null; supplierName: string | null; supplierNumber: string; orderQtyMilli: number | null;
  /** Last price paid each; only for roles that see cost. */
  lastPriceMinor: number | null;
  lots: LotView[];
  kit: (KitLine & { freeMilli: number })[];
  inKits: { sku: string; description: string }[];
  waiting: { number: string; promisedOn: string | null; needMilli: number; reservedMilli: number }[];
  onOrder: { orderId: string; number: string | null; openMilli: number; expectedOn: string | null }[];
  /** As the form types them. Sale price is empty for roles that do not see it. */
  form: { salePrice: string; reorderPoint: string; orderQty: string };
}

/** One part, whole, by its number or id. @throws NotFound */
export async function getPart(ctx: ShopContext, skuOrId: string): Promise<PartDetail> {
  mustBeAble(ctx, "stock.see");
  return inShop(ctx, async (tx) => {
    const inner = { ...ctx, tx };
    const mine = { shopId: ctx.shop.id };
    const [p] = await tx.select().from(parts).where(and(eq(parts.shopId, mine.shopId), isUuid(skuOrId) ? eq(parts.id, skuOrId) : eq(parts.sku, skuOrId)));
    if (!p) throw new NotFound("part");
    const row = await getPartRow(inner, p.id);
    if (!row) throw new NotFound("part");
    const day = localDate(ctx.now, ctx.shop.zone);
    const soon = addDays(day, EXPIRING_DAYS);
    const lotRows = p.lotTracked ? await tx.select().from(lots).where(and(eq(lots.shopId, mine.shopId), eq(lots.partId, p.id))).orderBy(desc(sql`${lots.onHandMilli} > 0`), asc(lots.expiresOn), desc(lots.createdAt)).limit(60) : [];
    const kit = p.isKit ? await kitLinesOf(inner, [p.id]) : [];
    const free = await freeOf(inner, kit.map((k) => k.partId));
    const inKits = await tx.select({ sku: parts.sku, description: parts.description }).from(kitLines).innerJoin(parts, and(eq(parts.shopId, kitLines.shopId), eq(parts.id, kitLines.kitPartId)))
      .where(and(eq(kitLines.shopId, mine.shopId), eq(kitLines.partId, p.id))).orderBy(asc(parts.sku));
    const waiting = await tx.select({ number: workOrders.number, promisedOn: workOrders.promisedOn, needMilli: sql<number>`(${workOrderParts.neededMilli} - ${workOrderParts.issuedMilli})::float8`, reservedMilli: workOrderParts.reservedMilli })
      .from(workOrderParts).innerJoin(workOrders, and(eq(workOrders.shopId, workOrderParts.shopId), eq(workOrders.id, workOrderParts.workOrderId)))
      .where(and(eq(workOrderParts.shopId, mine.shopId), eq(workOrderParts.partId, p.id), isNull(workOrderParts.removedAt), isNull(workOrders.closedAt), isNull(workOrders.cancelledAt), gt(workOrderParts.neededMilli, workOrderParts.issuedMilli)))
      .orderBy(asc(workOrders.promisedOn), asc(workOrders.openedAt)).limit(30);
    const onOrder = await tx.select({ orderId: purchaseOrders.id, number: purchaseOrders.number, openMilli: sql<number>`(${purchaseOrderLines.qtyMilli} - ${purchaseOrderLines.receivedMilli})::float8`, expectedOn: purchaseOrders.expectedOn })
      .from(purchaseOrderLines).innerJoin(purchaseOrders, and(eq(purchaseOrders.shopId, purchaseOrderLines.shopId), eq(purchaseOrders.id, purchaseOrderLines.purchaseOrderId)))
      .where(and(eq(purchaseOrderLines.shopId, mine.shopId), eq(purchaseOrderLines.partId, p.id), eq(purchaseOrders.state, "sent"), gt(purchaseOrderLines.qtyMilli, purchaseOrderLines.receivedMilli))).orderBy(asc(purchaseOrders.expectedOn)).limit(30);
    const [supplier] = p.preferredSupplierId ? await tx.select({ id: suppliers.id, name: suppliers.name }).from(suppliers).where(and(eq(suppliers.shopId, mine.shopId), eq(suppliers.id, p.preferredSupplierId))) : [];
    const level = (q: number | null) => (q === null ? "" : milliText(q));
    return {
      ...row, version: p.version, materialNote: p.materialNote, supplierId: supplier?.id ?? null, supplierName: supplier?.name ?? null, supplierNumber: p.supplierNumber, orderQtyMilli: p.orderQtyMilli,
      lastPriceMinor: ableTo(ctx, "cost.see") ? p.lastPriceMinor : null,
      lots: lotRows.map((l) => ({ id: l.id, code: l.code, expiresOn: l.expiresOn, onHandMilli: l.onHandMilli, state: l.onHandMilli === 0 ? "gone" as const : l.expiresOn && l.expiresOn < day ? "expired" as const : l.expiresOn && l.expiresOn <= soon ? "soon" as const : "good" as const })),
      kit: kit.map((k) => ({ ...k, freeMilli: free.get(k.partId) ?? 0 })),
      inKits, waiting, onOrder: ableTo(ctx, "purchase.see") ? onOrder : onOrder.map((o) => ({ ...o, orderId: "" })),
      form: { salePrice: ableTo(ctx, "prices.see") ? minorText(p.salePriceMinor, currencyDecimals(ctx.shop.currency)) : "", reorderPoint: level(p.reorderPointMilli), orderQty: level(p.orderQtyMilli) },
    };
  });
}
