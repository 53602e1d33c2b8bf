import { describe, expect, it } from "vitest";
import { nameKey, phoneDigits } from "./search-key";

describe("search keys", () => {
  it("finds a name whatever its case, accents and blanks", () => {
    expect(nameKey("  José   Müller-Ångström ")).toBe("jose muller-angstrom");
  });
  it("keeps only the digits of a telephone number", () => {
    expect(phoneDigits("+1 (303) 555-0142")).toBe("13035550142");
  });
});
