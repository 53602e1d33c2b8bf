import type { BenchRange, RawCell } from "./raw-test";

/** A range pressed by hand: which cell was in hand, and when. */
export interface PressedRange {
  readonly cell: string;
  readonly label: string;
  /** ISO instant. */
  readonly at: string;
}
interface RangeCell { readonly valueText: string; readonly rangeLabel: string | null; readonly takenAt: string }

/** The reading of a test that was taken last, with a range; cleared cells do not count. */
export function lastRead(cells: readonly Pick<RawCell, "valueText" | "rangeLabel" | "takenAt">[]): RangeCell | null {
  return cells.filter((c) => c.valueText.trim() !== "" && c.rangeLabel !== null).reduce<RangeCell | null>((last, c) => (last === null || c.takenAt > last.takenAt ? c : last), null);
}

/**
 * The range a cell is read on. What was pressed for this cell comes first. A cell that holds a reading keeps its own. An empty
 * one takes what was pressed since the last reading of the test, else the range of that reading: the knob on the bench has not moved.
 * @param typed what is in the cell now and was typed here, saved or not; `saved` what the records hold of it. @param last of `lastRead`.
 */
export function rangeOfCell(input: { cell: string; pressed: PressedRange | null; typed: Omit<RangeCell, "takenAt"> | null; saved: Omit<RangeCell, "takenAt"> | null; last: RangeCell | null; ranges: readonly BenchRange[] }): string | null {
  const { cell, pressed, typed, saved, last, ranges } = input;
  const known = (label: string | null | undefined): string | null => (label !== null && label !== undefined && ranges.some((r) => r.label === label) ? label : null);
  const holds = (c: Omit<RangeCell, "takenAt"> | null) => c !== null && c.valueText.trim() !== "";
  const isEmpty = typed !== null ? !holds(typed) : !holds(saved);
  if (pressed !== null && (pressed.cell === cell || (isEmpty && !holds(saved) && (last === null || pressed.at > last.takenAt)))) {
    const label = known(pressed.label);
    if (label !== null) return label;
  }
  const own = (holds(typed) ? known(typed?.rangeLabel) : null) ?? (holds(saved) ? known(typed?.rangeLabel ?? saved?.rangeLabel) : null);
  return own ?? known(last?.rangeLabel) ?? ranges[0]?.label ?? null;
}

/** The range above (1) or below (-1) in the bench's own order; the end stays the end. */
export function nextRange(ranges: readonly BenchRange[], now: string | null, by: 1 | -1): string | null {
  const at = ranges.findIndex((r) => r.label === now);
  return ranges[Math.min(Math.max(at + by, 0), ranges.length - 1)]?.label ?? null;
}
