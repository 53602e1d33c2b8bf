import { describe, expect, it } from "vitest";
import { HERO_CAM_UM, HERO_LIFTS_UM, heroConditions, heroSet } from "@/tests/support/hero-flow";
import { refusalOf, valueOf } from "@/tests/support/value-of";
import type { ReadingSetConditions, WithheldCode } from "./comparison-reasons";
import { meanOfRepeats } from "./repeats";
import { compareSets, type ComparableSets, type ReadingSet, type ShopComparison } from "./shop-comparison";

/** scipy.interpolate.PchipInterpolator (SciPy 1.17.1) of each test, (0, 0) added, at 0.340 in. */
const SCIPY_AT_CAM = { before: 123.513510, after: 138.936440 } as const;

function comparable(c: ShopComparison): ComparableSets {
  if (!c.comparable) throw new Error(c.reasons.map((r) => r.words).join(" "));
  return c;
}
const hero = (side: "intake" | "exhaust") => comparable(valueOf(compareSets({ before: heroSet(side, "before"), after: heroSet(side, "after"), camLiftUm: HERO_CAM_UM })));

describe("gain of the hero job", () => {
  it("hero intake, docs/hero-job.md: mean gain 9.45, 10.63 %", () => {
    const c = hero("intake");
    expect(c.rows.map((r) => r.gainCfm)).toEqual([0.4, 2.7, 5.7, 8.9, 11.7, 13.9, 15.7, 16.6]);
    expect(c.meanGainCfm).toBe(9.45);
    expect(c.meanPercent).toBeCloseTo(10.63, 2);
    expect(c.meanBeforeCfm).toBeCloseTo(88.91, 2);
    expect(c.meanAfterCfm).toBeCloseTo(98.36, 2);
    expect(c.peak).toEqual({ liftUm: 10160, gainCfm: 16.6 });
    expect(c.losses).toEqual([]);
    expect(c.crossovers).toEqual([]);
  });
  it("hero exhaust, docs/hero-job.md: mean gain 6.25, 8.92 %", () => {
    const c = hero("exhaust");
    expect(c.rows.map((r) => r.gainCfm)).toEqual([0.5, 1.9, 4.1, 6.1, 7.9, 9.1, 10.1, 10.3]);
    expect(c.meanGainCfm).toBe(6.25);
    expect(c.meanPercent).toBeCloseTo(8.92, 2);
    expect(c.meanBeforeCfm).toBeCloseTo(70.1, 2);
    expect(c.meanAfterCfm).toBeCloseTo(76.35, 2);
    expect(c.peak).toEqual({ liftUm: 10160, gainCfm: 10.3 });
  });
  it("at cam lift 0.340 in lies between the gains at 0.300 and 0.350", () => {
    const at = hero("intake").atCamLift;
    if (typeof at === "string") throw new Error(at);
    expect(at.beforeCfm).toBeCloseTo(SCIPY_AT_CAM.before, 5);
    expect(at.afterCfm).toBeCloseTo(SCIPY_AT_CAM.after, 5);
    expect(at.gainCfm).toBeCloseTo(SCIPY_AT_CAM.after - SCIPY_AT_CAM.before, 5);
  });
  it("seats differ and that is printed, not forbidden", () => {
    expect(hero("intake").notes.map((n) => n.words)).toEqual(["Seats: before original, cleaned, after new cut."]);
  });
});

describe("a gain is withheld with the reason", () => {
  const HOUR = 3_600_000;
  const takenAt = heroConditions("intake", "after").takenAt;
  const cases: readonly (readonly [WithheldCode, Partial<ReadingSetConditions>, string])[] = [
    ["SIDE_DIFFERS", { side: "exhaust" }, "Before is intake, after is exhaust."],
    ["BENCH_DIFFERS", { benchId: "bench-2", benchName: "the old bench" }, "Before was read on the flow bench, after on the old bench."],
    ["FIXTURE_BORE_DIFFERS", { fixtureId: "fixture-80", fixtureName: "80", fixtureBoreMm: 80 }, "Bore fixture differs: before 77 mm, after 80 mm."],
    ["FIXTURE_DIFFERS", { fixtureId: "fixture-77b", fixtureName: "77 B" }, "Another fixture of like bore: before 77, after 77 B."],
    ["PRESSURE_DIFFERS", { nominalInH2O: 10 }, "Test pressure differs: before 28 in H₂O, after 10 in H₂O."],
    ["ENTRY_DIFFERS", { entry: "clay" }, "Before was read with a radius entry, after with a clay entry."],
    ["VALVES_OPEN_DIFFER", { valvesOpen: ["left"] }, "Open valves differ: before left, right, after left."],
    ["LIFTS_DIFFER", { liftsUm: HERO_LIFTS_UM.slice(1) }, "The two sets were read at different lifts."],
    ["BENCH_CHECK_MISSING", { benchCheckAt: null }, "No bench check was made before the after readings."],
    ["BENCH_CHECK_MISSING", { benchCheckAt: new Date(takenAt.getTime() + HOUR) }, "No bench check was made before the after readings."],
    [
      "BENCH_CHECK_OLD",
      { benchCheckAt: new Date(takenAt.getTime() - 9.5 * HOUR) },
      "The bench check was 9.5 h old when the after readings were taken; it holds for 8 h.",
    ],
  ];
  it.each(cases)("%s", (code, change, words) => {
    const c = valueOf(compareSets({ before: heroSet("intake", "before"), after: heroSet("intake", "after", change), camLiftUm: HERO_CAM_UM }));
    if (c.comparable) throw new Error("compared");
    expect(c.reasons).toEqual([{ code, words }]);
    // Both tables stand, and no key of the answer can carry a difference.
    expect(c.rows).toHaveLength(8);
    expect(Object.keys(c).sort()).toEqual(["comparable", "notes", "reasons", "rows"]);
    for (const row of c.rows) expect(Object.keys(row).sort()).toEqual(["afterCfm", "beforeCfm", "liftUm"]);
    expect(JSON.stringify(c).toLowerCase()).not.toContain("gain");
  });
  it("an 8 h old check still holds; the shop's own limit is used", () => {
    const at = (h: number, limit?: number) =>
      valueOf(
        compareSets({
          before: heroSet("intake", "before"),
          after: heroSet("intake", "after", { benchCheckAt: new Date(takenAt.getTime() - h * HOUR) }),
          camLiftUm: null,
          ...(limit === undefined ? {} : { benchCheckHoursMax: limit }),
        }),
      ).comparable;
    expect([at(8), at(8.01), at(8.01, 12), at(4, 3)]).toEqual([true, false, true, false]);
  });
  it("gives all reasons at once", () => {
    const c = valueOf(
      compareSets({ before: heroSet("intake", "before"), after: heroSet("intake", "after", { entry: "none", nominalInH2O: 10, benchCheckAt: null }), camLiftUm: null }),
    );
    expect(c.comparable ? [] : c.reasons.map((r) => r.code)).toEqual(["PRESSURE_DIFFERS", "ENTRY_DIFFERS", "BENCH_CHECK_MISSING"]);
  });
  it("nothing read after yet", () => {
    const c = valueOf(compareSets({ before: heroSet("intake", "before"), after: { ...heroSet("intake", "after"), readings: [] }, camLiftUm: null }));
    expect(c.comparable ? [] : c.reasons.map((r) => r.code)).toEqual(["NO_COMMON_LIFT"]);
  });
});

describe("losses and unfinished sets", () => {
  const withFlows = (when: "before" | "after", flows: readonly number[]): ReadingSet => ({
    conditions: heroConditions("exhaust", when, { liftsUm: flows.map((_, i) => (i + 1) * 1000) }),
    readings: flows.map((flowCfm, i) => ({ liftUm: (i + 1) * 1000, flowCfm })),
  });
  it("lists losses and where they turn; figures of check case P-CROSS-01", () => {
    const c = comparable(
      valueOf(
        compareSets({
          before: withFlows("before", [14.2, 27.8, 40.1, 50.6, 58.4, 63.0]),
          after: withFlows("after", [13.6, 27.5, 41.9, 54.8, 64.9, 71.3]),
          camLiftUm: 7000,
        }),
      ),
    );
    expect(c.losses.map((r) => [r.liftUm, r.gainCfm])).toEqual([
      [1000, -0.6],
      [2000, -0.3],
    ]);
    expect(c.crossovers).toHaveLength(1);
    expect(c.crossovers[0]?.lift).toBeCloseTo(2142.857, 2);
    expect(c.crossovers[0]?.direction).toBe("loss_to_gain");
    expect(c.atCamLift).toBe("not_tested");
  });
  it("means over the lifts read in both; the others stand apart without a difference", () => {
    const after = heroSet("intake", "after");
    const c = comparable(valueOf(compareSets({ before: heroSet("intake", "before"), after: { ...after, readings: after.readings.slice(0, 3) }, camLiftUm: null })));
    expect(c.rows.map((r) => r.liftUm)).toEqual([1270, 2540, 3810]);
    expect(c.meanGainCfm).toBeCloseTo((0.4 + 2.7 + 5.7) / 3, 6);
    expect(c.unpairedRows).toHaveLength(5);
    expect(c.unpairedRows[0]).toEqual({ liftUm: 5080, beforeCfm: 90.8, afterCfm: null });
    expect(c.atCamLift).toBe("not_given");
  });
  it("before of zero has no percent", () => {
    const c = comparable(valueOf(compareSets({ before: withFlows("before", [0, 10]), after: withFlows("after", [1, 11]), camLiftUm: null })));
    expect(c.rows.map((r) => r.gainPercent)).toEqual([null, 10]);
    expect(c.meanPercent).toBeCloseTo(20, 9);
  });
  it("refuses a lift read twice; repeats are folded first and told when they disagree", () => {
    const before = heroSet("intake", "before");
    const twice = { ...before, readings: [...before.readings, { liftUm: 5080, flowCfm: 92.8 }] };
    expect(refusalOf(compareSets({ before: twice, after: heroSet("intake", "after"), camLiftUm: null }))).toMatchObject({ code: "LIFTS_NOT_INCREASING", field: "before" });
    const folded = meanOfRepeats(twice.readings);
    expect(folded).toHaveLength(8);
    expect(folded.find((r) => r.liftUm === 5080)).toMatchObject({ flowCfm: 91.8, count: 2, agrees: false });
    expect(folded.filter((r) => r.agrees)).toHaveLength(7);
  });
});
