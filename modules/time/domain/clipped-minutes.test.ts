import { describe, expect, it } from "vitest";
import { minutesWithin } from "./clipped-minutes";

const d = (t: string) => new Date(`2026-03-${t}Z`);

describe("minutes inside a day", () => {
  it("cuts a span at both ends of it", () => expect(minutesWithin([{ startedAt: d("02T22:00:00"), endedAt: d("04T03:00:00") }], d("03T00:00:00"), d("04T00:00:00"))).toBe(1440));
  it("counts an open span up to the end asked for", () => expect(minutesWithin([{ startedAt: d("03T10:00:00"), endedAt: null }], d("03T00:00:00"), d("03T10:42:10"))).toBe(42));
  it("takes nothing from a span elsewhere", () => expect(minutesWithin([{ startedAt: d("02T10:00:00"), endedAt: d("02T11:00:00") }], d("03T00:00:00"), d("04T00:00:00"))).toBe(0));
  it("gives the day of the spring change 23 hours", () => expect(minutesWithin([{ startedAt: d("08T00:00:00"), endedAt: null }], new Date("2026-03-08T00:00:00-07:00"), new Date("2026-03-09T00:00:00-06:00"))).toBe(1380));
});
