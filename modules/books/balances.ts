import "server-only";
import { and, eq, inArray, sql } from "drizzle-orm";
import { journalEntries, journalLines } from "@/db/schema";
import { inShop, type ShopContext } from "@/modules/access/context";
import { minor, type Minor } from "@/modules/kernel/money";
import type { AccountCode } from "./domain/accounts";

/**
 * Balance of one account over the entries of a work order or a customer, debit positive. What is held as deposit, owed
 * as credit or lies in process is read from the ledger, so that it cannot differ from the books.
 */
export async function balanceFor(ctx: ShopContext, account: AccountCode, of: { workOrderId: string } | { customerId: string }): Promise<Minor> {
  const whose = "workOrderId" in of ? eq(journalEntries.workOrderId, of.workOrderId) : eq(journalEntries.customerId, of.customerId);
  const [row] = await inShop(ctx, (tx) => tx.select({ sum: sql<string>`coalesce(sum(${journalLines.amountMinor}), 0)` }).from(journalLines)
    .innerJoin(journalEntries, and(eq(journalEntries.shopId, journalLines.shopId), eq(journalEntries.id, journalLines.entryId)))
    .where(and(eq(journalLines.shopId, ctx.shop.id), eq(journalLines.accountCode, account), whose)));
  return minor(Number(row?.sum ?? 0));
}

/** Balances by account over the entries of one work order. */
export async function balancesOfOrder(ctx: ShopContext, workOrderId: string, accounts?: readonly AccountCode[]): Promise<Record<string, Minor>> {
  const rows = await inShop(ctx, (tx) => tx.select({ account: journalLines.accountCode, sum: sql<string>`sum(${journalLines.amountMinor})` }).from(journalLines)
    .innerJoin(journalEntries, and(eq(journalEntries.shopId, journalLines.shopId), eq(journalEntries.id, journalLines.entryId)))
    .where(and(eq(journalLines.shopId, ctx.shop.id), eq(journalEntries.workOrderId, workOrderId), accounts ? inArray(journalLines.accountCode, [...accounts]) : undefined))
    .groupBy(journalLines.accountCode));
  return Object.fromEntries(rows.map((r) => [r.account, minor(Number(r.sum))]));
}

/** Deposit held for a work order and not yet applied. */
export const depositHeld = async (ctx: ShopContext, workOrderId: string): Promise<Minor> => minor(-(await balanceFor(ctx, "2100", { workOrderId })));
/** What the shop owes a customer as credit. */
export const creditOf = async (ctx: ShopContext, customerId: string): Promise<Minor> => minor(-(await balanceFor(ctx, "2110", { customerId })));
