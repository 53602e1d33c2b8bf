import "server-only";
import { randomUUID } from "node:crypto";
import { and, eq } from "drizzle-orm";
import { journalEntries, journalLines, periods } from "@/db/schema";
import { personIdOf, type TxContext } from "@/modules/access/context";
import { takeNumber } from "@/modules/access/numbers";
import { ok, refuse, type Result } from "@/modules/kernel/result";
import { checkEntry, type DraftLine } from "./domain/entry";

export interface NewEntry {
  /** Business date on the shop's calendar. */
  readonly date: string;
  readonly text: string;
  /** Posting rule that made the lines, such as `parts-issued`. */
  readonly rule: string;
  readonly sourceKind: string;
  readonly sourceId: string;
  readonly workOrderId?: string | null;
  readonly customerId?: string | null;
  readonly reversalOf?: string | null;
  /** Debit positive, credit negative. */
  readonly lines: readonly DraftLine[];
}

export interface Posted { readonly entryId: string; readonly number: number }

/**
 * Writes one balanced entry. The same rule over the same source posts once: a repeat gets the first entry back.
 * Refuses `PERIOD_CLOSED` when the month of the date is closed, and what `checkEntry` refuses.
 */
export async function postEntry(ctx: TxContext, entry: NewEntry): Promise<Result<Posted>> {
  const checked = checkEntry(entry.lines);
  if (!checked.ok) return checked;
  const { tx, shop } = ctx;
  const [before] = await tx.select({ entryId: journalEntries.id, number: journalEntries.number }).from(journalEntries).where(and(
    eq(journalEntries.shopId, shop.id), eq(journalEntries.rule, entry.rule), eq(journalEntries.sourceKind, entry.sourceKind), eq(journalEntries.sourceId, entry.sourceId),
  ));
  if (before) return ok(before);
  const month = entry.date.slice(0, 7);
  const [period] = await tx.select({ closedAt: periods.closedAt }).from(periods).where(and(eq(periods.shopId, shop.id), eq(periods.month, month)));
  if (period?.closedAt) return refuse("PERIOD_CLOSED", `The books of ${month} are closed. Use a date in an open month, or ask the owner to open ${month} again.`);
  const entryId = randomUUID();
  const number = await takeNumber(ctx, "JOURNAL");
  await tx.insert(journalEntries).values({
    shopId: shop.id, id: entryId, number, date: entry.date, text: entry.text, rule: entry.rule, sourceKind: entry.sourceKind, sourceId: entry.sourceId,
    workOrderId: entry.workOrderId ?? null, customerId: entry.customerId ?? null, reversalOf: entry.reversalOf ?? null, at: ctx.now, personId: personIdOf(ctx),
  });
  await tx.insert(journalLines).values(checked.value.map((l, i) => ({ shopId: shop.id, entryId, lineNo: i + 1, accountCode: l.account, amountMinor: l.amountMinor })));
  return ok({ entryId, number });
}
