import "server-only";
import { and, asc, desc, eq, inArray, isNotNull, isNull } from "drizzle-orm";
import { approvals, customers, estimateLines, estimates, findings, invoiceLines, invoices, operations, payments, workOrders, workPieces } from "@/db/schema";
import { settingsOf, type TxContext } from "@/modules/access/context";
import { depositHeld } from "@/modules/books/balances";
import type { DocumentTotals } from "@/modules/books/domain/document-totals";
import { TERMS, TERMS_WORDS, type Terms as TermsKey } from "@/modules/customers/domain/terms";
import { localDate } from "@/modules/kernel/instant";
import { ok, refuse, type Result } from "@/modules/kernel/result";
import { minutesByOperation } from "@/modules/time/queries/minutes";
import { totalsUnder, type DocumentRules } from "@/modules/work-orders/domain/document-rules";
import type { EstimateSnapshot } from "@/modules/work-orders/domain/estimate-snapshot";
import { rulesFor } from "@/modules/work-orders/queries/rules";
import { applyDeposit } from "@/modules/books/domain/deposit-due";
import { dueDate, type Terms } from "./domain/due-date";
import type { AgreedLine, BillablePiece } from "./domain/draft-lines";
import { RULE_SET, type InvoiceLine, type InvoiceLineKind, type InvoicePiece, type InvoiceSnapshot } from "./domain/invoice-snapshot";
import { gainOfPiece } from "./gain";

const TERMS_RULE: Record<TermsKey, Terms> = {
  receipt: { kind: "on receipt" }, net_15: { kind: "net", days: 15 }, net_30: { kind: "net", days: 30 }, end_of_month: { kind: "end of month", days: 0 },
};
const termsKey = (terms: string): TermsKey => TERMS.find((t) => t === terms) ?? "receipt";

export interface OrderToBill {
  readonly order: typeof workOrders.$inferSelect;
  readonly customer: typeof customers.$inferSelect;
  readonly agreed: typeof estimates.$inferSelect;
  readonly agreedSnapshot: EstimateSnapshot;
  readonly lines: readonly AgreedLine[];
  readonly pieces: readonly (BillablePiece & { readonly row: typeof workPieces.$inferSelect })[];
}

/** The agreed work of an order with what became of it. Refuses when nothing was agreed. */
export async function orderToBill(ctx: TxContext, workOrderId: string): Promise<Result<OrderToBill>> {
  const { tx, shop } = ctx;
  const [row] = await tx.select({ order: workOrders, customer: customers }).from(workOrders)
    .innerJoin(customers, and(eq(customers.shopId, workOrders.shopId), eq(customers.id, workOrders.customerId)))
    .where(and(eq(workOrders.shopId, shop.id), eq(workOrders.id, workOrderId)));
  if (!row) return refuse("NOT_FOUND", "This order is not here.");
  const [agreed] = row.order.agreedEstimateId ? await tx.select().from(estimates).where(and(eq(estimates.shopId, shop.id), eq(estimates.id, row.order.agreedEstimateId))) : [];
  if (!agreed?.snapshot) return refuse("NOTHING_AGREED", "Nothing was agreed on this order yet. An invoice is drawn from an approved estimate.");
  const pieceRows = await tx.select().from(workPieces).where(and(eq(workPieces.shopId, shop.id), eq(workPieces.workOrderId, workOrderId))).orderBy(asc(workPieces.pieceNo));
  const lineRows = await tx.select().from(estimateLines).where(and(eq(estimateLines.shopId, shop.id), eq(estimateLines.estimateId, agreed.id))).orderBy(asc(estimateLines.lineNo));
  const ops = await tx.select({ id: operations.id, lineId: operations.estimateLineId, doneAt: operations.doneAt }).from(operations)
    .where(and(eq(operations.shopId, shop.id), eq(operations.workOrderId, workOrderId), isNull(operations.removedAt)));
  const minutes = new Map((await minutesByOperation(ctx, workOrderId)).map((m) => [m.operationId, m.minutes - m.reworkMinutes]));
  return ok({
    ...row, agreed, agreedSnapshot: agreed.snapshot as EstimateSnapshot,
    pieces: pieceRows.map((p) => ({ id: p.id, tag: p.tag ?? `${row.order.number}-${p.pieceNo}`, released: p.releasedAt !== null, stopped: p.stoppedAt !== null, row: p })),
    lines: lineRows.map((l) => {
      const own = ops.filter((o) => o.lineId === l.id);
      return {
        id: l.id, kind: l.kind, pieceId: l.pieceId, description: l.description, qtyMilli: l.qtyMilli, unitPriceMinor: l.unitPriceMinor, amountMinor: l.amountMinor, bookMinutes: l.bookMinutes,
        actualMinutes: own.reduce((sum, o) => sum + (minutes.get(o.id) ?? 0), 0), isDone: own.every((o) => o.doneAt !== null),
      };
    }),
  });
}

/** Issued invoices of an order with their lines' sources and sums, for billing once and not more than approved. */
export async function billedBefore(ctx: TxContext, workOrderId: string): Promise<{ lineIds: Set<string>; netWithoutFreightMinor: number; suppliesMinor: number; freightMinor: number }> {
  const { tx, shop } = ctx;
  const docs = await tx.select({ id: invoices.id, kind: invoices.kind, snapshot: invoices.snapshot, totalMinor: invoices.totalMinor, creditedMinor: invoices.creditedMinor, creditsInvoiceId: invoices.creditsInvoiceId }).from(invoices)
    .where(and(eq(invoices.shopId, shop.id), eq(invoices.workOrderId, workOrderId), eq(invoices.state, "issued")));
  // An invoice taken back whole frees its lines for another one.
  const standing = docs.filter((d) => d.kind === "invoice" && !(d.creditedMinor > 0 && d.creditedMinor >= d.totalMinor));
  const ids = new Set(standing.map((d) => d.id));
  const totals = docs.filter((d) => ids.has(d.id) || (d.creditsInvoiceId !== null && ids.has(d.creditsInvoiceId))).map((d) => (d.snapshot as InvoiceSnapshot).totals);
  const lines = standing.length ? await tx.select({ sourceId: invoiceLines.sourceId }).from(invoiceLines).where(and(eq(invoiceLines.shopId, shop.id), inArray(invoiceLines.invoiceId, standing.map((d) => d.id)), isNotNull(invoiceLines.sourceId))) : [];
  const sum = (pick: (t: DocumentTotals) => number) => totals.reduce((a, t) => a + pick(t), 0);
  return {
    lineIds: new Set(lines.flatMap((l) => l.sourceId ?? [])),
    netWithoutFreightMinor: sum((t) => t.netMinor - t.freightMinor), suppliesMinor: sum((t) => t.suppliesMinor), freightMinor: sum((t) => t.freightMinor),
  };
}

/** The rules of a further invoice of one order: the cap on shop supplies is what the earlier ones left of it. */
const withSuppliesLeft = (rules: DocumentRules, billedMinor: number): DocumentRules =>
  billedMinor === 0 || rules.suppliesCapMinor === null ? rules : { ...rules, suppliesCapMinor: Math.max(0, rules.suppliesCapMinor - billedMinor) };

export interface DraftSheet {
  readonly snapshot: InvoiceSnapshot;
  readonly approvedNetMinor: number;
  readonly billedNetMinor: number;
  readonly depositSurplusMinor: number;
  /** Labor billed at book whose bench minutes differ, whole minutes over (positive) or under. */
  readonly minutesOverBook: number;
}

/**
 * A draft as it would be printed if it were issued at `ctx.now`: lines as stored, rules and rate of that day, deposit held,
 * findings refused, gain as measured.
 */
export async function draftSheet(ctx: TxContext, draft: typeof invoices.$inferSelect): Promise<Result<DraftSheet>> {
  const { tx, shop } = ctx;
  if (!draft.workOrderId) return refuse("NOT_FOUND", "This draft belongs to no order.");
  const bill = await orderToBill(ctx, draft.workOrderId);
  if (!bill.ok) return bill;
  const { order, customer, agreed, agreedSnapshot, pieces } = bill.value;
  const rows = await tx.select().from(invoiceLines).where(and(eq(invoiceLines.shopId, shop.id), eq(invoiceLines.invoiceId, draft.id))).orderBy(asc(invoiceLines.lineNo));
  const lines: InvoiceLine[] = rows.map((l) => ({
    id: l.id, lineNo: l.lineNo, kind: l.kind as InvoiceLineKind, pieceTag: l.pieceTag, description: l.description, qtyMilli: l.qtyMilli, unitPriceMinor: l.unitPriceMinor,
    amountMinor: l.amountMinor, bookMinutes: l.bookMinutes, actualMinutes: l.actualMinutes,
  }));
  const today = localDate(ctx.now, shop.zone);
  const before = await billedBefore(ctx, order.id);
  const rules = withSuppliesLeft(await rulesFor(ctx, customer.id, today), before.suppliesMinor);
  const totals = totalsUnder(rules, { lines, laborDiscountBp: agreed.laborDiscountBasisPoints, freightMinor: 0 });
  if (!totals.ok) return totals;
  const held = await depositHeld(ctx, order.id);
  const deposit = applyDeposit(totals.value.totalMinor, held);
  const settings = await settingsOf(ctx);
  const key = termsKey(customer.terms);
  const tags = new Set(lines.map((l) => l.pieceTag).filter(Boolean));
  const billed = pieces.filter((p) => tags.size === 0 || tags.has(p.tag));
  const released = billed.flatMap((p) => (p.row.releasedAt ? [localDate(p.row.releasedAt, shop.zone)] : [])).sort();
  const printed: InvoicePiece[] = [];
  for (const p of billed) printed.push({ tag: p.tag, family: p.row.family, castingNumber: p.row.castingNumber, serial: p.row.serial, released: p.released, gain: await gainOfPiece(ctx, p.id) });
  const snapshot: InvoiceSnapshot = {
    kind: "invoice", ruleSet: RULE_SET, number: null, date: today, supplyOn: released.at(-1) ?? today, dueOn: dueDate(today, TERMS_RULE[key]), terms: TERMS_WORDS[key],
    currency: shop.currency, locale: shop.locale, zone: shop.zone,
    shop: { name: shop.name, address: settings.address, phone: settings.phone, email: settings.email, taxNumber: settings.taxNumber },
    customer: { name: customer.name, address: customer.address, email: customer.email ?? "", taxNumber: customer.taxNumber },
    customerReference: order.customerReference, orderNumber: order.number, pieces: printed, lines, laborDiscountBp: agreed.laborDiscountBasisPoints, rules, totals: totals.value,
    deposit: { appliedMinor: deposit.appliedMinor, on: await depositDay(ctx, order.id) }, balanceMinor: deposit.openMinor, reference: null,
    ...(await answersOf(ctx, order.id)), words: settings.invoiceWords, credits: null,
  };
  const labor = lines.filter((l) => l.kind === "labor");
  return ok({
    snapshot, approvedNetMinor: agreedSnapshot.totals.netMinor - agreedSnapshot.totals.freightMinor,
    billedNetMinor: before.netWithoutFreightMinor + totals.value.netMinor - totals.value.freightMinor, depositSurplusMinor: deposit.surplusMinor,
    minutesOverBook: labor.reduce((sum, l) => sum + (l.actualMinutes > 0 ? l.actualMinutes - l.bookMinutes : 0), 0),
  });
}

async function depositDay(ctx: TxContext, workOrderId: string): Promise<string | null> {
  const [p] = await ctx.tx.select({ at: payments.receivedAt }).from(payments).where(and(
    eq(payments.shopId, ctx.shop.id), eq(payments.workOrderId, workOrderId), eq(payments.purpose, "deposit"))).orderBy(desc(payments.receivedAt)).limit(1);
  return p ? localDate(p.at, ctx.shop.zone) : null;
}

/** What the customer said yes to, and the findings they said no to. */
async function answersOf(ctx: TxContext, workOrderId: string): Promise<Pick<InvoiceSnapshot, "approvals" | "refused">> {
  const { tx, shop } = ctx;
  const rows = await tx.select({ a: approvals, version: estimates.estimateNo }).from(approvals)
    .innerJoin(estimates, and(eq(estimates.shopId, approvals.shopId), eq(estimates.id, approvals.estimateId)))
    .where(and(eq(approvals.shopId, shop.id), eq(estimates.workOrderId, workOrderId))).orderBy(asc(approvals.at));
  const declined = new Map(rows.filter((r) => r.a.answer === "declined").map((r) => [r.a.estimateId, localDate(r.a.at, shop.zone)]));
  const asked = declined.size ? await tx.select().from(findings).where(and(
    eq(findings.shopId, shop.id), eq(findings.workOrderId, workOrderId), inArray(findings.estimateId, [...declined.keys()]), isNull(findings.withdrawnAt))).orderBy(asc(findings.foundAt)) : [];
  return {
    approvals: rows.filter((r) => r.a.answer === "approved").map((r) => ({ version: r.version, totalMinor: r.a.totalMinor, name: r.a.name, on: localDate(r.a.at, shop.zone), via: r.a.via })),
    refused: asked.map((f) => ({ words: f.position ? `${f.position}: ${f.words}` : f.words, on: (f.estimateId && declined.get(f.estimateId)) || "" })),
  };
}

