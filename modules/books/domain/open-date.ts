/**
 * The date itself, or the first day of the next month that is not closed.
 * @param date `YYYY-MM-DD` @param closed months `YYYY-MM`, any order
 */
export function firstOpenDate(date: string, closed: readonly string[]): string {
  let [year = 0, month = 1] = date.split("-").map(Number);
  const name = () => `${String(year).padStart(4, "0")}-${String(month).padStart(2, "0")}`;
  if (!closed.includes(name())) return date;
  while (closed.includes(name())) {
    month += 1;
    if (month > 12) [year, month] = [year + 1, 1];
  }
  return `${name()}-01`;
}
