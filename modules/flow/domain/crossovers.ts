import { ok, type Result } from "@/modules/kernel/result";
import { gainTable, type BeforeAfter } from "./gain";
import { neighbours } from "./neighbours";

export interface Crossover {
  readonly lift: number;
  readonly direction: "loss_to_gain" | "gain_to_loss";
}

/**
 * Lifts at which loss turns to gain or gain to loss, on the straight line between the gains: `L1 + (L2 - L1) d1/(d1 - d2)`.
 * A run of exactly zero gain between opposite signs crosses at its first point.
 * Source: linear interpolation of the difference.
 */
export function crossoversOf(gains: readonly { readonly lift: number; readonly gainCfm: number }[]): Crossover[] {
  const signed = gains.filter((g) => g.gainCfm !== 0);
  return neighbours(signed).flatMap(([a, b]) => {
    if (Math.sign(a.gainCfm) === Math.sign(b.gainCfm)) return [];
    const zero = gains.find((g) => g.lift > a.lift && g.lift < b.lift);
    const lift = zero ? zero.lift : a.lift + ((b.lift - a.lift) * a.gainCfm) / (a.gainCfm - b.gainCfm);
    return [{ lift, direction: a.gainCfm < 0 ? ("loss_to_gain" as const) : ("gain_to_loss" as const) }];
  });
}

/** Crossovers of two tests, and every tested lift with a loss. Errors: as `gainTable`. */
export function crossovers(input: BeforeAfter): Result<{ crossovers: readonly Crossover[]; lossLifts: readonly number[] }> {
  const table = gainTable(input);
  if (!table.ok) return table;
  return ok({ crossovers: crossoversOf(table.value), lossLifts: table.value.filter((r) => r.gainCfm < 0).map((r) => r.lift) });
}
