import fc from "fast-check";
import { describe, expect, it } from "vitest";
import { heroSet } from "@/tests/support/hero-flow";
import { refusalOf, valueOf } from "@/tests/support/value-of";
import { crossovers } from "./crossovers";
import { gainAt, gainTable } from "./gain";
import { interpolateFlow } from "./interpolate-flow";
import { parseLiftUm } from "./lift-ladder";
import { monotoneCurve } from "./monotone-curve";
import { neighbours } from "./neighbours";
import { compareSets } from "./shop-comparison";
import { correctToPressure } from "./test-pressure";
import { convertUnit, unitKind, UNIT_NAMES } from "./units";

const tenths = (max: number) => fc.integer({ min: 0, max: max * 10 }).map((n) => n / 10);
/** Lifts in micrometres, increasing, with a before and an after reading each. */
const tests = fc
  .uniqueArray(fc.integer({ min: 1, max: 20_000 }), { minLength: 2, maxLength: 24 })
  .chain((lifts) => fc.array(fc.tuple(tenths(400), tenths(400)), { minLength: lifts.length, maxLength: lifts.length }).map((flows) => ({ lifts: [...lifts].sort((a, b) => a - b), flows })))
  .map(({ lifts, flows }) => ({ lifts, beforeCfm: flows.map((f) => f[0]), afterCfm: flows.map((f) => f[1]) }));

describe("gain", () => {
  it("is antisymmetric: swapping before and after turns every sign", () => {
    fc.assert(
      fc.property(tests, ({ lifts, beforeCfm, afterCfm }) => {
        const there = valueOf(gainTable({ lifts, beforeCfm, afterCfm })).map((r) => r.gainCfm);
        const back = valueOf(gainTable({ lifts, beforeCfm: afterCfm, afterCfm: beforeCfm })).map((r) => r.gainCfm);
        expect(there.map((g) => g + 0)).toEqual(back.map((g) => 0 - g));
      }),
    );
  });
  it("is exact to the tenth for readings in tenths", () => {
    fc.assert(fc.property(fc.integer({ min: 0, max: 5000 }), fc.integer({ min: 0, max: 5000 }), (b, a) => {
        expect(gainAt(b / 10, a / 10)).toBe((a - b) / 10);
      }),
    );
  });
  it("crosses over as often as the gain changes sign", () => {
    fc.assert(
      fc.property(tests, (t) => {
        const signs = valueOf(gainTable(t)).map((r) => Math.sign(r.gainCfm)).filter((s) => s !== 0);
        const turns = neighbours(signs).filter(([a, b]) => a !== b).length;
        const found = valueOf(crossovers(t)).crossovers;
        expect(found).toHaveLength(turns);
        for (const c of found) expect(c.lift > (t.lifts[0] ?? 0) && c.lift < (t.lifts.at(-1) ?? 0)).toBe(true);
      }),
    );
  });
});

describe("pressure", () => {
  it("correction to another pressure and back returns the value", () => {
    fc.assert(
      fc.property(tenths(600), fc.double({ min: 1, max: 60, noNaN: true }), fc.double({ min: 1, max: 60, noNaN: true }), (flowCfm, p, q) => {
        const there = valueOf(correctToPressure({ flowCfm, fromInH2O: p, toInH2O: q })).flowCfm;
        expect(valueOf(correctToPressure({ flowCfm: there, fromInH2O: q, toInH2O: p })).flowCfm).toBeCloseTo(flowCfm, 9);
      }),
    );
  });
  it("correction to the same pressure changes nothing and flags nothing", () => {
    fc.assert(fc.property(tenths(600), fc.integer({ min: 1, max: 60 }), (flowCfm, p) => {
        expect(valueOf(correctToPressure({ flowCfm, fromInH2O: p, toInH2O: p }))).toEqual({ flowCfm, flags: [] });
      }),
    );
  });
});

describe("interpolation", () => {
  it("passes through every reading", () => {
    fc.assert(
      fc.property(tests, ({ lifts, beforeCfm }) => {
        lifts.forEach((lift, i) => expect(valueOf(interpolateFlow({ lifts, flowsCfm: beforeCfm }, lift))).toBe(beforeCfm[i]));
      }),
    );
  });
  it("stays inside the range of its two neighbours", () => {
    fc.assert(
      fc.property(tests, fc.double({ min: 0, max: 1, noNaN: true }), ({ lifts, beforeCfm }, share) => {
        const points = lifts.map((lift, i) => ({ lift, flowCfm: beforeCfm[i] ?? NaN }));
        for (const [a, b] of neighbours(points)) {
          const flow = valueOf(interpolateFlow({ lifts, flowsCfm: beforeCfm }, Math.min(b.lift, a.lift + share * (b.lift - a.lift))));
          expect(flow).toBeGreaterThanOrEqual(Math.min(a.flowCfm, b.flowCfm));
          expect(flow).toBeLessThanOrEqual(Math.max(a.flowCfm, b.flowCfm));
        }
      }),
    );
  });
  it("is monotone between two readings without being clamped there", () => {
    fc.assert(
      fc.property(tests, ({ lifts, beforeCfm }) => {
        const curve = valueOf(monotoneCurve(lifts.map((lift, i) => ({ lift, flowCfm: beforeCfm[i] ?? NaN })), { addZero: true }));
        for (const [a, b] of neighbours(curve.knots)) {
          const rise = b.flowCfm - a.flowCfm;
          for (let i = 0; i <= 10; i += 1) {
            const slope = curve.knotAt(Math.min(b.lift, a.lift + ((b.lift - a.lift) * i) / 10))?.slope ?? NaN;
            expect(slope * Math.sign(rise)).toBeGreaterThanOrEqual(-1e-9);
          }
        }
      }),
    );
  });
});

describe("units", () => {
  it("round-trip", () => {
    const pair = fc.constantFrom(...UNIT_NAMES).chain((from) => fc.tuple(fc.constant(from), fc.constantFrom(...UNIT_NAMES.filter((u) => unitKind(u) === unitKind(from)))));
    fc.assert(
      fc.property(fc.double({ min: -1e6, max: 1e6, noNaN: true }), pair, (value, [from, to]) => {
        const back = valueOf(convertUnit(valueOf(convertUnit(value, from, to)), to, from));
        expect(Math.abs(back - value)).toBeLessThanOrEqual(1e-12 * Math.abs(value) + Number.MIN_VALUE * 1e6);
      }),
    );
  });
  it("a lift typed in hundredths of a millimetre is that lift", () => {
    fc.assert(fc.property(fc.integer({ min: 0, max: 5000 }), (n) => {
        expect(valueOf(parseLiftUm((n / 100).toFixed(2), "mm"))).toBe(n * 10);
      }),
    );
  });
});

describe("permuted rows", () => {
  const shuffled = fc.shuffledSubarray([0, 1, 2, 3, 4, 5, 6, 7], { minLength: 8, maxLength: 8 });
  it("change nothing in a comparison of sets", () => {
    const straight = valueOf(compareSets({ before: heroSet("intake", "before"), after: heroSet("intake", "after"), camLiftUm: 8636 }));
    expect(straight.comparable).toBe(true);
    fc.assert(
      fc.property(shuffled, shuffled, (one, two) => {
        const order = (set: ReturnType<typeof heroSet>, by: readonly number[]) => ({ ...set, readings: by.flatMap((i) => set.readings[i] ?? []) });
        const mixed = compareSets({ before: order(heroSet("intake", "before"), one), after: order(heroSet("intake", "after"), two), camLiftUm: 8636 });
        expect(valueOf(mixed)).toEqual(straight);
      }),
    );
  });
  it("are refused in a plain table", () => {
    fc.assert(
      fc.property(tests, fc.nat(), ({ lifts, beforeCfm, afterCfm }, n) => {
        const at = n % (lifts.length - 1);
        const swap = <T>(list: readonly T[]) => [...list.slice(0, at), ...list.slice(at, at + 2).reverse(), ...list.slice(at + 2)];
        const permuted = { lifts: swap(lifts), beforeCfm: swap(beforeCfm), afterCfm: swap(afterCfm) };
        expect(refusalOf(gainTable(permuted)).code).toBe("LIFTS_NOT_INCREASING");
        expect(refusalOf(interpolateFlow({ lifts: permuted.lifts, flowsCfm: permuted.beforeCfm }, lifts[0] ?? 0)).code).toBe("LIFTS_NOT_INCREASING");
      }),
    );
  });
});
