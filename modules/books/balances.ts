import "server-only";
import { and, eq, inArray, sql } from "drizzle-orm";
import { journalEntries, journalLines } from "@/db/schema";
import { inShop, type ShopContext } from "@/modules/access/context";
import { minor, ZERO, type Minor } from "@/modules/kernel/money";
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

/** Deposits held for work orders and not yet applied; an order without entries holds none and is not in the map. */
export async function depositsHeld(ctx: ShopContext, workOrderIds: readonly string[]): Promise<Map<string, Minor>> {
  if (workOrderIds.length === 0) return new Map();
  const rows = await inShop(ctx, (tx) => tx.select({ id: journalEntries.workOrderId, sum: sql<string>`sum(${journalLines.amountMinor})` }).from(journalLines)
    .innerJoin(journalEntries, and(eq(journalEntries.shopId, journalLines.shopId), eq(journalEntries.id, journalLines.entryId)))
    .where(and(eq(journalLines.shopId, ctx.shop.id), eq(journalLines.accountCode, "2100"), inArray(journalEntries.workOrderId, [...workOrderIds])))
    .groupBy(journalEntries.workOrderId));
  return new Map(rows.flatMap((r) => (r.id === null ? [] : [[r.id, minor(0 - Number(r.sum))]])));
}

/** Deposit held for a work order and not yet applied. */
export const depositHeld = async (ctx: ShopContext, workOrderId: string): Promise<Minor> => (await depositsHeld(ctx, [workOrderId])).get(workOrderId) ?? ZERO;
/** What the shop owes a customer as credit. */
export const creditOf = async (ctx: ShopContext, customerId: string): Promise<Minor> => minor(-(await balanceFor(ctx, "2110", { customerId })));
