import { parseDecimal } from "./money";

/** Quantities are whole thousandths of the stock unit: 2 valves = 2000, 42.5 g = 42500. */
declare const milliBrand: unique symbol;
export type Milli = number & { readonly [milliBrand]: true };

/** @throws RangeError when the value is not a safe whole number. */
export function milli(value: number | bigint): Milli {
  const n = Number(value);
  if (!Number.isSafeInteger(n)) throw new RangeError(`not whole thousandths: ${String(value)}`);
  return (n === 0 ? 0 : n) as Milli;
}

/** `pieces(2)` = 2000 thousandths. */
export const pieces = (n: number): Milli => milli(n * 1000);

/** Quantity as typed, with comma or point, at most three decimals; null when it is not one. */
export function parseMilli(text: string): Milli | null {
  const p = parseDecimal(text.trim().replace(",", "."));
  if (!p || p.scale > 3) return null;
  return milli(p.units * 10n ** BigInt(3 - p.scale));
}

/** `2000` -> `"2"`, `42500` -> `"42.5"`. */
export function milliText(q: number): string {
  const s = (Math.abs(q) / 1000).toFixed(3).replace(/\.?0+$/, "");
  return q < 0 ? `-${s}` : s;
}
