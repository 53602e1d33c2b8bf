import { ok, refuse, type Result } from "@/modules/kernel/result";

/** A series of numbers: `INV`, `WO`, `PO`, `CN`, `EST`. */
export interface DocumentNumber {
  readonly series: string;
  /** null for a series that does not start anew each year. */
  readonly year: number | null;
  readonly number: number;
}

/** Digits printed at least, by series; others get 5. A longer number is printed in full, never cut. */
const DIGITS: Readonly<Record<string, number>> = { WO: 4, PO: 4 };

/** `INV`, 2026, 318 -> `INV-2026-00318`. Refuses `NUMBER_OUT_OF_RANGE`, `SERIES_NOT_LETTERS`. */
export function printDocumentNumber(n: DocumentNumber): Result<string> {
  if (!/^[A-Z]{2,4}$/.test(n.series)) return refuse("SERIES_NOT_LETTERS", "A series is two to four capital letters.", { field: "series" });
  if (!Number.isSafeInteger(n.number) || n.number < 1) return refuse("NUMBER_OUT_OF_RANGE", "A document number is 1 or more.", { field: "number" });
  const body = String(n.number).padStart(DIGITS[n.series] ?? 5, "0");
  return ok([n.series, ...(n.year === null ? [] : [String(n.year)]), body].join("-"));
}

/** Reads a number as printed, lower case and surrounding blanks allowed; null when it is none. */
export function readDocumentNumber(text: string): DocumentNumber | null {
  const m = /^([A-Z]{2,4})(?:-(\d{4}))?-(\d{4,9})$/.exec(text.trim().toUpperCase());
  if (!m) return null;
  return { series: m[1] ?? "", year: m[2] === undefined ? null : Number(m[2]), number: Number(m[3]) };
}

/** Every document number in a free text, e.g. of a bank line, in capital letters as printed. */
export function documentNumbersIn(text: string): string[] {
  const found = text.toUpperCase().match(/(?<![A-Z0-9])[A-Z]{2,4}-(?:\d{4}-)?\d{4,9}(?![0-9])/g);
  return [...new Set(found ?? [])];
}
