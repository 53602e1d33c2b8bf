import type { UnitName } from "./units";

/** What a measurement belongs to: each valve, each cylinder, or the whole head. */
export type MeasureScope = "valve" | "cylinder" | "head";
export type MeasureGroup = "springs" | "lash" | "clearances" | "seats" | "guides" | "ports" | "chamber" | "deck";
export type Dimension = "length" | "area" | "force" | "stiffness" | "volume" | "pressure" | "angle" | "time";

export interface MeasureKind {
  readonly key: string;
  readonly label: string;
  readonly group: MeasureGroup;
  readonly scope: MeasureScope;
  readonly dimension: Dimension;
  /** Where a value of this kind usually lies, in the base unit; outside it is asked. Common practice, no source; no limit of any engine. */
  readonly usual: readonly [number, number];
}

/** Base unit of each dimension: what figures are worked out in and `usual` is written in. */
export const BASE_UNIT = { length: "mm", area: "mm²", force: "N", stiffness: "N/mm", volume: "cc", pressure: "kPa", angle: "°", time: "s" } as const satisfies Record<Dimension, string>;
/** Units that may be typed, the first of metric and of inch. */
export const UNITS_OF: Readonly<Record<Dimension, readonly string[]>> = {
  length: ["mm", "in"], area: ["mm²", "in²"], force: ["N", "lbf"], stiffness: ["N/mm", "lbf/in"], volume: ["cc", "in3"], pressure: ["kPa", "psi"], angle: ["°"], time: ["s"],
};
/** The same in the names of the unit table, for what it converts. */
export const TABLE_UNIT: Readonly<Record<string, UnitName>> = { mm: "mm", in: "in", "mm²": "mm2", "in²": "in2", N: "N", lbf: "lbf", "N/mm": "N/mm", "lbf/in": "lbf/in", cc: "cc", in3: "in3", kPa: "kPa", psi: "psi" };

export const GROUP_WORDS: Readonly<Record<MeasureGroup, string>> = {
  springs: "Springs", lash: "Shims and lash", clearances: "Clearances that break engines", seats: "Seats and valves", guides: "Guides and stems", ports: "Ports", chamber: "Chamber and compression", deck: "Deck",
};

const kind = (key: string, label: string, group: MeasureGroup, scope: MeasureScope, dimension: Dimension, low: number, high: number): MeasureKind => ({ key, label, group, scope, dimension, usual: [low, high] });

/** The smallest section of each port, which the flow sheet holds the flows against. */
export const SECTION_KINDS = { intake: "section-intake", exhaust: "section-exhaust" } as const;

/** Everything the sheet has a line for, in the order it is measured. */
export const MEASURE_KINDS: readonly MeasureKind[] = [
  kind("spring-installed", "Installed height", "springs", "valve", "length", 15, 70),
  kind("spring-seat-load", "Seat load", "springs", "valve", "force", 40, 1500),
  kind("spring-open-load", "Open load", "springs", "valve", "force", 80, 4000),
  kind("spring-rate", "Rate", "springs", "valve", "stiffness", 5, 200),
  kind("spring-solid", "Solid height", "springs", "valve", "length", 8, 60),
  kind("spring-free", "Free length", "springs", "valve", "length", 20, 90),
  kind("spring-shim", "Shim under spring", "springs", "valve", "length", 0, 4),
  kind("lash-measured", "Lash measured", "lash", "valve", "length", 0, 0.8),
  kind("lash-shim", "Shim now", "lash", "valve", "length", 1, 12),
  kind("piston-clay", "Valve to piston, clay", "clearances", "valve", "length", 0, 12),
  kind("piston-milled", "Milled since clay", "clearances", "valve", "length", 0, 3),
  kind("piston-angle", "Valve to bore angle", "clearances", "valve", "angle", 0, 60),
  kind("retainer-closed", "Retainer to seal, closed", "clearances", "valve", "length", 3, 30),
  kind("seat-width", "Seat width on the face", "seats", "valve", "length", 0.4, 4),
  kind("seat-angle", "Seat angle", "seats", "valve", "angle", 15, 75),
  kind("seat-runout", "Seat run-out, total", "seats", "valve", "length", 0, 0.5),
  kind("seat-contact", "Contact ring diameter", "seats", "valve", "length", 8, 70),
  kind("valve-margin", "Valve margin", "seats", "valve", "length", 0.2, 5),
  kind("valve-runout", "Valve head run-out", "seats", "valve", "length", 0, 0.5),
  kind("leak-start", "Vacuum at start", "seats", "valve", "pressure", 10, 101),
  kind("leak-end", "Vacuum at end", "seats", "valve", "pressure", 0, 101),
  kind("leak-seconds", "Seconds held", "seats", "valve", "time", 1, 600),
  kind("guide-top-x", "Guide bore, top, across", "guides", "valve", "length", 3.5, 15),
  kind("guide-top-y", "Guide bore, top, along", "guides", "valve", "length", 3.5, 15),
  kind("guide-mid-x", "Guide bore, middle, across", "guides", "valve", "length", 3.5, 15),
  kind("guide-mid-y", "Guide bore, middle, along", "guides", "valve", "length", 3.5, 15),
  kind("guide-low-x", "Guide bore, foot, across", "guides", "valve", "length", 3.5, 15),
  kind("guide-low-y", "Guide bore, foot, along", "guides", "valve", "length", 3.5, 15),
  kind("stem", "Stem, thinnest", "guides", "valve", "length", 3.5, 15),
  kind(SECTION_KINDS.intake, "Intake port, smallest section", "ports", "cylinder", "area", 100, 4000),
  kind(SECTION_KINDS.exhaust, "Exhaust port, smallest section", "ports", "cylinder", "area", 100, 4000),
  kind("fill-1", "Burette fill 1", "chamber", "cylinder", "volume", 1, 400),
  kind("fill-2", "Burette fill 2", "chamber", "cylinder", "volume", 1, 400),
  kind("fill-3", "Burette fill 3", "chamber", "cylinder", "volume", 1, 400),
  kind("deck-clearance", "Piston below deck", "chamber", "cylinder", "length", -5, 10),
  kind("gasket-bore", "Gasket bore", "chamber", "cylinder", "length", 20, 200),
  kind("gasket-thickness", "Gasket, compressed", "chamber", "cylinder", "length", 0, 5),
  kind("piston-pockets", "Piston pockets less dome", "chamber", "cylinder", "volume", -100, 100),
  ...[1, 2, 3, 4, 5, 6].map((n) => kind(`deck-flat-${n}`, `Straightedge line ${n}, feeler`, "deck", "head", "length", 0, 1)),
  kind("milled-total", "Milled in all", "deck", "head", "length", 0, 5),
];

const BY_KEY = new Map(MEASURE_KINDS.map((k) => [k.key, k]));
export const measureKind = (key: string): MeasureKind | undefined => BY_KEY.get(key);

/** Figures worked out of measurements that a limit may be set for as well. */
export const DERIVED_KINDS = [
  { key: "coil-bind-clearance", label: "Coil-bind clearance", dimension: "length" },
  { key: "stem-clearance", label: "Stem clearance, worst", dimension: "length" },
  { key: "valve-to-piston", label: "Valve to piston", dimension: "length" },
  { key: "retainer-to-seal", label: "Retainer to seal", dimension: "length" },
  { key: "chamber", label: "Chamber", dimension: "volume" },
  { key: "deck-flatness", label: "Deck flatness, worst line", dimension: "length" },
] as const satisfies readonly { key: string; label: string; dimension: Dimension }[];
export type DerivedKey = (typeof DERIVED_KINDS)[number]["key"];
