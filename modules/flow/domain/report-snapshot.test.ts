import { describe, expect, it } from "vitest";
import { heroTest, readAgain } from "@/tests/support/hero-tests";
import { valueOf } from "@/tests/support/value-of";
import type { RawTest } from "./raw-test";
import { replacedWhy } from "./report-replaces";
import { notTestedWords, reportTest } from "./report-snapshot";
import { sideGain } from "./side-gain";
import { standingTests } from "./standing-tests";

const without = (test: RawTest, liftUm: number, repeats: readonly number[], reason: string): RawTest => ({ ...test, cells: test.cells.map((c) => (c.liftUm === liftUm && repeats.includes(c.repeatNo) ? { ...c, excludedReason: reason } : c)) });
const wordsOf = (before: RawTest, after = heroTest("intake", "after")) => {
  const standing = standingTests([before, after], "intake", "complete");
  return notTestedWords([{ side: "intake", standing, gain: valueOf(sideGain(standing, "intake", 8)) }], 1, 1, (um) => (um / 25_400).toFixed(3)).join(" ");
};

describe("what was not tested", () => {
  it("tells a reading that was left out from a lift that was never read", () => {
    const bare = heroTest("intake", "before");
    const test = without({ ...bare, cells: bare.cells.filter((c) => c.liftUm !== 2540) }, 7620, [1], "clay had moved.");
    expect(wordsOf(test)).toContain("Intake before: 0.300 read and left out: clay had moved. Intake before: 0.100 planned, not read.");
    expect(wordsOf(bare)).not.toMatch(/left out|not read\./);
  });
  it("speaks of a lift only when every reading of it was left out, each reason once", () => {
    const twice = readAgain(heroTest("intake", "before"), [0.2], [7620]);
    expect(wordsOf(without(twice, 7620, [2], "valve stuck"))).not.toContain("left out");
    expect(wordsOf(without(twice, 7620, [1, 2], "valve stuck"))).toContain("0.300 read and left out: valve stuck.");
    expect(reportTest(without(twice, 7620, [2], "valve stuck")).leftOut).toEqual([{ liftUm: 7620, repeatNo: 2, flowCfm: 118.1, reason: "valve stuck", isWhole: false }]);
  });
});

describe("why a report is issued again", () => {
  const last = { testIds: ["intake-before", "intake-after"], isReworded: false };
  const [before, after] = [heroTest("intake", "before"), heroTest("intake", "after")];
  it("names the test that was corrected, and the reason given", () => {
    const corrected = { ...after, id: "c", correctsTestId: "intake-after", notes: "Corrects run 1: wrong range plate.\nwarm day" };
    expect(replacedWhy([before, corrected], last)).toBe("intake after corrected (wrong range plate)");
    expect(replacedWhy([{ ...before, id: "n" }, corrected], { ...last, isReworded: true })).toBe("intake before flowed since; intake after corrected (wrong range plate); words to the customer changed");
  });
  it("says what else differs where the tests are the same", () => {
    expect(replacedWhy([before, after], { ...last, isReworded: true })).toBe("words to the customer changed");
    expect(replacedWhy([before], last)).toBe("a test was put out of use");
    expect(replacedWhy([before, after], last)).toBe("what is said of the noise or the cam changed");
  });
});
