import { describe, expect, it } from "vitest";
import { CAUTIONS, CAUTION_CLOSE, cautionsFor, HAZARDS, seatCaution } from "./cautions";

describe("cautions", () => {
  it("has a text and a source for every hazard, short enough to be read at the machine", () => {
    for (const hazard of HAZARDS) {
      const c = CAUTIONS[hazard];
      expect(c.hazard).toBe(hazard);
      expect(c.words.length, hazard).toBeGreaterThan(20);
      expect(c.words.length, hazard).toBeLessThan(200);
      expect(c.source, hazard).not.toBe("");
      expect(`${c.title} ${c.words}`, hazard).not.toMatch(/\bsafe\b|\blegal\b/i);
    }
    expect(CAUTION_CLOSE).toBe("Local law and your safety data sheet come first. Ask a qualified person.");
  });
  it("reads the words of the menu, each caution once", () => {
    expect(cautionsFor(["grinding", "Metal dust", " fume "]).map((c) => c.hazard)).toEqual(["metal dust", "cutters", "fume"]);
    expect(cautionsFor(["noise", "suction"]).map((c) => c.hazard)).toEqual(["noise", "suction"]);
    expect(cautionsFor(["paperwork"])).toEqual([]);
  });
  it("takes unknown seats for copper-beryllium", () => {
    expect(seatCaution("unknown")).toEqual(["beryllium"]);
    expect(seatCaution("copper-beryllium")).toEqual(["beryllium"]);
    expect(seatCaution("steel")).toEqual([]);
  });
});
