import { describe, expect, it } from "vitest";
import { furthestPhase, phaseOfDispute, tookMoney } from "./dispute";

/* The states are those the card payment provider publishes for a dispute ("warning_*" is an inquiry before a chargeback). */
describe("a dispute", () => {
  it("moves money only when it is more than a question", () => {
    const moved = (status: string) => { const phase = phaseOfDispute(status); return phase === null ? null : tookMoney(phase); };
    expect(["warning_needs_response", "warning_under_review", "warning_closed"].map(moved)).toEqual([false, false, false]);
    expect(["needs_response", "under_review", "won", "lost"].map(moved)).toEqual([true, true, true, true]);
    expect(moved("a state of next year")).toBeNull();
  });

  it("stands where it got furthest, in whatever order it is told", () => {
    expect(furthestPhase([])).toBeNull();
    expect(furthestPhase(["won", "taken"])).toBe("won");
    expect(furthestPhase(["taken", "inquiry over", "inquiry"])).toBe("taken");
    expect(furthestPhase(["inquiry", "taken", "lost"])).toBe("lost");
  });
});
