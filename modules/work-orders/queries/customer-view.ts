import "server-only";
import { and, asc, desc, eq, inArray, isNull, sql } from "drizzle-orm";
import { approvals, estimates, files, findings, shopSettings, workOrders, workPieces } from "@/db/schema";
import { inShop, NotFound, type ShopContext } from "@/modules/access/context";
import { readFile } from "@/modules/documents/files";
import { localDate } from "@/modules/kernel/instant";
import { lineChanges } from "../domain/line-changes";
import type { EstimateSnapshot, SnapshotLine } from "../domain/estimate-snapshot";
import { depositOf, type OrderDeposit } from "./deposit";
import { houseOrders } from "./house";

export interface CustomerPiece { id: string; isProved: boolean; pieceNo: number; tag: string | null; family: string; place: string; station: number | null; photoIds: string[] }
export interface CustomerView {
  number: string; estimateId: string; version: number; shopPhone: string; shopEmail: string;
  /** `open` may be answered; the rest say in words why not. */
  standing: "open" | "approved" | "declined" | "replaced" | "out of date" | "closed";
  snapshot: EstimateSnapshot; documentHash: string; pdf: boolean;
  answer: { answer: string; name: string; at: string; via: string } | null;
  newerVersion: number | null;
  /** Lines that the version agreed before did not have, or had otherwise, and those that go; null for a first estimate. */
  changes: { more: SnapshotLine[]; less: SnapshotLine[] } | null;
  findings: { id: string; position: string; words: string; photoIds: string[] }[];
  pieces: CustomerPiece[];
  deposit: OrderDeposit | null;
  promisedOn: string | null;
}

/** Plain words for where a head is; no hours, no names, no cost. */
const PLACE_WORDS: Record<string, string> = {
  "Counter in": "Here, waiting for its turn", "Tear-down": "Being cleaned, taken apart and measured", "Bench before": "On the flow bench, before the work", Porting: "Being ported",
  Seats: "At the seats and guides", "Bench after": "On the flow bench, after the work", Assembly: "Being put together", "Counter out": "Done, in final inspection",
};

function subjectOf(ctx: ShopContext): string {
  if (ctx.actor.kind !== "customer" || ctx.actor.purpose !== "estimate") throw new NotFound("link");
  return ctx.actor.subjectId;
}

/** What the holder of an estimate's link sees. The matter comes from the link and from nothing else. @throws NotFound */
export async function customerView(ctx: ShopContext): Promise<CustomerView> {
  const estimateId = subjectOf(ctx);
  return inShop(ctx, async (tx) => {
    const inner = { ...ctx, tx };
    const s = ctx.shop.id;
    const [row] = await tx.select({ e: estimates, o: workOrders }).from(estimates).innerJoin(workOrders, and(eq(workOrders.shopId, estimates.shopId), eq(workOrders.id, estimates.workOrderId)))
      .where(and(eq(estimates.shopId, s), eq(estimates.id, estimateId)));
    if (!row?.e.snapshot || !row.e.documentHash) throw new NotFound("estimate");
    const { e, o } = row;
    const [settings] = await tx.select({ phone: shopSettings.phone, email: shopSettings.email }).from(shopSettings).where(eq(shopSettings.shopId, s));
    const [answer] = await tx.select().from(approvals).where(and(eq(approvals.shopId, s), eq(approvals.estimateId, e.id)));
    const [newer] = await tx.select({ no: estimates.estimateNo }).from(estimates)
      .where(and(eq(estimates.shopId, s), eq(estimates.workOrderId, o.id), sql`${estimates.estimateNo} > ${e.estimateNo}`, inArray(estimates.state, ["sent", "approved"]))).orderBy(desc(estimates.estimateNo)).limit(1);
    const snapshot = e.snapshot as EstimateSnapshot;
    const [base] = snapshot.change ? await tx.select({ snapshot: estimates.snapshot }).from(estimates).where(and(eq(estimates.shopId, s), eq(estimates.workOrderId, o.id), eq(estimates.estimateNo, snapshot.change.fromVersion))) : [];
    const asked = await tx.select({ id: findings.id, position: findings.position, words: findings.words }).from(findings).where(and(eq(findings.shopId, s), eq(findings.estimateId, e.id), isNull(findings.withdrawnAt))).orderBy(asc(findings.foundAt));
    const [house] = await houseOrders(inner, eq(workOrders.id, o.id));
    const subjects = [...(house?.pieces.map((p) => p.id) ?? []), ...asked.map((f) => f.id)];
    const photos = subjects.length === 0 ? [] : await tx.select({ id: files.id, subjectId: files.subjectId }).from(files).where(and(eq(files.shopId, s), eq(files.kind, "photo"), inArray(files.subjectId, subjects))).orderBy(asc(files.at));
    const photosOf = (id: string) => photos.filter((p) => p.subjectId === id).map((p) => p.id);
    const isOutOfDate = e.state === "sent" && e.validUntil !== null && localDate(ctx.now, ctx.shop.zone) > e.validUntil;
    return {
      number: o.number, estimateId: e.id, version: e.estimateNo, shopPhone: settings?.phone ?? "", shopEmail: settings?.email ?? "",
      standing: e.state === "sent" ? (o.closedAt || o.cancelledAt ? "closed" : isOutOfDate ? "out of date" : "open") : e.state === "approved" ? "approved" : e.state === "declined" ? "declined" : "replaced",
      snapshot, changes: base?.snapshot ? lineChanges((base.snapshot as EstimateSnapshot).lines, snapshot.lines) : null, documentHash: e.documentHash ?? "", pdf: e.pdfFileId !== null,
      answer: answer ? { answer: answer.answer, name: answer.name, at: answer.at.toISOString(), via: answer.via } : null, newerVersion: newer?.no ?? null,
      findings: asked.map((f) => ({ ...f, photoIds: photosOf(f.id) })), deposit: await depositOf(inner, o.id), promisedOn: o.promisedOn,
      pieces: house?.pieces.map((p) => {
        const at = p.status.station;
        const place = p.status.word === "Gone" ? "With you again" : p.status.dial === "ready" ? "Ready for you" : at === null ? "On its way to us" : (PLACE_WORDS[at] ?? at);
        return { id: p.id, isProved: p.status.dial === "ready" || p.status.dial === "out", pieceNo: p.pieceNo, tag: p.tag, family: p.family, place: p.status.dial === "hold" ? `${place}; on hold, we will call` : place, station: at === null ? null : Object.keys(PLACE_WORDS).indexOf(at), photoIds: photosOf(p.id) };
      }) ?? [],
    };
  });
}

/** A photo or paper of the link's own matter. @throws NotFound for any other */
export async function customerFile(ctx: ShopContext, fileId: string, thumb: boolean) {
  const estimateId = subjectOf(ctx);
  const file = await inShop(ctx, async (tx) => {
    const s = ctx.shop.id;
    const [e] = await tx.select({ workOrderId: estimates.workOrderId }).from(estimates).where(and(eq(estimates.shopId, s), eq(estimates.id, estimateId)));
    if (!e) throw new NotFound("estimate");
    const [row] = await tx.select().from(files).where(and(eq(files.shopId, s), eq(files.id, fileId)));
    if (!row) throw new NotFound("file");
    if (row.kind === "estimate" && row.subjectId === estimateId) return row;
    if (row.kind !== "photo") throw new NotFound("file");
    const own = await tx.select({ id: workPieces.id }).from(workPieces).where(and(eq(workPieces.shopId, s), eq(workPieces.workOrderId, e.workOrderId), eq(workPieces.id, row.subjectId)));
    const about = await tx.select({ id: findings.id }).from(findings).where(and(eq(findings.shopId, s), eq(findings.workOrderId, e.workOrderId), eq(findings.id, row.subjectId)));
    if (own.length + about.length === 0) throw new NotFound("file");
    return row;
  });
  return readFile(ctx, file.id, thumb);
}

/** Id of the paper of the link's own version. @throws NotFound while it is being made */
export async function customerPaperId(ctx: ShopContext): Promise<string> {
  const [e] = await inShop(ctx, (tx) => tx.select({ id: estimates.pdfFileId }).from(estimates).where(and(eq(estimates.shopId, ctx.shop.id), eq(estimates.id, subjectOf(ctx)))));
  if (!e?.id) throw new NotFound("paper");
  return e.id;
}

/** Pieces of the order behind any link of its customer that passed final inspection: those whose flow may be shown. */
export async function provedPieces(ctx: ShopContext, workOrderId: string): Promise<string[]> {
  if (ctx.actor.kind !== "customer") throw new NotFound("link");
  const customerId = ctx.actor.id;
  return inShop(ctx, async (tx) => (await tx.select({ id: workPieces.id }).from(workPieces).innerJoin(workOrders, and(eq(workOrders.shopId, workPieces.shopId), eq(workOrders.id, workPieces.workOrderId)))
    .where(and(eq(workPieces.shopId, ctx.shop.id), eq(workPieces.workOrderId, workOrderId), eq(workOrders.customerId, customerId), sql`${workPieces.releasedAt} is not null`)).orderBy(asc(workPieces.pieceNo))).map((p) => p.id));
}

/** How a customer reaches the shop. */
export async function customerShop(ctx: ShopContext): Promise<{ phone: string; email: string }> {
  const [row] = await inShop(ctx, (tx) => tx.select({ phone: shopSettings.phone, email: shopSettings.email }).from(shopSettings).where(eq(shopSettings.shopId, ctx.shop.id)));
  return row ?? { phone: "", email: "" };
}
