import { describe, expect, it } from "vitest";
import { coefficientTable } from "@/modules/flow/domain/coefficient-rows";
import { readingQuestion } from "@/modules/flow/domain/entry-questions";
import { parseLiftUm } from "@/modules/flow/domain/lift-ladder";
import { portReadings } from "../story/bench-curves";
import { BENCH_STORIES, ORDINARY } from "./bench-stories";
import { FLOW_FAMILIES, flowFamily } from "./flow-families";

const um = (lift: string): number => { const made = parseLiftUm(lift, "in"); return made.ok ? made.value : Number.NaN; };
const cases = [
  ...Object.keys(FLOW_FAMILIES).map((family) => ({ salt: 1, story: { ...ORDINARY, family } })),
  ...Object.entries(BENCH_STORIES).map(([salt, story]) => ({ salt: Number(salt), story })),
];

describe("the demo's invented flows", () => {
  // Band on curtain area as in Heywood, Internal Combustion Engine Fundamentals (1988), 6.3.2: low lifts high, falling with L/D.
  it.each(cases)("of $story.family, job $salt, have discharge coefficients from 0.30 to 0.80 and are not asked about", ({ salt, story }) => {
    const family = flowFamily(story.family);
    for (const side of ["intake", "exhaust"] as const) {
      for (const share of [0, 1]) {
        const readings = portReadings(family, side, story, share, { salt, cylinder: 1 }).map((r) => ({ liftUm: um(r.lift), flowCfm: r.flowCfm }));
        const valve = (share === 1 ? story.valveAfter[side] : undefined) ?? family[side].headMm;
        const table = coefficientTable({ readings, side, valveDiametersMm: family[side].places.map(() => valve), atInH2O: 28 });
        expect(table?.rows).toHaveLength(readings.length);
        for (const row of table?.rows ?? []) {
          expect(row.cd, `${side} at ${row.liftUm} µm`).toBeGreaterThanOrEqual(0.3);
          expect(row.cd, `${side} at ${row.liftUm} µm`).toBeLessThanOrEqual(0.8);
        }
        for (const r of readings) expect(readingQuestion(r, readings)).toBeNull();
      }
    }
  });

  it("reach past the cam on every side", () => {
    for (const family of Object.values(FLOW_FAMILIES)) {
      for (const side of ["intake", "exhaust"] as const) {
        expect(family[side].flowCfm).toHaveLength(family.lifts.length);
        expect(um(family.lifts.at(-1) ?? "")).toBeGreaterThan(um(family[side].camLift));
      }
    }
  });
});
