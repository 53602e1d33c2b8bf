import Papa from "papaparse";

export type Delimiter = "auto" | "," | ";" | "\t";

/** A text of separated values as rows of cells, blanks around cells taken off, empty lines left out. Quoting as in RFC 4180. */
export function readCsv(text: string, delimiter: Delimiter = "auto"): { rows: string[][]; delimiter: string } {
  const { data, meta } = Papa.parse<string[]>(text.replace(/^\ufeff/, ""), { delimiter: delimiter === "auto" ? "" : delimiter, skipEmptyLines: "greedy", delimitersToGuess: [",", ";", "\t"] });
  return { rows: data.map((row) => row.map((cell) => cell.trim())), delimiter: meta.delimiter };
}
