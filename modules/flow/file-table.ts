import Papa from "papaparse";

/** Largest file of readings, bytes. Our choice: some hundred times a long session. */
export const FILE_BYTES_MAX = 1_000_000;

/** Text of a file as rows of cells, the delimiter found by itself: comma, semicolon, tab or bar; quotes as RFC 4180. */
export function fileTable(text: string): { rows: string[][]; delimiter: string } {
  const parsed = Papa.parse<string[]>(text.replace(/\s+$/, ""), { delimitersToGuess: [";", "\t", ",", "|"], skipEmptyLines: false });
  return { rows: parsed.data, delimiter: parsed.meta.delimiter };
}
