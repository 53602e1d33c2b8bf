import { describe, expect, it } from "vitest";
import { PIECE_PLACES, placeOf, type PieceFacts } from "./piece-place";

const nothing: PieceFacts = {
  isEstimateSent: false, isApproved: false, isAnnounced: false, isBookedIn: false, isTornDown: false, isWorkStarted: false,
  hasOpenHold: false, isProved: false, isReleased: false, isPacked: false, daysSinceReady: null, isGone: false, ended: null,
};
const walk: [Partial<PieceFacts>, string][] = [
  [{}, "asked about"],
  [{ isEstimateSent: true }, "priced"],
  [{ isApproved: true }, "agreed"],
  [{ isAnnounced: true }, "on its way in"],
  [{ isBookedIn: true }, "booked in"],
  [{ isTornDown: true }, "torn down"],
  [{ isWorkStarted: true }, "in work"],
  [{ isProved: true }, "proved"],
  [{ isReleased: true, daysSinceReady: 0 }, "released"],
  [{ isPacked: true, daysSinceReady: 3 }, "at the counter"],
  [{ isGone: true }, "gone"],
];

describe("where a piece is", () => {
  it("follows the facts as they add up", () => {
    let facts = nothing;
    for (const [more, place] of walk) {
      facts = { ...facts, ...more };
      expect(placeOf(facts)).toBe(place);
    }
  });

  const inWork = { ...nothing, isEstimateSent: true, isApproved: true, isBookedIn: true, isTornDown: true, isWorkStarted: true };
  it.each<[string, PieceFacts, string]>([
    ["a hold shows over work", { ...inWork, hasOpenHold: true }, "held"],
    ["a hold shows over proved", { ...inWork, isProved: true, hasOpenHold: true }, "held"],
    ["a hold before it is in the house does not", { ...nothing, isApproved: true, hasOpenHold: true }, "agreed"],
    ["sent before it was agreed is still only priced", { ...nothing, isEstimateSent: true, isAnnounced: true }, "priced"],
    ["59 days ready", { ...inWork, isReleased: true, isPacked: true, daysSinceReady: 59 }, "at the counter"],
    ["60 days ready", { ...inWork, isReleased: true, isPacked: true, daysSinceReady: 60 }, "left behind"],
    ["fetched after 74 days", { ...inWork, isReleased: true, isPacked: true, daysSinceReady: 74, isGone: true }, "gone"],
    ["stopped on the bench", { ...inWork, ended: "stopped" }, "stopped"],
    ["stopped, then fetched", { ...inWork, ended: "stopped", isGone: true }, "gone"],
    ["returned undone", { ...nothing, isBookedIn: true, ended: "returned undone", isGone: true }, "returned undone"],
    ["scrapped", { ...inWork, ended: "scrapped by agreement" }, "scrapped by agreement"],
  ])("%s", (_title, facts, place) => expect(placeOf(facts)).toBe(place));

  it("uses every word and no other", () => {
    const reached = new Set([...walk.map(([, p]) => p), "held", "left behind", "stopped", "returned undone", "scrapped by agreement"]);
    expect(new Set(PIECE_PLACES)).toEqual(reached);
  });
});
