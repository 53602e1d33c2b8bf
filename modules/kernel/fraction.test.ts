import { describe, expect, it } from "vitest";
import { compareFractions, dividedBy, fixedText, fraction, plus, ratio, roundWhole, times } from "./fraction";

describe("exact fractions", () => {
  it.each([
    ["2.345", 2, "2.35"],
    ["-2.345", 2, "-2.35"],
    ["0.005", 2, "0.01"],
    ["1.2549", 2, "1.25"],
    ["0.4", 0, "0"],
    ["-0.004", 2, "0.00"],
  ])("prints %s with %i decimals as %s (half away from zero)", (text, decimals, printed) => {
    expect(fixedText(fraction(text), decimals)).toBe(printed);
  });

  it("adds, multiplies and divides without loss", () => {
    const third = ratio(1, 3);
    expect(compareFractions(plus(plus(third, third), third), fraction("1"))).toBe(0);
    expect(compareFractions(times(third, fraction("0.3")), ratio(1, 10))).toBe(0);
    expect(compareFractions(dividedBy(fraction("1"), ratio(-2, 3)), fraction("-1.5"))).toBe(0);
    expect(compareFractions(third, fraction("0.3333"))).toBe(1);
    expect(compareFractions(fraction("0.3333"), third)).toBe(-1);
  });

  it("rounds to the nearest whole", () => {
    expect(roundWhole(fraction("2.5"))).toBe(3n);
    expect(roundWhole(fraction("-2.5"))).toBe(-3n);
  });

  it("refuses what is no number and a zero divisor", () => {
    expect(() => fraction("1,5")).toThrow(RangeError);
    expect(() => ratio(1, 0)).toThrow(RangeError);
    expect(() => dividedBy(fraction("1"), fraction("0"))).toThrow(RangeError);
  });
});
