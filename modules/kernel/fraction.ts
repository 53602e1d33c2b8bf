import { divideHalfUp, parseDecimal } from "./money";

/** An exact fraction; the denominator is always positive. For averages, rates and roots that must not drift. */
export interface Fraction {
  readonly num: bigint;
  readonly den: bigint;
}

/** @throws RangeError when `den` is 0. */
export function ratio(num: number | bigint, den: number | bigint): Fraction {
  const n = BigInt(num);
  const d = BigInt(den);
  if (d === 0n) throw new RangeError("division by zero");
  return d < 0n ? { num: -n, den: -d } : { num: n, den: d };
}

/**
 * A decimal text (`"7.35"`) as an exact fraction.
 * @throws RangeError when the text is not a plain decimal.
 */
export function fraction(text: string): Fraction {
  const p = parseDecimal(text);
  if (!p) throw new RangeError(`not a decimal: ${text}`);
  return { num: p.units, den: 10n ** BigInt(p.scale) };
}

export const plus = (a: Fraction, b: Fraction): Fraction => ratio(a.num * b.den + b.num * a.den, a.den * b.den);
export const times = (a: Fraction, b: Fraction): Fraction => ratio(a.num * b.num, a.den * b.den);
/** @throws RangeError when `b` is 0. */
export const dividedBy = (a: Fraction, b: Fraction): Fraction => ratio(a.num * b.den, a.den * b.num);
/** Negative, 0 or positive, like the callback of a sort. */
export const compareFractions = (a: Fraction, b: Fraction): number => {
  const d = a.num * b.den - b.num * a.den;
  return d < 0n ? -1 : d > 0n ? 1 : 0;
};

/** Whole number nearest to `f`, half-up on the absolute value. */
export const roundWhole = (f: Fraction): bigint => divideHalfUp(f.num, f.den);

/** Plain decimal text with a fixed count of decimals, half-up on the absolute value: 1/3 at 4 -> `"0.3333"`. */
export function fixedText(f: Fraction, decimals: number): string {
  const units = divideHalfUp(f.num * 10n ** BigInt(decimals), f.den);
  const s = (units < 0n ? -units : units).toString().padStart(decimals + 1, "0");
  const body = decimals === 0 ? s : `${s.slice(0, -decimals)}.${s.slice(-decimals)}`;
  return units < 0n ? `-${body}` : body;
}
