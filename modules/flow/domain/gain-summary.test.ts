import { describe, expect, it } from "vitest";
import { gainTable } from "./gain";
import { gainSummary } from "./gain-summary";

const lifts = [0.05, 0.1, 0.15, 0.2, 0.25, 0.3, 0.35, 0.4];
const rowsOf = (beforeCfm: number[], afterCfm: number[], at = lifts) => {
  const t = gainTable({ lifts: at, beforeCfm, afterCfm });
  if (!t.ok) throw new Error(t.refusal.code);
  return t.value;
};

describe("gain in one line", () => {
  // Both tables of docs/hero-job.md.
  it.each([
    [[24.6, 48.9, 71.2, 90.8, 106.5, 117.9, 124.4, 127], [25, 51.6, 76.9, 99.7, 118.2, 131.8, 140.1, 143.6], 9.45, 10.63, 16.6],
    [[21.8, 43, 60.7, 74.1, 83.6, 89.7, 93.1, 94.8], [22.3, 44.9, 64.8, 80.2, 91.5, 98.8, 103.2, 105.1], 6.25, 8.92, 10.3],
  ])("averages %o against %o", (before, after, averageGainCfm, percent, peakGainCfm) => {
    const s = gainSummary(rowsOf(before, after));
    expect(s).toMatchObject({ averageGainCfm, peakGainCfm, peakLift: 0.4 });
    expect(s?.averageGainPercent).toBeCloseTo(percent, 2);
  });

  it("shows a loss as a loss, and the lower of two equal peaks", () => {
    expect(gainSummary(rowsOf([10, 20, 30], [9, 19, 28], [1, 2, 3]))).toMatchObject({ peakGainCfm: -1, peakLift: 1 });
    expect(gainSummary(rowsOf([0, 0], [1, 1], [1, 2]))).toMatchObject({ averageGainPercent: null, averageGainCfm: 1 });
    expect(gainSummary([])).toBeNull();
  });
});
