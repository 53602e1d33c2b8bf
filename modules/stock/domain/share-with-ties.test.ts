import { describe, expect, it } from "vitest";
import { shareWithTies } from "./share-with-ties";

// Shop rule, no published source: the earlier promise wins; goods bought for an order are that order's first.
describe("sharing a part among orders", () => {
  it("gives the last four springs to the earlier promise", () => {
    expect(shareWithTies(4000, [{ id: "late", promise: "2026-03-27", needMilli: 4000, tiedMilli: 0 }, { id: "early", promise: "2026-03-20", needMilli: 4000, tiedMilli: 0 }])).toEqual([0, 4000]);
  });
  it("keeps goods bought for an order for that order, whatever the promises", () => {
    expect(shareWithTies(4000, [{ id: "bought for", promise: "2026-04-30", needMilli: 3000, tiedMilli: 3000 }, { id: "early", promise: "2026-03-20", needMilli: 4000, tiedMilli: 0 }])).toEqual([3000, 1000]);
  });
  it("never gives more than there is nor more than is needed", () => {
    expect(shareWithTies(10_000, [{ id: "a", promise: null, needMilli: 2000, tiedMilli: 6000 }])).toEqual([2000]);
    expect(shareWithTies(1000, [{ id: "a", promise: null, needMilli: 2000, tiedMilli: 2000 }, { id: "b", promise: null, needMilli: 2000, tiedMilli: 2000 }])).toEqual([1000, 0]);
  });
});
