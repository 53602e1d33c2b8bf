import { describe, expect, it } from "vitest";
import { daySummary, utilisationPercent } from "./day-summary";

describe("door against bench", () => {
  it.each([
    [480, 420, 30, 15, 15, "none"],
    [480, 420, 29, 15, 16, "what was done"],
    [480, 470, 0, 20, -10, "bench beyond door"],
    [0, 0, 0, 0, 0, "none"],
  ])("in %i min, direct %i, indirect %i, breaks %i: %i unexplained, asks %s", (doorMinutes, directMinutes, indirectMinutes, paidBreakMinutes, left, asks) => {
    expect(daySummary({ doorMinutes, directMinutes, indirectMinutes, paidBreakMinutes })).toMatchObject({ unexplainedMinutes: left, asks });
  });

  it("uses the tolerance of the shop", () => {
    expect(daySummary({ doorMinutes: 480, directMinutes: 450, indirectMinutes: 0, paidBreakMinutes: 0, toleranceMinutes: 30 }).asks).toBe("none");
  });

  it("utilisation is bench over door; nothing to divide by is no figure", () => {
    expect(utilisationPercent(420, 480)).toBe("87.50");
    expect(utilisationPercent(1, 3)).toBe("33.33");
    expect(utilisationPercent(60, 0)).toBeNull();
  });
});
