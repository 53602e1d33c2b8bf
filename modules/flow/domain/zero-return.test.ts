import { describe, expect, it } from "vitest";
import { refusalOf, valueOf } from "@/tests/support/value-of";
import { heroTest } from "@/tests/support/hero-tests";
import { figuresOfTest } from "./test-figures";
import { zeroReturnUm, zeroReturnWords } from "./zero-return";

describe("the indicator after the last lift", () => {
  // 1 in = 25.4 mm by definition.
  it.each([["0", "in", 0], ["-.002", "in", -51], ["0,05", "mm", 50], ["0.05 mm", "in", 50], [".002 in", "mm", 51], ["", "in", null]] as const)("%s in %s is %s um", (text, unit, um) => expect(valueOf(zeroReturnUm(text, unit))).toBe(um));
  it.each([["back", "NUMBER_NOT_FINITE"], ["6 mm", "READING_OUT_OF_RANGE"]])("refuses %s", (text, code) => expect(refusalOf(zeroReturnUm(text, "in"))).toMatchObject({ code, field: "zeroReturn" }));
  it("says so beyond 0.05 mm either way, and nothing within", () => {
    expect(zeroReturnWords("0.05", "mm")).toBeNull();
    expect(zeroReturnWords("-0.06", "mm")).toContain("did not return to zero");
    expect(zeroReturnWords(".003", "in")).toContain("did not return to zero");
    expect(zeroReturnWords("", "in")).toBeNull();
  });
  it("flags the test it was read after", () => {
    const flags = (zeroReturnUm: number | null) => figuresOfTest(heroTest("intake", "before", { zeroReturnUm })).doubts.map((d) => d.flag);
    expect(flags(76)).toContain("LIFT_ZERO_DRIFT");
    expect(flags(50)).not.toContain("LIFT_ZERO_DRIFT");
    expect(flags(null)).not.toContain("LIFT_ZERO_DRIFT");
  });
});
