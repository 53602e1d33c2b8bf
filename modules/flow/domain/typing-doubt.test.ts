import { describe, expect, it } from "vitest";
import { heroTest } from "@/tests/support/hero-tests";
import type { RawTest } from "./raw-test";
import { figuresOfTest } from "./test-figures";
import { mayBecomeNumber, typingDoubt } from "./typing-doubt";

const percent: Partial<RawTest> = { bench: { id: "b", name: "Bench 1", scale: "percent_linear", ranges: [{ label: "100", fullScaleCfm: 100 }], waterUnit: "conventional" } };
/** The doubt as the sheet sees it after each key: the cell computed among the others of the hero test. */
function typing(text: string, more: Partial<RawTest> = {}, acceptedReason: string | null = null) {
  const test = heroTest("intake", "before", { state: "draft", ...more });
  const cells = test.cells.map((c) => (c.liftUm === 3810 ? { ...c, valueText: text, acceptedReason, ...(more.bench ? { valueUnit: "percent" as const, rangeLabel: "100" } : {}) } : c));
  return typingDoubt(text, figuresOfTest({ ...test, cells }).cells.find((c) => c.liftUm === 3810) ?? null);
}

describe("a reading while it is typed", () => {
  it.each(["", "-", "1", "1,", ".", "-.", "7", "71", "71.2"])("%j may still become a sound one", (text) => expect(typing(text)).toBeNull());
  it.each([["abc", "not a number"], ["7a", "not a number"], ["1.2.3", "not a number"], ["1O6", "not a number"]])("%s is marked at once", (text, words) => expect(typing(text)).toMatchObject({ kind: "refused", words: expect.stringContaining(words) as string }));
  it("beyond the end of the scale is marked at once, up to it is not", () => {
    expect(typing("101", percent)).toMatchObject({ kind: "refused", words: expect.stringContaining("outside the scale") as string });
    expect(typing("100", percent)).toBeNull();
  });
  it("below zero and above 2000 CFM is asked at once, unless a reason stands", () => {
    expect(typing("-5")).toMatchObject({ kind: "asked" });
    expect(typing("2001")).toMatchObject({ kind: "asked" });
    expect(typing("-5", {}, "zero of the meter was off")).toBeNull();
  });
  it("knows what may become a number", () => {
    expect(["", "-", "1,", ".5", "12."].map(mayBecomeNumber)).toEqual([true, true, true, true, true]);
    expect(["--", "1.2.", "e", "1 2"].map(mayBecomeNumber)).toEqual([false, false, false, false]);
  });
});
