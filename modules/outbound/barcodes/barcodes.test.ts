import { describe, expect, it } from "vitest";
import { code128, qr } from "./encode";
import { code128Rects, qrRects } from "./vectors";

describe("Code 128", () => {
  // ISO/IEC 15417 annex A/table 1: start B = 211214, "A" = 111323, stop = 2331112; check digit (104 + 33) mod 103 = 34 ("B" = 131123).
  it("encodes A with start B, check character and stop as the standard's table says", () => {
    expect(code128("A").widths.join("")).toBe("211214" + "111323" + "131123" + "2331112");
  });
  it("gives 11 modules a character and 13 for the stop, two digits a character where four or more end it", () => {
    expect(code128("WO-A").modules).toBe(11 * (1 + 4 + 1) + 13);
    // W O - shift-to-C 10 42
    expect(code128("WO-1042").modules).toBe(11 * (1 + 6 + 1) + 13);
  });
  it.each(["", "Ø", "line\nbreak", "x".repeat(49)])("refuses %j", (text) => {
    expect(() => code128(text)).toThrow(RangeError);
  });
  it("draws inside its width with ten quiet modules on both sides", () => {
    const bars = code128("WO-1042-1");
    const rects = code128Rects(bars, 200, 30);
    const unit = 200 / (bars.modules + 20);
    expect(rects[0]?.x).toBeCloseTo(10 * unit, 9);
    const last = rects.at(-1);
    expect((last?.x ?? 0) + (last?.w ?? 0)).toBeCloseTo(200 - 10 * unit, 9);
    expect(rects).toHaveLength(Math.ceil(bars.widths.length / 2));
  });
});

describe("QR", () => {
  const finder = ["1111111", "1000001", "1011101", "1011101", "1011101", "1000001", "1111111"];
  it("has the three finder patterns of ISO/IEC 18004", () => {
    const { size, dark } = qr("https://example.com/t/4f2a");
    expect((size - 17) % 4).toBe(0);
    const patch = (row: number, col: number) =>
      Array.from({ length: 7 }, (_, r) => Array.from({ length: 7 }, (_, c) => (dark[(row + r) * size + col + c] ? "1" : "0")).join(""));
    expect(patch(0, 0)).toEqual(finder);
    expect(patch(0, size - 7)).toEqual(finder);
    expect(patch(size - 7, 0)).toEqual(finder);
  });
  it("draws exactly the dark modules, and nothing in the quiet zone", () => {
    const matrix = qr("WO-1042-1");
    const side = matrix.size + 8;
    const rects = qrRects(matrix, side);
    const area = rects.reduce((sum, r) => sum + r.w * r.h, 0);
    expect(area).toBeCloseTo(matrix.dark.filter(Boolean).length, 6);
    expect(Math.min(...rects.map((r) => r.x))).toBe(4);
    expect(Math.max(...rects.map((r) => r.x + r.w))).toBeCloseTo(side - 4, 9);
  });
  it("refuses an empty text", () => {
    expect(() => qr("")).toThrow(RangeError);
  });
});
