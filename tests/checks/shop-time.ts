import { z } from "@/modules/kernel/zod";
import { fraction, ratio, roundWhole, times } from "@/modules/kernel/fraction";
import { instantOf, localMinute } from "@/modules/kernel/instant";
import { minorText, type Minor } from "@/modules/kernel/money";
import { gainTable } from "@/modules/flow/domain/gain";
import { gainSummary } from "@/modules/flow/domain/gain-summary";
import { cureReadyAt } from "@/modules/time/domain/cure";
import { hoursText } from "@/modules/time/domain/elapsed";
import { salaryRates, weekPay, type StraightPay } from "@/modules/time/domain/overtime";
import { roundPunch, ROUNDING_STEPS } from "@/modules/time/domain/rounding";
import { shareMinutes } from "@/modules/time/domain/share-minutes";
import { shiftMinutes } from "@/modules/time/domain/shift-hours";
import { effectiveRate, efficiencyPercent, laborCost } from "@/modules/work-orders/domain/costing";
import { moneyText, percentBp, reads, valueOf, type Adapter } from "./shop-case";

/** Hours as decimal text to whole minutes. */
const hoursIn = z.string().transform((t) => Number(roundWhole(times(fraction(t), ratio(60, 1)))));

function week(pay: readonly StraightPay[], bonus?: Minor): Record<string, unknown> {
  const w = valueOf(weekPay(pay, bonus));
  return { regular_rate: w.regularRate, overtime_premium: minorText(w.premiumMinor), total: minorText(w.totalMinor) };
}
const hourly = reads({ rate: moneyText, hours: hoursIn, bonus: moneyText.optional() }, (i) =>
  week([{ kind: "hourly", minutes: i.hours, rateMinorPerHour: i.rate }], i.bonus),
);

const ZONE = "America/Denver";
const rounding = reads({ step_minutes: z.literal(ROUNDING_STEPS), punches: z.array(z.string()) }, (i) => ({
  rounded: i.punches.map((p) => localMinute(roundPunch(instantOf(`2026-03-04T${p}`, ZONE), i.step_minutes, ZONE), ZONE).slice(11)),
}));

const nightShift = reads({ zone: z.string(), start: z.string(), end: z.string(), unpaid_meal_minutes: z.number() }, (i) => ({
  hours: hoursText(valueOf(shiftMinutes({
    start: i.start, end: i.end, zone: i.zone, breaks: [{ minutes: i.unpaid_meal_minutes, isRelievedOfDuty: true }],
  }))),
}));

export const timeAdapters: Readonly<Record<string, Adapter>> = {
  "P-OT-01": hourly, "P-OT-02": hourly, "P-OT-05": hourly,
  "P-OT-03": reads({ piece_earnings: moneyText, productive_hours: hoursIn, waiting_hours: hoursIn, waiting_rate: moneyText }, (i) =>
    week([
      { kind: "amount", minutes: i.productive_hours, amountMinor: i.piece_earnings },
      { kind: "hourly", minutes: i.waiting_hours, rateMinorPerHour: i.waiting_rate },
    ]),
  ),
  "P-OT-04": reads({ salary: moneyText, salary_hours: z.string() }, (i) => {
    const r = valueOf(salaryRates(i.salary, Number(i.salary_hours)));
    return { regular_rate: r.regularRate, overtime_rate: r.overtimeRate };
  }),
  "P-TR-01": rounding, "P-TR-02": rounding, "P-TR-03": rounding,
  "P-DST-01": nightShift, "P-DST-02": nightShift,
  "P-DST-03": reads({ zone: z.string(), start: z.string(), cure_hours: z.number() }, (i) => {
    const ready = cureReadyAt(instantOf(i.start, i.zone), i.cure_hours * 60);
    return { ready_local: localMinute(ready, i.zone), ready_utc: ready.toISOString().replace(".000Z", "Z") };
  }),
  "P-LAB-01": reads(
    {
      book_hours: z.string(), actual_minutes: z.number(), labor_net: moneyText, burden_pct: percentBp,
      labor_by_person: z.array(z.strictObject({ minutes: z.number(), rate: moneyText })),
    },
    (i) => {
      const c = laborCost(i.labor_by_person.map((p) => ({ minutes: p.minutes, rateMinorPerHour: p.rate })), i.burden_pct);
      if (c.minutes !== i.actual_minutes) throw new Error("the people's minutes are not the job's");
      return {
        actual_hours: hoursText(c.minutes), efficiency_pct: efficiencyPercent(i.book_hours, c.minutes),
        effective_rate: effectiveRate(i.labor_net, c.minutes), direct_labor: minorText(c.directMinor),
        burden: minorText(c.burdenMinor), loaded_labor: minorText(c.loadedMinor),
      };
    },
  ),
  "P-LAB-02": reads({ minutes: z.number(), weights: z.array(z.string()) }, (i) => ({
    minutes_each: valueOf(shareMinutes(i.minutes, { by: "book", bookMinutes: i.weights.map(Number) })),
  })),
  "P-FLOW-01": reads(
    { lift_in: z.array(z.string()), baseline_cfm: z.array(z.string()), final_cfm: z.array(z.string()), depression_inH2O: z.string() },
    (i) => {
      const rows = valueOf(gainTable({ lifts: i.lift_in.map(Number), beforeCfm: i.baseline_cfm.map(Number), afterCfm: i.final_cfm.map(Number) }));
      const s = gainSummary(rows);
      return {
        gain_cfm: rows.map((r) => String(r.gainCfm)), average_gain_cfm: s?.averageGainCfm, average_gain_pct: s?.averageGainPercent,
        peak_gain_cfm: s?.peakGainCfm, peak_lift: s?.peakLift,
      };
    },
  ),
};
