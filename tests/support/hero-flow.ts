import type { ReadingSetConditions, PortSide } from "@/modules/flow/domain/comparison-reasons";
import type { ReadingSet } from "@/modules/flow/domain/shop-comparison";

/** The flow figures of docs/hero-job.md: 28 inH2O, cam lift 0.340 in. */
export const HERO_LIFTS_UM = [1270, 2540, 3810, 5080, 6350, 7620, 8890, 10160] as const;
export const HERO_CAM_UM = 8636;
export const HERO_FLOWS = {
  intake: {
    before: [24.6, 48.9, 71.2, 90.8, 106.5, 117.9, 124.4, 127.0],
    after: [25.0, 51.6, 76.9, 99.7, 118.2, 131.8, 140.1, 143.6],
  },
  exhaust: {
    before: [21.8, 43.0, 60.7, 74.1, 83.6, 89.7, 93.1, 94.8],
    after: [22.3, 44.9, 64.8, 80.2, 91.5, 98.8, 103.2, 105.1],
  },
} as const;

export const heroConditions = (side: PortSide, when: "before" | "after", change: Partial<ReadingSetConditions> = {}): ReadingSetConditions => ({
  side,
  benchId: "bench-1",
  benchName: "the flow bench",
  fixtureId: "fixture-77",
  fixtureName: "77",
  fixtureBoreMm: 77,
  nominalInH2O: 28,
  entry: side === "intake" ? "radius" : "none",
  valvesOpen: ["left", "right"],
  liftsUm: HERO_LIFTS_UM,
  benchCheckAt: when === "before" ? new Date("2026-02-26T15:40:00Z") : new Date("2026-03-12T15:05:00Z"),
  takenAt: when === "before" ? new Date("2026-02-26T17:00:00Z") : new Date("2026-03-12T16:45:00Z"),
  operator: "June Castellano",
  benchFactor: 1.004,
  valve: "31 mm",
  seat: when === "before" ? "original, cleaned" : "new cut",
  ...change,
});

export const heroSet = (side: PortSide, when: "before" | "after", change: Partial<ReadingSetConditions> = {}): ReadingSet => ({
  conditions: heroConditions(side, when, change),
  readings: HERO_LIFTS_UM.map((liftUm, i) => ({ liftUm, flowCfm: HERO_FLOWS[side][when][i] ?? Number.NaN })),
});
