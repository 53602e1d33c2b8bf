import { allocate, minor, type Minor } from "@/modules/kernel/money";
import { type Milli } from "@/modules/kernel/quantity";
import { ok, refuse, type Result } from "@/modules/kernel/result";

export interface PriceVariance {
  /** Bill minus receipt. */
  readonly differenceMinor: Minor;
  /** Share of the units still on the shelf: changes their value. */
  readonly toStockMinor: Minor;
  /** Share of the units already used: purchase price variance. */
  readonly toVarianceMinor: Minor;
  /** Over the tolerance, so a person decides before it is booked. */
  readonly asksPerson: boolean;
}

/**
 * A supplier's bill that differs from the receipt. Cost already issued is not rewritten.
 * `toleranceBp` and `toleranceMinor`: the larger of the two is tolerated (shop rule, 2 % or 5.00 to begin with).
 * Refuses `ON_HAND_OUT_OF_RANGE` when more is on hand than was received.
 */
export function priceVariance(p: {
  readonly receivedMilli: Milli;
  readonly onHandMilli: Milli;
  readonly receiptValueMinor: Minor;
  readonly billedMinor: Minor;
  readonly toleranceBp: number;
  readonly toleranceMinor: Minor;
}): Result<PriceVariance> {
  if (p.onHandMilli < 0 || p.onHandMilli > p.receivedMilli) {
    return refuse("ON_HAND_OUT_OF_RANGE", "The quantity left of a receipt lies between 0 and what was received.", { field: "onHand" });
  }
  const differenceMinor = minor(p.billedMinor - p.receiptValueMinor);
  const [stock, variance] = allocate(differenceMinor, [p.onHandMilli, p.receivedMilli - p.onHandMilli]);
  const tolerated = Math.max(p.toleranceMinor, (p.receiptValueMinor * p.toleranceBp) / 10_000);
  return ok({
    differenceMinor,
    toStockMinor: minor(stock ?? 0),
    toVarianceMinor: minor(variance ?? 0),
    asksPerson: Math.abs(differenceMinor) > tolerated,
  });
}
