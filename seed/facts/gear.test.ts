import { describe, expect, it } from "vitest";
import { benchFactorFromPlates } from "@/modules/flow/domain/bench-factor";
import { checkDoubt } from "@/modules/flow/domain/plate-doubt";
import { valueOf } from "@/tests/support/value-of";
import { BENCH_1_CHECKS, CHECK_PLATES, OLDER_BENCH_CHECKS } from "./gear";

describe("bench checks of the demo", () => {
  it("state a reason exactly where one is asked for", () => {
    for (const days of [BENCH_1_CHECKS, OLDER_BENCH_CHECKS]) {
      let last: { lastFactor?: number } = {};
      for (const day of days) {
        const plates = CHECK_PLATES.map((p, i) => ({ serial: p.serial, referenceCfm: Number(p.referenceFlow), indicatedCfm: Number(day.shown[i]) }));
        const made = valueOf(benchFactorFromPlates({ referenceCfm: plates.map((p) => p.referenceCfm), indicatedCfm: plates.map((p) => p.indicatedCfm), ...last }));
        expect([day.at, checkDoubt({ plates, made, ...last }) !== null]).toEqual([day.at, day.reason !== undefined]);
        last = { lastFactor: made.factor };
      }
    }
  });
});
