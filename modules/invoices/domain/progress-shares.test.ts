import { describe, expect, it } from "vitest";
import { minor } from "@/modules/kernel/money";
import { progressShares } from "./progress-shares";

describe("billing by stage", () => {
  it.each([
    [100_000, [3000, 5000, 2000], [30_000, 50_000, 20_000]],
    [1001, [5000, 5000], [501, 500]],
    [241_032, [3333, 3333, 3334], [80_336, 80_336, 80_360]],
  ])("%i in stages %o is %o", (total, stages, shares) => {
    expect(progressShares(minor(total), stages)).toEqual({ ok: true, value: shares });
    expect(shares.reduce((a, b) => a + b, 0)).toBe(total);
  });

  it("refuses stages that are not 100 %", () => {
    expect(progressShares(minor(100), [5000, 4000])).toMatchObject({ ok: false, refusal: { code: "STAGES_NOT_WHOLE", data: { differenceBp: -1000 } } });
    expect(progressShares(minor(100), [])).toMatchObject({ ok: false });
  });
});
