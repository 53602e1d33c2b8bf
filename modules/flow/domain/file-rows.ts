import type { PortSide } from "./comparison-reasons";
import { parseLiftUm, type LiftUnit } from "./lift-ladder";
import { typedNumber } from "./typed-number";

export type DecimalSign = "." | ",";

/** Which column of a file holds what, counted from 0; null = not in the file. */
export interface FileMapping {
  readonly headerRows: number;
  readonly decimal: DecimalSign;
  readonly lift: number;
  readonly flow: number;
  readonly pressure: number | null;
  readonly side: number | null;
  readonly cylinder: number | null;
  readonly repeat: number | null;
  readonly range: number | null;
  readonly liftUnit: LiftUnit;
  /** For files that name no side or cylinder. */
  readonly fixedSide: PortSide;
  readonly fixedCylinder: number;
}

export interface FileReading {
  /** As a spreadsheet counts: the first line of the file is 1. */
  readonly row: number;
  readonly side: PortSide;
  readonly cylinder: number;
  readonly liftText: string;
  readonly liftUm: number;
  readonly repeatNo: number;
  readonly valueText: string;
  readonly pressureText: string;
  readonly rangeLabel: string | null;
}
export interface RowRefusal {
  readonly row: number;
  readonly column: "lift" | "flow" | "pressure" | "side" | "cylinder" | "repeat" | "row";
  readonly words: string;
}
export interface FileRows {
  readonly readings: readonly FileReading[];
  readonly refusals: readonly RowRefusal[];
  /** Rows that say again, word for word, what an earlier row said. */
  readonly duplicates: readonly { readonly row: number; readonly of: number }[];
}

/** One file holds so many readings: two sides of eight ports with repeats and to spare. Our choice. */
export const FILE_ROWS_MAX = 2000;
const SIDE_WORDS: Readonly<Record<string, PortSide>> = {
  i: "intake", in: "intake", int: "intake", intake: "intake", inlet: "intake", e: "exhaust", ex: "exhaust", exh: "exhaust", exhaust: "exhaust", outlet: "exhaust",
};

/** A number of a file in its own decimal sign; the other sign is refused, because it may be a thousands mark. */
function numberText(text: string, decimal: DecimalSign): string | null {
  const t = text.trim();
  if (t === "" || t.includes(decimal === "." ? "," : ".")) return null;
  return typedNumber(t).ok ? t : null;
}
const wholeIn = (text: string, most: number): number | null => (/^\d{1,2}$/.test(text.trim()) && Number(text) >= 1 && Number(text) <= most ? Number(text) : null);

/**
 * Readings of a file by the mapping. Every row is read, refused with its number and reason, or known as a repetition; none is
 * dropped without a word. A lift that comes again with another flow is the next repeat unless the file numbers its repeats.
 * Empty rows are passed over. @param cylinders of the head.
 */
export function fileRows(rows: readonly (readonly string[])[], mapping: FileMapping, cylinders: number): FileRows {
  const readings: FileReading[] = [];
  const refusals: RowRefusal[] = [];
  const duplicates: { row: number; of: number }[] = [];
  const said = new Map<string, number>();
  const repeats = new Map<string, number>();
  const sign = mapping.decimal === "." ? "a point" : "a comma";
  rows.forEach((cells, index) => {
    const row = index + 1;
    if (index < mapping.headerRows || cells.every((c) => c.trim() === "")) return;
    const at = (column: number | null): string => (column === null ? "" : (cells[column] ?? "").trim());
    const no = (column: RowRefusal["column"], words: string) => { refusals.push({ row, column, words }); };
    if (readings.length >= FILE_ROWS_MAX) return no("row", `A file holds at most ${FILE_ROWS_MAX} readings. Split it.`);

    const side = mapping.side === null ? mapping.fixedSide : SIDE_WORDS[at(mapping.side).toLowerCase()];
    if (!side) return no("side", `"${at(mapping.side)}" is no side. Write intake or exhaust, in or ex.`);
    const cylinder = mapping.cylinder === null ? mapping.fixedCylinder : wholeIn(at(mapping.cylinder), cylinders);
    if (cylinder === null) return no("cylinder", `"${at(mapping.cylinder)}" is no port of this head. Write a number from 1 to ${cylinders}.`);
    const liftText = numberText(at(mapping.lift).replace(/\s*(in|mm|"|″)$/i, ""), mapping.decimal);
    const lift = liftText === null ? null : parseLiftUm(at(mapping.lift), mapping.liftUnit);
    if (!lift?.ok) return no("lift", `"${at(mapping.lift)}" is no lift. Write a number with ${sign} for decimals, up to 50 mm.`);
    const valueText = numberText(at(mapping.flow), mapping.decimal);
    if (valueText === null) return no("flow", `"${at(mapping.flow)}" is no flow. Write a number with ${sign} for decimals and no thousands mark.`);
    const pressureText = mapping.pressure === null ? "" : numberText(at(mapping.pressure), mapping.decimal);
    if (pressureText === null) return no("pressure", `"${at(mapping.pressure)}" is no pressure. Write a number with ${sign} for decimals.`);
    const pressure = typedNumber(pressureText);
    if (mapping.pressure !== null && (!pressure.ok || pressure.value <= 0)) return no("pressure", "The pressure held must be above zero.");

    const port = `${cylinder}/${side}`;
    const spoken = `${port}/${cells.map((c) => c.trim()).join("\u0001")}`;
    const first = said.get(spoken);
    if (first !== undefined) { duplicates.push({ row, of: first }); return; }
    const cell = `${port}/${lift.value}`;
    const given = mapping.repeat === null ? null : wholeIn(at(mapping.repeat), 9);
    if (mapping.repeat !== null && given === null) return no("repeat", `"${at(mapping.repeat)}" is no repeat number. Write 1 to 9.`);
    const repeatNo = given ?? (repeats.get(cell) ?? 0) + 1;
    if (repeatNo > 9) return no("repeat", "One lift holds at most nine repeats.");
    const clash = readings.find((r) => r.cylinder === cylinder && r.side === side && r.liftUm === lift.value && r.repeatNo === repeatNo);
    if (clash) return no("repeat", `Row ${clash.row} has this port, lift and repeat already, with ${clash.valueText}. Keep one of the two.`);
    said.set(spoken, row);
    repeats.set(cell, Math.max(repeats.get(cell) ?? 0, repeatNo));
    readings.push({ row, side, cylinder, liftText: at(mapping.lift), liftUm: lift.value, repeatNo, valueText, pressureText, rangeLabel: at(mapping.range) || null });
  });
  return { readings, refusals, duplicates };
}

/** Words in a head line, and the column they most likely stand over. A guess to begin from; the person decides. */
const GUESSES: readonly (readonly [keyof Pick<FileMapping, "lift" | "flow" | "pressure" | "side" | "cylinder" | "repeat" | "range">, RegExp])[] = [
  ["lift", /\blift\b|^l$/i], ["flow", /\bflow\b|cfm|reading|l\/s|m3\/h/i], ["pressure", /press|depression|h2o|held|kpa/i], ["side", /\bside\b|in\/ex|direction/i],
  ["cylinder", /cyl|\bport\b/i], ["repeat", /repeat|\brun\b|pass/i], ["range", /range|orifice/i],
];

/** Where the columns seem to be. Lift and flow fall back to the first two columns. */
export function guessMapping(rows: readonly (readonly string[])[]): FileMapping {
  const [head = []] = rows;
  const isHead = head.some((c) => /\p{L}/u.test(c) && !(c.trim().toLowerCase() in SIDE_WORDS));
  const found = new Map<string, number>();
  if (isHead) {
    head.forEach((cell, i) => {
      const guess = GUESSES.find(([name, words]) => !found.has(name) && words.test(cell));
      if (guess) found.set(guess[0], i);
    });
  }
  const body = rows.slice(isHead ? 1 : 0, 40);
  const cells = body.flat();
  const commas = cells.filter((c) => /^\s*-?\d+,\d+\s*$/.test(c)).length;
  const points = cells.filter((c) => /^\s*-?\d*\.\d+\s*$/.test(c)).length;
  const lift = found.get("lift") ?? 0;
  const lifts = body.map((r) => Number((r[lift] ?? "").replace(",", "."))).filter((n) => Number.isFinite(n) && n > 0);
  const headWords = isHead ? (head[lift] ?? "") : "";
  // Valve lifts in inches stay under 1.2; millimetres soon pass it.
  const liftUnit: LiftUnit = /mm/i.test(headWords) ? "mm" : /\bin\b|"/i.test(headWords) || Math.max(0, ...lifts) <= 1.2 ? "in" : "mm";
  const column = (name: string) => found.get(name) ?? null;
  return {
    headerRows: isHead ? 1 : 0, decimal: commas > points ? "," : ".", lift, flow: found.get("flow") ?? (lift === 1 ? 0 : 1), pressure: column("pressure"), side: column("side"),
    cylinder: column("cylinder"), repeat: column("repeat"), range: column("range"), liftUnit, fixedSide: "intake", fixedCylinder: 1,
  };
}
