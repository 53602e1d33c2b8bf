import { daysBetween } from "@/modules/kernel/instant";
import { minor, minorText, parseMinor, sumMinor, type Minor } from "@/modules/kernel/money";

export const DATE_ORDERS = ["ymd", "mdy", "dmy"] as const;
export type DateOrder = (typeof DATE_ORDERS)[number];

/** Which column of the bank's file is what; columns count from 0. */
export interface BankMapping {
  readonly hasHeader: boolean;
  readonly dateColumn: number;
  readonly dateOrder: DateOrder;
  readonly textColumns: readonly number[];
  readonly amountColumn: number;
  /** Money out stands in a column of its own, without a sign; null when one column holds both. */
  readonly outColumn: number | null;
  readonly decimalComma: boolean;
}

export interface FileLine { readonly row: number; readonly date: string; readonly text: string; readonly amountMinor: Minor; /** What makes the line one of a kind. */ readonly key: string }
export interface LineRefusal { readonly row: number; readonly message: string }

/** A date as the bank writes it, to `YYYY-MM-DD`; null when it is none. */
export function readBankDate(text: string, order: DateOrder): string | null {
  const m = /^(\d{1,4})[-./](\d{1,2})[-./](\d{1,4})$/.exec(text.trim()) ?? /^(\d{4})(\d{2})(\d{2})$/.exec(text.trim());
  if (!m) return null;
  const [a, b, c] = [Number(m[1]), Number(m[2]), Number(m[3])];
  const [y, mo, d] = order === "ymd" || (m[1]?.length ?? 0) === 4 ? [a, b, c] : order === "mdy" ? [c, a, b] : [c, b, a];
  const year = y < 100 ? 2000 + y : y;
  const iso = `${year}-${String(mo).padStart(2, "0")}-${String(d).padStart(2, "0")}`;
  // A day that does not exist turns into another one when counted.
  return mo >= 1 && mo <= 12 && d >= 1 && d <= 31 && year >= 1990 && year <= 2100 && daysBetween(`${year}-${String(mo).padStart(2, "0")}-01`, iso) === d - 1 && new Date(`${iso}T12:00:00Z`).getUTCDate() === d ? iso : null;
}

/** An amount as the bank writes it: sign before or behind, brackets for money out, thousands marks. Null when it is none. */
export function readBankAmount(text: string, decimalComma: boolean): Minor | null {
  let s = text.replace(/[\s\u00a0']/g, "").replace(/^[A-Z]{3}|[A-Z]{3}$|^[$€£]|[$€£]$/g, "").replace("\u2212", "-");
  let sign = 1;
  if (/^\(.*\)$/.test(s)) [sign, s] = [-1, s.slice(1, -1)];
  if (/^[-+]/.test(s)) [sign, s] = [s.startsWith("-") ? -sign : sign, s.slice(1)];
  else if (/[-+]$/.test(s)) [sign, s] = [s.endsWith("-") ? -sign : sign, s.slice(0, -1)];
  s = s.replace(/^[$€£]/, "");
  const plain = decimalComma ? s.replaceAll(".", "").replace(",", ".") : s.replaceAll(",", "");
  if (!/^\d+(\.\d+)?$/.test(plain)) return null;
  const value = parseMinor(plain);
  return value === null ? null : minor(sign * value);
}

/**
 * Reads the rows of a bank's file by a mapping. Every row is read or refused by its number; nothing is guessed. Two like
 * lines of one day are two: the key counts them.
 */
export function bankLinesOf(rows: readonly (readonly string[])[], m: BankMapping): { lines: FileLine[]; refused: LineRefusal[] } {
  const lines: FileLine[] = [];
  const refused: LineRefusal[] = [];
  const seen = new Map<string, number>();
  rows.forEach((cells, i) => {
    const row = i + 1;
    if (m.hasHeader && i === 0) return;
    const dateText = cells[m.dateColumn] ?? "";
    const date = readBankDate(dateText, m.dateOrder);
    const inText = cells[m.amountColumn] ?? "";
    const outText = m.outColumn === null ? "" : (cells[m.outColumn] ?? "");
    const amount = inText !== "" ? readBankAmount(inText, m.decimalComma) : outText !== "" ? readBankAmount(outText, m.decimalComma) : null;
    if (!date) return void refused.push({ row, message: `“${dateText.slice(0, 30)}” is not a date in the order chosen.` });
    if (amount === null) return void refused.push({ row, message: `“${(inText || outText).slice(0, 30)}” is not an amount with at most two decimals.` });
    const amountMinor = inText === "" && amount > 0 ? minor(-amount) : amount;
    if (amountMinor === 0) return;
    const text = m.textColumns.map((c) => cells[c] ?? "").filter(Boolean).join(" ").replace(/\s+/g, " ").slice(0, 300);
    const same = `${date}|${amountMinor}|${text}`;
    const index = (seen.get(same) ?? 0) + 1;
    seen.set(same, index);
    lines.push({ row, date, text, amountMinor, key: `${same}|${index}` });
  });
  return { lines, refused };
}

/** Closing must be opening and the lines; null when it is, else the sentence. */
export function checkClosing(openingMinor: number, closingMinor: number, lines: readonly FileLine[]): string | null {
  const should = openingMinor + sumMinor(lines.map((l) => l.amountMinor));
  return should === closingMinor ? null : `Opening ${minorText(openingMinor)} and the lines come to ${minorText(should)}, not ${minorText(closingMinor)}. A line is missing or is there twice.`;
}

/** A first guess at the mapping from the header's words; a person confirms it. */
export function guessMapping(rows: readonly (readonly string[])[], locale: string): BankMapping {
  const head = (rows[0] ?? []).map((h) => h.toLowerCase());
  const hasHeader = !head.some((c) => /\d{2,}[-./]\d{1,2}[-./]\d{1,4}/.test(c));
  const find = (words: RegExp, otherwise: number) => { const i = head.findIndex((h) => words.test(h)); return i === -1 ? otherwise : i; };
  const amountColumn = find(/amount|betrag|credit|haben|paid in|montant/, Math.max(0, head.length - 1));
  const out = find(/debit|soll|paid out|withdrawal/, -1);
  const sample = rows.slice(hasHeader ? 1 : 0, 12);
  const dateColumn = find(/date|datum|posted|valuta/, 0);
  const dates = sample.map((r) => r[dateColumn] ?? "");
  const texts = head.map((_, i) => i).filter((i) => /text|descr|memo|payee|name|verwendung|details|reference/.test(head[i] ?? ""));
  return {
    hasHeader, dateColumn, amountColumn, outColumn: out === -1 || out === amountColumn ? null : out,
    dateOrder: dates.some((d) => /^\d{4}/.test(d)) ? "ymd" : /-US$/.test(locale) && !dates.some((d) => Number(d.split(/[-./]/)[0]) > 12) ? "mdy" : "dmy",
    textColumns: texts.length ? texts : [1].filter((c) => c < head.length), decimalComma: sample.some((r) => /,\d{2}-?$/.test(r[amountColumn] ?? "")),
  };
}
