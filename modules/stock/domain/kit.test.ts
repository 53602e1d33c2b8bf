import { describe, expect, it } from "vitest";
import { pieces } from "@/modules/kernel/quantity";
import { explodeKit, kitAvailability } from "./kit";

// Spring kit of docs/hero-job.md: 4 springs, 4 retainers, 8 keepers, 4 spring seats.
const springKit = [
  { partId: "spring", needMilli: pieces(4) },
  { partId: "retainer", needMilli: pieces(4) },
  { partId: "keeper", needMilli: pieces(8) },
  { partId: "seat", needMilli: pieces(4) },
];
const shelf = (keepers: number) =>
  new Map([["spring", 40_000], ["retainer", 12_000], ["keeper", keepers * 1000], ["seat", 16_000]]);

describe("kits", () => {
  it("comes apart into its parts", () => {
    expect(explodeKit(springKit, 2).map((p) => p.needMilli)).toEqual([8000, 8000, 16_000, 8000]);
    expect(explodeKit([...springKit, { partId: "keeper", needMilli: pieces(1) }], 1)).toContainEqual({ partId: "keeper", needMilli: 9000 });
  });

  it.each([
    [24, 3, []],
    [23, 2, []],
    [7, 0, [{ partId: "keeper", shortMilli: 1000 }]],
  ])("with %i keepers there are %i kits, short %o", (keepers, kits, short) => {
    expect(kitAvailability(springKit, shelf(keepers))).toEqual({ kits, short });
  });

  it("names every part that is short for the wanted number", () => {
    expect(kitAvailability(springKit, shelf(24), 4).short).toEqual([
      { partId: "retainer", shortMilli: 4000 },
      { partId: "keeper", shortMilli: 8000 },
    ]);
  });

  it("an empty kit, or a part never seen, is not available", () => {
    expect(kitAvailability([], new Map()).kits).toBe(0);
    expect(kitAvailability(springKit, new Map())).toMatchObject({ kits: 0, short: [{}, {}, {}, {}] });
  });
});
