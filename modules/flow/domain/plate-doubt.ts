import { DRIFT_SHARE_MAX, type BenchFactor } from "./bench-factor";

/** A plate that misses by more after the factor is asked. Common practice, no source. */
export const RESIDUAL_ASK_PERCENT = 5;
/** No bench moves so far, and no plate wears so much, between two checks: a slip of the keys. Common practice, no source. */
export const MISTYPED_SHARE = 0.2;

export interface FlowedPlate { readonly serial: string; readonly referenceCfm: number; readonly indicatedCfm: number }
export interface CheckDoubt {
  readonly code: "PLATE_MISTYPED" | "PLATE_OFF" | "FACTOR_MOVED";
  readonly words: string;
}

const middle = (values: readonly number[]): number => {
  const sorted = [...values].sort((a, b) => a - b);
  const at = (i: number) => sorted[i] ?? 1;
  return sorted.length % 2 === 1 ? at((sorted.length - 1) / 2) : (at(sorted.length / 2 - 1) + at(sorted.length / 2)) / 2;
};
const round = (value: number, digits: number): string => String(Number(value.toFixed(digits)));

/**
 * What is asked before a bench check is kept: a factor or plate so far off that a digit was mistyped, a plate that misses the
 * others, a factor that drifted. Null: nothing to ask. Kept all the same with a reason.
 * @param plates flowed, at least one, both flows > 0, cfm. @param lastFactor of the check before; left out on a bench never checked,
 * which is judged against 1 for slips only: its first factor may be anything.
 */
export function checkDoubt(input: { plates: readonly FlowedPlate[]; made: BenchFactor; lastFactor?: number }): CheckDoubt | null {
  const { plates, made, lastFactor } = input;
  // What the plates ought to show: by the last factor, else by what most of them agree on, else as certified.
  const base = lastFactor ?? (plates.length > 2 ? middle(plates.map((p) => p.referenceCfm / p.indicatedCfm)) : 1);
  const off = plates.map((p) => ({ p, share: Math.abs((p.indicatedCfm * base) / p.referenceCfm - 1) })).sort((a, b) => b.share - a.share);
  const worst = off[0]?.p;
  if (!worst) return null;
  const moved = Math.abs(made.factor / (lastFactor ?? 1) - 1);
  if (moved > MISTYPED_SHARE || made.maxResidualPercent > MISTYPED_SHARE * 100) {
    return {
      code: "PLATE_MISTYPED",
      words: `Plate ${worst.serial} shows ${round(worst.indicatedCfm, 1)} CFM where about ${round(worst.referenceCfm / base, 1)} was to be expected, and the factor would become ${made.factor.toFixed(4)}. That reads like a slip of the keys. Type it again, or say why it stands.`,
    };
  }
  if (made.maxResidualPercent > RESIDUAL_ASK_PERCENT) {
    const miss = [...plates].sort((a, b) => Math.abs(1 - (made.factor * b.indicatedCfm) / b.referenceCfm) - Math.abs(1 - (made.factor * a.indicatedCfm) / a.referenceCfm))[0] ?? worst;
    return { code: "PLATE_OFF", words: `Plate ${miss.serial} is off by ${round(made.maxResidualPercent, 1)} % after the factor. Look at the plate, its seat and what was typed; flow it again, or say why it stands.` };
  }
  if (lastFactor !== undefined && moved > DRIFT_SHARE_MAX) {
    return { code: "FACTOR_MOVED", words: `The factor moves by ${round(moved * 100, 2)} %, from ${lastFactor.toFixed(4)} to ${made.factor.toFixed(4)}; more than 1 % is drift. Flow the plates again, or say what changed.` };
  }
  return null;
}
