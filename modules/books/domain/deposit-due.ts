import { basisPointsOf, minor, type Minor } from "@/modules/kernel/money";
import { ok, refuse, type Result } from "@/modules/kernel/result";

/** Deposit asked for at approval: percent (basis points, 30 % = 3000) of the total. Refuses `PERCENT_OUT_OF_RANGE`. */
export function depositDue(totalMinor: Minor, percentBp: number): Result<Minor> {
  return Number.isInteger(percentBp) && percentBp >= 0 && percentBp <= 10_000
    ? ok(basisPointsOf(totalMinor, percentBp))
    : refuse("PERCENT_OUT_OF_RANGE", "A deposit is 0 to 100 % of the total.", { field: "percent" });
}

export interface DepositUse {
  readonly appliedMinor: Minor;
  /** What the invoice did not need: customer credit or refund, never silently kept as a second deposit. */
  readonly surplusMinor: Minor;
  readonly openMinor: Minor;
}

/** Applies a held deposit to an issued invoice, at most its total. */
export function applyDeposit(totalMinor: Minor, heldMinor: Minor): DepositUse {
  const appliedMinor = minor(Math.max(0, Math.min(totalMinor, heldMinor)));
  return { appliedMinor, surplusMinor: minor(heldMinor - appliedMinor), openMinor: minor(totalMinor - appliedMinor) };
}
