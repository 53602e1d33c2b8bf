import type { PortSide } from "@/modules/flow/domain/comparison-reasons";
import type { RawTest } from "@/modules/flow/domain/raw-test";
import { HERO_FLOWS, HERO_LIFTS_UM } from "./hero-flow";

export const HERO_FIXTURES = { "77": { id: "f77", name: "77", boreMm: 77 }, "79": { id: "f79", name: "79", boreMm: 79.5 } } as const;

/** One finished test of the hero head, raw as the records hold it. */
export function heroTest(side: PortSide, when: "before" | "after", more: Partial<RawTest> & { flows?: readonly number[] } = {}): RawTest {
  const { flows = HERO_FLOWS[side][when], ...rest } = more;
  const day = when === "before" ? "2026-02-26" : "2026-03-12";
  return {
    id: `${side}-${when}`, side, purpose: when === "before" ? "baseline" : "after", runNo: 1, state: "complete", version: 2,
    bench: { id: "b", name: "Bench 1", scale: "direct", ranges: [], waterUnit: "conventional" }, benchFactor: 1, benchCheckedAt: `${day}T15:40:00.000Z`, fixture: HERO_FIXTURES["77"], nominalInH2O: 28,
    lifts: HERO_LIFTS_UM.map((liftUm) => ({ liftUm, text: (liftUm / 25_400).toFixed(3) })), liftUnit: "in", camLiftUm: 8636, entry: side === "intake" ? "radius" : "none", valvesOpen: "all", valveMm: 31,
    seatNote: when === "before" ? "baseline on the cleaned original seats" : "new cut", plugClosed: true, testSprings: true, warmUpMinutes: null, roomTemperatureText: "71 °F", roomPressureText: "", roomHumidityText: "",
    leakText: "", leakPressureText: "", notes: "", operator: { id: "june", name: "June" }, startedAt: `${day}T16:30:00.000Z`, completedAt: `${day}T17:00:00.000Z`, correctsTestId: null, voidReason: null,
    cells: flows.map((flow, i) => ({ liftUm: HERO_LIFTS_UM[i] ?? 0, repeatNo: 1, revision: 1, valueText: String(flow), valueUnit: "cfm", rangeLabel: null, pressureText: "28", pressureUnit: "inH2O", acceptedReason: null, excludedReason: null, takenAt: `${day}T16:40:00.000Z` })),
    ...rest,
  };
}

/** The same test with further readings at its lifts: `off` is added to each first reading. */
export const readAgain = (test: RawTest, off: readonly number[], liftsUm?: readonly number[]): RawTest => ({
  ...test,
  cells: test.cells.flatMap((c) => [c, ...(liftsUm && !liftsUm.includes(c.liftUm) ? [] : off.map((d, i) => ({ ...c, repeatNo: i + 2, valueText: (Number(c.valueText) + d).toFixed(1) })))]),
});
