import { milli, milliText, type Milli } from "@/modules/kernel/quantity";
import { ok, refuse, type Result } from "@/modules/kernel/result";

/**
 * Stock units in one purchase unit as an exact fraction: a 1,000 g kit = 1000 / 1; a 10 lb tube of rod with
 * 24 sticks to the pound = 240 / 1; sold in pairs, counted in pieces = 2 / 1.
 */
export interface UnitFactor {
  readonly num: number;
  readonly den: number;
}

/** Refuses `FACTOR_MISSING`: a part without a factor above 0 cannot be purchased. */
function checkFactor(factor: UnitFactor | null): Result<UnitFactor> {
  return factor && Number.isSafeInteger(factor.num) && Number.isSafeInteger(factor.den) && factor.num > 0 && factor.den > 0
    ? ok(factor)
    : refuse("FACTOR_MISSING", "Say how many stock units are in one purchase unit: a whole number or fraction above 0.", { field: "factor" });
}

/**
 * Purchase units to stock units. Refuses `FACTOR_MISSING`, and `NOT_WHOLE_THOUSANDTHS` when the result would
 * have to be rounded.
 */
export function toStockUnits(purchasedMilli: Milli, factor: UnitFactor | null): Result<Milli> {
  const f = checkFactor(factor);
  if (!f.ok) return f;
  const num = BigInt(purchasedMilli) * BigInt(f.value.num);
  const den = BigInt(f.value.den);
  return num % den === 0n
    ? ok(milli(num / den))
    : refuse("NOT_WHOLE_THOUSANDTHS", "This does not come to a whole thousandth of the stock unit. Change the quantity or the factor.", { field: "qty" });
}

/** Parts counted in pieces have no half: refuses `NOT_WHOLE_PIECES`. */
export function checkPieces(qtyMilli: Milli, isCountedInPieces: boolean): Result<Milli> {
  if (!isCountedInPieces || qtyMilli % 1000 === 0) return ok(qtyMilli);
  return refuse("NOT_WHOLE_PIECES", `${milliText(qtyMilli)} is not a whole number. This part is counted in pieces.`, { field: "qty" });
}
