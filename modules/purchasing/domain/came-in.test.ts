import { describe, expect, it } from "vitest";
import { howFar, takeIn } from "./came-in";

// Shop rules, no published source.
describe("how far a purchase order has come in", () => {
  it.each([
    ["draft", [], "draft"], ["cancelled", [{ qtyMilli: 1000, receivedMilli: 0 }], "cancelled"], ["sent", [{ qtyMilli: 6000, receivedMilli: 0 }], "sent"],
    ["sent", [{ qtyMilli: 6000, receivedMilli: 6000 }, { qtyMilli: 10_000, receivedMilli: 4000 }], "partly in"], ["sent", [{ qtyMilli: 6000, receivedMilli: 8000 }], "in"],
  ])("%s %j is %s", (state, lines, word) => expect(howFar(state, lines)).toBe(word));
});

describe("taking in", () => {
  it("asks what becomes of twelve for ten", () => expect(takeIn(10_000, 12_000, "")).toBeNull());
  it("keeps them when told to", () => expect(takeIn(10_000, 12_000, "keep")).toEqual({ inMilli: 12_000, overMilli: 2000 }));
  it.each(["return", "refuse"] as const)("takes in ten and not the two that go back (%s)", (over) => expect(takeIn(10_000, 12_000, over)).toEqual({ inMilli: 10_000, overMilli: 2000 }));
  it("never asks when no more came than was ordered", () => expect(takeIn(10_000, 4000, "")).toEqual({ inMilli: 4000, overMilli: 0 }));
});
