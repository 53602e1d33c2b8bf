/** Classes of parts a head shop keeps. Common practice of the trade, no published source. */
export const PART_CLASSES = [
  "valve", "spring", "retainer", "keeper", "spring seat", "seal", "guide", "seat ring", "lash shim", "gasket", "epoxy", "weld rod", "consumable", "kit", "core", "exchange head",
] as const;
export type PartClass = (typeof PART_CLASSES)[number];

/** Units parts are counted and issued in. */
export const STOCK_UNITS = ["each", "gram", "stick", "millilitre", "metre"] as const;
export type StockUnit = (typeof STOCK_UNITS)[number];

/** Counted in pieces: half a one does not exist. */
export const isCountedInPieces = (unit: string): boolean => unit === "each" || unit === "stick";

const SHORT = { each: "", gram: "g", stick: "sticks", millilitre: "ml", metre: "m" } as const satisfies Record<StockUnit, string>;
/** Unit as written behind a quantity; empty for pieces. */
export const unitMark = (unit: string): string => (SHORT as Record<string, string>)[unit] ?? unit;

/** Cautions a part carries to whoever handles it. Ask the maker's safety data sheet; the note beside it is the shop's. */
export const HAZARDS = ["", "contains beryllium copper", "titanium", "epoxy resin"] as const;

export const POSITIONS = ["", "intake", "exhaust"] as const;

export type MovementKind = "opening" | "receipt" | "receipt reversal" | "issue" | "return from job" | "return to supplier" | "count difference" | "scrap" | "reversal";

const WORDS = {
  opening: "Opening stock", receipt: "Taken in", "receipt reversal": "Take-in reversed", issue: "Issued", "return from job": "Back from the job",
  "return to supplier": "Back to the supplier", "count difference": "Counted", scrap: "Thrown out", reversal: "Reversed",
} as const satisfies Record<MovementKind, string>;
export const movementWords = (kind: string): string => (WORDS as Record<string, string>)[kind] ?? kind;

export const COUNT_CAUSES = ["routine count", "found none at the bench", "miscounted before", "damaged on the shelf", "issued without a note", "found again"] as const;
