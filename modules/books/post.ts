import "server-only";
import { randomUUID } from "node:crypto";
import { and, eq, gte, isNotNull, sql } from "drizzle-orm";
import { journalEntries, journalLines, periods } from "@/db/schema";
import { inShop, personIdOf, type ShopContext, type TxContext } from "@/modules/access/context";
import { takeNumber } from "@/modules/access/numbers";
import { minor } from "@/modules/kernel/money";
import { ok, refuse, type Result } from "@/modules/kernel/result";
import { checkEntry } from "./domain/entry";
import { firstOpenDate } from "./domain/open-date";

export interface NewEntry {
  /** Business date, `YYYY-MM-DD`. */
  readonly date: string;
  readonly text: string;
  /** Name of the posting rule, such as `invoiceIssued`. With the source it makes the entry one of a kind. */
  readonly rule: string;
  readonly sourceKind: string;
  readonly sourceId: string;
  readonly workOrderId?: string | null;
  readonly customerId?: string | null;
  readonly reversalOf?: string | null;
  /** Debit positive, credit negative; must sum to 0. */
  readonly lines: readonly { readonly account: string; readonly amountMinor: number }[];
}

/** Months from `from` on that are closed, `YYYY-MM`. */
async function closedMonths(ctx: ShopContext, from: string): Promise<string[]> {
  const rows = await inShop(ctx, (tx) => tx.select({ month: periods.month }).from(periods)
    .where(and(eq(periods.shopId, ctx.shop.id), gte(periods.month, from.slice(0, 7)), isNotNull(periods.closedAt))));
  return rows.map((r) => r.month);
}

/** The date itself, or the first open one after it when its month is closed: for facts that cannot wait, such as money that came in. */
export const openDateFrom = async (ctx: ShopContext, date: string): Promise<string> => firstOpenDate(date, await closedMonths(ctx, date));

/**
 * Writes one journal entry in the caller's transaction. The same rule on the same source is written once; a repeat gets
 * the first entry back. The number is taken last, so call this late.
 * Refuses what `checkEntry` refuses, and `PERIOD_CLOSED` with the first open date.
 */
export async function postEntry(ctx: TxContext, entry: NewEntry): Promise<Result<{ id: string; number: number }>> {
  const { tx, shop } = ctx;
  const checked = checkEntry(entry.lines.map((l) => ({ account: l.account, amountMinor: minor(l.amountMinor) })));
  if (!checked.ok) return checked;
  await tx.execute(sql`select pg_advisory_xact_lock(hashtextextended(${`entry:${shop.id}:${entry.rule}:${entry.sourceKind}:${entry.sourceId}`}, 2))`);
  const [before] = await tx.select({ id: journalEntries.id, number: journalEntries.number }).from(journalEntries).where(and(
    eq(journalEntries.shopId, shop.id), eq(journalEntries.rule, entry.rule), eq(journalEntries.sourceKind, entry.sourceKind), eq(journalEntries.sourceId, entry.sourceId)));
  if (before) return ok(before);
  const open = firstOpenDate(entry.date, await closedMonths(ctx, entry.date));
  if (open !== entry.date) {
    return refuse("PERIOD_CLOSED", `${entry.date.slice(0, 7)} is closed in the books. The first open date is ${open}.`, { field: "date", data: { firstOpenDate: open } });
  }
  const id = randomUUID();
  const number = await takeNumber(ctx, "JOURNAL");
  await tx.insert(journalEntries).values({
    shopId: shop.id, id, number, date: entry.date, text: entry.text, rule: entry.rule, sourceKind: entry.sourceKind, sourceId: entry.sourceId,
    workOrderId: entry.workOrderId ?? null, customerId: entry.customerId ?? null, reversalOf: entry.reversalOf ?? null, at: ctx.now, personId: personIdOf(ctx),
  });
  await tx.insert(journalLines).values(checked.value.map((l, i) => ({ shopId: shop.id, entryId: id, lineNo: i + 1, accountCode: l.account, amountMinor: l.amountMinor })));
  return ok({ id, number });
}
