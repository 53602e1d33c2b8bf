import { describe, expect, it } from "vitest";
import { heroTest } from "@/tests/support/hero-tests";
import { figuresOfTest } from "./test-figures";

/** One reading of 100 cfm held at `pressureText`, leak of 2 cfm read at 28 in H2O. */
const read = (pressureText: string, leakScalingAgreed: boolean) => {
  const test = heroTest("intake", "before", { state: "draft", leakText: "2", leakPressureText: "28", leakScalingAgreed });
  const [cell] = test.cells;
  if (!cell) throw new Error("no cell");
  return figuresOfTest({ ...test, cells: [{ ...cell, valueText: "100", pressureText }] }).cells[0];
};

describe("a leak read at another pressure than the reading", () => {
  it("gives no figure until its scaling is agreed", () => {
    expect(read("25", false)).toMatchObject({ flowCfm: null, refusal: { code: "LEAK_PRESSURE_MISMATCH" } });
  });
  // Bernoulli; ISO 5167-1 eq. (1): the leak by the root of the pressures, then the net flow to 28 in H2O.
  it("is scaled by the root of the pressures where it is, and says so", () => {
    const cell = read("25", true);
    expect(cell?.flowCfm).toBeCloseTo((100 - 2 * Math.sqrt(25 / 28)) * Math.sqrt(28 / 25), 9);
    expect(cell?.flags).toContain("LEAK_SCALED");
  });
  it("counts as one pressure within 2 %", () => {
    expect(read("27.5", false)?.flowCfm).toBeCloseTo(98 * Math.sqrt(28 / 27.5), 9);
    expect(read("27.5", false)?.flags).not.toContain("LEAK_SCALED");
  });
});
