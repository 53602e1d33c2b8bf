import { describe, expect, it } from "vitest";
import { isPaidBreak, shiftMinutes } from "./shift-hours";

const meal = [{ minutes: 30, isRelievedOfDuty: true }];
const shift = (start: string, end: string, breaks = meal) => shiftMinutes({ start, end, zone: "America/Denver", breaks });

describe("hours of a shift", () => {
  // US Department of Labor hours-worked advisor: the same shift is 7 h in spring and 9 h in autumn.
  it.each([
    ["2026-03-07T23:00", "2026-03-08T07:30", 7],
    ["2026-10-31T23:00", "2026-11-01T07:30", 9],
    ["2026-06-06T23:00", "2026-06-07T07:30", 8],
  ])("%s to %s with a 30 min meal is %i h", (start, end, hours) => {
    expect(shift(start, end)).toEqual({ ok: true, value: hours * 60 });
  });

  it.each([
    [10, true, true], [20, true, true], [29, true, true], [30, true, false], [45, false, true],
  ])("a break of %i min, relieved %s, is paid: %s", (minutes, isRelievedOfDuty, paid) => {
    expect(isPaidBreak({ minutes, isRelievedOfDuty })).toBe(paid);
  });

  it.each([
    [shift("2026-03-04T16:00", "2026-03-04T08:00"), "OUT_BEFORE_IN"],
    [shift("2026-03-04T08:00", "2026-03-04T08:20"), "BREAKS_TOO_LONG"],
    [shift("2026-03-08T02:30", "2026-03-08T08:20"), "TIME_DOES_NOT_EXIST"],
    [shift("2026-03-08T01:30", "later"), "TIME_NOT_READABLE"],
  ])("refuses what cannot be (%#)", (result, code) => expect(result).toMatchObject({ ok: false, refusal: { code } }));
});
