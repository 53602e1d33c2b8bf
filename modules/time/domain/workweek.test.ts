import { describe, expect, it } from "vitest";
import { workweekOf } from "./workweek";

const hours = (w: { from: Date; to: Date }) => (w.to.getTime() - w.from.getTime()) / 3_600_000;

describe("a workweek", () => {
  it("holds its date and begins on the shop's day", () => {
    expect(workweekOf("2026-03-08", 1, "America/Denver").days).toEqual(["2026-03-02", "2026-03-03", "2026-03-04", "2026-03-05", "2026-03-06", "2026-03-07", "2026-03-08"]);
    expect(workweekOf("2026-03-08", 0, "America/Denver").days[0]).toBe("2026-03-08");
    expect(workweekOf("2026-03-09", 1, "America/Denver").days[0]).toBe("2026-03-09");
  });
  it.each([["2026-03-02", "America/Denver", 167], ["2026-10-26", "America/Denver", 169], ["2026-03-23", "Europe/Berlin", 167], ["2026-06-01", "America/Denver", 168], ["2026-04-01", "Australia/Lord_Howe", 168.5]])(
    "of %s in %s has %d elapsed hours", (date, zone, n) => expect(hours(workweekOf(date, 1, zone))).toBe(n));
});
