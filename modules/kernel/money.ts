/** Money is a whole number of minor units (cents) beside an ISO 4217 currency. Never a binary fraction. */
declare const minorBrand: unique symbol;
export type Minor = number & { readonly [minorBrand]: true };

/**
 * Whole minor units.
 * @throws RangeError when the value is not a safe whole number: that is a bug, not bad input.
 */
export function minor(value: number | bigint): Minor {
  const n = Number(value);
  if (!Number.isSafeInteger(n)) throw new RangeError(`not whole minor units: ${String(value)}`);
  return (n === 0 ? 0 : n) as Minor;
}

export const ZERO = minor(0);

export const sumMinor = (values: readonly number[]): Minor => minor(values.reduce((a, b) => a + b, 0));

/**
 * `num / den` rounded half-up on the absolute value (half away from zero), so that a credit note
 * mirrors its invoice. Exact whole-number arithmetic.
 * Source: R.I. Gen. Laws 44-18.1-25(A) (third decimal over four rounds up); sign rule is ours.
 */
export function divideHalfUp(num: bigint, den: bigint): bigint {
  if (den === 0n) throw new RangeError("division by zero");
  const sign = num < 0n !== den < 0n ? -1n : 1n;
  const n = num < 0n ? -num : num;
  const d = den < 0n ? -den : den;
  return sign * ((n * 2n + d) / (d * 2n));
}

/** A decimal text as an exact fraction of `10^scale`. `"7.35"` -> `{ units: 735n, scale: 2 }`. */
export function parseDecimal(text: string): { units: bigint; scale: number } | null {
  const m = /^([+-]?)(\d+)(?:\.(\d+))?$/.exec(text.trim());
  if (!m) return null;
  const frac = m[3] ?? "";
  const units = BigInt(`${m[2]}${frac}`);
  return { units: m[1] === "-" ? -units : units, scale: frac.length };
}

/** `amount * rate` for a rate written as a decimal text (`"0.0735"`), rounded half-up to whole minor units. */
export function timesDecimal(amount: number, rate: string): Minor {
  const r = parseDecimal(rate);
  if (!r) throw new RangeError(`not a decimal: ${rate}`);
  return minor(divideHalfUp(BigInt(amount) * r.units, 10n ** BigInt(r.scale)));
}

/** `amount * num / den`, rounded half-up to whole minor units. */
export const timesFraction = (amount: number, num: number | bigint, den: number | bigint): Minor =>
  minor(divideHalfUp(BigInt(amount) * BigInt(num), BigInt(den)));

/** Percent in basis points (7.35 % = 735) of an amount, rounded half-up. */
export const basisPointsOf = (amount: number, bp: number): Minor => timesFraction(amount, bp, 10_000);

/** `qtyMilli` thousandths of a unit at a unit price in minor units. */
export const extend = (unitMinor: number, qtyMilli: number): Minor => timesFraction(unitMinor, qtyMilli, 1000);

/**
 * Share a whole total over weights, to the unit, by largest remainder; the earlier line wins a tie.
 * Works for money and for whole minutes. Weights must not be negative; if all are 0 the first line takes all.
 * Source: largest remainder (Hamilton) method.
 */
export function allocate(total: number, weights: readonly (number | bigint)[]): number[] {
  if (weights.length === 0) return [];
  const w = weights.map((x) => BigInt(x));
  if (w.some((x) => x < 0n)) throw new RangeError("weights must not be negative");
  const sum = w.reduce((a, b) => a + b, 0n);
  if (sum === 0n) return weights.map((_, i) => (i === 0 ? total : 0));
  const sign = total < 0 ? -1 : 1;
  const t = BigInt(Math.abs(total));
  const parts = w.map((x, i) => ({ i, whole: (t * x) / sum, rest: (t * x) % sum }));
  let left = t - parts.reduce((a, p) => a + p.whole, 0n);
  const out = parts.map((p) => p.whole);
  for (const p of [...parts].sort((a, b) => (b.rest > a.rest ? 1 : b.rest < a.rest ? -1 : a.i - b.i))) {
    if (left === 0n) break;
    out[p.i] = (out[p.i] ?? 0n) + 1n;
    left -= 1n;
  }
  return out.map((x) => Number(x) * sign);
}

/**
 * Amount as typed (`1,910.33`, `1910,33`, `1910`) to minor units, or null when it is not one.
 * More decimals than the currency has are refused, never rounded.
 */
export function parseMinor(text: string, decimals = 2): Minor | null {
  const s = text.trim().replace(/[\s\u00a0']/g, "");
  const normal = /^-?\d{1,3}(,\d{3})+(\.\d+)?$/.test(s)
    ? s.replaceAll(",", "")
    : /^-?\d{1,3}(\.\d{3})+,\d+$/.test(s)
      ? s.replaceAll(".", "").replace(",", ".")
      : s.replace(",", ".");
  const p = parseDecimal(normal);
  if (!p || p.scale > decimals) return null;
  const units = p.units * 10n ** BigInt(decimals - p.scale);
  return units > BigInt(Number.MAX_SAFE_INTEGER) || units < -BigInt(Number.MAX_SAFE_INTEGER) ? null : minor(units);
}

/** Plain decimal text, for files and form fields: `191033` -> `"1910.33"`. */
export function minorText(amount: number, decimals = 2): string {
  const s = Math.abs(amount).toString().padStart(decimals + 1, "0");
  const body = decimals === 0 ? s : `${s.slice(0, -decimals)}.${s.slice(-decimals)}`;
  return amount < 0 ? `-${body}` : body;
}
