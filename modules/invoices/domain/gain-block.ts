import type { ShopComparison } from "@/modules/flow/domain/shop-comparison";
import type { PortSide } from "@/modules/flow/domain/comparison-reasons";

/** One side of one port as it is printed: both tables, and the gain only where the sets are comparable. */
export interface GainSide {
  readonly side: PortSide;
  readonly cylinder: number;
  readonly comparison: ShopComparison;
  /** Pressure the flows are stated at, inches of water. */
  readonly atInH2O: number;
  /** Micrometres; null when no cam is recorded. */
  readonly camLiftUm: number | null;
  /** `Bench 1, adapter 77, test springs`: what held for both. */
  readonly conditions: string;
}

/** What an invoice says about the air a piece flows. `comparable: false` prints the reasons and no difference. */
export type PieceGain =
  | { readonly comparable: true; readonly sides: readonly GainSide[] }
  | { readonly comparable: false; readonly reasons: readonly string[]; readonly sides: readonly GainSide[] };

export const NOT_MEASURED: PieceGain = { comparable: false, reasons: ["No flow was measured on this piece before and after the work."], sides: [] };

/** Comparable when at least one side is; reasons of the others stand beside it. */
export function pieceGain(sides: readonly GainSide[]): PieceGain {
  if (sides.length === 0) return NOT_MEASURED;
  if (sides.some((s) => s.comparison.comparable)) return { comparable: true, sides };
  const reasons = sides.flatMap((s) => (s.comparison.comparable ? [] : s.comparison.reasons.map((r) => r.words)));
  return { comparable: false, reasons: [...new Set(reasons)], sides };
}

/** The readings of a side as the curve wants them. */
export function readingsOf(s: GainSide): { before: { liftUm: number; flowCfm: number }[]; after: { liftUm: number; flowCfm: number }[] } {
  const rows = [...s.comparison.rows, ...(s.comparison.comparable ? s.comparison.unpairedRows : [])].sort((a, b) => a.liftUm - b.liftUm);
  return {
    before: rows.flatMap((r) => (r.beforeCfm === null ? [] : [{ liftUm: r.liftUm, flowCfm: r.beforeCfm }])),
    after: rows.flatMap((r) => (r.afterCfm === null ? [] : [{ liftUm: r.liftUm, flowCfm: r.afterCfm }])),
  };
}
