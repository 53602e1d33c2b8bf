import { describe, expect, it } from "vitest";
import { camTable, camTableText } from "./cam-table";
import { headDiametersMm, valveListWords, type ValveOfFamily } from "./valve-list";

describe("a cam table", () => {
  it("reads blanks, tabs and semicolons, point and comma, in millimetres and inches", () => {
    for (const text of ["0 0\n20 1.25\n\n40 4,5", "0\t0\r\n20\t1,25\r\n40\t4.5", "0;0\n20;1.25\n40;4.5"]) {
      expect(camTable(text, "mm")).toEqual({ ok: true, value: [{ angleDeg: 0, liftUm: 0 }, { angleDeg: 20, liftUm: 1250 }, { angleDeg: 40, liftUm: 4500 }] });
    }
    // 0.340 in is 8.636 mm: 25.4 mm to the inch by definition.
    expect(camTable("0 0\n90 0.340\n180 0", "in")).toMatchObject({ ok: true, value: [{}, { liftUm: 8636 }, {}] });
  });
  it("names the row that cannot be read", () => {
    const words = (text: string) => { const r = camTable(text, "mm"); return r.ok ? "" : r.refusal.message; };
    expect(words("0 0\n20 x\n40 3")).toMatch(/^Row 2: both must be numbers/);
    expect(words("0 0\n\n20 1\n10 2")).toMatch(/^Row 4: each angle must be larger/);
    expect(words("0 0 0\n20 1\n30 2")).toMatch(/^Row 1: write an angle and a lift/);
    expect(words("0 0\n20 51\n30 2")).toMatch(/^Row 2: the lift must be from 0 to 50 mm/);
    expect(words("0 0\n20 1")).toMatch(/at least three points/);
  });
  it("writes itself so that it reads the same again", () => {
    const points = [{ angleDeg: 0, liftUm: 0 }, { angleDeg: 20.5, liftUm: 1251 }, { angleDeg: 41, liftUm: 8636 }];
    expect(camTable(camTableText(points, "mm"), "mm")).toEqual({ ok: true, value: points });
  });
});

describe("a valve list", () => {
  const valve = (side: "intake" | "exhaust", headMm: number, position: ValveOfFamily["position"] = "single"): ValveOfFamily => ({ side, position, headMm, stemMm: 5.5, seatAngleDeg: 45 });
  it("is worded for two, four and five valves, unequal ones one by one", () => {
    expect(valveListWords([valve("intake", 42), valve("exhaust", 36)], "intake")).toBe("42 mm");
    expect(valveListWords([valve("intake", 31, "left"), valve("intake", 31, "right"), valve("exhaust", 26)], "intake")).toBe("2 × 31 mm");
    const five = [valve("intake", 23, "left"), valve("intake", 22, "centre"), valve("intake", 23, "right")];
    expect(valveListWords(five, "intake")).toBe("23, 22, 23 mm");
    expect(headDiametersMm(five, "exhaust")).toEqual([]);
    expect(valveListWords(five, "exhaust")).toBe("");
  });
});
