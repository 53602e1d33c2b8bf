import { describe, expect, it } from "vitest";
import { jobProfit } from "./job-profit";

describe("profit of a job", () => {
  it("is 1,506.42, 58.20 % for the worked example", () => {
    // docs/hero-job.md: Emeka, Hollis, June, Anselm, Rosa, Bram; burden 18 % of 604.54 is 108.82.
    const p = jobProfit({ netSalesMinor: 258830, partsMinor: 26052, laborMinor: [2090, 12439, 7000, 21850, 10075, 7000], burdenBasisPoints: 1800, outsideMinor: 0, freightOutMinor: 3640, paymentFeesMinor: 7160 });
    expect(p).toMatchObject({ laborMinor: 60454, burdenMinor: 10882, loadedLaborMinor: 71336, profitMinor: 150642, marginBp: 5820 });
  });
  it("has no percent when nothing was sold", () => {
    expect(jobProfit({ netSalesMinor: 0, partsMinor: 3140, laborMinor: [4130], burdenBasisPoints: 1800, outsideMinor: 0, freightOutMinor: 0, paymentFeesMinor: 0 })).toMatchObject({ profitMinor: -8013, marginBp: null });
  });
});
