import { describe, expect, it } from "vitest";
import { heroTest } from "@/tests/support/hero-tests";
import { arrivedReadings, arrivedWords } from "./arrived-readings";

describe("what came from the bench", () => {
  const test = heroTest("intake", "before", { state: "draft" });
  const [first, ...rest] = test.cells;
  it("counts new cells and cells written over, no cleared ones", () => {
    if (!first) throw new Error("no cell");
    expect(arrivedReadings([{ ...test, cells: rest }], [test])).toBe(1);
    expect(arrivedReadings([test], [{ ...test, cells: [{ ...first, revision: 2, valueText: "25.0" }, ...rest] }])).toBe(1);
    expect(arrivedReadings([test], [{ ...test, cells: [{ ...first, revision: 2, valueText: "" }, ...rest] }])).toBe(0);
    expect(arrivedReadings([], [test])).toBe(8);
    expect(arrivedReadings([test], [test])).toBe(0);
  });
  it("says it", () => {
    expect([0, 1, 3].map(arrivedWords)).toEqual(["Nothing new from the bench.", "1 reading came from the bench.", "3 readings came from the bench."]);
  });
});
