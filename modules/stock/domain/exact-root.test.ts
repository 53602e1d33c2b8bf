import fc from "fast-check";
import { describe, expect, it } from "vitest";
import { fixedText, fraction, ratio } from "@/modules/kernel/fraction";
import { ceilingOfSum, rootOf, wholeRoot } from "./exact-root";

describe("exact roots", () => {
  it.each([[0n, 0n], [1n, 1n], [3n, 1n], [4n, 2n], [62_499n, 249n], [62_500n, 250n], [10n ** 40n, 10n ** 20n], [10n ** 40n - 1n, 10n ** 20n - 1n]])(
    "whole root of %s is %s", (n, root) => expect(wholeRoot(n)).toBe(root),
  );

  it("is the largest whole number whose square fits", () => {
    fc.assert(fc.property(fc.bigInt({ min: 0n, max: 10n ** 36n }), (n) => {
      const r = wholeRoot(n);
      expect(r * r <= n && (r + 1n) * (r + 1n) > n).toBe(true);
    }));
  });

  it("takes roots of fractions and knows the exact ones", () => {
    expect(rootOf(fraction("2.25"))).toEqual({ floor: ratio(1_500_000_000_000n, 10n ** 12n), isExact: true });
    const three = rootOf(fraction("3"));
    expect(fixedText(three.floor, 4)).toBe("1.7321");
    expect(three.isExact).toBe(false);
  });

  it.each([
    ["30", "43.56", 37n],
    ["10", "4", 12n],
    ["10", "4.000001", 13n],
    ["9.9", "0", 10n],
    ["10", "0", 10n],
  ])("the ceiling of %s + root of %s is %s", (whole, square, up) => {
    expect(ceilingOfSum(fraction(whole), rootOf(fraction(square)))).toBe(up);
  });

  it("refuses a negative number", () => expect(() => wholeRoot(-1n)).toThrow(RangeError));
});
