import { describe, expect, it } from "vitest";
import { firstOpenDate } from "./open-date";

// Common practice: a closed month takes no more entries; later documents take the next open date.
describe("first open date", () => {
  it("is the date itself in an open month", () => expect(firstOpenDate("2026-03-14", ["2026-02"])).toBe("2026-03-14"));
  it("passes over closed months in a row, also across a year's end", () => {
    expect(firstOpenDate("2026-11-30", ["2026-12", "2026-11", "2027-01"])).toBe("2027-02-01");
    expect(firstOpenDate("2026-03-31", ["2026-03"])).toBe("2026-04-01");
  });
});
