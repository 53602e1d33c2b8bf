import { describe, expect, it } from "vitest";
import { code128Check } from "./code128";

describe("Code 128 check character", () => {
  // abcdef: published worked example, 1539 mod 103. The other two by hand from the rule:
  // set C 12 34 -> 105 + 12 + 68 = 185; set B "A" -> 104 + 33 = 137.
  it.each([["B", "abcdef", 97], ["C", "1234", 82], ["B", "A", 34]] as const)("set %s, %s -> %i", (set, data, check) => {
    expect(code128Check(set, data)).toEqual({ ok: true, value: check });
  });

  it.each([["B", "Größe"], ["B", ""], ["C", "123"], ["C", "12A4"]] as const)("set %s refuses %s", (set, data) => {
    expect(code128Check(set, data)).toMatchObject({ ok: false, refusal: { code: "NOT_IN_SET" } });
  });
});
