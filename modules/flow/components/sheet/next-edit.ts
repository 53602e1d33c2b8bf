import { SCALE_UNIT } from "../../domain/computed-reading";
import type { BenchScale, RawCell } from "../../domain/raw-test";
import type { CellEdit } from "./reading-queue";

/** What is said about a cell besides its value. */
export type CellMore = Partial<Pick<CellEdit, "acceptedReason" | "excludedReason" | "range" | "pressure" | "portTemperature" | "orificeTemperature">>;

const isHeld = (text: string | undefined): boolean => text !== undefined && text.trim() !== "";

/**
 * The next edit of a cell. A new value is read as the bench stands now: range in force, pressure held. What is in the cell
 * already keeps its pressure and its unit when it is only marked. A value typed over one in another unit stays in that unit, which
 * stands beside it, until the cell is emptied.
 * @param was the edit that stands in the cell, sent or not; `saved` what the records hold. @param held as typed; empty = nominal. @param at ISO instant.
 */
export function nextEdit(input: { scale: BenchScale; value: string; more: CellMore; was: CellEdit | null; saved: RawCell | null; held: string; range: string | null; requestId: string; at: string }): CellEdit {
  const { scale, value, more, was, saved, held, range, requestId, at } = input;
  const stood = saved && isHeld(saved.valueText) ? saved : null;
  const now = was && isHeld(was.value) ? was : stood?.valueText === value ? { pressure: stood.pressureText, pressureUnit: stood.pressureUnit } : { pressure: held };
  const pressureUnit = more.pressure === undefined && now.pressureUnit !== "inH2O" ? now.pressureUnit : undefined;
  const valueUnit = was ? (isHeld(was.value) ? was.valueUnit : undefined) : stood && stood.valueUnit !== SCALE_UNIT[scale] ? stood.valueUnit : undefined;
  // Leaving out and correcting for the air do not touch the value, so its time and the reason it was kept with stand.
  const isUntouched = "excludedReason" in more || "portTemperature" in more;
  return {
    requestId, value, range, pressure: now.pressure, ...(pressureUnit ? { pressureUnit } : {}), ...(valueUnit ? { valueUnit } : {}),
    portTemperature: was?.portTemperature ?? saved?.portTemperatureText ?? "", orificeTemperature: was?.orificeTemperature ?? saved?.orificeTemperatureText ?? "",
    acceptedReason: isUntouched ? ((was ?? stood)?.acceptedReason ?? null) : null, excludedReason: null, takenAt: isUntouched ? ((was ?? stood)?.takenAt ?? at) : at, ...more,
  };
}
