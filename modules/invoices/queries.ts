import "server-only";
import { and, asc, desc, eq, gt, ilike, inArray, isNotNull, isNull, lt, ne, or, sql, type SQL } from "drizzle-orm";
import { customers, files, invoices, mailMessages, workOrders, workPieces } from "@/db/schema";
import { inShop, mustBeAble, NotFound, type ShopContext } from "@/modules/access/context";
import { creditOf } from "@/modules/books/balances";
import { readFile } from "@/modules/documents/files";
import { daysBetween, localDate } from "@/modules/kernel/instant";
import { agingOf, AGING_BUCKETS, bucketOf, type AgingBucket } from "./domain/aging";
import type { InvoiceSnapshot } from "./domain/invoice-snapshot";
import { openOf } from "@/modules/books/domain/open-sum";
import type { FindInvoices } from "./input";
import { draftSheet } from "./sheet";

export interface InvoiceRow {
  id: string; number: string | null; kind: string; state: string; customer: string; orderNumber: string; issuedOn: string | null; dueOn: string | null; totalMinor: number; openMinor: number; daysLate: number;
}
export interface InvoicesPage { rows: InvoiceRow[]; next: string | null; counts: Record<"open" | "overdue" | "draft" | "ready", number>; openMinor: number }

const OPEN = sql<number>`(${invoices.totalMinor} - ${invoices.depositAppliedMinor} - ${invoices.paidMinor} - ${invoices.creditedMinor})`;
const literal = (s: string) => s.replace(/[\\%_]/g, (c) => `\\${c}`);

function viewOf(view: FindInvoices["view"], today: string): SQL | undefined {
  const issued = and(eq(invoices.state, "issued"), eq(invoices.kind, "invoice"));
  switch (view) {
    case "open": return and(issued, sql`${OPEN} > 0`);
    case "overdue": return and(issued, sql`${OPEN} > 0`, lt(invoices.dueOn, today));
    case "paid": return and(issued, sql`${OPEN} <= 0`);
    case "draft": return and(eq(invoices.state, "draft"), eq(invoices.kind, "invoice"));
    case "all": return ne(invoices.state, "dropped");
  }
}

/** Work orders with a released piece whose agreed lines are not billed: what the bookkeeper sees first. */
const readyCondition = (shopId: string) => and(
  eq(workOrders.shopId, shopId), isNull(workOrders.cancelledAt), isNotNull(workOrders.agreedEstimateId),
  sql`exists (select 1 from pieces p where p.shop_id = ${workOrders.shopId} and p.work_order_id = ${workOrders.id} and p.released_at is not null)`,
  sql`not exists (select 1 from invoices i where i.shop_id = ${workOrders.shopId} and i.work_order_id = ${workOrders.id} and i.kind = 'invoice' and i.state in ('draft', 'issued') and not (i.credited_minor > 0 and i.credited_minor >= i.total_minor))`,
);

/** Invoices of a view, newest first, keyset-paged; `q` is part of a number, an order, a name, or an exact sum. */
export async function findInvoices(ctx: ShopContext, ask: FindInvoices): Promise<InvoicesPage> {
  mustBeAble(ctx, "books.see");
  const today = localDate(ctx.now, ctx.shop.zone);
  return inShop(ctx, async (tx) => {
    const q = ask.q.trim();
    const sum = /^\d+([.,]\d{1,2})?$/.test(q) ? Math.round(Number(q.replace(",", ".")) * 100) : null;
    const at = ask.after?.split("|");
    const rows = await tx.select({ i: invoices, customer: customers.name, orderNumber: workOrders.number }).from(invoices)
      .innerJoin(customers, and(eq(customers.shopId, invoices.shopId), eq(customers.id, invoices.customerId)))
      .leftJoin(workOrders, and(eq(workOrders.shopId, invoices.shopId), eq(workOrders.id, invoices.workOrderId)))
      .where(and(
        eq(invoices.shopId, ctx.shop.id), viewOf(ask.view, today),
        q ? or(ilike(invoices.number, `%${literal(q)}%`), ilike(workOrders.number, `%${literal(q)}%`), ilike(customers.name, `%${literal(q)}%`), ...(sum === null ? [] : [eq(invoices.totalMinor, sum), sql`${OPEN} = ${sum}`])) : undefined,
        at?.[0] && at[1] ? or(lt(invoices.createdAt, new Date(at[0])), and(eq(invoices.createdAt, new Date(at[0])), gt(invoices.id, at[1]))) : undefined,
      )).orderBy(desc(invoices.createdAt), asc(invoices.id)).limit(ask.limit + 1);
    const page = rows.slice(0, ask.limit);
    const last = page.at(-1)?.i;
    const [counts] = await tx.select({
      open: sql<number>`count(*) filter (where state = 'issued' and kind = 'invoice' and ${OPEN} > 0)::int`, overdue: sql<number>`count(*) filter (where state = 'issued' and kind = 'invoice' and ${OPEN} > 0 and due_on < ${today})::int`,
      draft: sql<number>`count(*) filter (where state = 'draft' and kind = 'invoice')::int`, openMinor: sql<string>`coalesce(sum(${OPEN}) filter (where state = 'issued' and kind = 'invoice' and ${OPEN} > 0), 0)`,
    }).from(invoices).where(eq(invoices.shopId, ctx.shop.id));
    const [ready] = await tx.select({ n: sql<number>`count(*)::int` }).from(workOrders).where(readyCondition(ctx.shop.id));
    return {
      rows: page.map(({ i, customer, orderNumber }) => ({
        id: i.id, number: i.number, kind: i.kind, state: i.state, customer, orderNumber: orderNumber ?? "", issuedOn: i.issuedOn, dueOn: i.dueOn, totalMinor: i.totalMinor,
        openMinor: i.kind === "invoice" && i.state === "issued" ? openOf(i) : 0, daysLate: i.dueOn && i.kind === "invoice" && i.state === "issued" && openOf(i) > 0 ? Math.max(0, daysBetween(i.dueOn, today)) : 0,
      })),
      next: rows.length > ask.limit && last ? `${last.createdAt.toISOString()}|${last.id}` : null,
      counts: { open: counts?.open ?? 0, overdue: counts?.overdue ?? 0, draft: counts?.draft ?? 0, ready: ready?.n ?? 0 }, openMinor: Number(counts?.openMinor ?? 0),
    };
  });
}

export interface ReadyRow { workOrderId: string; number: string; customer: string; agreedMinor: number; releasedOn: string | null; pieces: number; waiting: number }

/** Released and not billed, longest first. */
export async function findReadyToBill(ctx: ShopContext): Promise<ReadyRow[]> {
  mustBeAble(ctx, "books.see");
  const rows = await inShop(ctx, (tx) => tx.select({
    workOrderId: workOrders.id, number: workOrders.number, customer: customers.name,
    agreed: sql<string | null>`(select e.snapshot #>> '{totals,totalMinor}' from estimates e where e.shop_id = ${workOrders.shopId} and e.id = ${workOrders.agreedEstimateId})`,
    released: sql<Date | string | null>`(select max(p.released_at) from pieces p where p.shop_id = ${workOrders.shopId} and p.work_order_id = ${workOrders.id})`,
    pieces: sql<number>`(select count(*)::int from pieces p where p.shop_id = ${workOrders.shopId} and p.work_order_id = ${workOrders.id})`,
    waiting: sql<number>`(select count(*)::int from pieces p where p.shop_id = ${workOrders.shopId} and p.work_order_id = ${workOrders.id} and p.released_at is null and p.stopped_at is null)`,
  }).from(workOrders).innerJoin(customers, and(eq(customers.shopId, workOrders.shopId), eq(customers.id, workOrders.customerId)))
    .where(readyCondition(ctx.shop.id)).orderBy(asc(workOrders.openedAt)).limit(200));
  return rows.map((r) => ({
    workOrderId: r.workOrderId, number: r.number, customer: r.customer, agreedMinor: Number(r.agreed ?? 0), releasedOn: r.released ? localDate(new Date(r.released), ctx.shop.zone) : null, pieces: r.pieces, waiting: r.waiting,
  }));
}

export interface InvoicePageView {
  id: string; version: number; state: string; kind: string; workOrderId: string | null; customerId: string; snapshot: InvoiceSnapshot;
  openMinor: number; paidMinor: number; creditedMinor: number; creditHeldMinor: number; depositSurplusMinor: number; sentTo: string; sentAt: string | null; pdfFileId: string | null; pdfHash: string | null;
  checks: { overApprovedMinor: number; minutesOverBook: number; waitingTags: string[] };
  credits: { id: string; number: string; totalMinor: number; on: string }[]; creditsInvoice: { id: string; number: string } | null;
  mail: { subject: string; to: string; state: string; at: string }[];
}

/** An invoice, draft or issued, or a credit note, with all its page shows. @throws NotFound */
export async function getInvoice(ctx: ShopContext, id: string): Promise<InvoicePageView> {
  mustBeAble(ctx, "books.see");
  return inShop(ctx, async (tx) => {
    const inner = { ...ctx, tx };
    const [row] = await tx.select({ i: invoices, email: customers.email }).from(invoices).innerJoin(customers, and(eq(customers.shopId, invoices.shopId), eq(customers.id, invoices.customerId)))
      .where(and(eq(invoices.shopId, ctx.shop.id), eq(invoices.id, id), ne(invoices.state, "dropped")));
    if (!row) throw new NotFound("invoice");
    const { i } = row;
    const drawn = i.state === "draft" ? await draftSheet(inner, i) : null;
    if (drawn && !drawn.ok) throw new NotFound(drawn.refusal.code);
    const sheet = drawn?.ok ? drawn.value : null;
    const snapshot = sheet?.snapshot ?? (i.snapshot as InvoiceSnapshot);
    const [file] = i.pdfFileId ? await tx.select({ sha: files.sha256 }).from(files).where(and(eq(files.shopId, ctx.shop.id), eq(files.id, i.pdfFileId))) : [];
    const credits = await tx.select().from(invoices).where(and(eq(invoices.shopId, ctx.shop.id), eq(invoices.creditsInvoiceId, id), eq(invoices.state, "issued"))).orderBy(asc(invoices.issuedAt));
    const [of] = i.creditsInvoiceId ? await tx.select({ id: invoices.id, number: invoices.number }).from(invoices).where(and(eq(invoices.shopId, ctx.shop.id), eq(invoices.id, i.creditsInvoiceId))) : [];
    const mail = await tx.select().from(mailMessages).where(and(eq(mailMessages.shopId, ctx.shop.id), eq(mailMessages.subjectKind, "invoice"), eq(mailMessages.subjectId, id))).orderBy(desc(mailMessages.at)).limit(5);
    return {
      id, version: i.version, state: i.state, kind: i.kind, workOrderId: i.workOrderId, customerId: i.customerId, snapshot,
      openMinor: i.state === "issued" ? (i.kind === "invoice" ? openOf(i) : 0) : snapshot.balanceMinor, paidMinor: i.paidMinor, creditedMinor: i.creditedMinor, creditHeldMinor: await creditOf(inner, i.customerId),
      depositSurplusMinor: sheet?.depositSurplusMinor ?? 0, sentTo: row.email ?? "", sentAt: i.sentAt?.toISOString() ?? null, pdfFileId: i.pdfFileId, pdfHash: file?.sha ?? null,
      checks: { overApprovedMinor: sheet ? Math.max(0, sheet.billedNetMinor - sheet.approvedNetMinor) : 0, minutesOverBook: sheet?.minutesOverBook ?? 0, waitingTags: snapshot.pieces.filter((p) => !p.released).map((p) => p.tag) },
      credits: credits.map((c) => ({ id: c.id, number: c.number ?? "", totalMinor: c.totalMinor, on: c.issuedOn ?? "" })), creditsInvoice: of ? { id: of.id, number: of.number ?? "" } : null,
      mail: mail.map((m) => ({ subject: m.subject, to: m.toAddress, state: m.state, at: m.at.toISOString() })),
    };
  });
}

/** The stored paper of an issued document, byte for byte. @throws NotFound */
export async function invoicePdf(ctx: ShopContext, id: string): Promise<{ name: string; mime: string; bytes: Buffer }> {
  if (ctx.actor.kind !== "customer") mustBeAble(ctx, "books.see");
  const [row] = await inShop(ctx, (tx) => tx.select({ fileId: invoices.pdfFileId, customerId: invoices.customerId }).from(invoices).where(and(eq(invoices.shopId, ctx.shop.id), eq(invoices.id, id))));
  if (!row?.fileId) throw new NotFound("paper");
  if (ctx.actor.kind === "customer" && (row.customerId !== ctx.actor.id || ctx.actor.purpose !== "invoice" || ctx.actor.subjectId !== id)) throw new NotFound("paper");
  return readFile(ctx, row.fileId);
}

export interface AgingRow { customerId: string; customer: string; buckets: Record<AgingBucket, number>; totalMinor: number; creditMinor: number }
export interface AgingView { asOf: string; rows: AgingRow[]; buckets: Record<AgingBucket, number>; totalMinor: number }

/** Who owes what for how long, by customer; credit not yet used stands apart. */
export async function agingView(ctx: ShopContext): Promise<AgingView> {
  mustBeAble(ctx, "books.see");
  const asOf = localDate(ctx.now, ctx.shop.zone);
  return inShop(ctx, async (tx) => {
    const open = await tx.select({ i: invoices, customer: customers.name }).from(invoices).innerJoin(customers, and(eq(customers.shopId, invoices.shopId), eq(customers.id, invoices.customerId)))
      .where(and(eq(invoices.shopId, ctx.shop.id), eq(invoices.kind, "invoice"), eq(invoices.state, "issued"), sql`${OPEN} <> 0`));
    const credits = await tx.execute<{ customer_id: string; name: string; credit: string }>(sql`
      select e.customer_id, c.name, -sum(l.amount_minor) as credit from journal_lines l join journal_entries e on e.shop_id = l.shop_id and e.id = l.entry_id
      join customers c on c.shop_id = e.shop_id and c.id = e.customer_id where l.shop_id = ${ctx.shop.id} and l.account_code = '2110' group by e.customer_id, c.name having sum(l.amount_minor) <> 0`);
    const by = new Map<string, AgingRow>();
    const rowOf = (id: string, customer: string) => {
      const row = by.get(id) ?? { customerId: id, customer, buckets: Object.fromEntries(AGING_BUCKETS.map((b) => [b, 0])) as Record<AgingBucket, number>, totalMinor: 0, creditMinor: 0 };
      by.set(id, row);
      return row;
    };
    for (const { i, customer } of open) {
      const row = rowOf(i.customerId, customer);
      const bucket = bucketOf(i.dueOn ?? asOf, asOf);
      row.buckets[bucket] += openOf(i);
      row.totalMinor += openOf(i);
    }
    for (const c of credits.rows) rowOf(c.customer_id, c.name).creditMinor = Number(c.credit);
    const all = agingOf(open.map(({ i }) => ({ due: i.dueOn ?? asOf, openMinor: openOf(i) })), asOf);
    return { asOf, rows: [...by.values()].sort((x, y) => y.totalMinor - x.totalMinor), buckets: { ...all.buckets }, totalMinor: all.totalMinor };
  });
}

/** Invoices and drafts of one order, for its page. */
export async function invoicesOfOrder(ctx: ShopContext, workOrderId: string): Promise<{ id: string; number: string | null; kind: string; state: string; totalMinor: number; openMinor: number }[]> {
  mustBeAble(ctx, "prices.see");
  const rows = await inShop(ctx, (tx) => tx.select().from(invoices).where(and(eq(invoices.shopId, ctx.shop.id), eq(invoices.workOrderId, workOrderId), inArray(invoices.state, ["draft", "issued"]))).orderBy(asc(invoices.createdAt)));
  return rows.map((i) => ({ id: i.id, number: i.number, kind: i.kind, state: i.state, totalMinor: i.totalMinor, openMinor: i.kind === "invoice" && i.state === "issued" ? openOf(i) : 0 }));
}

/** The invoice behind a customer's own link. @throws NotFound */
export async function invoiceForCustomer(ctx: ShopContext): Promise<{ id: string; snapshot: InvoiceSnapshot; openMinor: number; hasPdf: boolean; isReady: boolean; credits: { number: string; totalMinor: number }[] }> {
  const { actor } = ctx;
  if (actor.kind !== "customer" || actor.purpose !== "invoice") throw new NotFound("invoice");
  return inShop(ctx, async (tx) => {
    const [i] = await tx.select().from(invoices).where(and(eq(invoices.shopId, ctx.shop.id), eq(invoices.id, actor.subjectId), eq(invoices.customerId, actor.id), eq(invoices.state, "issued")));
    if (!i) throw new NotFound("invoice");
    const credits = await tx.select({ number: invoices.number, totalMinor: invoices.totalMinor }).from(invoices).where(and(eq(invoices.shopId, ctx.shop.id), eq(invoices.creditsInvoiceId, i.id), eq(invoices.state, "issued")));
    const pieces = i.workOrderId ? await tx.select({ released: workPieces.releasedAt, gone: workPieces.handedOverAt }).from(workPieces).where(and(eq(workPieces.shopId, ctx.shop.id), eq(workPieces.workOrderId, i.workOrderId))) : [];
    return {
      id: i.id, snapshot: i.snapshot as InvoiceSnapshot, openMinor: openOf(i), hasPdf: i.pdfFileId !== null, isReady: pieces.length > 0 && pieces.every((p) => p.released) && pieces.some((p) => !p.gone),
      credits: credits.map((c) => ({ number: c.number ?? "", totalMinor: c.totalMinor })),
    };
  });
}
