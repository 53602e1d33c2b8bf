import "server-only";
import { and, asc, eq, isNull, ne, sql } from "drizzle-orm";
import { customers, estimateLines, estimates, findings, links, parts, workOrders, workPieces } from "@/db/schema";
import { canonical, sha256 } from "@/modules/access/audit";
import { changedMeanwhile, defineCommand } from "@/modules/access/command";
import { settingsOf, type TxContext } from "@/modules/access/context";
import { leaveJob } from "@/modules/access/jobs";
import { linkFor } from "@/modules/access/link";
import { depositDue } from "@/modules/books/domain/deposit-due";
import { addDays, localDate, startOfDay } from "@/modules/kernel/instant";
import { minor } from "@/modules/kernel/money";
import { ok, refuse, type Result } from "@/modules/kernel/result";
import { totalsUnder } from "../domain/document-rules";
import { agreementWords, type EstimateLineKind, type EstimateSnapshot } from "../domain/estimate-snapshot";
import { sendEstimateInput } from "../input";
import { depositOf } from "../queries/deposit";
import { rulesFor } from "../queries/rules";

/** The link still opens some time after the last day of the offer, to say in words that it is over. */
const LINK_DAYS_AFTER = 60;

/** Everything the version prints, computed anew from the stored lines; no total ever comes from a browser. */
async function snapshotOf(ctx: TxContext, estimateId: string): Promise<Result<{ snapshot: EstimateSnapshot; workOrderId: string; customerId: string; customerEmail: string | null }>> {
  const { tx, shop } = ctx;
  const [row] = await tx.select({ e: estimates, o: workOrders, c: customers }).from(estimates)
    .innerJoin(workOrders, and(eq(workOrders.shopId, estimates.shopId), eq(workOrders.id, estimates.workOrderId)))
    .innerJoin(customers, and(eq(customers.shopId, workOrders.shopId), eq(customers.id, workOrders.customerId)))
    .where(and(eq(estimates.shopId, shop.id), eq(estimates.id, estimateId)));
  if (!row) return refuse("NOT_FOUND", "This estimate is not here.");
  const { e, o, c } = row;
  const settings = await settingsOf(ctx);
  const pieces = await tx.select().from(workPieces).where(and(eq(workPieces.shopId, shop.id), eq(workPieces.workOrderId, o.id))).orderBy(asc(workPieces.pieceNo));
  const lines = await tx.select({ l: estimateLines, sku: parts.sku }).from(estimateLines)
    .leftJoin(parts, and(eq(parts.shopId, estimateLines.shopId), eq(parts.id, estimateLines.partId)))
    .where(and(eq(estimateLines.shopId, shop.id), eq(estimateLines.estimateId, estimateId))).orderBy(asc(estimateLines.lineNo));
  const asked = await tx.select({ id: findings.id, position: findings.position, words: findings.words }).from(findings)
    .where(and(eq(findings.shopId, shop.id), eq(findings.estimateId, estimateId), isNull(findings.withdrawnAt))).orderBy(asc(findings.foundAt));
  const today = localDate(ctx.now, shop.zone);
  const rules = await rulesFor(ctx, c.id, today);
  const totals = totalsUnder(rules, {
    lines: lines.map(({ l }) => ({ kind: l.kind as EstimateLineKind, amountMinor: l.amountMinor })), laborDiscountBp: e.laborDiscountBasisPoints, freightMinor: e.freightMinor,
  });
  if (!totals.ok) return totals;
  const standing = o.agreedEstimateId ? await tx.select().from(estimates).where(and(eq(estimates.shopId, shop.id), eq(estimates.id, o.agreedEstimateId))) : [];
  const agreed = standing[0]?.snapshot as EstimateSnapshot | undefined;
  const asksAnew = depositDue(totals.value.totalMinor, e.depositBasisPoints);
  if (!asksAnew.ok) return asksAnew;
  const held = (await depositOf(ctx, o.id))?.paidMinor ?? 0;
  const depositStands = agreed !== undefined;
  const depositMinor = agreed ? agreed.depositMinor : asksAnew.value;
  const change = agreed ? { fromVersion: agreed.version, fromTotalMinor: agreed.totals.totalMinor, changeMinor: minor(totals.value.totalMinor - agreed.totals.totalMinor) } : null;
  const pieceNoOf = new Map(pieces.map((p) => [p.id, p.pieceNo]));
  const snapshot: EstimateSnapshot = {
    kind: "estimate", number: o.number, version: e.estimateNo, date: today, validUntil: addDays(today, settings.estimateValidDays), currency: shop.currency, locale: shop.locale,
    shop: { name: shop.name, address: settings.address, phone: settings.phone, email: settings.email, taxNumber: settings.taxNumber },
    customer: { name: c.name, address: c.address, email: c.email ?? "", phone: c.phone ?? "" },
    customerReference: o.customerReference, use: o.use,
    pieces: pieces.map((p) => ({ pieceNo: p.pieceNo, family: p.family, castingNumber: p.castingNumber, serial: p.serial, description: p.description, tag: p.tag })),
    lines: lines.map(({ l, sku }) => ({
      lineNo: l.lineNo, kind: l.kind as EstimateLineKind, pieceNo: l.pieceId ? (pieceNoOf.get(l.pieceId) ?? null) : null, code: l.operationCode ?? sku ?? "",
      description: l.description, qtyMilli: l.qtyMilli, unitPriceMinor: l.unitPriceMinor, amountMinor: l.amountMinor, bookMinutes: l.bookMinutes,
    })),
    laborDiscountBp: e.laborDiscountBasisPoints, exclusions: e.exclusions, message: e.message, readyOn: e.estimatedReadyOn,
    depositBp: e.depositBasisPoints, depositMinor, depositStands, rules, totals: totals.value, change, findings: asked,
    words: agreementWords({ number: o.number, version: e.estimateNo, totalMinor: totals.value.totalMinor, depositMinor: depositStands ? held : depositMinor, depositStands: depositStands && held > 0, change, use: o.use, place: shop }),
  };
  return ok({ snapshot, workOrderId: o.id, customerId: c.id, customerEmail: c.email });
}

/**
 * Fixes a draft: what is printed, its totals and rules, and the hash of it all. Earlier versions that wait for an answer
 * are replaced. The paper and the mail are made by the worker from what was frozen here.
 */
export const sendEstimate = defineCommand({
  name: "estimates.send",
  act: "estimate.send",
  input: sendEstimateInput,
  async run(ctx, input) {
    const { tx, shop } = ctx;
    const at = and(eq(estimates.shopId, shop.id), eq(estimates.id, input.estimateId));
    const [draft] = await tx.select({ state: estimates.state, version: estimates.version, workOrderId: estimates.workOrderId }).from(estimates).where(at).for("update");
    if (!draft) return refuse("NOT_FOUND", "This estimate is not here.");
    if (draft.state !== "draft") return refuse("ESTIMATE_FIXED", "This version was sent already. Begin the next version to change it.");
    if (draft.version !== input.version) return changedMeanwhile("This draft");
    const made = await snapshotOf(ctx, input.estimateId);
    if (!made.ok) return made;
    const { snapshot, customerId, workOrderId } = made.value;
    if (!snapshot.lines.some((l) => l.kind !== "note")) return refuse("ESTIMATE_EMPTY", "There is nothing to agree to yet. Add at least one line of work or a part.");
    const documentHash = sha256(canonical(snapshot));
    await tx.update(estimates).set({ state: "replaced", version: sql`${estimates.version} + 1` })
      .where(and(eq(estimates.shopId, shop.id), eq(estimates.workOrderId, workOrderId), eq(estimates.state, "sent"), ne(estimates.id, input.estimateId)));
    await tx.update(estimates).set({
      state: "sent", sentAt: ctx.now, sentTo: input.to || null, validUntil: snapshot.validUntil, snapshot, documentHash, version: sql`${estimates.version} + 1`,
    }).where(at);
    await linkFor(ctx, { purpose: "estimate", subjectId: input.estimateId, customerId, workOrderId });
    await tx.update(links).set({ expiresAt: startOfDay(addDays(snapshot.validUntil, LINK_DAYS_AFTER), shop.zone) }).where(and(eq(links.shopId, shop.id), eq(links.subjectId, input.estimateId), eq(links.purpose, "estimate"), isNull(links.revokedAt)));
    await leaveJob(ctx, "estimates.paper", { estimateId: input.estimateId }, { dedupeKey: input.estimateId });
    return ok({ estimateId: input.estimateId, number: snapshot.number, version: snapshot.version, totalMinor: snapshot.totals.totalMinor, depositMinor: snapshot.depositMinor, validUntil: snapshot.validUntil, mailedTo: input.to || null });
  },
  subject: (input) => ({ kind: "estimate", id: input.estimateId }),
});
