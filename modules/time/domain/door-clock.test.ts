import { describe, expect, it } from "vitest";
import { punchDoor, type DoorPunchKind, type DoorState } from "./door-clock";

const at = (hhmm: string) => new Date(`2026-03-10T${hhmm}:00Z`);
const NOW = at("20:00");
const punch = (state: DoorState, kind: DoorPunchKind, t = "16:00") => punchDoor({ state, since: at("08:00") }, { kind, at: at(t) }, NOW);

describe("door clock", () => {
  it.each<[DoorState, DoorPunchKind, DoorState, string[]]>([
    ["out", "in", "in", []],
    ["in", "meal out", "at meal", []],
    ["at meal", "meal in", "in", []],
    ["in", "out", "out", []],
    ["out", "out", "out", ["in missing"]],
    ["at meal", "out", "out", ["meal in missing"]],
    ["at meal", "in", "in", ["meal in missing"]],
    ["out", "meal out", "at meal", ["in missing"]],
    ["out", "meal in", "in", ["meal out missing"]],
  ])("%s, then %s: %s, flags %o", (state, kind, next, flags) => {
    expect(punch(state, kind)).toEqual({ ok: true, value: { state: next, flags } });
  });

  it.each<[DoorState, DoorPunchKind, string]>([
    ["in", "in", "ALREADY_IN"], ["in", "meal in", "ALREADY_IN"], ["at meal", "meal out", "ALREADY_AT_MEAL"],
  ])("%s, then %s: refused with since when", (state, kind, code) => {
    expect(punch(state, kind)).toMatchObject({ ok: false, refusal: { code, data: { since: "2026-03-10T08:00:00.000Z" } } });
  });

  it("takes a double tap on out as one act, and no time from the future", () => {
    expect(punch("out", "out", "08:00")).toMatchObject({ refusal: { code: "ALREADY_OUT" } });
    expect(punch("out", "in", "21:00")).toMatchObject({ refusal: { code: "FUTURE_TIME" } });
  });
});
