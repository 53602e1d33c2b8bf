import { describe, expect, it } from "vitest";
import { punchTime } from "./punch-time";

const now = new Date("2026-03-09T15:00:00.700Z");
const at = (s: string) => new Date(s);

describe("when a tap happened", () => {
  it("is the tap for a live punch a few seconds on its way", () => {
    expect(punchTime({ now, deviceAt: at("2026-03-09T14:59:58Z"), offsetMs: 0 })).toEqual({ at: at("2026-03-09T14:59:58Z"), isLate: false, flags: [] });
  });
  it("is the tablet's time put right by its offset when the punch was kept", () => {
    // The tablet is an hour behind; the tap was at 14:10 by the server.
    expect(punchTime({ now, deviceAt: at("2026-03-09T13:10:00Z"), offsetMs: 3_600_000 })).toEqual({ at: at("2026-03-09T14:10:00Z"), isLate: true, flags: ["tablet clock off"] });
  });
  it("does not flag two minutes, and flags more", () => {
    expect(punchTime({ now, deviceAt: at("2026-03-09T14:00:00Z"), offsetMs: 120_000 }).flags).toEqual([]);
    expect(punchTime({ now, deviceAt: at("2026-03-09T14:00:00Z"), offsetMs: -121_000 }).flags).toEqual(["tablet clock off"]);
  });
  it("never lies in the future", () => {
    expect(punchTime({ now, deviceAt: at("2026-03-10T15:00:00Z"), offsetMs: 0 })).toEqual({ at: at("2026-03-09T15:00:00Z"), isLate: false, flags: ["tablet clock ahead"] });
  });
  it("says when it is older than a fortnight", () => {
    expect(punchTime({ now, deviceAt: at("2026-02-20T15:00:00Z"), offsetMs: 0 }).flags).toEqual(["very late"]);
  });
  it("has no say about a punch without a tablet", () => {
    expect(punchTime({ now, deviceAt: null, offsetMs: null }).at).toEqual(at("2026-03-09T15:00:00Z"));
  });
});
