import { basisPointsOf, minor, sumMinor, timesFraction, type Minor } from "@/modules/kernel/money";

export interface JobProfitFacts {
  /** Sales without tax, deposits and core charges, after discounts, credit notes taken off. */
  readonly netSalesMinor: number;
  readonly partsMinor: number;
  /** Cost of each person's minutes at the rate of the day, each already rounded. */
  readonly laborMinor: readonly number[];
  readonly burdenBasisPoints: number;
  readonly outsideMinor: number;
  readonly freightOutMinor: number;
  readonly paymentFeesMinor: number;
}
export interface JobProfit {
  readonly netSalesMinor: Minor;
  readonly partsMinor: Minor;
  readonly laborMinor: Minor;
  readonly burdenMinor: Minor;
  readonly loadedLaborMinor: Minor;
  readonly outsideMinor: Minor;
  readonly freightOutMinor: Minor;
  readonly paymentFeesMinor: Minor;
  readonly profitMinor: Minor;
  /** Of net sales, basis points half-up; null when nothing was sold: there is no such percent. */
  readonly marginBp: number | null;
}

/**
 * Profit of a job: net sales less parts, loaded labor (sum of the shares, then burden once), outside services, freight out
 * and payment fees. Overtime premium is overhead, not this job's. Source: docs/hero-job.md; burden rule common practice, no source.
 */
export function jobProfit(f: JobProfitFacts): JobProfit {
  const laborMinor = sumMinor(f.laborMinor);
  const burdenMinor = basisPointsOf(laborMinor, f.burdenBasisPoints);
  const loadedLaborMinor = minor(laborMinor + burdenMinor);
  const profitMinor = minor(f.netSalesMinor - f.partsMinor - loadedLaborMinor - f.outsideMinor - f.freightOutMinor - f.paymentFeesMinor);
  return {
    netSalesMinor: minor(f.netSalesMinor), partsMinor: minor(f.partsMinor), laborMinor, burdenMinor, loadedLaborMinor, outsideMinor: minor(f.outsideMinor),
    freightOutMinor: minor(f.freightOutMinor), paymentFeesMinor: minor(f.paymentFeesMinor), profitMinor,
    marginBp: f.netSalesMinor === 0 ? null : timesFraction(profitMinor, 10_000, f.netSalesMinor),
  };
}
