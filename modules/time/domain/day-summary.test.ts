import { describe, expect, it } from "vitest";
import { daySummary, efficiencyPercent, productivityPercent, utilisationPercent } from "./day-summary";

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

  // docs/hero-job.md: 18.90 book hours in 1149 bench minutes.
  it("efficiency * utilisation = productivity; nothing to divide by is no figure", () => {
    expect(efficiencyPercent(1134, 1149)).toBe(98.69);
    expect(utilisationPercent(1149, 1532)).toBe(75);
    expect(productivityPercent(1134, 1532)).toBe(74.02);
    expect(efficiencyPercent(60, 0)).toBeNull();
  });
});
