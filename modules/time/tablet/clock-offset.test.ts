import { describe, expect, it } from "vitest";
import { clockOffset } from "./clock-offset";

describe("how far the tablet's clock is off", () => {
  it("takes the middle of question and answer", () => {
    expect(clockOffset({ sentAt: 1_000, receivedAt: 1_200, elapsedMs: 200, serverAt: 61_100 })).toBe(60_000);
    expect(clockOffset({ sentAt: 1_000, receivedAt: 1_200, elapsedMs: 200, serverAt: 1_100 })).toBe(0);
  });
  it("measures nothing when the clock was set meanwhile, forward or back", () => {
    expect(clockOffset({ sentAt: 0, receivedAt: 5_700_000, elapsedMs: 400, serverAt: 5_700_000 })).toBeNull();
    expect(clockOffset({ sentAt: 5_700_000, receivedAt: 0, elapsedMs: 400, serverAt: 0 })).toBeNull();
  });
});
