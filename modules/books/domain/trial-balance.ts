import { minor, sumMinor, type Minor } from "@/modules/kernel/money";
import { ACCOUNTS, type Account } from "./accounts";
import { type EntryLine } from "./entry";

export interface BalanceRow {
  readonly account: Account;
  /** Sum of the debits, 0 or more. */
  readonly debitMinor: Minor;
  /** Sum of the credits, 0 or more. */
  readonly creditMinor: Minor;
  /** Debit less credit. */
  readonly balanceMinor: Minor;
}

export interface TrialBalance {
  /** Every account that was ever posted to, by code; also those back at 0. */
  readonly rows: readonly BalanceRow[];
  readonly debitMinor: Minor;
  readonly creditMinor: Minor;
  /** 0 as long as every entry balanced. */
  readonly sumMinor: Minor;
}

/** Adds up journal lines by account. */
export function trialBalance(lines: readonly EntryLine[]): TrialBalance {
  const rows = ACCOUNTS.flatMap((account): BalanceRow[] => {
    const own = lines.filter((l) => l.account === account.code).map((l) => l.amountMinor);
    if (own.length === 0) return [];
    const debitMinor = sumMinor(own.filter((a) => a > 0));
    const creditMinor = minor(0 - sumMinor(own.filter((a) => a < 0)));
    return [{ account, debitMinor, creditMinor, balanceMinor: minor(debitMinor - creditMinor) }];
  });
  return {
    rows,
    debitMinor: sumMinor(rows.map((r) => r.debitMinor)),
    creditMinor: sumMinor(rows.map((r) => r.creditMinor)),
    sumMinor: sumMinor(rows.map((r) => r.balanceMinor)),
  };
}

/** Balance of one account, debit positive; 0 when it was never posted to. */
export const balanceOf = (lines: readonly EntryLine[], code: Account["code"]): Minor =>
  sumMinor(lines.filter((l) => l.account === code).map((l) => l.amountMinor));
