/** The minute a punch shows on the wall: seconds are kept in the record, minutes are what is counted. */
export const minuteOf = (instant: Date): number => Math.floor(instant.getTime() / 60_000);

/**
 * Whole minutes between two instants, counted from shown minute to shown minute: 08:10 to 08:38 is 28.
 * Absolute time, so a clock change neither adds nor takes any. Because both ends are read the same way,
 * neighbouring intervals add up exactly to the whole and neither side gains by it.
 */
export const elapsedMinutes = (from: Date, to: Date): number => minuteOf(to) - minuteOf(from);

/** Decimal hours of whole minutes as text with two decimals, half-up: 1149 -> `"19.15"`. */
export const hoursText = (minutes: number): string => {
  const hundredths = Math.floor((Math.abs(minutes) * 200 + 60) / 120);
  const s = String(hundredths).padStart(3, "0");
  return `${minutes < 0 && hundredths > 0 ? "-" : ""}${s.slice(0, -2)}.${s.slice(-2)}`;
};
