import "server-only";
import { and, asc, eq, inArray } from "drizzle-orm";
import { customers, invoices, journalEntries, journalLines, workOrders } from "@/db/schema";
import { ableTo, inShop, mustBeAble, NotFound, settingsOf, type ShopContext } from "@/modules/access/context";
import type { InvoiceSnapshot } from "@/modules/invoices/domain/invoice-snapshot";
import { laborOf } from "@/modules/time/queries/minutes";
import { jobProfit, type JobProfit } from "./domain/job-profit";

export interface ProfitRow { text: string; date: string | null; amountMinor: number; invoiceId: string | null }
export interface JobProfitView extends JobProfit {
  workOrderId: string; number: string; customer: string; isBilled: boolean; minutes: number;
  /** The rows behind each figure. Minutes by person carry cost only for who may see pay. */
  rows: { sales: ProfitRow[]; parts: ProfitRow[]; outside: ProfitRow[]; freightOut: ProfitRow[]; fees: ProfitRow[]; labor: { name: string; minutes: number; costMinor: number | null }[] };
}

/** Cost accounts of a job: parts before they are billed stand in work in process, so both are taken. */
const ACCOUNTS = { parts: ["5000", "1250", "5300"], outside: ["5100"], freightOut: ["5200"], fees: ["6100", "6150"] } as const;

/** Profit of one job from its facts: issued documents, the ledger, bench minutes at the rate of the day. @throws NotFound */
export async function jobProfitOf(ctx: ShopContext, workOrderId: string): Promise<JobProfitView> {
  mustBeAble(ctx, "profit.see");
  return inShop(ctx, async (tx) => {
    const inner = { ...ctx, tx };
    const [order] = await tx.select({ number: workOrders.number, customer: customers.name }).from(workOrders).innerJoin(customers, and(eq(customers.shopId, workOrders.shopId), eq(customers.id, workOrders.customerId)))
      .where(and(eq(workOrders.shopId, ctx.shop.id), eq(workOrders.id, workOrderId)));
    if (!order) throw new NotFound("order");
    const docs = await tx.select().from(invoices).where(and(eq(invoices.shopId, ctx.shop.id), eq(invoices.workOrderId, workOrderId), eq(invoices.state, "issued"))).orderBy(asc(invoices.issuedAt));
    const sales = docs.map((d): ProfitRow => {
      const { totals } = d.snapshot as InvoiceSnapshot;
      return { text: `${d.kind === "credit" ? "Credit note" : "Invoice"} ${d.number ?? ""}`, date: d.issuedOn, amountMinor: totals.netMinor - totals.coreMinor, invoiceId: d.id };
    });
    const lines = await tx.select({ account: journalLines.accountCode, amountMinor: journalLines.amountMinor, text: journalEntries.text, date: journalEntries.date, rule: journalEntries.rule }).from(journalLines)
      .innerJoin(journalEntries, and(eq(journalEntries.shopId, journalLines.shopId), eq(journalEntries.id, journalLines.entryId)))
      .where(and(eq(journalLines.shopId, ctx.shop.id), eq(journalEntries.workOrderId, workOrderId), inArray(journalLines.accountCode, Object.values(ACCOUNTS).flat()))).orderBy(asc(journalEntries.number));
    const of = (key: keyof typeof ACCOUNTS) => lines.filter((l) => (ACCOUNTS[key] as readonly string[]).includes(l.account) && l.rule !== "costOfParts").map((l): ProfitRow => ({ text: l.text, date: l.date, amountMinor: l.amountMinor, invoiceId: null }));
    const sum = (rows: readonly ProfitRow[]) => rows.reduce((a, r) => a + r.amountMinor, 0);
    const labor = await laborOf(inner, workOrderId);
    const { burdenBasisPoints } = await settingsOf(inner);
    const rows = { sales, parts: of("parts"), outside: of("outside"), freightOut: of("freightOut"), fees: of("fees") };
    const profit = jobProfit({ netSalesMinor: sum(sales), partsMinor: sum(rows.parts), laborMinor: labor.map((l) => l.costMinor), burdenBasisPoints, outsideMinor: sum(rows.outside), freightOutMinor: sum(rows.freightOut), paymentFeesMinor: sum(rows.fees) });
    const seesPay = ableTo(ctx, "pay.see");
    return {
      ...profit, workOrderId, ...order, isBilled: docs.some((d) => d.kind === "invoice"), minutes: labor.reduce((a, l) => a + l.minutes, 0),
      rows: { ...rows, labor: labor.map((l) => ({ name: l.name, minutes: l.minutes, costMinor: seesPay ? l.costMinor : null })) },
    };
  });
}
