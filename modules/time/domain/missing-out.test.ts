import { describe, expect, it } from "vitest";
import { isOutMissing } from "./missing-out";

const zone = "America/Denver";
const since = new Date("2026-09-15T14:00:00Z");

describe("a forgotten out", () => {
  it.each([["2026-09-15T23:00:00Z", false], ["2026-09-16T05:59:00Z", false], ["2026-09-16T06:01:00Z", true], ["2026-09-16T14:00:00Z", true]])("at %s: %s", (now, is) =>
    expect(isOutMissing(since, new Date(now), zone)).toBe(is));
  it("is asked four hours after midnight for a late shift", () => {
    const late = new Date("2026-09-16T04:30:00Z"); // 22:30 on the 15th
    expect(isOutMissing(late, new Date("2026-09-16T09:59:00Z"), zone)).toBe(false);
    expect(isOutMissing(late, new Date("2026-09-16T10:01:00Z"), zone)).toBe(true);
  });
});
