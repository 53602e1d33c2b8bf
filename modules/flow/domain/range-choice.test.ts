import { describe, expect, it } from "vitest";
import { lastRead, nextRange, rangeOfCell } from "./range-choice";

const ranges = ["100", "200", "400"].map((label) => ({ label, fullScaleCfm: Number(label) }));
const none = { cell: "a", pressed: null, typed: null, saved: null, last: null, ranges };
const holds = (rangeLabel: string, valueText = "73") => ({ valueText, rangeLabel });
const last = { valueText: "61", rangeLabel: "200", takenAt: "2026-03-12T16:30:00.000Z" };
const pressed = (cell: string, label: string, at = "2026-03-12T16:31:00.000Z") => ({ cell, label, at });

describe("the range a cell is read on", () => {
  it.each([
    ["the first of the bench where nothing was read", none, "100"],
    ["that of the last reading of the test, for a cell never read", { ...none, last }, "200"],
    ["that of the last reading for a cell that was cleared and saved", { ...none, saved: holds("400", ""), last }, "200"],
    ["its own, for a cell that holds a reading", { ...none, saved: holds("400"), last }, "400"],
    ["its own while the reading is typed over", { ...none, typed: holds("400", ""), saved: holds("400"), last }, "400"],
    ["what was pressed for this cell, over what it held", { ...none, pressed: pressed("a", "100"), typed: holds("400"), saved: holds("400"), last }, "100"],
    ["what was pressed for this cell once it was undone to nothing", { ...none, pressed: pressed("a", "100"), typed: holds("400", ""), last }, "100"],
    ["what was pressed at another cell since the last reading, where this one is empty", { ...none, pressed: pressed("b", "400"), last }, "400"],
    ["the last reading's, where it came after the press", { ...none, pressed: pressed("b", "400", "2026-03-12T16:29:00.000Z"), last }, "200"],
    ["its own, whatever was pressed at another cell", { ...none, pressed: pressed("b", "400"), saved: holds("100"), last }, "100"],
    ["the last reading's, where the press names no range of this bench", { ...none, pressed: pressed("a", "9"), last }, "200"],
  ])("is %s", (_, input, label) => expect(rangeOfCell(input)).toBe(label));
  it("is none on a bench without ranges", () => expect(rangeOfCell({ ...none, ranges: [] })).toBeNull());
  it("is found again from the records: newest reading that still stands", () => {
    const at = (minute: number, rangeLabel: string | null, valueText = "61") => ({ valueText, rangeLabel, takenAt: `2026-03-12T16:${minute}:00.000Z` });
    expect(lastRead([at(30, "200"), at(35, "400", ""), at(20, "100"), at(40, null)])?.rangeLabel).toBe("200");
    expect(lastRead([])).toBeNull();
  });
  it("goes up and down by key and stops at the ends", () => {
    expect([nextRange(ranges, "200", 1), nextRange(ranges, "400", 1), nextRange(ranges, "100", -1), nextRange(ranges, null, 1), nextRange([], null, 1)]).toEqual(["400", "400", "100", "100", null]);
  });
});
