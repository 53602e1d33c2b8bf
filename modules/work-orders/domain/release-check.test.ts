import { describe, expect, it } from "vitest";
import { missingForRelease, type ReleaseFacts } from "./release-check";

const good: ReleaseFacts = {
  isBookedIn: true, isReleased: false, openOperations: [], holds: [], flowMissing: [], tray: [{ kind: "valves", came: 4, accounted: 4 }], unchecked: [], isOwnPorting: false, isAlone: false,
};

describe("final inspection", () => {
  it("lets a finished piece go", () => expect(missingForRelease(good)).toEqual([]));
  it("names each thing that is missing", () => {
    expect(missingForRelease({
      ...good, openOperations: [{ code: "LAP", name: "Lap and vacuum check" }], holds: ["parts"], flowMissing: ["Final flow"],
      tray: [{ kind: "valves", came: 4, accounted: 3 }], unchecked: ["Final photos are taken"],
    })).toEqual([
      "On hold: parts. End the hold first.", "Lap and vacuum check (LAP) is not done. Finish it, or skip it with a reason.",
      "Final flow: no finished reading set.", "valves: 4 came in, 3 accounted for.", "Not ticked: Final photos are taken.",
    ]);
  });
  it("refuses the one who ported it, but for a shop of one", () => {
    expect(missingForRelease({ ...good, isOwnPorting: true })).toHaveLength(1);
    expect(missingForRelease({ ...good, isOwnPorting: true, isAlone: true })).toEqual([]);
  });
});
