import { ok, refuse, type Result } from "@/modules/kernel/result";
import type { LiftUnit } from "./lift-ladder";
import { MM_PER_IN } from "./units";
import { typedNumber } from "./typed-number";

export interface CamPoint {
  readonly angleDeg: number;
  readonly liftUm: number;
}

/** Rows a cam table may hold: half a degree over two turns of the crank and some more. Our choice. */
export const CAM_ROWS_MAX = 1500;
const UM_PER: Readonly<Record<LiftUnit, number>> = { mm: 1000, in: 1000 * MM_PER_IN };

/**
 * Cam table as pasted: one line a point, angle in degrees and lift at the valve, with a tab, semicolon or blanks between.
 * Point or comma for decimals. Angles increase; lifts from 0 to 50 mm; empty lines are passed over.
 * Errors: CAM_TABLE_NOT_READABLE with the row number in words.
 */
export function camTable(text: string, unit: LiftUnit): Result<readonly CamPoint[]> {
  const bad = (row: number, words: string) => refuse("CAM_TABLE_NOT_READABLE", `Row ${row}: ${words}`, { field: "profile", data: { row } });
  const points: CamPoint[] = [];
  const rows = text.split(/\r?\n/);
  for (const [i, raw] of rows.entries()) {
    const row = raw.trim();
    if (row === "") continue;
    const cells = row.split(/[\t;]+|\s+/).filter(Boolean);
    if (cells.length !== 2) return bad(i + 1, "write an angle and a lift with a blank, tab or semicolon between, such as 20 1.25.");
    const [angle, lift] = cells.map((c) => typedNumber(c));
    if (!angle?.ok || !lift?.ok) return bad(i + 1, "both must be numbers, with a point or a comma for decimals.");
    const last = points.at(-1);
    if (last && angle.value <= last.angleDeg) return bad(i + 1, "each angle must be larger than the one before it.");
    const liftUm = Math.round(lift.value * UM_PER[unit]);
    if (liftUm < 0 || liftUm > 50_000) return bad(i + 1, "the lift must be from 0 to 50 mm.");
    points.push({ angleDeg: angle.value, liftUm });
    if (points.length > CAM_ROWS_MAX) return bad(i + 1, `a table holds at most ${CAM_ROWS_MAX} points.`);
  }
  if (points.length < 3) return refuse("CAM_TABLE_NOT_READABLE", "A cam table needs at least three points.", { field: "profile" });
  return ok(points);
}

/** The table as text again, for editing: mm with three decimals, inches with four. */
export const camTableText = (points: readonly CamPoint[], unit: LiftUnit): string =>
  points.map((p) => `${p.angleDeg} ${unit === "mm" ? (p.liftUm / 1000).toFixed(3) : (p.liftUm / 25_400).toFixed(4)}`).join("\n");
