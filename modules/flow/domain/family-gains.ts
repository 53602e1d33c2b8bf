import { ok, type Result } from "@/modules/kernel/result";
import type { RawTest } from "./raw-test";
import type { LiftReading } from "./repeats";
import { compareSets, type ShopComparison } from "./shop-comparison";
import { readingSetOf } from "./test-figures";

export interface GainDot {
  readonly liftUm: number;
  readonly gainCfm: number;
  /** Which port it is, in the order given. */
  readonly port: number;
}
export interface LiftGains {
  readonly liftUm: number;
  /** Every port's gain at this lift, largest first. Losses are negative. */
  readonly dots: readonly GainDot[];
  readonly n: number;
  readonly medianCfm: number;
  readonly losses: number;
  /** Fewer than three ports: too few to speak of the family. Our choice. */
  readonly isThin: boolean;
}

export const THIN_BELOW = 3;

/** Middle value; the mean of the two middle ones of an even count. NaN of nothing. */
export function median(values: readonly number[]): number {
  const sorted = [...values].sort((a, b) => a - b);
  const half = sorted.length / 2;
  const [low, high] = [sorted[Math.ceil(half) - 1], sorted[Math.floor(half)]];
  return low === undefined || high === undefined ? Number.NaN : (low + high) / 2;
}

/** What is kept of a finished test, so that it need not be computed from its cells again. */
export interface KeptFigures {
  readonly readings: readonly LiftReading[];
  readonly isConverted: boolean;
}

/**
 * One port before against after, from the figures kept of both tests; null without a before test. No verdict against the noise:
 * that needs the single readings. @param benchCheckHoursMax the shop's limit, hours. Errors: as `compareSets`.
 */
export function portChange(input: { before: { test: RawTest; figures: KeptFigures } | null; after: { test: RawTest; figures: KeptFigures }; benchCheckHoursMax: number }): Result<ShopComparison | null> {
  const { before, after, benchCheckHoursMax } = input;
  if (!before) return ok(null);
  return compareSets({
    before: readingSetOf(before.test, before.figures), after: readingSetOf(after.test, after.figures), camLiftUm: after.test.camLiftUm ?? before.test.camLiftUm, benchCheckHoursMax,
  });
}

/** Gains of several ports, lift by lift. Only comparable ports speak; the others have no figure to give. */
export function gainsByLift(changes: readonly (ShopComparison | null)[]): LiftGains[] {
  const byLift = new Map<number, GainDot[]>();
  changes.forEach((change, port) => {
    if (!change?.comparable) return;
    for (const { liftUm, gainCfm } of change.rows) {
      const dots = byLift.get(liftUm) ?? [];
      dots.push({ liftUm, gainCfm, port });
      byLift.set(liftUm, dots);
    }
  });
  return [...byLift].sort(([a], [b]) => a - b).map(([liftUm, dots]) => ({
    liftUm, dots: [...dots].sort((a, b) => b.gainCfm - a.gainCfm), n: dots.length, medianCfm: median(dots.map((d) => d.gainCfm)),
    losses: dots.filter((d) => d.gainCfm < 0).length, isThin: dots.length < THIN_BELOW,
  }));
}
