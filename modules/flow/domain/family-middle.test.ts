import { describe, expect, it } from "vitest";
import { middleCurve } from "./family-middle";

const curve = (liftsUm: number[], flows: number[]) => liftsUm.map((liftUm, i) => ({ liftUm, flowCfm: flows[i] ?? Number.NaN }));

describe("middle curve of a family", () => {
  // Worked by hand: middle of three is the second, of four the mean of the second and the third.
  it("is the median at each lift of tests on one ladder", () => {
    const lifts = [1000, 2000, 3000];
    const three = [curve(lifts, [20, 40, 60]), curve(lifts, [26, 44, 58]), curve(lifts, [22, 41, 70])];
    expect(middleCurve(three).map((p) => [p.flowCfm, p.n])).toEqual([[22, 3], [41, 3], [60, 3]]);
    expect(middleCurve([...three, curve(lifts, [24, 50, 64])])[0]).toEqual({ liftUm: 1000, flowCfm: 23, n: 4 });
  });
  // PCHIP through (0,0) and the published data of the interpolation check: 1..9 mm, 99.788 cfm at 6.35 mm.
  it("brings a test on another ladder to the lifts of the newest, instead of jumping between the two", () => {
    const mm = curve([1, 2, 3, 4, 5, 6, 7, 8, 9].map((v) => v * 1000), [18.4, 37.9, 56.3, 73.1, 87, 97.2, 103.4, 106.1, 107]);
    const inch = curve([1270, 6350, 8890], [24.6, 99.788, 106.9]);
    const middle = middleCurve([inch, mm]);
    expect(middle.map((p) => p.liftUm)).toEqual([1270, 6350, 8890]);
    expect(middle[1]?.flowCfm).toBeCloseTo(99.788, 3);
    expect(middle.every((p, i, all) => i === 0 || p.flowCfm >= (all[i - 1]?.flowCfm ?? 0))).toBe(true);
  });
  it("extends nobody, and leaves out what fewer than half reach", () => {
    const far = curve([1000, 2000, 3000], [20, 40, 60]);
    const short = curve([1000, 2000], [20, 40]);
    expect(middleCurve([far, short]).at(-1)).toEqual({ liftUm: 3000, flowCfm: 60, n: 1 });
    expect(middleCurve([far, short, short]).map((p) => p.liftUm)).toEqual([1000, 2000]);
  });
  it("is empty without tests", () => expect(middleCurve([])).toEqual([]));
});
