import dayjs from "dayjs";
import timezone from "dayjs/plugin/timezone";
import utc from "dayjs/plugin/utc";

dayjs.extend(utc);
dayjs.extend(timezone);

/** Offset of `zone` from UTC at an instant, in minutes (east positive). */
function offsetMinutes(instant: Date, zone: string): number {
  const p = partsIn(instant, zone);
  const asUtc = Date.UTC(p.year, p.month - 1, p.day, p.hour, p.minute, p.second);
  return Math.round((asUtc - Math.floor(instant.getTime() / 1000) * 1000) / 60_000);
}

const formatters = new Map<string, Intl.DateTimeFormat>();
function partsIn(instant: Date, zone: string) {
  let f = formatters.get(zone);
  if (!f) {
    f = new Intl.DateTimeFormat("en-US", {
      timeZone: zone, hourCycle: "h23", year: "numeric", month: "2-digit", day: "2-digit",
      hour: "2-digit", minute: "2-digit", second: "2-digit",
    });
    formatters.set(zone, f);
  }
  const get: Record<string, number> = {};
  for (const p of f.formatToParts(instant)) if (p.type !== "literal") get[p.type] = Number(p.value);
  return {
    year: get.year ?? 0, month: get.month ?? 1, day: get.day ?? 1,
    hour: get.hour ?? 0, minute: get.minute ?? 0, second: get.second ?? 0,
  };
}

const two = (n: number) => String(n).padStart(2, "0");

/** Business date (`YYYY-MM-DD`) of an instant on the shop's calendar. */
export function localDate(instant: Date, zone: string): string {
  const p = partsIn(instant, zone);
  return `${p.year}-${two(p.month)}-${two(p.day)}`;
}

/** Wall clock `YYYY-MM-DDTHH:mm` of an instant in the shop's zone. */
export function localMinute(instant: Date, zone: string): string {
  const p = partsIn(instant, zone);
  return `${p.year}-${two(p.month)}-${two(p.day)}T${two(p.hour)}:${two(p.minute)}`;
}

/**
 * The instants a wall-clock time (`YYYY-MM-DDTHH:mm[:ss]`) names in a zone: one as a rule, none when the
 * clocks jumped over it, two when they were put back across it.
 * Source of the zone rules: IANA time zone database, as shipped with the runtime.
 */
export function instantsOf(local: string, zone: string): Date[] {
  const m = /^(\d{4})-(\d{2})-(\d{2})T(\d{2}):(\d{2})(?::(\d{2}))?$/.exec(local);
  if (!m) return [];
  const [y, mo, d, h, mi, s] = m.slice(1).map((x) => Number(x ?? 0)) as [number, number, number, number, number, number];
  const guess = Date.UTC(y, mo - 1, d, h, mi, s);
  const offsets = new Set([offsetMinutes(new Date(guess - 86_400_000), zone), offsetMinutes(new Date(guess + 86_400_000), zone), offsetMinutes(new Date(guess), zone)]);
  const found = new Set<number>();
  for (const o of offsets) {
    const t = guess - o * 60_000;
    if (offsetMinutes(new Date(t), zone) === o) found.add(t);
  }
  return [...found].sort((a, b) => a - b).map((t) => new Date(t));
}

/** The one instant of a wall-clock time; the earlier one when it exists twice, the first after the gap when it does not exist. */
export function instantOf(local: string, zone: string): Date {
  const all = instantsOf(local, zone);
  if (all[0]) return all[0];
  return dayjs.tz(local, zone).toDate();
}

/** Midnight at which a business date begins in the zone. */
export const startOfDay = (date: string, zone: string): Date => instantOf(`${date}T00:00`, zone);

/** Calendar arithmetic on a business date; no clock involved. */
export function addDays(date: string, days: number): string {
  return dayjs.utc(date).add(days, "day").format("YYYY-MM-DD");
}

/** Whole calendar days from `a` to `b` (positive when b is later). */
export const daysBetween = (a: string, b: string): number => dayjs.utc(b).diff(dayjs.utc(a), "day");

/** Day of week of a business date, 0 = Sunday. */
export const weekday = (date: string): number => dayjs.utc(date).day();
