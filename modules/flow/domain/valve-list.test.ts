import { describe, expect, it } from "vitest";
import { coefficientTable } from "./coefficient-rows";
import { headDiametersMm, valveFieldHint, valvesOfTest, type ValveOfFamily } from "./valve-list";

const valve = (side: ValveOfFamily["side"], position: ValveOfFamily["position"], headMm: number): ValveOfFamily => ({ side, position, headMm, stemMm: null, seatAngleDeg: null });
/** A head of three unequal intake valves. */
const FIVE = [valve("intake", "left", 23), valve("intake", "centre", 25.5), valve("intake", "right", 23), valve("exhaust", "left", 27), valve("exhaust", "right", 27)];

describe("the valves a test ran with", () => {
  const intake = headDiametersMm(FIVE, "intake");
  it("are the family's where it states none, all of one size where it states one", () => {
    expect(valvesOfTest(null, intake)).toEqual([23, 25.5, 23]);
    expect(valvesOfTest(24, intake)).toEqual([24, 24, 24]);
    expect(valvesOfTest(31, [])).toEqual([31]);
    expect(valvesOfTest(null, [])).toEqual([]);
  });
  // The curtain of several valves is the sum of pi x D x L (71.5 x pi x 8 = 1796.99 mm2); the coefficient rests on it.
  it("make the curtain the coefficient rests on", () => {
    const at = (valveDiametersMm: readonly number[]) => coefficientTable({ readings: [{ liftUm: 8000, flowCfm: 170 }], side: "intake", valveDiametersMm, atInH2O: 28 })?.rows[0];
    expect(at(valvesOfTest(null, intake))?.curtainMm2).toBeCloseTo(Math.PI * 71.5 * 8, 6);
    expect(at(valvesOfTest(null, intake))?.cd).toBeLessThan(at(valvesOfTest(23, intake))?.cd ?? 0);
  });
  it("are told beside the field", () => {
    expect(valveFieldHint(intake)).toBe("Empty: 23, 25.5, 23 mm, as the family lists. One number: all 3 are that size.");
    expect(valveFieldHint([27, 27])).toBe("One number: both valves are that size.");
    expect(valveFieldHint([31])).toBe("");
  });
});
