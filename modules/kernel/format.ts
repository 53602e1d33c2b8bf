import { minorText } from "./money";
import { localDate } from "./instant";

/** The only file that turns values into words for a place. Everything else asks here. */
export interface Place {
  readonly locale: string;
  readonly currency: string;
  readonly zone: string;
}

const cache = new Map<string, Intl.NumberFormat | Intl.DateTimeFormat>();
function numberFormat(locale: string, options: Intl.NumberFormatOptions): Intl.NumberFormat {
  const key = `n${locale}${JSON.stringify(options)}`;
  let f = cache.get(key) as Intl.NumberFormat | undefined;
  if (!f) cache.set(key, (f = new Intl.NumberFormat(locale, options)));
  return f;
}
function dateFormat(locale: string, options: Intl.DateTimeFormatOptions): Intl.DateTimeFormat {
  const key = `d${locale}${JSON.stringify(options)}`;
  let f = cache.get(key) as Intl.DateTimeFormat | undefined;
  if (!f) cache.set(key, (f = new Intl.DateTimeFormat(locale, options)));
  return f;
}

/** Decimals of an ISO 4217 currency. */
export const currencyDecimals = (currency: string): number =>
  numberFormat("en", { style: "currency", currency }).resolvedOptions().maximumFractionDigits ?? 2;

/** `$1,910.33` / `860,13 €`. */
export const money = (amountMinor: number, p: Pick<Place, "locale" | "currency">): string => {
  const d = currencyDecimals(p.currency);
  return numberFormat(p.locale, { style: "currency", currency: p.currency }).format(
    minorText(amountMinor, d) as unknown as number,
  );
};

/** `1,910.33` without the sign of the currency, for columns headed by it. */
export const amount = (amountMinor: number, p: Pick<Place, "locale" | "currency">): string => {
  const d = currencyDecimals(p.currency);
  return numberFormat(p.locale, { minimumFractionDigits: d, maximumFractionDigits: d }).format(
    minorText(amountMinor, d) as unknown as number,
  );
};

export const decimal = (n: number, digits: number, locale: string): string =>
  numberFormat(locale, { minimumFractionDigits: digits, maximumFractionDigits: digits }).format(n);

/** Whole minutes as decimal hours: `1149` -> `19.2`. */
export const hours = (minutes: number, locale: string, digits = 1): string => decimal(minutes / 60, digits, locale);

/** `1:42` from seconds, for a running clock. */
export const clock = (seconds: number): string =>
  `${Math.floor(seconds / 3600)}:${String(Math.floor((seconds % 3600) / 60)).padStart(2, "0")}`;

const utcNoon = (date: string) => new Date(`${date}T12:00:00Z`);

/** `13 Mar 2026` from a business date. */
export const date = (isoDate: string, locale: string): string =>
  dateFormat(locale, { timeZone: "UTC", day: "numeric", month: "short", year: "numeric" }).format(utcNoon(isoDate));

/** `Fri 13 Mar` from a business date. */
export const shortDate = (isoDate: string, locale: string): string => {
  const part = (o: Intl.DateTimeFormatOptions) => dateFormat(locale, { timeZone: "UTC", ...o }).format(utcNoon(isoDate));
  return `${part({ weekday: "short" })} ${part({ day: "numeric" })} ${part({ month: "short" })}`;
};

/** `Tuesday 1 December`. */
export const longDay = (isoDate: string, locale: string): string => {
  const part = (o: Intl.DateTimeFormatOptions) => dateFormat(locale, { timeZone: "UTC", ...o }).format(utcNoon(isoDate));
  return `${part({ weekday: "long" })} ${part({ day: "numeric" })} ${part({ month: "long" })}`;
};

/** `10:42` in the shop's zone. */
export const time = (instant: Date | string, p: Pick<Place, "locale" | "zone">): string =>
  dateFormat(p.locale, { timeZone: p.zone, hour: "2-digit", minute: "2-digit", hourCycle: "h23" }).format(new Date(instant));

/** `10:42:07` in the shop's zone: for "saved at". */
export const clockTime = (instant: Date | string, p: Pick<Place, "locale" | "zone">): string =>
  dateFormat(p.locale, { timeZone: p.zone, hour: "2-digit", minute: "2-digit", second: "2-digit", hourCycle: "h23" }).format(new Date(instant));

/** `19 Feb 2026, 10:42` in the shop's zone. */
export const dateTime = (instant: Date | string, p: Pick<Place, "locale" | "zone">): string =>
  `${date(localDate(new Date(instant), p.zone), p.locale)}, ${time(instant, p)}`;

/** `19 Feb 2026, 10:42 MST`: for papers, where the zone matters. */
export const dateTimeZone = (instant: Date | string, p: Pick<Place, "locale" | "zone">): string => {
  const name = dateFormat(p.locale, { timeZone: p.zone, timeZoneName: "short" }).formatToParts(new Date(instant));
  return `${dateTime(instant, p)} ${name.find((x) => x.type === "timeZoneName")?.value ?? ""}`.trim();
};
