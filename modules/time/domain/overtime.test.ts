import { describe, expect, it } from "vitest";
import { minor } from "@/modules/kernel/money";
import { dailyOvertime, salaryRates, weekPay, type StraightPay } from "./overtime";

const hourly = (hours: number, rate: number): StraightPay => ({ kind: "hourly", minutes: hours * 60, rateMinorPerHour: minor(rate) });

describe("weekly overtime", () => {
  it.each<[string, StraightPay[], number, string, number, number]>([
    ["29 CFR 778.110(a): 46 h at 12.00", [hourly(46, 1200)], 0, "12.0000", 3600, 58_800],
    ["29 CFR 778.110(b): with a bonus of 46.00", [hourly(46, 1200)], 4600, "13.0000", 3900, 63_700],
    ["29 CFR 778.111(a): piece work 491.00 in 46 h, 4 h waiting at 8.00", [{ kind: "amount", minutes: 2760, amountMinor: minor(49_100) }, hourly(4, 800)], 0, "10.4600", 5230, 57_530],
    ["docs/hero-job.md: lead porter, 44.25 h at 38.00", [hourly(44.25, 3800)], 0, "38.0000", 8075, 176_225],
    // By hand: (30 * 20 + 20 * 30) / 50 = 24.00; 10 h * 12.00 on top.
    ["two rates, weighted average", [hourly(30, 2000), hourly(20, 3000)], 0, "24.0000", 12_000, 132_000],
    ["no overtime at exactly 40 h", [hourly(40, 1200)], 0, "12.0000", 0, 48_000],
  ])("%s", (_title, pay, bonus, regularRate, premiumMinor, totalMinor) => {
    expect(weekPay(pay, minor(bonus))).toMatchObject({ ok: true, value: { regularRate, premiumMinor, totalMinor } });
  });

  it("has no rate for a week without hours", () => {
    expect(weekPay([])).toMatchObject({ ok: false, refusal: { code: "NO_HOURS" } });
    expect(weekPay([hourly(50, 100), hourly(-1, 100)])).toMatchObject({ ok: false, refusal: { code: "NO_HOURS" } });
  });
});

describe("salary", () => {
  it("29 CFR 778.113(a): 182.70 for 35 h is 5.22, overtime 7.83", () => {
    expect(salaryRates(minor(18_270), 35)).toEqual({ ok: true, value: { regularRate: "5.2200", overtimeRate: "7.8300" } });
  });
  it("refuses a salary meant for no hours", () => {
    expect(salaryRates(minor(18_270), 0)).toMatchObject({ ok: false, refusal: { code: "NO_HOURS" } });
  });
});

describe("daily option", () => {
  // Worked by hand from the text of California Labor Code 510(a).
  it.each([
    ["five days of 9 h", [9, 9, 9, 9, 9, 0, 0], 40, 5, 0],
    ["one day of 14 h", [14, 0, 0, 0, 0, 0, 0], 8, 4, 2],
    ["six days of 8 h: the sixth is over 40", [8, 8, 8, 8, 8, 8, 0], 40, 8, 0],
    ["seven in a row, 10 h on the seventh", [6, 6, 6, 6, 6, 6, 10], 36, 8, 2],
    ["the last day after a day off is no seventh", [8, 0, 8, 8, 8, 0, 10], 40, 2, 0],
    ["over 8 a day and over 40 a week are not counted twice", [10, 10, 10, 10, 10, 10, 0], 40, 20, 0],
  ])("%s", (_title, hours, regular, overtime, double) => {
    expect(dailyOvertime(hours.map((h) => h * 60))).toEqual({
      ok: true, value: { regularMinutes: regular * 60, overtimeMinutes: overtime * 60, doubleMinutes: double * 60 },
    });
  });

  it("wants seven days", () => {
    expect(dailyOvertime([480])).toMatchObject({ ok: false, refusal: { code: "NOT_SEVEN_DAYS" } });
  });
});
