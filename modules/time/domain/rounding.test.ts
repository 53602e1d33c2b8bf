import { describe, expect, it } from "vitest";
import { instantOf, localMinute } from "@/modules/kernel/instant";
import { roundPunch, roundingNeutrality, type RoundingStep } from "./rounding";

const ZONE = "America/Denver";
const at = (local: string) => instantOf(local, ZONE);

describe("rounding of pay time", () => {
  // 29 CFR 785.48(b). The quarter-hour rows are the published examples 8:13, 4:59 and 8:05.
  it.each<[RoundingStep, string, string]>([
    [15, "2026-03-04T08:13", "2026-03-04T08:15"],
    [15, "2026-03-04T16:59", "2026-03-04T17:00"],
    [15, "2026-03-04T08:05", "2026-03-04T08:00"],
    [15, "2026-03-04T08:07", "2026-03-04T08:00"],
    [15, "2026-03-04T08:08", "2026-03-04T08:15"],
    [6, "2026-03-04T08:03", "2026-03-04T08:06"],
    [6, "2026-03-04T16:33", "2026-03-04T16:36"],
    [5, "2026-03-04T23:58", "2026-03-05T00:00"],
    [1, "2026-03-04T08:13:40", "2026-03-04T08:13"],
  ])("to %i minutes: %s -> %s", (step, punch, rounded) => {
    expect(localMinute(roundPunch(at(punch), step, ZONE), ZONE)).toBe(rounded);
  });

  it("goes by the wall clock in a zone that is off by three quarters of an hour", () => {
    const zone = "Asia/Kathmandu";
    expect(localMinute(roundPunch(instantOf("2026-03-04T08:02", zone), 6, zone), zone)).toBe("2026-03-04T08:00");
  });

  it("reports what rounding took from a person", () => {
    const shifts = [{ in: at("2026-03-04T07:53"), out: at("2026-03-04T16:07") }, { in: at("2026-03-05T08:00"), out: at("2026-03-05T16:08") }];
    expect(roundingNeutrality(shifts, 15, ZONE)).toEqual({ exactMinutes: 982, roundedMinutes: 975, differenceMinutes: -7 });
  });
});
