import { compareFractions, dividedBy, fixedText, fraction, plus, ratio, roundWhole, times, type Fraction } from "@/modules/kernel/fraction";
import { minor, type Minor } from "@/modules/kernel/money";
import { ok, refuse, type Result } from "@/modules/kernel/result";
import { ceilingOfSum, rootOf } from "./exact-root";

/** z of a normal distribution for a 95 % service level, as printed in the textbooks. */
const Z_95 = "1.65";
/** Below this many issues a year a formula says nothing; levels are then set by hand (shop rule). */
const ISSUES_PER_YEAR_MIN = 8;

const one = fraction("1");
const positive = (text: string): Fraction | null => {
  try {
    const f = fraction(text);
    return f.num > 0n ? f : null;
  } catch {
    return null;
  }
};

export interface OrderQuantity {
  /** Exact root, to 4 decimals. */
  readonly exact: string;
  /** Rounded up to whole packs, never above the yearly use when `unitsMax` is given. */
  readonly units: number;
  readonly ordersPerYear: string;
  readonly orderingCostMinor: Minor;
  readonly holdingCostMinor: Minor;
}

/**
 * Economic order quantity Q = sqrt(2 D S / H).
 * @param annualDemand units a year, decimal text above 0
 * @param orderCostMinor cost of placing one order
 * @param holdingPerUnitYearMinor cost of keeping one unit one year, in minor units, decimal text above 0
 *   (unit cost 31.40 at 25 % = `"785"`)
 * @param pack units per pack; Q is rounded up to whole packs
 * @param unitsMax never more than this (12 months' use, or what shelf life allows), rounded down to whole packs
 * Refuses `NOT_POSITIVE` with the field.
 * Source: F. W. Harris 1913; R. H. Wilson, Harvard Business Review 13 (1934).
 */
export function economicOrderQuantity(p: {
  readonly annualDemand: string;
  readonly orderCostMinor: Minor;
  readonly holdingPerUnitYearMinor: string;
  readonly pack?: number;
  readonly unitsMax?: number;
}): Result<OrderQuantity> {
  const pack = p.pack ?? 1;
  const d = positive(p.annualDemand);
  if (!d) return refuse("NOT_POSITIVE", "Type a yearly use above 0.", { field: "annualDemand" });
  const h = positive(p.holdingPerUnitYearMinor);
  if (!h) return refuse("NOT_POSITIVE", "Type a holding cost above 0.", { field: "holdingPerUnitYearMinor" });
  if (p.orderCostMinor <= 0) return refuse("NOT_POSITIVE", "Type an order cost above 0.", { field: "orderCostMinor" });
  if (!Number.isInteger(pack) || pack < 1) return refuse("NOT_POSITIVE", "A pack holds 1 or more.", { field: "pack" });

  const s = ratio(p.orderCostMinor, 1);
  const root = rootOf(dividedBy(times(times(ratio(2, 1), d), s), h));
  const packs = ceilingOfSum(ratio(0, 1), {
    floor: dividedBy(root.floor, ratio(pack, 1)),
    isExact: root.isExact,
  });
  const most = p.unitsMax === undefined ? null : Math.max(1, Math.floor(p.unitsMax / pack)) * pack;
  const units = Math.min(Number(packs) * pack, most ?? Number.MAX_SAFE_INTEGER);
  // The cost figures are those of the exact quantity, where ordering and holding cost are equal.
  return ok({
    exact: fixedText(root.floor, 4),
    units,
    ordersPerYear: fixedText(dividedBy(d, root.floor), 4),
    orderingCostMinor: minor(roundWhole(dividedBy(times(d, s), root.floor))),
    holdingCostMinor: minor(roundWhole(dividedBy(times(root.floor, h), ratio(2, 1)))),
  });
}

export interface ReorderPoint {
  readonly leadTimeDemand: string;
  readonly sigmaLeadTime: string;
  readonly safetyStock: string;
  readonly exact: string;
  /** Rounded up to a whole stocking unit. */
  readonly units: number;
}

/** Spread of demand: of the whole lead time, or of one day (then multiplied by the root of the lead time). */
export type DemandSpread = { readonly sigmaLeadTime: string } | { readonly sigmaDaily: string };

/**
 * Reorder point = daily demand * lead time + safety stock; safety stock = z * sigma_L, or z * sigma_d * sqrt(L).
 * @param demand units, decimal text, over `days` working days
 * @param leadTimeDays working days, decimal text
 * Refuses `NOT_POSITIVE` with the field. Source: standard inventory texts (z * sigma of lead-time demand).
 */
export function reorderPoint(p: {
  readonly demand: string;
  readonly days: string;
  readonly leadTimeDays: string;
  readonly spread: DemandSpread;
  readonly z?: string;
}): Result<ReorderPoint> {
  const demand = positive(p.demand);
  if (!demand) return refuse("NOT_POSITIVE", "Type a use above 0.", { field: "demand" });
  const days = positive(p.days);
  if (!days) return refuse("NOT_POSITIVE", "Type the working days, above 0.", { field: "days" });
  const lead = positive(p.leadTimeDays);
  if (!lead) return refuse("NOT_POSITIVE", "Type a lead time above 0 days.", { field: "leadTimeDays" });
  const z = fraction(p.z ?? Z_95);
  const daily = "sigmaDaily" in p.spread;
  const sigma = fraction("sigmaDaily" in p.spread ? p.spread.sigmaDaily : p.spread.sigmaLeadTime);
  if (compareFractions(sigma, fraction("0")) < 0) return refuse("NOT_POSITIVE", "A spread is 0 or more.", { field: "spread" });

  const over = daily ? lead : one;
  const leadDemand = dividedBy(times(demand, lead), days);
  const sigmaL = rootOf(times(times(sigma, sigma), over));
  const safety = rootOf(times(times(times(z, z), times(sigma, sigma)), over));
  return ok({
    leadTimeDemand: fixedText(leadDemand, 4),
    sigmaLeadTime: fixedText(sigmaL.floor, 4),
    safetyStock: fixedText(safety.floor, 4),
    exact: fixedText(plus(leadDemand, safety.floor), 4),
    units: Number(ceilingOfSum(leadDemand, safety)),
  });
}

/** Whether there is enough history to trust the formulas. */
export const hasEnoughHistory = (issuesPerYear: number): boolean => issuesPerYear >= ISSUES_PER_YEAR_MIN;
