import { addDays, localDate, startOfDay, weekday } from "@/modules/kernel/instant";

export interface Workweek { readonly days: readonly string[]; readonly from: Date; readonly to: Date }

/**
 * The fixed week of seven shop days that holds a business date: `startDay` 0 = Sunday. Its length is 168 h of wall clock;
 * a week with a clock change has 167 or 169 elapsed hours. Source: 29 CFR 778.105.
 */
export function workweekOf(date: string, startDay: number, zone: string): Workweek {
  const first = addDays(date, -((weekday(date) - startDay + 7) % 7));
  const days = Array.from({ length: 7 }, (_, i) => addDays(first, i));
  return { days, from: startOfDay(first, zone), to: startOfDay(addDays(first, 7), zone) };
}

export const weekHolding = (instant: Date, startDay: number, zone: string): Workweek => workweekOf(localDate(instant, zone), startDay, zone);
