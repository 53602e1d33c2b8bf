import { describe, expect, it } from "vitest";
import { typedInstant } from "./typed-time";

const ZONE = "America/Denver";

describe("typed times", () => {
  it("takes an ordinary time", () => {
    expect(typedInstant("2026-02-25T08:10", ZONE)).toEqual({ ok: true, value: new Date("2026-02-25T15:10:00Z") });
  });

  it("refuses a time the clocks jumped over and names its neighbours", () => {
    expect(typedInstant("2026-03-08T02:30", ZONE)).toMatchObject({
      ok: false, refusal: { code: "TIME_DOES_NOT_EXIST", field: "at", data: { before: "01:59", after: "03:00" } },
    });
  });

  it("asks which of two when the clocks were put back, and takes the answer", () => {
    expect(typedInstant("2026-11-01T01:30", ZONE)).toMatchObject({
      ok: false, refusal: { code: "TIME_EXISTS_TWICE", data: { first: "2026-11-01T07:30:00.000Z", second: "2026-11-01T08:30:00.000Z" } },
    });
    expect(typedInstant("2026-11-01T01:30", ZONE, "first")).toMatchObject({ value: new Date("2026-11-01T07:30:00Z") });
    expect(typedInstant("2026-11-01T01:30", ZONE, "second")).toMatchObject({ value: new Date("2026-11-01T08:30:00Z") });
  });

  it.each(["", "8:10", "2026-02-30T08:10", "2026-02-25T24:00", "2026-02-25T08:60"])("cannot read %s", (text) => {
    expect(typedInstant(text, ZONE)).toMatchObject({ ok: false, refusal: { code: "TIME_NOT_READABLE" } });
  });
});
