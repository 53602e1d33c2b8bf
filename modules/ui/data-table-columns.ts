import type { ReactNode } from "react";

export interface DataColumn<Row> {
  id: string;
  head: ReactNode;
  cell: (row: Row) => ReactNode;
  /** Makes the head a sort key. Returns what to order by; null sorts last. */
  sortBy?: (row: Row) => string | number | null;
  /** First press sorts from high to low (newest, dearest). */
  highFirst?: boolean;
  align?: "start" | "end";
  /** Table figures: slightly narrow. */
  figures?: boolean;
  /** Identity of the row: with `hrefOf` its content becomes the link. */
  primary?: boolean;
  /** Left out below 1280 px. */
  desktopOnly?: boolean;
  className?: string;
  width?: number | string;
}

export interface Sort {
  column: string;
  descending: boolean;
}

/** Ascending order of sort values: numbers by size, text by the rules of the reader's language, null last. */
export function compareValues(a: string | number | null, b: string | number | null): number {
  if (a === null || b === null) return a === b ? 0 : a === null ? 1 : -1;
  if (typeof a === "number" && typeof b === "number") return a - b;
  return String(a).localeCompare(String(b), undefined, { numeric: true, sensitivity: "base" });
}

/** Where the picked row goes on a key; null when the key is not one of the table's. `at` -1 means none picked yet. */
export function nextRow(key: string, at: number, count: number): number | null {
  if (count === 0) return null;
  switch (key) {
    case "ArrowDown":
      return Math.min(count - 1, at + 1);
    case "ArrowUp":
      return Math.max(0, at - 1);
    case "Home":
      return 0;
    case "End":
      return count - 1;
    case "PageDown":
      return Math.min(count - 1, at + 10);
    case "PageUp":
      return Math.max(0, at - 10);
    default:
      return null;
  }
}
