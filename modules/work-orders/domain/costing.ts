import { dividedBy, fixedText, fraction, ratio, times, type Fraction } from "@/modules/kernel/fraction";
import { basisPointsOf, minor, sumMinor, timesFraction, type Minor } from "@/modules/kernel/money";

/** Bench minutes of one person on a job, at the pay rate of that date (minor units an hour). */
export interface PersonTime {
  readonly minutes: number;
  readonly rateMinorPerHour: Minor;
}

export interface LaborCost {
  readonly minutes: number;
  /** Sum over people of round(minutes / 60 * rate). */
  readonly directMinor: Minor;
  readonly burdenMinor: Minor;
  readonly loadedMinor: Minor;
}

/**
 * Loaded labor of a job. Rounded once per person (all minutes at one rate together) and once for the burden.
 * `burdenBp`: payroll burden in basis points. Overtime premium is overhead and not in here.
 */
export function laborCost(people: readonly PersonTime[], burdenBp: number): LaborCost {
  const directMinor = sumMinor(people.map((p) => timesFraction(p.rateMinorPerHour, p.minutes, 60)));
  const burdenMinor = basisPointsOf(directMinor, burdenBp);
  return {
    minutes: people.reduce((sum, p) => sum + p.minutes, 0),
    directMinor,
    burdenMinor,
    loadedMinor: minor(directMinor + burdenMinor),
  };
}

/** A ratio for people to read: decimal text, or null when there is nothing to divide by (printed as "-"). */
const figure = (part: Fraction, whole: Fraction, decimals: number): string | null =>
  whole.num === 0n ? null : fixedText(dividedBy(part, whole), decimals);

/** Book hours earned / bench hours * 100, two decimals. `bookHours` is decimal text, `"18.9"`. Rework earns no book hours. */
export const efficiencyPercent = (bookHours: string, benchMinutes: number): string | null =>
  figure(times(fraction(bookHours), ratio(6000, 1)), ratio(benchMinutes, 1), 2);

/** Book hours earned / door hours * 100, two decimals: efficiency * utilisation. */
export const productivityPercent = (bookHours: string, doorMinutes: number): string | null => efficiencyPercent(bookHours, doorMinutes);

/** Labor sold net of labor discount per bench hour, in major units of a currency with two decimals. */
export const effectiveRate = (laborNetMinor: Minor, benchMinutes: number): string | null =>
  figure(ratio(laborNetMinor * 60, 100), ratio(benchMinutes, 1), 2);

/** Actual hours / book hours, two decimals. */
export const quoteToActual = (benchMinutes: number, bookHours: string): string | null =>
  figure(ratio(benchMinutes, 60), fraction(bookHours), 2);

/** What a job brought and cost, all in minor units and positive. */
export interface JobFigures {
  /** Without tax, deposits and core charges, after discounts. */
  readonly netSalesMinor: Minor;
  readonly partsCostMinor: Minor;
  readonly loadedLaborMinor: Minor;
  readonly outsideMinor: Minor;
  readonly freightOutMinor: Minor;
  readonly paymentFeesMinor: Minor;
}

export interface JobProfit {
  readonly costMinor: Minor;
  readonly profitMinor: Minor;
  /** Percent of net sales, two decimals; null when nothing was sold. */
  readonly marginPercent: string | null;
}

/** Profit = net sales - parts - loaded labor - outside - freight out - payment fees. */
export function jobProfit(f: JobFigures): JobProfit {
  const costMinor = sumMinor([f.partsCostMinor, f.loadedLaborMinor, f.outsideMinor, f.freightOutMinor, f.paymentFeesMinor]);
  const profitMinor = minor(f.netSalesMinor - costMinor);
  return { costMinor, profitMinor, marginPercent: figure(ratio(profitMinor * 100, 1), ratio(f.netSalesMinor, 1), 2) };
}

/** Work in process of an open job: parts issued less parts cost already billed. */
export const workInProcess = (issuedMinor: Minor, billedCostMinor: Minor): Minor => minor(issuedMinor - billedCostMinor);
