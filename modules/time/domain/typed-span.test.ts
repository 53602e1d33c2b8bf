import { describe, expect, it } from "vitest";
import { typedSpan } from "./typed-span";

const now = new Date("2026-12-01T12:00:00Z");
const span = (start: string, end: string, which: { startWhich?: "first" | "second"; endWhich?: "first" | "second" } = {}) => {
  const r = typedSpan({ start, end, ...which }, "America/Denver", now);
  return r.ok ? (r.value.endedAt.getTime() - r.value.startedAt.getTime()) / 60_000 : `${r.refusal.code} ${r.refusal.field}`;
};

describe("a stretch of time as typed", () => {
  it("is elapsed time over both clock changes", () => {
    expect(span("2026-03-07T23:00", "2026-03-08T07:30")).toBe(450);
    expect(span("2026-10-31T23:00", "2026-11-01T07:30")).toBe(570);
  });
  it.each([
    ["2026-03-08T02:30", "2026-03-08T05:00", "TIME_DOES_NOT_EXIST start"], ["2026-03-08T01:00", "2026-03-08T02:10", "TIME_DOES_NOT_EXIST end"],
    ["2026-11-01T01:30", "2026-11-01T05:00", "TIME_EXISTS_TWICE start"], ["2026-11-01T00:30", "2026-11-01T01:30", "TIME_EXISTS_TWICE end"],
    ["2026-03-04T10:00", "2026-03-04T10:00", "END_BEFORE_START end"], ["2026-12-01T04:00", "2026-12-01T05:30", "FUTURE_TIME end"],
    ["2026-03-04T06:00", "2026-03-04T22:01", "LONG_ENTRY end"], ["4 March", "2026-03-04T10:00", "TIME_NOT_READABLE start"],
  ])("%s to %s: %s", (a, b, said) => expect(span(a, b)).toBe(said));
  it("takes the one that was meant of two", () => {
    expect(span("2026-11-01T01:30", "2026-11-01T05:00", { startWhich: "first" })).toBe(270);
    expect(span("2026-11-01T01:30", "2026-11-01T05:00", { startWhich: "second" })).toBe(210);
  });
});
