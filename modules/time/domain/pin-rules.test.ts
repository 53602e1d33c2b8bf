import { describe, expect, it } from "vitest";
import { pinProblem, pinWaitSeconds } from "./pin-rules";

describe("a clock PIN", () => {
  it.each(["12345", "123456789", "12a456", "", "١٢٣٤٥٦"])("refuses %j: not six to eight digits", (pin) => expect(pinProblem(pin)).toMatch(/6 to 8 digits/));
  it.each(["111111", "121212", "112211", "123456", "654321", "890123", "321098", "123123", "12341234", "19840712", "200103"])("refuses the guessable %s", (pin) => expect(pinProblem(pin)).not.toBeNull());
  it.each(["480131", "907314", "5820917"])("takes %s", (pin) => expect(pinProblem(pin)).toBeNull());

  it("waits 30 s after five wrong ones, doubles, and is dead after ten", () => {
    expect([0, 4, 5, 6, 7, 9, 10, 11].map(pinWaitSeconds)).toEqual([0, 0, 30, 60, 120, 480, null, null]);
  });
});
