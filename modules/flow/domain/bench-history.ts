import { withoutDust } from "./gain";
import type { BenchHistory } from "./noise";
import type { RawTest } from "./raw-test";
import type { LiftReading } from "./repeats";

/** What the repeats of one test, or of many, say of their spread. */
export interface RepeatSums {
  /** Sum over the lifts of the squared differences from the mean of that lift, cfm2, >= 0. */
  readonly squaresCfm2: number;
  /** Sum over the lifts of readings less one, >= 0: two readings of a lift are one repeat pair. */
  readonly dof: number;
}

/**
 * Spread of the readings within each lift; the level of a lift does not count.
 * Every lift with at least two counting readings counts alike, in cfm at the test's nominal pressure: common practice, no source.
 * Spread grows somewhat with flow, so what is pooled is careful at low lifts and a little bold at the highest.
 * @param readings counting readings, excluded ones left out, any order.
 */
export function repeatSums(readings: readonly LiftReading[]): RepeatSums {
  const byLift = new Map<number, number[]>();
  for (const r of readings) byLift.set(r.liftUm, [...(byLift.get(r.liftUm) ?? []), r.flowCfm]);
  return [...byLift.values()].filter((flows) => flows.length >= 2).reduce<RepeatSums>((sums, flows) => {
    const mean = flows.reduce((a, b) => a + b, 0) / flows.length;
    // Alike readings give nothing, not the dust of their mean.
    return { squaresCfm2: sums.squaresCfm2 + withoutDust(flows.reduce((s, v) => s + (v - mean) ** 2, 0)), dof: sums.dof + flows.length - 1 };
  }, { squaresCfm2: 0, dof: 0 });
}

/**
 * Pooled standard deviation of repeats, cfm: root of the sum of squares within over the sum of degrees of freedom. No repeat: 0 of 0 pairs.
 * Source: JCGM 100:2008 (GUM) 4.2.4 and note to H.3.6; IUPAC Gold Book, "pooled standard deviation".
 */
export const pooledHistory = ({ squaresCfm2, dof }: RepeatSums): BenchHistory => ({ pooledCfm: dof === 0 ? 0 : Math.sqrt(squaresCfm2 / dof), pairs: dof });

/** From after `since` up to and with `until`, ISO instants. */
export interface HistorySpan {
  readonly since: string;
  readonly until: string;
}

/** The twelve months up to a test, by the calendar in UTC; from 29 February they begin on 1 March. */
export function historySpan(startedAt: string): HistorySpan {
  const since = new Date(startedAt);
  since.setUTCFullYear(since.getUTCFullYear() - 1);
  return { since: since.toISOString(), until: startedAt };
}

/** Spans that touch made one, so that no row is read twice; earliest first. */
export function joinedSpans(spans: readonly HistorySpan[]): HistorySpan[] {
  return [...spans].sort((a, b) => a.since.localeCompare(b.since)).reduce<HistorySpan[]>((joined, span) => {
    const last = joined.at(-1);
    if (!last || span.since > last.until) return [...joined, span];
    return [...joined.slice(0, -1), { since: last.since, until: span.until > last.until ? span.until : last.until }];
  }, []);
}

/** Tests that may be the newer of two of one side: only these are asked for a history. */
export const mayBeNewer = <T extends Pick<RawTest, "id" | "side" | "state" | "startedAt">>(tests: readonly T[]): T[] => {
  const live = tests.filter((t) => t.state !== "void");
  return live.filter((t) => live.some((other) => other.id !== t.id && other.side === t.side && other.startedAt <= t.startedAt));
};

/** History for a comparison: of the bench, up to the newer of the two tests; undefined when it was not asked for. */
export const historyOfPair = (before: Pick<RawTest, "startedAt" | "history">, after: Pick<RawTest, "startedAt" | "history">): BenchHistory | undefined =>
  (before.startedAt > after.startedAt ? before : after).history;
