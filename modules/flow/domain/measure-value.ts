import { ok, refuse, type Result } from "@/modules/kernel/result";
import { BASE_UNIT, TABLE_UNIT, UNITS_OF, type Dimension, type MeasureKind } from "./measure-kinds";
import { typedNumber } from "./typed-number";
import { convertUnit, MM_PER_IN } from "./units";

export interface MeasuredValue {
  readonly valueText: string;
  readonly unit: string;
  /** In the base unit of its dimension. */
  readonly base: number;
}

/** A value in the base unit of its dimension; nine decimals are kept, finer is binary dust. */
export function toBase(value: number, unit: string, dimension: Dimension): Result<number> {
  const base = BASE_UNIT[dimension];
  if (unit === base) return ok(value);
  const from = TABLE_UNIT[unit];
  const to = TABLE_UNIT[base];
  if (!from || !to) return refuse("UNIT_KIND_MISMATCH", `${unit} does not fit here. Write ${UNITS_OF[dimension].join(" or ")}.`, { field: "value" });
  const made = convertUnit(value, from, to);
  return made.ok ? ok(Math.round(made.value * 1e9) / 1e9) : made;
}

/**
 * A measurement as typed: a number, with a unit behind it where it is not the sheet's (`1.319 in`, `33,5`, `46 lbf`).
 * Errors: NUMBER_NOT_FINITE, UNIT_KIND_MISMATCH, MEASURE_NEGATIVE.
 */
export function measuredValue(text: string, kind: MeasureKind, sheetUnit: string): Result<MeasuredValue> {
  const m = /^(.*?)\s*([a-z/°"″]+[23²]?)?$/i.exec(text.trim());
  const written = m?.[2]?.replace(/^["″]$/, "in").replace(/2$/, "²");
  const unit = written ? (UNITS_OF[kind.dimension].find((u) => u.toLowerCase() === written.toLowerCase()) ?? written) : sheetUnit;
  const number = typedNumber(m?.[1] ?? "");
  if (!number.ok) return refuse("NUMBER_NOT_FINITE", `This is not a number. Write digits with a point or a comma, and ${UNITS_OF[kind.dimension].join(" or ")} behind it if you like.`, { field: "value" });
  if (!UNITS_OF[kind.dimension].includes(unit)) return refuse("UNIT_KIND_MISMATCH", `${unit} does not fit here. Write ${UNITS_OF[kind.dimension].join(" or ")}.`, { field: "value" });
  if (number.value < 0 && kind.usual[0] >= 0) return refuse("MEASURE_NEGATIVE", "This cannot be below zero. Check the sign.", { field: "value" });
  const base = toBase(number.value, unit, kind.dimension);
  return base.ok ? ok({ valueText: (m?.[1] ?? "").trim(), unit, base: base.value }) : base;
}

/** Something doubtful that is asked before it is kept. */
export interface MeasureQuestion {
  readonly code: "INCH_OR_MM" | "UNUSUAL";
  readonly words: string;
}

const inside = (value: number, [low, high]: readonly [number, number]): boolean => value >= low && value <= high;

/** 25.4 times too large or too small in a length is the other unit; elsewhere outside the usual is asked as such. */
export function measureQuestion(value: MeasuredValue, kind: MeasureKind): MeasureQuestion | null {
  if (inside(value.base, kind.usual)) return null;
  if (kind.dimension === "length") {
    const other = value.unit === "mm" ? value.base * MM_PER_IN : value.base / MM_PER_IN;
    // Nothing measures zero in either unit.
    if (value.base !== 0 && inside(other, kind.usual)) {
      const [said, meant] = value.unit === "mm" ? ["mm", "in"] : ["in", "mm"];
      return { code: "INCH_OR_MM", words: `${value.valueText} ${said} is 25.4 times off the usual. Inch or mm? Write ${value.valueText} ${meant}, or keep ${said}.` };
    }
  }
  const [low, high] = kind.usual;
  return { code: "UNUSUAL", words: `Usually between ${low} and ${high} ${BASE_UNIT[kind.dimension]}. Check the digits, or keep it as it is.` };
}

export interface MeasureLimit {
  readonly min: number | null;
  readonly max: number | null;
  readonly minText: string;
  readonly maxText: string;
  readonly unit: string;
  readonly source: string;
}
export type LimitVerdict = "within" | "below" | "above" | "no-limit";

/** A value against the shop's limit; ends count as within. Judged after rounding to a tenth of a micrometre or the like. */
export function againstLimit(base: number, limit: MeasureLimit | null): LimitVerdict {
  if (limit === null || (limit.min === null && limit.max === null)) return "no-limit";
  if (limit.min !== null && base < limit.min - 1e-7) return "below";
  return limit.max !== null && base > limit.max + 1e-7 ? "above" : "within";
}

/** `below 0.10 mm (service manual 4-12)`; what to do where nobody entered a limit. */
export function limitWords(verdict: LimitVerdict, limit: MeasureLimit | null): string {
  if (limit === null || verdict === "no-limit") return "defer to the service manual";
  if (verdict === "below") return `below ${limit.minText} ${limit.unit} (${limit.source})`;
  if (verdict === "above") return `above ${limit.maxText} ${limit.unit} (${limit.source})`;
  return `within ${limit.minText ? `${limit.minText}${limit.maxText ? " to " : " or more"}` : "up to "}${limit.maxText} ${limit.unit} (${limit.source})`;
}
