import "server-only";
import { and, asc, eq } from "drizzle-orm";
import { files, parts, people, purchaseOrderLines, purchaseOrders, shopSettings, suppliers, workOrders } from "@/db/schema";
import { withShop } from "@/db/scope";
import { inShop, mustBeAble, NotFound, type ShopContext } from "@/modules/access/context";
import { TERMS_WORDS, type Terms } from "@/modules/customers/domain/terms";
import { addFileRow, keepBytes } from "@/modules/documents/files";
import { queueMail } from "@/modules/documents/mail";
import { date } from "@/modules/kernel/format";
import { localDate } from "@/modules/kernel/instant";
import { renderPdf } from "@/modules/outbound/pdf/render";
import { orderPaper, type OrderSheet } from "./pdf/order-paper";
import { seesPrices } from "./queries/orders";

interface Loaded { sheet: OrderSheet; orderedAt: Date; revision: number; supplier: { name: string; email: string } }

async function load(ctx: ShopContext, purchaseOrderId: string): Promise<Loaded> {
  return inShop(ctx, async (tx) => {
    const shopId = ctx.shop.id;
    const [row] = await tx.select({ o: purchaseOrders, s: suppliers, settings: shopSettings, contact: people.name }).from(purchaseOrders)
      .innerJoin(suppliers, and(eq(suppliers.shopId, purchaseOrders.shopId), eq(suppliers.id, purchaseOrders.supplierId)))
      .innerJoin(shopSettings, eq(shopSettings.shopId, purchaseOrders.shopId))
      .leftJoin(people, and(eq(people.shopId, purchaseOrders.shopId), eq(people.id, purchaseOrders.orderedBy)))
      .where(and(eq(purchaseOrders.shopId, shopId), eq(purchaseOrders.id, purchaseOrderId)));
    if (!row) throw new NotFound("purchase order");
    const lines = await tx.select({ l: purchaseOrderLines, sku: parts.sku, description: parts.description, stockUnit: parts.stockUnit, forOrder: workOrders.number }).from(purchaseOrderLines)
      .innerJoin(parts, and(eq(parts.shopId, purchaseOrderLines.shopId), eq(parts.id, purchaseOrderLines.partId)))
      .leftJoin(workOrders, and(eq(workOrders.shopId, purchaseOrderLines.shopId), eq(workOrders.id, purchaseOrderLines.workOrderId)))
      .where(and(eq(purchaseOrderLines.shopId, shopId), eq(purchaseOrderLines.purchaseOrderId, purchaseOrderId))).orderBy(asc(purchaseOrderLines.lineNo));
    const { o, s, settings } = row;
    const orderedAt = o.orderedAt ?? o.createdAt;
    return {
      orderedAt, revision: o.revision, supplier: { name: s.name, email: s.email },
      sheet: {
        shop: { name: ctx.shop.name, address: settings.address, phone: settings.phone, email: settings.email, locale: ctx.shop.locale }, currency: ctx.shop.currency, number: o.number ?? "DRAFT", revision: o.revision,
        orderedOn: localDate(orderedAt, ctx.shop.zone), neededBy: o.neededBy, expectedOn: o.expectedOn, terms: TERMS_WORDS[s.terms as Terms] ?? s.terms, contact: row.contact ?? ctx.shop.name, notes: o.notes,
        supplier: { name: s.name, address: s.address, email: s.email, phone: s.phone },
        lines: lines.map(({ l, ...p }) => ({ lineNo: l.lineNo, supplierNumber: l.supplierNumber, qtyMilli: l.qtyMilli, unitPriceMinor: l.unitPriceMinor, ...p })),
      },
    };
  });
}

/** The order as a PDF, made from how it stands now. For those who see its prices. @throws NotFound */
export async function orderPdf(ctx: ShopContext, purchaseOrderId: string): Promise<{ name: string; mime: string; bytes: Uint8Array }> {
  mustBeAble(ctx, "purchase.see");
  if (!seesPrices(ctx)) throw new NotFound("purchase order paper");
  const { sheet, orderedAt } = await load(ctx, purchaseOrderId);
  return { name: `${sheet.number}.pdf`, mime: "application/pdf", bytes: await renderPdf(orderPaper(sheet), { creationDate: orderedAt }) };
}

/**
 * Job: makes the paper of a revision, keeps it, and mails it to the supplier when asked to. Run twice it keeps and mails
 * once; a revision that was overtaken meanwhile is left to the later job.
 */
export async function makeOrderPaper(ctx: ShopContext, job: { purchaseOrderId: string; revision: number; mail: boolean }): Promise<void> {
  const { sheet, orderedAt, revision, supplier } = await load(ctx, job.purchaseOrderId);
  if (revision !== job.revision) return;
  const note = `revision ${revision}`;
  const mine = and(eq(files.shopId, ctx.shop.id), eq(files.kind, "purchase-order"), eq(files.subjectId, job.purchaseOrderId), eq(files.note, note));
  const done = await withShop(ctx.shop.id, (tx) => tx.select({ id: files.id }).from(files).where(mine).limit(1));
  if (done.length) return;
  const kept = await keepBytes(ctx.shop.id, {
    kind: "purchase-order", name: `${sheet.number}${revision > 1 ? `-r${revision}` : ""}.pdf`, mime: "application/pdf", extension: "pdf", bytes: await renderPdf(orderPaper(sheet), { creationDate: orderedAt }),
    subject: { kind: "purchase-order", id: job.purchaseOrderId }, note,
  });
  await withShop(ctx.shop.id, async (tx) => {
    const inner = { ...ctx, tx };
    const at = and(eq(purchaseOrders.shopId, ctx.shop.id), eq(purchaseOrders.id, job.purchaseOrderId));
    const [order] = await tx.select({ revision: purchaseOrders.revision }).from(purchaseOrders).where(at).for("update");
    if (order?.revision !== revision || (await tx.select({ id: files.id }).from(files).where(mine).limit(1)).length) return;
    const fileId = await addFileRow(inner, kept);
    await tx.update(purchaseOrders).set({ pdfFileId: fileId }).where(at);
    if (!job.mail || supplier.email === "") return;
    await queueMail(inner, {
      kind: "purchase-order", to: supplier.email, toName: supplier.name, attachmentFileIds: [fileId], about: { kind: "purchase-order", id: job.purchaseOrderId },
      subject: `Purchase order ${sheet.number}${revision > 1 ? `, revision ${revision}` : ""} from ${ctx.shop.name}`,
      paragraphs: [
        `Hello ${supplier.name},`,
        revision > 1 ? `our purchase order ${sheet.number} changed. Revision ${revision} is attached and replaces what you have.` : `our purchase order ${sheet.number} is attached.`,
        `${sheet.neededBy ? `We need it by ${date(sheet.neededBy, ctx.shop.locale)}. ` : ""}Please answer this mail with your date, and if a price differs.`,
      ],
    });
  });
}
