import { renderToStaticMarkup } from "react-dom/server";
import { describe, expect, it } from "vitest";
import type { BenchView, FamilyView, GearRoom } from "../queries/gear";
import { GearFactorChart } from "./gear-factor-chart";
import { GearTable, type GearView } from "./gear-tables";

const valve = (side: "intake" | "exhaust", position: "left" | "centre" | "right", headMm: number) => ({ side, position, headMm, stemMm: 5.5, seatAngleDeg: 45 });
const family: FamilyView = {
  id: "f", name: "S250-4V", cylinders: 1, boreMm: 77, strokeMm: 53.6, camLiftIntakeUm: 8640, camLiftExhaustUm: null, notes: "", version: 1,
  valves: [valve("intake", "left", 31), valve("intake", "right", 31), valve("exhaust", "left", 26.5), valve("exhaust", "centre", 25), valve("exhaust", "right", 26.5)],
};
const bench: BenchView = {
  id: "b", name: "North", kind: "series_orifice", scale: "direct", ranges: [], waterUnit: "conventional", nominalPressuresInH2O: [28], maxFlowCfm: 400, pressureUncertaintyInH2O: null, readingUncertaintyCfm: null,
  altitudeM: null, active: true, version: 1, check: null,
};
const room: GearRoom = { benches: [bench], plates: [], fixtures: [], liftDevices: [], camshafts: [], families: [family], benchCheckHours: 8, canSetUp: false, canRecord: false, limits: { own: {}, version: 1, maySet: false } };
const text = (view: GearView) => renderToStaticMarkup(<GearTable view={view} room={room} slug="ninebark" locale="en-US" edit={null} when={(iso) => iso} />).replace(/<[^>]+>/g, "|");
const dates = (ats: string[]) => [...renderToStaticMarkup(<GearFactorChart locale="en-US" dateText={(iso) => iso.slice(0, 10)} points={ats.map((at, i) => ({ at, factor: 1 + i / 100, drifted: false }))} />).matchAll(/>(2026-\d\d-\d\d)</g)].map((m) => m[1]);

describe("gear as it is shown", () => {
  it("says the valves of each side of a family by their sizes", () => {
    expect(text("families")).toContain("2 × 31 mm");
    expect(text("families")).toContain("26.5, 25, 26.5 mm");
  });
  it("gives a bench never checked its factor in as many digits as the others", () => {
    expect(text("benches")).toContain("1.0000");
    expect(text("benches")).toContain("never checked");
  });
  it("dates checks of one day once, and others at both ends", () => {
    expect(dates(["2026-02-18T08:00:00Z", "2026-02-18T09:00:00Z"])).toEqual(["2026-02-18"]);
    expect(dates(["2026-02-18T08:00:00Z", "2026-03-18T09:00:00Z"])).toEqual(["2026-02-18", "2026-03-18"]);
  });
});
