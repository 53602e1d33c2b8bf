import "server-only";
import { and, asc, desc, eq, inArray, isNull } from "drizzle-orm";
import { approvals, customers, estimateLines, estimates, findings, links, parts, people, workOrders, workPieces } from "@/db/schema";
import { inShop, mustBeAble, NotFound, type ShopContext } from "@/modules/access/context";
import { linkAddress } from "@/modules/access/link";
import { localDate } from "@/modules/kernel/instant";
import type { DocumentRules } from "../domain/document-rules";
import type { EstimateSnapshot, EstimateState } from "../domain/estimate-snapshot";
import { rulesFor } from "./rules";

export interface EditorLine {
  kind: "labor" | "part" | "outside" | "note"; pieceNo: number | null; operationCode: string | null; partId: string | null; sku: string | null; description: string;
  qtyMilli: number; unitPriceMinor: number; bookMinutes: number; findingId: string | null;
}
export interface EstimateEditor {
  orderId: string; number: string; customer: string; customerEmail: string; customerDiscountBp: number; use: string; isClosed: boolean;
  pieces: { pieceNo: number; family: string; tag: string | null; castingNumber: string }[];
  rules: DocumentRules;
  draft: {
    estimateId: string; version: number; estimateNo: number; laborDiscountBp: number; freightMinor: number; depositBp: number; exclusions: string; message: string; readyOn: string | null;
    lines: EditorLine[]; findings: { id: string; position: string; words: string }[];
  } | null;
  /** Total and deposit of the version that stands agreed. */
  agreed: { estimateNo: number; totalMinor: number; depositMinor: number } | null;
}

/** The draft of an order and everything its form computes with. @throws NotFound */
export async function estimateEditor(ctx: ShopContext, number: string): Promise<EstimateEditor> {
  mustBeAble(ctx, "estimate.write");
  return inShop(ctx, async (tx) => {
    const s = ctx.shop.id;
    const [row] = await tx.select({ o: workOrders, c: customers }).from(workOrders).innerJoin(customers, and(eq(customers.shopId, workOrders.shopId), eq(customers.id, workOrders.customerId)))
      .where(and(eq(workOrders.shopId, s), eq(workOrders.number, number)));
    if (!row) throw new NotFound("order");
    const { o, c } = row;
    const pieces = await tx.select().from(workPieces).where(and(eq(workPieces.shopId, s), eq(workPieces.workOrderId, o.id))).orderBy(asc(workPieces.pieceNo));
    const [draft] = await tx.select().from(estimates).where(and(eq(estimates.shopId, s), eq(estimates.workOrderId, o.id), eq(estimates.state, "draft"))).orderBy(desc(estimates.estimateNo)).limit(1);
    const [agreed] = o.agreedEstimateId ? await tx.select().from(estimates).where(and(eq(estimates.shopId, s), eq(estimates.id, o.agreedEstimateId))) : [];
    const lines = draft ? await tx.select({ l: estimateLines, sku: parts.sku }).from(estimateLines).leftJoin(parts, and(eq(parts.shopId, estimateLines.shopId), eq(parts.id, estimateLines.partId)))
      .where(and(eq(estimateLines.shopId, s), eq(estimateLines.estimateId, draft.id))).orderBy(asc(estimateLines.lineNo)) : [];
    const asked = draft ? await tx.select({ id: findings.id, position: findings.position, words: findings.words }).from(findings)
      .where(and(eq(findings.shopId, s), eq(findings.estimateId, draft.id), isNull(findings.withdrawnAt))).orderBy(asc(findings.foundAt)) : [];
    const noOf = new Map(pieces.map((p) => [p.id, p.pieceNo]));
    const was = agreed?.snapshot as EstimateSnapshot | undefined;
    return {
      orderId: o.id, number: o.number, customer: c.name, customerEmail: c.email ?? "", customerDiscountBp: c.laborDiscountBasisPoints, use: o.use, isClosed: Boolean(o.closedAt ?? o.cancelledAt),
      pieces: pieces.map((p) => ({ pieceNo: p.pieceNo, family: p.family, tag: p.tag, castingNumber: p.castingNumber })),
      rules: await rulesFor({ ...ctx, tx }, c.id, localDate(ctx.now, ctx.shop.zone)),
      draft: draft ? {
        estimateId: draft.id, version: draft.version, estimateNo: draft.estimateNo, laborDiscountBp: draft.laborDiscountBasisPoints, freightMinor: draft.freightMinor, depositBp: draft.depositBasisPoints,
        exclusions: draft.exclusions, message: draft.message, readyOn: draft.estimatedReadyOn, findings: asked,
        lines: lines.map(({ l, sku }) => ({
          kind: l.kind as EditorLine["kind"], pieceNo: l.pieceId ? (noOf.get(l.pieceId) ?? null) : null, operationCode: l.operationCode, partId: l.partId, sku, description: l.description,
          qtyMilli: l.qtyMilli, unitPriceMinor: l.unitPriceMinor, bookMinutes: l.bookMinutes, findingId: l.findingId,
        })),
      } : null,
      agreed: was ? { estimateNo: was.version, totalMinor: was.totals.totalMinor, depositMinor: was.depositMinor } : null,
    };
  });
}

export interface VersionView {
  id: string; estimateNo: number; state: EstimateState; isOutOfDate: boolean; version: number; sentAt: string | null; sentTo: string | null; openedAt: string | null; validUntil: string | null;
  totalMinor: number | null; changeMinor: number | null; depositMinor: number | null; pdfFileId: string | null; link: string | null;
  answer: { answer: string; via: string; name: string; at: string; phoneNumber: string; takenBy: string | null } | null;
}

/** All versions of an order, newest first, with their answers. */
export async function versionsOf(ctx: ShopContext, workOrderId: string): Promise<VersionView[]> {
  mustBeAble(ctx, "prices.see");
  return inShop(ctx, async (tx) => {
    const s = ctx.shop.id;
    const rows = await tx.select().from(estimates).where(and(eq(estimates.shopId, s), eq(estimates.workOrderId, workOrderId))).orderBy(desc(estimates.estimateNo));
    const ids = rows.map((r) => r.id);
    if (ids.length === 0) return [];
    const answers = new Map((await tx.select({ a: approvals, by: people.shortName }).from(approvals).leftJoin(people, and(eq(people.shopId, approvals.shopId), eq(people.id, approvals.takenBy)))
      .where(and(eq(approvals.shopId, s), inArray(approvals.estimateId, ids)))).map((r) => [r.a.estimateId, r]));
    const standing = new Map((await tx.select({ id: links.id, subjectId: links.subjectId, opened: links.firstOpenedAt }).from(links)
      .where(and(eq(links.shopId, s), inArray(links.subjectId, ids), eq(links.purpose, "estimate"), isNull(links.revokedAt)))).map((l) => [l.subjectId, l]));
    const today = localDate(ctx.now, ctx.shop.zone);
    return rows.map((e): VersionView => {
      const snapshot = e.snapshot as EstimateSnapshot | null;
      const a = answers.get(e.id);
      const link = standing.get(e.id);
      return {
        id: e.id, estimateNo: e.estimateNo, state: e.state as EstimateState, isOutOfDate: e.state === "sent" && e.validUntil !== null && e.validUntil < today, version: e.version, sentAt: e.sentAt?.toISOString() ?? null, sentTo: e.sentTo,
        openedAt: link?.opened?.toISOString() ?? null, validUntil: e.validUntil, totalMinor: snapshot?.totals.totalMinor ?? null, changeMinor: snapshot?.change?.changeMinor ?? null, depositMinor: snapshot?.depositMinor ?? null,
        pdfFileId: e.pdfFileId, link: link ? linkAddress(link.id) : null,
        answer: a ? { answer: a.a.answer, via: a.a.via, name: a.a.name, at: a.a.at.toISOString(), phoneNumber: a.a.phoneNumber, takenBy: a.by } : null,
      };
    });
  });
}
