import { dividedBy, fixedText, plus, ratio, roundWhole, times, type Fraction } from "@/modules/kernel/fraction";
import { minor, type Minor } from "@/modules/kernel/money";
import { ok, refuse, type Result } from "@/modules/kernel/result";

/** Hours of a workweek paid without premium under federal rules. */
export const WEEK_MINUTES = 40 * 60;

/** Pay earned at straight time: hourly work, piece work, paid waiting. Minutes are hours worked. */
export type StraightPay =
  | { readonly kind: "hourly"; readonly minutes: number; readonly rateMinorPerHour: Minor }
  | { readonly kind: "amount"; readonly minutes: number; readonly amountMinor: Minor };

export interface WeekPay {
  readonly minutes: number;
  readonly overtimeMinutes: number;
  /** Regular rate per hour, 4 decimals, in major units of a currency with two decimals. */
  readonly regularRate: string;
  readonly straightMinor: Minor;
  /** The half-time on top, for the overtime hours. */
  readonly premiumMinor: Minor;
  readonly totalMinor: Minor;
}

/**
 * One workweek under the federal rule: regular rate = all straight pay (with a non-discretionary bonus) / all hours
 * worked; overtime adds half the regular rate for each hour over 40. Two hourly rates give their weighted average.
 * An estimate: the payroll service and the law of the place decide. Refuses `NO_HOURS`.
 * Source: 29 CFR 778.110, 778.111, 778.115.
 */
export function weekPay(pay: readonly StraightPay[], bonusMinor: Minor = minor(0)): Result<WeekPay> {
  const minutes = pay.reduce((sum, p) => sum + p.minutes, 0);
  if (minutes <= 0 || pay.some((p) => p.minutes < 0)) {
    return refuse("NO_HOURS", "There are no hours in this week, so there is no regular rate.", { field: "minutes" });
  }
  const straight = pay.reduce<Fraction>(
    (sum, p) => plus(sum, p.kind === "hourly" ? ratio(p.rateMinorPerHour * p.minutes, 60) : ratio(p.amountMinor, 1)),
    ratio(bonusMinor, 1),
  );
  const overtimeMinutes = Math.max(0, minutes - WEEK_MINUTES);
  const regular = dividedBy(times(straight, ratio(60, 1)), ratio(minutes, 1));
  const straightMinor = minor(roundWhole(straight));
  const premiumMinor = minor(roundWhole(times(regular, ratio(overtimeMinutes, 120))));
  return ok({
    minutes,
    overtimeMinutes,
    regularRate: fixedText(times(regular, ratio(1, 100)), 4),
    straightMinor,
    premiumMinor,
    totalMinor: minor(straightMinor + premiumMinor),
  });
}

/**
 * Regular and overtime rate of a salary meant for a fixed count of hours. Refuses `NO_HOURS`.
 * Source: 29 CFR 778.113(a).
 */
export function salaryRates(salaryMinor: Minor, hoursMeant: number): Result<{ regularRate: string; overtimeRate: string }> {
  if (!Number.isInteger(hoursMeant) || hoursMeant <= 0) {
    return refuse("NO_HOURS", "Say for how many whole hours a week the salary is meant.", { field: "hours" });
  }
  const regular = ratio(salaryMinor, hoursMeant * 100);
  return ok({ regularRate: fixedText(regular, 4), overtimeRate: fixedText(times(regular, ratio(3, 2)), 4) });
}

export interface DailySplit {
  readonly regularMinutes: number;
  /** Paid at one and a half. */
  readonly overtimeMinutes: number;
  /** Paid at two. */
  readonly doubleMinutes: number;
}

/**
 * State daily option for one workweek of seven days (minutes worked, first day first): over 8 h a day, over 40 h a
 * week, and the first 8 h of a seventh day worked in a row at one and a half; over 12 h a day, and over 8 h on that
 * seventh day, at two. No hour is counted twice. Refuses `NOT_SEVEN_DAYS`.
 * Source: California Labor Code 510(a).
 */
export function dailyOvertime(minutesByDay: readonly number[]): Result<DailySplit> {
  if (minutesByDay.length !== 7 || minutesByDay.some((m) => m < 0 || m > 1500)) {
    return refuse("NOT_SEVEN_DAYS", "A workweek has seven days of 0 to 25 hours each.", { field: "days" });
  }
  const isSeventhInRow = minutesByDay.every((m) => m > 0);
  let straight = 0;
  let overtimeMinutes = 0;
  let doubleMinutes = 0;
  minutesByDay.forEach((m, day) => {
    if (isSeventhInRow && day === 6) {
      overtimeMinutes += Math.min(m, 480);
      doubleMinutes += Math.max(0, m - 480);
      return;
    }
    straight += Math.min(m, 480);
    overtimeMinutes += Math.max(0, Math.min(m, 720) - 480);
    doubleMinutes += Math.max(0, m - 720);
  });
  const regularMinutes = Math.min(straight, WEEK_MINUTES);
  return ok({ regularMinutes, overtimeMinutes: overtimeMinutes + straight - regularMinutes, doubleMinutes });
}
