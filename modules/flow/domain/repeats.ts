import { withoutDust } from "./gain";

/** Repeats further apart than this share are read again. Common practice, no source. */
export const REPEAT_SHARE_MAX = 0.01;

export interface LiftReading {
  readonly liftUm: number;
  readonly flowCfm: number;
}
export interface LiftMean extends LiftReading {
  readonly count: number;
  /** Largest less smallest, as a share of the mean; 0 for a single reading. */
  readonly spreadShare: number;
  readonly agrees: boolean;
}

/** Repeat readings folded to one for each lift, lifts increasing. The raw readings stay as they are. */
export function meanOfRepeats(readings: readonly LiftReading[]): LiftMean[] {
  const byLift = new Map<number, number[]>();
  for (const r of readings) byLift.set(r.liftUm, [...(byLift.get(r.liftUm) ?? []), r.flowCfm]);
  return [...byLift]
    .sort(([a], [b]) => a - b)
    .map(([liftUm, flows]) => {
      const mean = flows.reduce((a, b) => a + b, 0) / flows.length;
      const spread = Math.max(...flows) - Math.min(...flows);
      const spreadShare = mean === 0 ? 0 : withoutDust(spread / Math.abs(mean));
      return { liftUm, flowCfm: withoutDust(mean), count: flows.length, spreadShare, agrees: spreadShare <= REPEAT_SHARE_MAX };
    });
}
