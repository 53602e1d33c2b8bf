import { describe, expect, it } from "vitest";
import { compareValues, nextRow } from "./data-table-columns";

describe("order of values", () => {
  const sorted = (list: (string | number | null)[]) => [...list].sort(compareValues);
  it("numbers by size", () => expect(sorted([10, 9, -1, 2.5])).toEqual([-1, 2.5, 9, 10]));
  it("numbers inside words by size", () => expect(sorted(["2418-B", "2418-A", "307-A"])).toEqual(["307-A", "2418-A", "2418-B"]));
  it("nothing goes last", () => expect(sorted([null, 1, null, 0])).toEqual([0, 1, null, null]));
  it("equals are equal", () => {
    expect(compareValues(null, null)).toBe(0);
    expect(compareValues("Orrin", "orrin")).toBe(0);
  });
});

describe("walking the rows", () => {
  it("stops at both ends", () => {
    expect(nextRow("ArrowDown", 2, 3)).toBe(2);
    expect(nextRow("ArrowUp", 0, 3)).toBe(0);
  });
  it("starts at the first row when none is picked", () => {
    expect(nextRow("ArrowDown", -1, 3)).toBe(0);
    expect(nextRow("ArrowUp", -1, 3)).toBe(0);
  });
  it("jumps", () => {
    expect(nextRow("End", 0, 15)).toBe(14);
    expect(nextRow("Home", 9, 15)).toBe(0);
    expect(nextRow("PageDown", 1, 15)).toBe(11);
    expect(nextRow("PageUp", 4, 15)).toBe(0);
  });
  it("leaves other keys and empty tables alone", () => {
    expect(nextRow("a", 0, 3)).toBeNull();
    expect(nextRow("ArrowDown", -1, 0)).toBeNull();
  });
});
