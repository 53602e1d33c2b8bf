import type { SideGain } from "./side-gain";

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

/** Gains of several ports, lift by lift. Only comparable ports speak; the others have no figure to give. */
export function gainsByLift(gains: readonly SideGain[]): LiftGains[] {
  const byLift = new Map<number, GainDot[]>();
  gains.forEach((gain, port) => {
    if (gain.state !== "comparable") return;
    for (const row of gain.rows) byLift.set(row.liftUm, [...(byLift.get(row.liftUm) ?? []), { liftUm: row.liftUm, gainCfm: row.gainCfm, port }]);
  });
  return [...byLift].sort(([a], [b]) => a - b).map(([liftUm, dots]) => ({
    liftUm, dots: [...dots].sort((a, b) => b.gainCfm - a.gainCfm), n: dots.length, medianCfm: median(dots.map((d) => d.gainCfm)),
    losses: dots.filter((d) => d.gainCfm < 0).length, isThin: dots.length < THIN_BELOW,
  }));
}
