import { describe, expect, it } from "vitest";
import { overlay } from "./overlay";

const before = { wants: "", use: undefined, pieces: [{ family: "", value: "" }], ticks: [] as string[] };

describe("what is typed now over what was kept", () => {
  it("takes the kept text where nothing was typed since", () => {
    const kept = { wants: "Seats", use: "road", pieces: [{ family: "S250", value: "300" }], ticks: ["a"] };
    expect(overlay(kept, before, before)).toEqual(kept);
  });
  it("lets what is typed now win, field by field, inside rows too", () => {
    const kept = { wants: "Seats", use: "road", pieces: [{ family: "S250", value: "300" }], ticks: ["a"] };
    const now = { wants: "Guides", use: undefined, pieces: [{ family: "", value: "three" }], ticks: ["b"] };
    expect(overlay(kept, before, now)).toEqual({ wants: "Guides", use: "road", pieces: [{ family: "S250", value: "three" }], ticks: ["b"] });
  });
  it("keeps the rows that were kept beyond the first, and fields the kept copy does not know", () => {
    expect(overlay({ pieces: [{ family: "A" }, { family: "B" }] }, before, { ...before, wants: "x" })).toEqual({ wants: "x", use: undefined, ticks: [], pieces: [{ family: "A", value: "" }, { family: "B" }] });
  });
});
