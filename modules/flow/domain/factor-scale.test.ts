import { describe, expect, it } from "vitest";
import { factorScale } from "./factor-scale";

describe("the axis of the bench factor", () => {
  it("holds every factor between its outer ticks, in even steps", () => {
    for (const factors of [[1], [1, 1.0157, 1.0024], [0.9731, 1.0345], [0.1262, 1.002], [1.262], [0.98, 0.981]]) {
      const { low, high, ticks, digits } = factorScale(factors);
      expect(ticks[0]).toBeLessThanOrEqual(Math.min(...factors));
      expect(ticks.at(-1)).toBeGreaterThanOrEqual(Math.max(...factors));
      expect([low, high].map((v) => Number(v.toFixed(digits)))).toEqual([ticks[0], ticks.at(-1)]);
      expect(ticks.length).toBeGreaterThanOrEqual(3);
      expect(ticks.length).toBeLessThanOrEqual(7);
      expect(new Set(ticks.map((t) => t.toFixed(digits))).size).toBe(ticks.length);
    }
  });
  it("stays two percent tall over a bench that does not move", () => {
    expect(factorScale([1])).toMatchObject({ ticks: [0.99, 0.995, 1, 1.005, 1.01], digits: 3 });
  });
});
