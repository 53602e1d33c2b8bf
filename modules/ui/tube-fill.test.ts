import fc from "fast-check";
import { describe, expect, it } from "vitest";
import { tubeFill } from "./tube-fill";

describe("a tube", () => {
  it("stops short of its mark", () => expect(tubeFill(5.7, 8)).toEqual({ fill: 71.25, mark: 100, over: 0 }));
  it("is full at its mark", () => expect(tubeFill(8, 8)).toEqual({ fill: 100, mark: 100, over: 0 }));
  it("is hatched past its mark", () => {
    const t = tubeFill(2.6, 2);
    expect(t.fill).toBeCloseTo(76.92, 2);
    expect(t.mark).toBe(t.fill);
    expect(t.over).toBeCloseTo(23.08, 2);
  });
  it("is empty at nothing, below nothing and at what is no number", () => {
    for (const v of [0, -3, Number.NaN, Number.POSITIVE_INFINITY]) expect(tubeFill(v, 8).fill).toBe(0);
    expect(tubeFill(0, 0)).toEqual({ fill: 0, mark: 100, over: 0 });
  });
  it("never runs out of its ends", () => {
    fc.assert(
      fc.property(fc.double({ min: -1e6, max: 1e6, noNaN: true }), fc.double({ min: -1e6, max: 1e6, noNaN: true }), (v, m) => {
        const t = tubeFill(v, m);
        expect(t.fill).toBeGreaterThanOrEqual(0);
        expect(t.fill + t.over).toBeLessThanOrEqual(100 + 1e-9);
        if (t.over > 0) expect(t.fill + t.over).toBeCloseTo(100, 6);
      }),
    );
  });
});
