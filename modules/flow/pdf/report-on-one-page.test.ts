import { describe, expect, it } from "vitest";
import { heroTest, readAgain } from "@/tests/support/hero-tests";
import { reportOf } from "@/tests/support/report-snapshot";
import type { NamedCam } from "../domain/comparison-means";
import type { RawTest } from "../domain/raw-test";
import { AIRFLOW_WORDS, type ReportSnapshot } from "../domain/report-snapshot";
import { DENSITIES, flowReport } from "./flow-report";
import { pagesOf, reportPaper } from "./report-on-one-page";

const HISTORY = { pooledCfm: 0.2, pairs: 24 };
const CAM: NamedCam = { label: "Sport 272", maxLiftUm: 8636, durationDeg: 240, profile: [] };
const LONG_SEATS = "45° seats cut at 30/45/60 with 1.2 mm faces, lapped and blued all round, exhaust inserts renewed in sintered alloy";
const BOTH = (["intake", "exhaust"] as const).flatMap((side) => (["before", "after"] as const).map((when) => ({ side, when })));
const hero = (more: Partial<RawTest> = {}): RawTest[] => BOTH.map(({ side, when }) => heroTest(side, when, more));

/** `count` lifts up to .480 in; the lowest two lose, and so does the highest. */
function ladder(count: number, more: (when: "before" | "after") => Partial<RawTest> = () => ({})): RawTest[] {
  const lifts = Array.from({ length: count }, (_, i) => Math.round((12_192 * (i + 1)) / count));
  return BOTH.map(({ side, when }): RawTest => {
    const test = heroTest(side, when, { ...more(when), lifts: lifts.map((liftUm) => ({ liftUm, text: String(liftUm) })) });
    const flow = (i: number) => (side === "intake" ? 24 : 20) + (100 * i) / count + (when === "before" ? 0 : i < 2 || i === count - 1 ? -0.9 : 2 + (i % 3));
    return { ...test, cells: lifts.map((liftUm, i) => ({ ...(test.cells[0] as RawTest["cells"][number]), liftUm, valueText: flow(i).toFixed(1) })) };
  });
}
const leftOut = (t: RawTest): RawTest => ({ ...t, cells: t.cells.map((c) => (c.repeatNo === 3 && c.liftUm > 10_000 && c.liftUm < 11_000 ? { ...c, excludedReason: "indicator had slipped" } : c)) });

const PAPERS: Record<string, ReportSnapshot> = {
  "8 lifts, plain": reportOf(hero()),
  "8 lifts with a cam, on A4": reportOf(hero(), { cam: CAM, locale: "de-DE" }),
  "8 lifts of one side before only": reportOf([heroTest("intake", "before")]),
  "10 lifts with repeats, history, losses, notes, a cam, long seat words and a report replaced": reportOf(
    ladder(10, (when) => ({ history: HISTORY, seatNote: when === "before" ? LONG_SEATS : `${LONG_SEATS} (new)`, valveMm: when === "before" ? 31 : 31.5, operator: { id: when, name: when === "before" ? "June Castellano" : "Anselm Quist" }, benchFactor: when === "before" ? 1.0045394160089691 : 1.0101 })).map((t) => leftOut(readAgain(t, [0.3, -0.2], t.lifts.slice(5).map((l) => l.liftUm)))),
    { cam: CAM, cylinders: 4, comparisonNo: 2, replaces: { comparisonNo: 1, issuedAt: "2026-03-11T18:00:00.000Z", why: "intake after corrected (wrong range plate)" }, customerWords: "Ported to the drawing we spoke about; the low lifts give a little away for what comes above .200." },
  ),
  "24 lifts": reportOf(ladder(24)),
  "24 lifts with repeats, history, losses, a cam and long seat words": reportOf(ladder(24, () => ({ history: HISTORY, seatNote: LONG_SEATS })).map((t) => readAgain(t, [0.3], t.lifts.slice(12).map((l) => l.liftUm))), { cam: CAM }),
};
/** Every size of type in a paper's description. */
const sizes = (node: unknown): number[] => (Array.isArray(node) ? node.flatMap(sizes) : typeof node === "object" && node !== null ? Object.entries(node).flatMap(([k, v]) => (k === "fontSize" ? [Number(v)] : sizes(v))) : []);

describe("a report stands on one page", () => {
  it.each(Object.entries(PAPERS))("%s", async (_, s) => {
    const bytes = await reportPaper(s);
    expect(pagesOf(bytes)).toBe(1);
    expect((await reportPaper(s)).equals(bytes)).toBe(true);
  });
  it.each(Object.entries(PAPERS))("with type of at least 7.5 points: %s", (_, s) => {
    for (const density of DENSITIES) {
      const content = flowReport(s, density).content;
      expect(Math.min(...sizes(content))).toBeGreaterThanOrEqual(7.5);
      expect(JSON.stringify(content)).toContain(AIRFLOW_WORDS);
    }
  });
  it("names no pressure on an axis that two of them share", () => {
    const text = (tests: readonly RawTest[]) => JSON.stringify(flowReport(reportOf(tests)).content);
    expect(text(hero())).toContain("CFM at 28 in H₂O");
    const apart = text([...hero().slice(0, 1), heroTest("intake", "after", { nominalInH2O: 25 })]);
    expect(apart).toContain("CFM at pressures that differ, see below");
    expect(apart).not.toMatch(/CFM at 2[58] in/);
  });
});
