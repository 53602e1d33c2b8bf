import "server-only";
import { and, asc, eq, isNull } from "drizzle-orm";
import { customers, estimates, links, menuOperations, operations, parts, receivingChecks, workOrderParts, workOrders, workPieces } from "@/db/schema";
import { inShop, mustBeAble, NotFound, settingsOf, type ShopContext } from "@/modules/access/context";
import { env } from "@/modules/access/env";
import { linkAddress } from "@/modules/access/link";
import { cautionsFor } from "@/modules/flow/domain/cautions";
import { dateTime } from "@/modules/kernel/format";
import { estimatePaper } from "../pdf/estimate-paper";
import { tagLabel } from "../pdf/tag-label";
import { traveler, type TravelerFacts } from "../pdf/traveler";
import type { EstimateSnapshot } from "../domain/estimate-snapshot";

const pieceAddress = (ctx: ShopContext, number: string, pieceNo: number) => `${env().VK_APP_URL}/s/${ctx.shop.slug}/orders/${number}/pieces/${pieceNo}`;

/** The tag of a piece, described; its id so that the print can be written down. @throws NotFound before it is booked in */
export async function tagPaper(ctx: ShopContext, number: string, pieceNo: number) {
  mustBeAble(ctx, "orders.see");
  const [row] = await inShop(ctx, (tx) => tx.select({ p: workPieces, o: workOrders, customer: customers.name }).from(workPieces)
    .innerJoin(workOrders, and(eq(workOrders.shopId, workPieces.shopId), eq(workOrders.id, workPieces.workOrderId))).innerJoin(customers, and(eq(customers.shopId, workOrders.shopId), eq(customers.id, workOrders.customerId)))
    .where(and(eq(workPieces.shopId, ctx.shop.id), eq(workOrders.number, number), eq(workPieces.pieceNo, pieceNo))));
  if (!row?.p.tag) throw new NotFound("tag");
  const { p, o, customer } = row;
  return {
    pieceId: p.id, name: `tag-${p.tag}.pdf`, madeAt: p.bookedInAt ?? ctx.now,
    definition: tagLabel({ tag: row.p.tag, address: pieceAddress(ctx, o.number, p.pieceNo), customer, family: p.family, castingNumber: p.castingNumber, serial: p.serial, orderNumber: o.number, promisedOn: o.promisedOn, ownerKind: p.ownerKind, locale: ctx.shop.locale }),
  };
}

/** The traveler of an order, or of one of its heads. @throws NotFound */
export async function travelerPaper(ctx: ShopContext, number: string, onlyPieceNo: number | null) {
  mustBeAble(ctx, "orders.see");
  return inShop(ctx, async (tx) => {
    const s = ctx.shop.id;
    const settings = await settingsOf({ ...ctx, tx });
    const [row] = await tx.select({ o: workOrders, customer: customers.name }).from(workOrders).innerJoin(customers, and(eq(customers.shopId, workOrders.shopId), eq(customers.id, workOrders.customerId)))
      .where(and(eq(workOrders.shopId, s), eq(workOrders.number, number)));
    if (!row) throw new NotFound("order");
    const { o, customer } = row;
    const pieces = (await tx.select().from(workPieces).where(and(eq(workPieces.shopId, s), eq(workPieces.workOrderId, o.id))).orderBy(asc(workPieces.pieceNo))).filter((p) => onlyPieceNo === null || p.pieceNo === onlyPieceNo);
    if (pieces.length === 0) throw new NotFound("piece");
    const ops = await tx.select().from(operations).where(and(eq(operations.shopId, s), eq(operations.workOrderId, o.id), isNull(operations.removedAt))).orderBy(asc(operations.sequence));
    const records = new Map((await tx.select({ code: menuOperations.code, mustRecord: menuOperations.mustRecord }).from(menuOperations).where(eq(menuOperations.shopId, s))).map((m) => [m.code, m.mustRecord]));
    const checks = await tx.select().from(receivingChecks).where(eq(receivingChecks.shopId, s)).orderBy(asc(receivingChecks.at));
    const needs = await tx.select({ pieceId: workOrderParts.pieceId, neededMilli: workOrderParts.neededMilli, sku: parts.sku, description: parts.description, bin: parts.bin }).from(workOrderParts)
      .innerJoin(parts, and(eq(parts.shopId, workOrderParts.shopId), eq(parts.id, workOrderParts.partId))).where(and(eq(workOrderParts.shopId, s), eq(workOrderParts.workOrderId, o.id), isNull(workOrderParts.removedAt))).orderBy(asc(parts.bin));
    const facts: TravelerFacts = {
      shop: { name: ctx.shop.name, address: settings.address, phone: settings.phone, email: settings.email, locale: ctx.shop.locale }, orderNumber: o.number, customer, use: o.use, wants: o.wants, promisedOn: o.promisedOn, printedAt: dateTime(ctx.now, ctx.shop),
      heads: pieces.map((p) => {
        const own = ops.filter((x) => x.pieceId === p.id);
        const check = checks.filter((c) => c.pieceId === p.id).at(-1);
        return {
          tag: p.tag, pieceNo: p.pieceNo, address: pieceAddress(ctx, o.number, p.pieceNo), family: p.family, castingNumber: p.castingNumber, serial: p.serial, ownerKind: p.ownerKind,
          tray: check ? (check.counts as Record<string, number>) : null, damage: check?.damage ?? "", benchNotes: check?.notes ?? "",
          operations: own.map((x) => ({ sequence: x.sequence, code: x.code, name: x.name, skill: x.skill, qtyMilli: x.qtyMilli, bookMinutes: x.bookMinutes, mustRecord: records.get(x.code) ?? "", benchNote: x.benchNote, state: x.doneAt ? "done" : x.skippedAt ? "skipped" : "open" })),
          parts: needs.filter((n) => n.pieceId === p.id || n.pieceId === null), cautions: cautionsFor([...new Set(own.flatMap((x) => x.hazards))]),
        };
      }),
    };
    return { name: `traveler-${o.number}.pdf`, madeAt: ctx.now, definition: traveler(facts) };
  });
}

/** The paper of a sent version, made from what was frozen: the same bytes each time. @throws NotFound for a draft */
export async function estimatePaperOf(ctx: ShopContext, number: string, version: number) {
  mustBeAble(ctx, "prices.see");
  return inShop(ctx, async (tx) => {
    const [row] = await tx.select({ e: estimates, link: links.id }).from(estimates).innerJoin(workOrders, and(eq(workOrders.shopId, estimates.shopId), eq(workOrders.id, estimates.workOrderId)))
      .leftJoin(links, and(eq(links.shopId, estimates.shopId), eq(links.subjectId, estimates.id), eq(links.purpose, "estimate"), isNull(links.revokedAt)))
      .where(and(eq(estimates.shopId, ctx.shop.id), eq(workOrders.number, number), eq(estimates.estimateNo, version)));
    if (!row?.e.snapshot || !row.e.sentAt) throw new NotFound("estimate");
    return { fileId: row.e.pdfFileId, name: `${number}-estimate-${version}.pdf`, madeAt: row.e.sentAt, definition: estimatePaper(row.e.snapshot as EstimateSnapshot, row.link ? linkAddress(row.link) : null) };
  });
}
