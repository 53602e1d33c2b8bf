import { describe, expect, it } from "vitest";
import { hatchLines } from "./hatch-lines";

const square = [{ x: 0, y: 0 }, { x: 10, y: 0 }, { x: 10, y: 10 }, { x: 0, y: 10 }];
const length = (l: { x1: number; y1: number; x2: number; y2: number }) => Math.hypot(l.x2 - l.x1, l.y2 - l.y1);

describe("hatching an outline", () => {
  it("rises to the right at 45 degrees and stays inside", () => {
    const lines = hatchLines(square, 2);
    expect(lines.length).toBeGreaterThan(4);
    for (const l of lines) {
      expect(Math.abs(l.y2 - l.y1)).toBeCloseTo(Math.abs(l.x2 - l.x1), 9);
      expect((l.x2 - l.x1) * (l.y2 - l.y1)).toBeLessThan(0);
      for (const v of [l.x1, l.x2, l.y1, l.y2]) expect(v).toBeGreaterThanOrEqual(-1e-9);
      for (const v of [l.x1, l.x2, l.y1, l.y2]) expect(v).toBeLessThanOrEqual(10 + 1e-9);
    }
  });
  it("covers the area: length times gap comes to it (Cavalieri's principle)", () => {
    for (const gap of [0.5, 0.25, 0.1]) expect(hatchLines(square, gap).reduce((s, l) => s + length(l), 0) * gap).toBeCloseTo(100, gap < 0.2 ? 0 : -1);
    const triangle = [{ x: 3, y: 1 }, { x: 9, y: 4 }, { x: 2, y: 8 }];
    // Shoelace: 22.5.
    expect(hatchLines(triangle, 0.05).reduce((s, l) => s + length(l), 0) * 0.05).toBeCloseTo(22.5, 1);
  });
  it("leaves the hollow of a bent outline empty", () => {
    const horseshoe = [{ x: 0, y: 0 }, { x: 10, y: 0 }, { x: 10, y: 10 }, { x: 7, y: 10 }, { x: 7, y: 3 }, { x: 3, y: 3 }, { x: 3, y: 10 }, { x: 0, y: 10 }];
    for (const l of hatchLines(horseshoe, 1)) {
      const [x, y] = [(l.x1 + l.x2) / 2, (l.y1 + l.y2) / 2];
      expect(x > 3 && x < 7 && y > 3).toBe(false);
    }
  });
  it("makes nothing of nothing", () => {
    expect(hatchLines(square.slice(0, 2), 2)).toEqual([]);
    expect(hatchLines(square, 0)).toEqual([]);
    expect(hatchLines([], 2)).toEqual([]);
  });
});
