import "server-only";
import { and, asc, desc, eq, gte, inArray, lt, lte, sql } from "drizzle-orm";
import { customers, journalEntries, journalLines, people, workOrders } from "@/db/schema";
import { inShop, mustBeAble, type ShopContext } from "@/modules/access/context";
import { minor } from "@/modules/kernel/money";
import { accountOf } from "./domain/accounts";
import { trialBalance } from "./domain/trial-balance";
import type { EntryLine } from "./domain/entry";

export interface EntryView {
  id: string; number: number; date: string; text: string; rule: string; sourceKind: string; sourceId: string; orderNumber: string | null; customer: string | null; by: string | null;
  lines: { account: string; name: string; amountMinor: number }[];
}

/** Entries newest first, of one account if asked; keyset-paged by number. */
export async function findEntries(ctx: ShopContext, ask: { account?: string | undefined; before?: number | undefined; from?: string | undefined; to?: string | undefined; limit?: number }): Promise<{ rows: EntryView[]; next: number | null }> {
  mustBeAble(ctx, "books.see");
  const limit = ask.limit ?? 60;
  return inShop(ctx, async (tx) => {
    const rows = await tx.select({ e: journalEntries, orderNumber: workOrders.number, customer: customers.name, by: people.shortName }).from(journalEntries)
      .leftJoin(workOrders, and(eq(workOrders.shopId, journalEntries.shopId), eq(workOrders.id, journalEntries.workOrderId)))
      .leftJoin(customers, and(eq(customers.shopId, journalEntries.shopId), eq(customers.id, journalEntries.customerId)))
      .leftJoin(people, and(eq(people.shopId, journalEntries.shopId), eq(people.id, journalEntries.personId)))
      .where(and(
        eq(journalEntries.shopId, ctx.shop.id), ask.before ? lt(journalEntries.number, ask.before) : undefined,
        ask.from ? gte(journalEntries.date, ask.from) : undefined, ask.to ? lte(journalEntries.date, ask.to) : undefined,
        ask.account ? sql`exists (select 1 from journal_lines jl where jl.shop_id = ${journalEntries.shopId} and jl.entry_id = ${journalEntries.id} and jl.account_code = ${ask.account})` : undefined,
      )).orderBy(desc(journalEntries.number)).limit(limit + 1);
    const page = rows.slice(0, limit);
    const lines = page.length ? await tx.select().from(journalLines).where(and(eq(journalLines.shopId, ctx.shop.id), inArray(journalLines.entryId, page.map((r) => r.e.id)))).orderBy(asc(journalLines.lineNo)) : [];
    return {
      rows: page.map(({ e, ...r }) => ({
        id: e.id, number: e.number, date: e.date, text: e.text, rule: e.rule, sourceKind: e.sourceKind, sourceId: e.sourceId, ...r,
        lines: lines.filter((l) => l.entryId === e.id).map((l) => ({ account: l.accountCode, name: accountOf(l.accountCode)?.name ?? "", amountMinor: l.amountMinor })),
      })),
      next: rows.length > limit ? (page.at(-1)?.e.number ?? null) : null,
    };
  });
}

export interface TrialBalanceView { to: string | null; rows: { code: string; name: string; kind: string; debitMinor: number; creditMinor: number; balanceMinor: number }[]; debitMinor: number; creditMinor: number; sumMinor: number }

/** Every account with its debits, credits and balance up to a day; the sum is 0. */
export async function trialBalanceView(ctx: ShopContext, to: string | null): Promise<TrialBalanceView> {
  mustBeAble(ctx, "books.see");
  const rows = await inShop(ctx, (tx) => tx.select({
    account: journalLines.accountCode, debit: sql<string>`coalesce(sum(${journalLines.amountMinor}) filter (where ${journalLines.amountMinor} > 0), 0)`, credit: sql<string>`coalesce(sum(${journalLines.amountMinor}) filter (where ${journalLines.amountMinor} < 0), 0)`,
  }).from(journalLines).innerJoin(journalEntries, and(eq(journalEntries.shopId, journalLines.shopId), eq(journalEntries.id, journalLines.entryId)))
    .where(and(eq(journalLines.shopId, ctx.shop.id), to ? lte(journalEntries.date, to) : undefined)).groupBy(journalLines.accountCode));
  const known = rows.flatMap((r): EntryLine[] => { const a = accountOf(r.account); return a ? [{ account: a.code, amountMinor: minor(Number(r.debit)) }, { account: a.code, amountMinor: minor(Number(r.credit)) }] : []; });
  const t = trialBalance(known);
  return { to, rows: t.rows.map((r) => ({ code: r.account.code, name: r.account.name, kind: r.account.kind, debitMinor: r.debitMinor, creditMinor: r.creditMinor, balanceMinor: r.balanceMinor })), debitMinor: t.debitMinor, creditMinor: t.creditMinor, sumMinor: t.sumMinor };
}
