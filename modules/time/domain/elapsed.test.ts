import fc from "fast-check";
import { describe, expect, it } from "vitest";
import { instantOf } from "@/modules/kernel/instant";
import { elapsedMinutes, hoursText } from "./elapsed";

const at = (local: string) => instantOf(local, "America/Denver");

describe("elapsed time", () => {
  it.each([
    ["2026-02-25T08:10", "2026-02-25T08:38", 28],
    ["2026-02-25T08:10:59", "2026-02-25T08:38:01", 28],
    ["2026-02-25T08:10:59", "2026-02-25T08:11:00", 1],
    ["2026-03-07T23:00", "2026-03-08T07:30", 450],
    ["2026-10-31T23:00", "2026-11-01T07:30", 570],
  ])("%s to %s is %i minutes", (from, to, minutes) => expect(elapsedMinutes(at(from), at(to))).toBe(minutes));

  it("loses nothing over any number of switches in a day", () => {
    fc.assert(fc.property(fc.array(fc.integer({ min: 0, max: 86_400 }), { minLength: 2, maxLength: 20 }), (seconds) => {
      const punches = [...seconds].sort((a, b) => a - b).map((s) => new Date(Date.UTC(2026, 2, 4) + s * 1000));
      const [first, last] = [punches[0] ?? new Date(0), punches.at(-1) ?? new Date(0)];
      const parts = punches.slice(1).reduce((sum, p, i) => sum + elapsedMinutes(punches[i] ?? p, p), 0);
      expect(parts).toBe(elapsedMinutes(first, last));
    }));
  });

  it.each([[1149, "19.15"], [0, "0.00"], [1, "0.02"], [-90, "-1.50"], [2655, "44.25"]])("%i minutes print as %s h", (m, text) => {
    expect(hoursText(m)).toBe(text);
  });
});
