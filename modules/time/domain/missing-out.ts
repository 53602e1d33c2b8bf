import { addDays, localDate, startOfDay } from "@/modules/kernel/instant";

/** An attendance may stay open so long, or so long past the midnight after it began, before it is asked about. */
const OPEN_HOURS_MAX = 16;
const PAST_MIDNIGHT_HOURS = 4;

/** Whether an open attendance looks forgotten. Nothing is stopped by it; the person is asked. */
export const isOutMissing = (since: Date, now: Date, zone: string): boolean =>
  now.getTime() - since.getTime() > OPEN_HOURS_MAX * 3_600_000 || now.getTime() > startOfDay(addDays(localDate(since, zone), 1), zone).getTime() + PAST_MIDNIGHT_HOURS * 3_600_000;
