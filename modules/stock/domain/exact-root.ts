import { ratio, type Fraction } from "@/modules/kernel/fraction";

/** Largest whole number whose square does not exceed `n` (Newton's method on whole numbers). */
export function wholeRoot(n: bigint): bigint {
  if (n < 0n) throw new RangeError("no root of a negative number");
  if (n < 2n) return n;
  let x = 1n << BigInt((n.toString(2).length + 1) >> 1);
  for (;;) {
    const y = (x + n / x) >> 1n;
    if (y >= x) return x;
    x = y;
  }
}

const GRID = 10n ** 12n;

/**
 * Square root of a fraction, cut off (not rounded) at 12 decimals, and whether that is the exact root.
 * Good for deciding "is it above this whole number" without binary fractions.
 */
export function rootOf(f: Fraction): { readonly floor: Fraction; readonly isExact: boolean } {
  const scaled = f.num * f.den * GRID * GRID;
  const root = wholeRoot(scaled);
  const floor = ratio(root / f.den, GRID);
  return { floor, isExact: floor.num * floor.num * f.den === f.num * floor.den * floor.den };
}

/** Smallest whole number not below `whole part + root`. */
export function ceilingOfSum(exact: Fraction, root: { readonly floor: Fraction; readonly isExact: boolean }): bigint {
  const num = exact.num * root.floor.den + root.floor.num * exact.den;
  const den = exact.den * root.floor.den;
  const down = num >= 0n || num % den === 0n ? num / den : num / den - 1n;
  return num % den === 0n && root.isExact ? down : down + 1n;
}
