import { describe, expect, it } from "vitest";
import { HERO_CAM_UM, HERO_LIFTS_UM } from "@/tests/support/hero-flow";
import { refusalOf, valueOf } from "@/tests/support/value-of";
import { liftInOtherUnit, liftLadder, liftText, parseLiftUm } from "./lift-ladder";

describe("a lift as typed, in whole micrometres (1 in = 25.4 mm by definition)", () => {
  it.each([
    ["0.050", "in", 1270],
    [".050", "in", 1270],
    ["0,050", "in", 1270],
    [",05", "in", 1270],
    ["0.340", "in", 8636],
    ["0.001", "in", 25],
    ["0.0005", "in", 13],
    ["8.6", "mm", 8600],
    ["1,25", "mm", 1250],
    ["8.6 mm", "in", 8600],
    ['0.34"', "mm", 8636],
    [" 0.1 in ", "mm", 2540],
    ["0", "mm", 0],
    ["50", "mm", 50_000],
  ] as const)("%s in a field of %s is %d", (text, unit, um) => expect(valueOf(parseLiftUm(text, unit))).toBe(um));

  it.each(["", "  ", "abc", "-1", "1.2.3", "1/2", "0x10", "1e3", "NaN", "5 cm", ".", "50.001", "1,234.5"])("refuses %j in mm", (text) =>
    expect(refusalOf(parseLiftUm(text, "mm")).code).toBe("LIFT_NOT_READABLE"),
  );
  it("reads back as typed", () => {
    expect(HERO_LIFTS_UM.map((um) => liftText(um, "in"))).toEqual(["0.050", "0.100", "0.150", "0.200", "0.250", "0.300", "0.350", "0.400"]);
    expect(liftText(1250, "mm")).toBe("1.25");
  });
  it("every thousandth of an inch up to an inch comes back through micrometres", () => {
    for (let t = 0; t <= 1000; t += 1) {
      const text = (t / 1000).toFixed(3);
      expect(liftText(valueOf(parseLiftUm(text, "in")), "in")).toBe(text);
    }
  });
});

describe("lifts to test", () => {
  it("hero ladder, docs/hero-job.md: .050 steps, cam .340, two points past it", () => {
    const l = valueOf(liftLadder({ step: ".050", camLift: ".340", unit: "in", pastCam: 2 }));
    expect(l.rungs.map((r) => r.liftUm)).toEqual([...HERO_LIFTS_UM]);
    expect(l.camLiftUm).toBe(HERO_CAM_UM);
    expect(l.rungs.at(-1)?.text).toBe("0.400");
  });
  it("goes one past cam lift, also when a rung falls on it", () => {
    expect(valueOf(liftLadder({ step: "0.050", camLift: "0.340", unit: "in" })).rungs.at(-1)?.text).toBe("0.350");
    expect(valueOf(liftLadder({ step: "0.050", camLift: "0.350", unit: "in" })).rungs.at(-1)?.text).toBe("0.400");
    expect(valueOf(liftLadder({ step: "1", camLift: "8.6", unit: "mm" })).rungs.map((r) => r.text)).toEqual(["1", "2", "3", "4", "5", "6", "7", "8", "9"]);
  });
  it("never fewer than one past", () => {
    expect(valueOf(liftLadder({ step: "1", camLift: "3", unit: "mm", pastCam: 0 })).rungs).toHaveLength(4);
  });
  it("does not add up the rounding of a step: 0.0625 in is 1587.5 um", () => {
    const l = valueOf(liftLadder({ step: "0.0625", camLift: "0.5", unit: "in" }));
    expect(l.rungs.map((r) => r.liftUm)).toEqual([1588, 3175, 4763, 6350, 7938, 9525, 11113, 12700, 14288]);
  });
  it("mixes units when they are written", () => {
    const l = valueOf(liftLadder({ step: "0.050", camLift: "8.6 mm", unit: "in" }));
    expect(l.camLiftUm).toBe(8600);
    expect(l.rungs.at(-1)?.text).toBe("0.350");
  });
  it("refuses what is no step and names the field", () => {
    expect(refusalOf(liftLadder({ step: "0", camLift: "0.34", unit: "in" })).field).toBe("step");
    expect(refusalOf(liftLadder({ step: "0.05", camLift: "", unit: "in" })).field).toBe("camLift");
    expect(refusalOf(liftLadder({ step: "0.01", camLift: "0.34", unit: "in" })).code).toBe("TOO_MANY_LIFTS");
  });
});

describe("a lift typed in one unit, shown in the other", () => {
  // 1 in = 25.4 mm by definition.
  it.each([[".050", "in", "mm", "1.27"], ["0.340", "in", "mm", "8.636"], ["0,34", "in", "mm", "8.636"], ["8.636", "mm", "in", "0.340"], ["1", "mm", "in", "0.0394"], ["1.27", "mm", "in", "0.050"]] as const)("%s %s is %s %s", (text, from, to, made) => expect(liftInOtherUnit(text, from, to)).toBe(made));
  it.each([["8.6 mm", "in", "mm"], ["soon", "in", "mm"], ["", "in", "mm"], [".050", "in", "in"]] as const)("%j stays as it was typed", (text, from, to) => expect(liftInOtherUnit(text, from, to)).toBe(text));
});
