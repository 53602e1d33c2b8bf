import { describe, expect, it } from "vitest";
import { HERO_FLOWS } from "@/tests/support/hero-flow";
import { heroTest } from "@/tests/support/hero-tests";
import { geometryFlags } from "./geometry-flags";
import { figuresOfTest } from "./test-figures";

const at = (flowCfm: number, more: Partial<Parameters<typeof geometryFlags>[0]> = {}) => geometryFlags({ liftUm: 8000, flowCfm, side: "intake", atInH2O: 28, valveDiametersMm: [31, 31], ...more });

describe("what the valves and the smallest section can pass", () => {
  // Curtain 2 x pi x 31 x 8 = 1558.230 mm2; 170 cfm at 28 in H2O there is a compressible coefficient of 0.496 (worked example of Heywood (6.10)).
  it("170 cfm over two 31 mm valves at 8 mm is usual", () => expect(at(170)).toEqual([]));
  it("300 cfm there is unusual, 400 is impossible", () => {
    expect(at(300)).toEqual(["CD_UNUSUAL"]);
    expect(at(400)).toEqual(["CD_ABOVE_ONE"]);
  });
  it("a lift ten times too large shows: too small a coefficient", () => expect(at(24.6, { liftUm: 12_700 })).toEqual(["CD_UNUSUAL"]));
  // 118 cfm through 560 mm2 is 99.4 m/s, under the ideal speed at 28 in H2O (about 107 m/s); 140 cfm is 118 m/s.
  it("more than the smallest section can pass is said", () => {
    expect(at(118, { minSectionMm2: 560 })).toEqual([]);
    expect(at(140, { minSectionMm2: 560 })).toEqual(["ABOVE_IDEAL_PORT_LIMIT"]);
  });
  it("says nothing where the sizes are not known, or the valve is shut", () => {
    expect(at(400, { valveDiametersMm: [] })).toEqual([]);
    expect(at(3, { liftUm: 0 })).toEqual([]);
  });
  it("the hero head has none of it with its two 31 mm valves", () => {
    const flags = figuresOfTest(heroTest("intake", "after"), { valveDiametersMm: [31, 31], before: HERO_BEFORE }).cells.flatMap((c) => c.flags);
    expect(flags).toEqual([]);
  });
});

const HERO_BEFORE = heroTest("intake", "before").cells.map((c) => ({ liftUm: c.liftUm, flowCfm: Number(c.valueText) }));

describe("an after test held against its before test", () => {
  const doubts = (first: number, before = HERO_BEFORE) => figuresOfTest(heroTest("intake", "after", { flows: [first, ...HERO_FLOWS.intake.after.slice(1)] }), { before }).doubts;
  it("a gain over 40 % at a lift is unusual, there and nowhere else", () => {
    expect(doubts(24.6 * 1.41)).toEqual(expect.arrayContaining([{ flag: "GAIN_UNUSUAL", liftUm: 1270 }]));
    expect(doubts(24.6 * 1.39).filter((d) => d.flag === "GAIN_UNUSUAL")).toEqual([]);
  });
  it("lifts the before test has not read are not judged", () => {
    expect(doubts(24.6 * 1.41, HERO_BEFORE.slice(1)).filter((d) => d.flag === "GAIN_UNUSUAL")).toEqual([]);
  });
});
