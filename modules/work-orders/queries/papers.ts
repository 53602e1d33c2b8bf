import "server-only";
import { and, asc, eq, isNull } from "drizzle-orm";
import { customers, menuOperations, operations, receivingChecks, workOrders, workPieces } from "@/db/schema";
import { inShop, mustBeAble, NotFound, settingsOf, type ShopContext } from "@/modules/access/context";
import { env } from "@/modules/access/env";
import { CAUTION_CLOSE, CAUTIONS, HAZARDS } from "@/modules/flow/domain/cautions";
import { code128, qr } from "@/modules/outbound/barcodes/encode";
import { code128Rects, qrRects } from "@/modules/outbound/barcodes/vectors";
import { renderPdf } from "@/modules/outbound/pdf/render";
import { trayText } from "../domain/tray-kinds";
import { TAG_BARS, TAG_QR, tagLabel } from "../pdf/tag-label";
import { travelerPaper } from "../pdf/traveler";

interface PdfFile { name: string; mime: string; bytes: Buffer }

/** The tag of a booked-in piece as a label. @throws NotFound before it has one */
export async function tagPdf(ctx: ShopContext, number: string, pieceNo: number): Promise<PdfFile & { pieceId: string }> {
  mustBeAble(ctx, "orders.see");
  const [row] = await inShop(ctx, (tx) => tx.select({ p: workPieces, o: workOrders, customer: customers.name }).from(workPieces)
    .innerJoin(workOrders, and(eq(workOrders.shopId, workPieces.shopId), eq(workOrders.id, workPieces.workOrderId)))
    .innerJoin(customers, and(eq(customers.shopId, workOrders.shopId), eq(customers.id, workOrders.customerId)))
    .where(and(eq(workPieces.shopId, ctx.shop.id), eq(workOrders.number, number), eq(workPieces.pieceNo, pieceNo))));
  if (!row?.p.tag) throw new NotFound("tag");
  const { p, o } = row;
  const tag = row.p.tag;
  const art = { qr: qrRects(qr(`${env().VK_APP_URL}/s/${ctx.shop.slug}/orders/${o.number}/pieces/${p.pieceNo}`), TAG_QR), bars: code128Rects(code128(tag), TAG_BARS.width, TAG_BARS.height) };
  const bytes = await renderPdf(tagLabel({
    tag, customer: row.customer, family: p.family, castingNumber: [p.castingNumber, p.serial].filter(Boolean).join(" / "), orderNumber: o.number, promisedOn: o.promisedOn,
    ownerLetter: p.ownerKind === "shop" ? "S" : "C", locale: ctx.shop.locale,
  }, art), { creationDate: p.bookedInAt ?? ctx.now });
  return { name: `tag-${tag}.pdf`, mime: "application/pdf", bytes, pieceId: p.id };
}

/** The sheet that walks with an order's heads. @throws NotFound */
export async function travelerPdf(ctx: ShopContext, number: string): Promise<PdfFile> {
  mustBeAble(ctx, "orders.see");
  const facts = await inShop(ctx, async (tx) => {
    const s = ctx.shop.id;
    const [row] = await tx.select({ o: workOrders, customer: customers.name }).from(workOrders).innerJoin(customers, and(eq(customers.shopId, workOrders.shopId), eq(customers.id, workOrders.customerId)))
      .where(and(eq(workOrders.shopId, s), eq(workOrders.number, number)));
    if (!row) throw new NotFound("order");
    const pieces = await tx.select().from(workPieces).where(and(eq(workPieces.shopId, s), eq(workPieces.workOrderId, row.o.id))).orderBy(asc(workPieces.pieceNo));
    const ops = await tx.select({ op: operations, record: menuOperations.mustRecord }).from(operations)
      .leftJoin(menuOperations, and(eq(menuOperations.shopId, operations.shopId), eq(menuOperations.code, operations.code)))
      .where(and(eq(operations.shopId, s), eq(operations.workOrderId, row.o.id), isNull(operations.removedAt))).orderBy(asc(operations.sequence));
    const trays = await tx.select().from(receivingChecks).where(eq(receivingChecks.shopId, s));
    return { ...row, pieces, ops, trays, settings: await settingsOf({ ...ctx, tx }) };
  });
  const { o, pieces, ops, settings } = facts;
  const hazards = new Set(ops.flatMap((x) => x.op.hazards));
  const cautions = HAZARDS.filter((h) => hazards.has(h)).map((h) => `${CAUTIONS[h].title} ${CAUTIONS[h].words}`);
  const bytes = await renderPdf(travelerPaper({
    shop: { name: ctx.shop.name, address: settings.address, phone: settings.phone, email: settings.email, locale: ctx.shop.locale },
    orderNumber: o.number, customer: facts.customer, wants: o.wants, promisedOn: o.promisedOn,
    pieces: pieces.map((p) => ({
      label: p.tag ?? `Head ${p.pieceNo}`, family: p.family, castingNumber: p.castingNumber, serial: p.serial,
      tray: ((t) => (t ? trayText(t.counts as Record<string, number>) : "not booked in"))(facts.trays.find((t) => t.pieceId === p.id)),
      operations: ops.filter((x) => x.op.pieceId === p.id).map(({ op, record }) => ({ code: op.code, name: op.name, station: op.station, bookMinutes: op.bookMinutes, done: op.doneAt !== null, record: record ?? "" })),
    })),
    cautions: cautions.length ? [...cautions, CAUTION_CLOSE] : [],
  }), { creationDate: ctx.now });
  return { name: `traveler-${o.number}.pdf`, mime: "application/pdf", bytes };
}
