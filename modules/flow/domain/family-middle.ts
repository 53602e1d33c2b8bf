import { median } from "./family-gains";
import { monotoneCurve } from "./monotone-curve";
import type { LiftReading } from "./repeats";

export interface MiddlePoint extends LiftReading {
  /** Tests that reach this lift. */
  readonly n: number;
}

/**
 * The middle flow of several tests, at the lifts of the first (newest) one: tests read at other lifts are interpolated there, so
 * that a ladder in millimetres beside one in inches does not make the curve jump from test to test. No test is extended past
 * its last reading; a lift that fewer than half of the tests reach is left out.
 * @param curves readings of each test, lifts increasing, newest test first. Source: median; interpolation as `monotoneCurve`.
 */
export function middleCurve(curves: readonly (readonly LiftReading[])[]): MiddlePoint[] {
  const made = curves.flatMap((readings) => {
    const curve = monotoneCurve(readings.map((r) => ({ lift: r.liftUm, flowCfm: r.flowCfm })), { addZero: true });
    return curve.ok ? [curve.value] : [];
  });
  const ladder = curves.find((c) => c.length > 0)?.map((r) => r.liftUm) ?? [];
  return ladder.flatMap((liftUm) => {
    const flows = made.flatMap((c) => c.knotAt(liftUm)?.flowCfm ?? []);
    return flows.length === 0 || flows.length * 2 < made.length ? [] : [{ liftUm, flowCfm: median(flows), n: flows.length }];
  });
}
