import { dividedBy, fraction, plus, ratio, roundWhole, times } from "@/modules/kernel/fraction";
import { minor, minorText, sumMinor, type Minor } from "@/modules/kernel/money";
import { ok, refuse, type Result } from "@/modules/kernel/result";

/** Fee of a card provider: percent as decimal text (`"2.7"`) plus a fixed sum per charge. Not returned on a refund. */
export interface FeeSchedule {
  readonly percent: string;
  readonly fixedMinor: Minor;
}

/** Fee of one charge, rounded once: 1,910.33 at 2.7 % + 0.25 is 51.83. */
export const chargeFee = (amountMinor: Minor, fees: FeeSchedule): Minor =>
  minor(roundWhole(plus(dividedBy(times(ratio(amountMinor, 1), fraction(fees.percent)), ratio(100, 1)), ratio(fees.fixedMinor, 1))));

/** The parts of a payout, each as a positive sum except adjustments, which carry their sign. */
export interface PayoutParts {
  readonly charges: readonly { readonly amountMinor: Minor; readonly feeMinor: Minor }[];
  readonly refundsMinor: readonly Minor[];
  readonly disputesMinor: readonly Minor[];
  readonly adjustmentsMinor: readonly Minor[];
}

export interface PayoutSum {
  readonly chargesMinor: Minor;
  readonly feesMinor: Minor;
  /** What leaves clearing: charges - refunds - disputes + adjustments. */
  readonly clearedMinor: Minor;
  /** What reaches the bank: cleared - fees. Below 0 when the provider takes money back. */
  readonly payoutMinor: Minor;
}

export function payoutSum(p: PayoutParts): PayoutSum {
  const chargesMinor = sumMinor(p.charges.map((c) => c.amountMinor));
  const feesMinor = sumMinor(p.charges.map((c) => c.feeMinor));
  const clearedMinor = minor(chargesMinor - sumMinor(p.refundsMinor) - sumMinor(p.disputesMinor) + sumMinor(p.adjustmentsMinor));
  return { chargesMinor, feesMinor, clearedMinor, payoutMinor: minor(clearedMinor - feesMinor) };
}

/** A payout is matched only when it equals its bank line to the cent. Refuses `PAYOUT_DIFFERS` with the difference. */
export function checkPayout(p: PayoutParts, bankLineMinor: Minor): Result<PayoutSum> {
  const sum = payoutSum(p);
  const differenceMinor = sum.payoutMinor - bankLineMinor;
  return differenceMinor === 0
    ? ok(sum)
    : refuse("PAYOUT_DIFFERS", `The parts come to ${minorText(sum.payoutMinor)}, the bank shows ${minorText(bankLineMinor)}: ${minorText(differenceMinor)} is not explained. Find the missing part first.`, {
        data: { differenceMinor },
      });
}
