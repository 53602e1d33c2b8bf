/** Ends and ticks of an axis that every value lies inside. */
export interface FactorScale { readonly low: number; readonly high: number; readonly ticks: readonly number[]; /** Decimals the ticks need. */ readonly digits: number }

/**
 * Axis of a bench factor over time: round ticks, the outer ones at or beyond the least and the greatest factor, and at least two
 * percent tall so that a steady bench looks steady.
 * @param factors at least one, > 0.
 */
export function factorScale(factors: readonly number[]): FactorScale {
  const [least, most] = [Math.min(...factors), Math.max(...factors)];
  const middle = (least + most) / 2;
  const half = Math.max((most - least) / 2, middle * 0.01);
  const rough = half / 2;
  const power = 10 ** Math.floor(Math.log10(rough));
  const step = ([1, 2, 5, 10].find((n) => n * power >= rough * (1 - 1e-9)) ?? 10) * power;
  const from = Math.floor((middle - half) / step + 1e-9);
  const to = Math.ceil((middle + half) / step - 1e-9);
  const digits = Math.max(0, -Math.floor(Math.log10(step) + 1e-9));
  const ticks = Array.from({ length: to - from + 1 }, (_, i) => Number(((from + i) * step).toFixed(digits)));
  return { low: from * step, high: to * step, ticks, digits };
}
