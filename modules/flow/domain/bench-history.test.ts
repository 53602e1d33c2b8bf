import fc from "fast-check";
import { jStat } from "jstat";
import { describe, expect, it } from "vitest";
import { valueOf } from "@/tests/support/value-of";
import { historyOfPair, historySpan, joinedSpans, mayBeNewer, pooledHistory, repeatSums } from "./bench-history";
import { compareWithNoise, HISTORY_PAIRS_MIN, isHistoryUsable, type BenchHistory } from "./noise";
import type { LiftReading } from "./repeats";

/** Each list is one lift. */
const read = (lifts: readonly (readonly number[])[]): LiftReading[] => lifts.flatMap((flows, i) => flows.map((flowCfm) => ({ liftUm: (i + 1) * 1000, flowCfm })));

describe("pooled repeats", () => {
  it("JCGM 100:2008 H.5, Table H.9: ten days of five readings pool to 85 with 40 degrees of freedom", () => {
    // Standard deviations of the days as printed, in microvolts, here taken as hundredths. Five readings with that very spread.
    const days = [60, 77, 111, 101, 67, 93, 80, 73, 88, 86].map((s, day) => [-1, 0, 0, 0, 1].map((k) => 100 + day + k * Math.SQRT2 * (s / 100)));
    const { pooledCfm, pairs } = pooledHistory(repeatSums(read(days)));
    expect(pairs).toBe(40);
    expect(Math.round(pooledCfm * 100)).toBe(85);
  });
  it("IUPAC Gold Book, pooled standard deviation: k pairs give the root of the squared differences over 2k", () => {
    const pairs = [[24.6, 25.0], [48.9, 48.6], [71.2, 71.3], [90.0, 89.5]] as const;
    const squared = pairs.reduce((s, [x, y]) => s + (x - y) ** 2, 0);
    expect(pooledHistory(repeatSums(read(pairs))).pooledCfm).toBeCloseTo(Math.sqrt(squared / (2 * pairs.length)), 9);
  });
  it("agrees with jstat's pooled standard deviation, whatever was read", () => {
    const flow = fc.integer({ min: 0, max: 20_000 }).map((n) => n / 100);
    fc.assert(fc.property(fc.array(fc.array(flow, { minLength: 2, maxLength: 5 }), { minLength: 1, maxLength: 8 }), (lifts) => {
      expect(pooledHistory(repeatSums(read(lifts))).pooledCfm).toBeCloseTo(jStat.pooledstdev(lifts), 4);
    }));
  });
  it("sums add up over tests: two tests pool as one of all their lifts", () => {
    const [one, two] = [[[24.6, 25.0, 24.8], [48.9, 48.6]], [[30, 30.5]]];
    const [a, b] = [repeatSums(read(one ?? [])), repeatSums(read(two ?? []))];
    const both = pooledHistory({ squaresCfm2: a.squaresCfm2 + b.squaresCfm2, dof: a.dof + b.dof });
    expect(both.pairs).toBe(4);
    expect(both.pooledCfm).toBeCloseTo(jStat.pooledstdev([...(one ?? []), ...(two ?? [])]), 9);
  });
  it("is nothing without a repeat, and without spread says nothing of the noise", () => {
    expect(repeatSums(read([[24.6], [48.9]]))).toEqual({ squaresCfm2: 0, dof: 0 });
    expect(pooledHistory({ squaresCfm2: 0, dof: 0 })).toEqual({ pooledCfm: 0, pairs: 0 });
    // 24.7 three times: the mean in binary is not 24.7.
    const alike = pooledHistory(repeatSums(read(Array.from({ length: 12 }, () => [24.7, 24.7, 24.7]))));
    expect(alike).toEqual({ pooledCfm: 0, pairs: 24 });
    expect(isHistoryUsable(alike)).toBe(false);
  });
});

describe("a lift read once, judged by the bench's history", () => {
  const judge = (history: BenchHistory, more: object = {}) => valueOf(compareWithNoise({ beforeCfm: [103.2], afterCfm: [106.0], uOtherCfm: 0, history, ...more }));
  // Hand calculation: u_c = 0.3 x sqrt(2) = 0.42426 with the pooled degrees of freedom; t95 of NIST TN 1297, Table B.1: 2.23 for 10, 2.09 for 20, 2.06 for 25.
  it.each([[10, 2.23], [20, 2.09], [25, 2.06]])("with %d pairs exceeds %d times 0.424", (pairs, t95) => {
    const value = judge({ pooledCfm: 0.3, pairs });
    if (value.verdict === "not_assessed") throw new Error("not assessed");
    expect(value.effectiveDof).toBe(pairs);
    expect(value.combinedUCfm).toBeCloseTo(0.42426, 5);
    expect(value.expandedUCfm).toBeCloseTo(t95 * 0.42426, 2);
    expect([value.verdict, value.flags]).toEqual(["larger_than_noise", ["BENCH_HISTORY"]]);
  });
  it("is within the noise of a bench that repeats badly", () => {
    // U = 2.09 x 1.2 x sqrt(2) = 3.55 against a change of 2.8.
    expect(judge({ pooledCfm: 1.2, pairs: 20 }).verdict).toBe("within_noise");
  });
  it("keeps its own repeats on the side that has them", () => {
    // u_c2 = 0.04/3 + 0.09, the own part with 2 and the pooled part with 20 degrees of freedom (GUM G.4.1): 0.10333^2/(0.013333^2/2 + 0.09^2/20) = 21.6.
    const value = judge({ pooledCfm: 0.3, pairs: 20 }, { beforeCfm: [103, 103.2, 103.4] });
    if (value.verdict === "not_assessed") throw new Error("not assessed");
    expect(value.combinedUCfm).toBeCloseTo(Math.sqrt(0.04 / 3 + 0.09), 9);
    expect(value.effectiveDof).toBe(21);
  });
  it("asks for no history where both sides were repeated, and takes none of fewer than ten pairs or without spread", () => {
    const repeated = { beforeCfm: [103, 103.2, 103.4], afterCfm: [106, 106.2, 106.4] };
    expect(judge({ pooledCfm: 9, pairs: 100 }, repeated)).toEqual(valueOf(compareWithNoise({ ...repeated, uOtherCfm: 0 })));
    for (const history of [{ pooledCfm: 0.3, pairs: HISTORY_PAIRS_MIN - 1 }, { pooledCfm: 0, pairs: 40 }]) expect(judge(history)).toMatchObject({ verdict: "not_assessed", flags: ["NO_REPEATS"] });
  });
});

describe("which months and which test", () => {
  it("twelve months by the calendar, up to the newer test", () => {
    expect(historySpan("2026-03-12T16:15:00.000Z")).toEqual({ since: "2025-03-12T16:15:00.000Z", until: "2026-03-12T16:15:00.000Z" });
    expect(historySpan("2028-02-29T10:00:00.000Z").since).toBe("2027-03-01T10:00:00.000Z");
  });
  it("months that touch are read once", () => {
    const span = (since: string, until: string) => ({ since, until });
    expect(joinedSpans([span("2025-03", "2026-03"), span("2024-01", "2025-01"), span("2024-06", "2025-06"), span("2020-01", "2021-01")])).toEqual([span("2020-01", "2021-01"), span("2024-01", "2026-03")]);
    expect(joinedSpans([span("2024-01", "2026-01"), span("2024-02", "2025-01")])).toEqual([span("2024-01", "2026-01")]);
  });
  it("asks for what may be the newer of two, never for a void or a lone test", () => {
    const test = (id: string, side: "intake" | "exhaust", startedAt: string, state: "complete" | "draft" | "void" = "complete") => ({ id, side, startedAt, state });
    const tests = [test("a", "intake", "2026-01"), test("b", "intake", "2026-02", "draft"), test("c", "exhaust", "2026-02"), test("d", "exhaust", "2026-03", "void")];
    expect(mayBeNewer(tests).map((t) => t.id)).toEqual(["b"]);
  });
  it("takes the history of the newer test, whichever stands first", () => {
    const [old, young] = [{ startedAt: "2026-01", history: { pooledCfm: 1, pairs: 1 } }, { startedAt: "2026-02", history: { pooledCfm: 2, pairs: 2 } }];
    expect([historyOfPair(old, young), historyOfPair(young, old)]).toEqual([young.history, young.history]);
    expect(historyOfPair({ startedAt: "2026-01" }, { startedAt: "2026-02" })).toBeUndefined();
  });
});
