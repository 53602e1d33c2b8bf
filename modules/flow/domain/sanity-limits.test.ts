import { describe, expect, it } from "vitest";
import { HERO_FLOWS } from "@/tests/support/hero-flow";
import { heroTest } from "@/tests/support/hero-tests";
import { flagWords } from "./flag-words";
import { FLOW_FLAGS, LIFT_FLAGS, type FlowFlag, type LiftFlag } from "./flow-flags";
import { crossedLimits, keptLimit, LIMIT_FACTS, LIMIT_KEYS, ownLimits, SANITY_LIMITS, sanityLimits, shownLimit } from "./sanity-limits";
import { figuresOfTest, type FiguresBeside } from "./test-figures";
import type { RawTest } from "./raw-test";
import { zeroReturnWords } from "./zero-return";

// The limits themselves are common practice without a source; what is tried is that the one that was set is the one that counts.
describe("limits of the checks", () => {
  it("are the product's where the shop set none, and the shop's own over them", () => {
    expect(sanityLimits({})).toEqual(SANITY_LIMITS);
    expect(sanityLimits(null)).toEqual(SANITY_LIMITS);
    expect(sanityLimits({ gainShare: 0.25 })).toEqual({ ...SANITY_LIMITS, gainShare: 0.25 });
  });
  it("leave out what is no number, out of its range or no limit", () => {
    expect(ownLimits({ gainShare: "0.25", leakShare: Number.NaN, cdHigh: 4, fallShare: -1, toString: 3, other: 1 })).toEqual({});
    expect(ownLimits([1, 2])).toEqual({});
    expect(ownLimits({ fallShare: 0.2, percentHigh: 100 })).toEqual({ fallShare: 0.2, percentHigh: 100 });
  });
  it.each(LIMIT_KEYS)("%s: the product's lies in its own range and comes back as typed", (key) => {
    const shown = shownLimit(key, SANITY_LIMITS[key]);
    expect(shown).toBeGreaterThanOrEqual(LIMIT_FACTS[key].min);
    expect(shown).toBeLessThanOrEqual(LIMIT_FACTS[key].max);
    expect(keptLimit(key, shown)).toBe(SANITY_LIMITS[key]);
    for (const typed of [LIMIT_FACTS[key].min, LIMIT_FACTS[key].max, 7, 33.3]) expect(shownLimit(key, keptLimit(key, typed))).toBe(typed);
  });
  it("a lower one at or over its upper one is found", () => {
    expect(crossedLimits(SANITY_LIMITS)).toEqual([]);
    expect(crossedLimits({ ...SANITY_LIMITS, cdLow: 0.8 })).toEqual([["cdLow", "cdHigh"]]);
    expect(crossedLimits({ ...SANITY_LIMITS, percentHigh: 20 })).toEqual([["percentLow", "percentHigh"]]);
  });
});

describe("a limit that was set", () => {
  const flagsOf = (test: RawTest, own: object, beside: FiguresBeside = {}): string[] => {
    const figures = figuresOfTest({ ...test, limits: sanityLimits(own) }, beside);
    return [...figures.cells.flatMap((c) => c.flags), ...figures.doubts.map((d) => d.flag)];
  };
  const scale = (percent: string) => {
    const test = heroTest("intake", "before", { bench: { id: "b", name: "B", scale: "percent_linear", ranges: [{ label: "100", fullScaleCfm: 100 }], waterUnit: "conventional" } });
    return { ...test, cells: test.cells.slice(0, 1).map((c) => ({ ...c, valueText: percent, valueUnit: "percent" as const, rangeLabel: "100" })) };
  };
  const held = (pressure: string) => { const t = heroTest("intake", "before"); return { ...t, cells: t.cells.map((c) => ({ ...c, pressureText: pressure })) }; };
  const flows = HERO_FLOWS.intake.before;
  const before = heroTest("intake", "before").cells.map((c) => ({ liftUm: c.liftUm, flowCfm: Number(c.valueText) }));
  const last = flows.at(-1) ?? 0;
  const first = flows[0] ?? 0;
  const shut = heroTest("intake", "before");
  /** Flag, test, limits under which it is quiet, limits under which it speaks. */
  it.each<[FlowFlag | LiftFlag, RawTest, object, object, FiguresBeside?]>([
    ["FLOW_FALLS_WITH_LIFT", heroTest("intake", "before", { flows: [...flows.slice(0, -1), (flows.at(-2) ?? 0) * 0.97] }), { fallShare: 0.04 }, { fallShare: 0.02 }],
    ["FLOW_AT_ZERO_LIFT", { ...shut, cells: [...shut.cells.slice(0, 1).map((c) => ({ ...c, liftUm: 0, valueText: "1" })), ...shut.cells] }, { zeroLiftExtraCfm: 1.5 }, {}],
    ["READING_LOW_IN_RANGE", scale("35"), {}, { percentLow: 40 }],
    ["READING_HIGH_IN_RANGE", scale("96"), {}, { percentHigh: 95 }],
    ["PRESSURE_OFF_NOMINAL", held("26"), {}, { offNominalShare: 0.05 }],
    ["OUTLIER", heroTest("intake", "before", { flows: [...flows.slice(0, -1), last * 1.35] }), { outlierTimesMedian: 20 }, {}],
    ["OUTLIER", heroTest("intake", "before", { flows: [...flows.slice(0, -1), last * 1.35] }), { outlierShareMin: 0.5 }, {}],
    ["GAIN_UNUSUAL", heroTest("intake", "after", { flows: [first * 1.3, ...flows.slice(1)] }), {}, { gainShare: 0.25 }, { before }],
    ["LIFT_ZERO_DRIFT", heroTest("intake", "before", { zeroReturnUm: 80 }), { zeroDriftMm: 0.1 }, {}],
    ["LEAK_HIGH", heroTest("intake", "before", { leakText: "1" }), {}, { leakShare: 0.03 }],
    ["CD_UNUSUAL", heroTest("intake", "after"), {}, { cdHigh: 0.4 }, { valveDiametersMm: [31, 31] }],
    ["CD_UNUSUAL", heroTest("intake", "after"), {}, { cdLow: 0.45 }, { valveDiametersMm: [31, 31] }],
  ])("decides %s", (flag, test, quiet, speaks, beside) => {
    expect(flagsOf(test, quiet, beside)).not.toContain(flag);
    expect(flagsOf(test, speaks, beside)).toContain(flag);
  });
  it("changes what is doubted and no figure", () => {
    const test = heroTest("intake", "before", { leakText: "1" });
    const strict = figuresOfTest({ ...test, limits: sanityLimits({ leakShare: 0.005, fallShare: 0.001, offNominalShare: 0.02 }) });
    expect(strict.readings).toEqual(figuresOfTest(test).readings);
  });
  it("decides beside the field of the indicator too", () => {
    expect(zeroReturnWords("0.08", "mm")).toBe(FLOW_FLAGS.LIFT_ZERO_DRIFT);
    expect(zeroReturnWords("0.08", "mm", sanityLimits({ zeroDriftMm: 0.1 }))).toBeNull();
  });
});

describe("a doubt in words", () => {
  it("by the product's limits says what it always said", () => {
    for (const [flag, words] of [...Object.entries(FLOW_FLAGS), ...Object.entries(LIFT_FLAGS)]) expect(flagWords(flag as FlowFlag | LiftFlag)).toBe(words);
  });
  it("names the shop's limit", () => {
    const limits = sanityLimits({ gainShare: 0.125, cdLow: 0.255, leakShare: 0.07, offNominalShare: 0.05 });
    expect(flagWords("GAIN_UNUSUAL", limits)).toBe("Gain over 12.5 %. Check range and pressure of both tests.");
    expect(flagWords("CD_UNUSUAL", limits)).toContain("outside 0.255 to 0.80.");
    expect(flagWords("LEAK_HIGH", limits)).toContain("over 7 % of the reading");
    expect(flagWords("PRESSURE_OFF_NOMINAL", limits)).toContain("more than 5 % off");
  });
});
