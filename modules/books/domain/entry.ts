import { minor, minorText, type Minor } from "@/modules/kernel/money";
import { ok, refuse, type Result } from "@/modules/kernel/result";
import { accountOf, type AccountCode } from "./accounts";

/** One line of a journal entry. Debit positive, credit negative. */
export interface EntryLine {
  readonly account: AccountCode;
  readonly amountMinor: Minor;
}

/** A line as it comes from outside: the code has not been looked up yet. */
export interface DraftLine {
  readonly account: string;
  readonly amountMinor: Minor;
}

/**
 * Lets an entry through only when it sums to exactly 0.
 * Refuses `ENTRY_EMPTY`, `ACCOUNT_UNKNOWN`, and `ENTRY_NOT_BALANCED` with the difference (debit less credit).
 * Source: double entry.
 */
export function checkEntry(lines: readonly DraftLine[]): Result<readonly EntryLine[]> {
  if (lines.length < 2) return refuse("ENTRY_EMPTY", "An entry has at least two lines.", { field: "lines" });
  const known: EntryLine[] = [];
  for (const [i, line] of lines.entries()) {
    const account = accountOf(line.account);
    if (!account) {
      return refuse("ACCOUNT_UNKNOWN", `There is no account ${line.account}. Choose one from the chart.`, { field: `lines.${i}.account` });
    }
    known.push({ account: account.code, amountMinor: line.amountMinor });
  }
  const differenceMinor = known.reduce((sum, l) => sum + l.amountMinor, 0);
  if (differenceMinor !== 0) {
    return refuse("ENTRY_NOT_BALANCED", `Debit and credit differ by ${minorText(differenceMinor)}. An entry must sum to 0.00.`, {
      field: "lines", data: { differenceMinor },
    });
  }
  return ok(known);
}

/** The same entry with every sign turned: a reversal, or the credit note of an invoice. */
export const mirror = (lines: readonly EntryLine[]): EntryLine[] =>
  lines.map((l) => ({ ...l, amountMinor: minor(0 - l.amountMinor) }));

export const debit = (account: AccountCode, amountMinor: number): EntryLine => ({ account, amountMinor: minor(amountMinor) });
export const credit = (account: AccountCode, amountMinor: number): EntryLine => ({ account, amountMinor: minor(0 - amountMinor) });

/** Lines in the order given; those of 0 are left out. */
export const entryOf = (...lines: readonly EntryLine[]): EntryLine[] => lines.filter((l) => l.amountMinor !== 0);
