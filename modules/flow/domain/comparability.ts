/** What must be alike before two tests may be compared. A field neither test states is not judged. */
export interface TestConditions {
  readonly port?: string;
  readonly direction?: "intake" | "exhaust";
  readonly bench?: string;
  /** Pressure the flows are stated at; a labelled conversion counts as stated at the pressure converted to. */
  readonly statedAtInH2O?: number;
  readonly fixtureBoreMm?: number;
  readonly entry?: "radius" | "clay" | "manifold" | "none";
  readonly valvesOpen?: readonly string[];
  readonly valveDiametersMm?: readonly number[];
  readonly seat?: string;
  readonly operator?: string;
  readonly benchFactor?: number;
  readonly roomC?: number;
  readonly roomPa?: number;
  readonly takenAt?: Date;
}

export const HARD_REASONS = [
  "PORT_DIFFERS",
  "DIRECTION_DIFFERS",
  "BENCH_DIFFERS",
  "PRESSURE_DIFFERS",
  "FIXTURE_BORE_DIFFERS",
  "ENTRY_DIFFERS",
  "VALVES_OPEN_DIFFER",
] as const;
export const SOFT_REASONS = ["VALVE_DIFFERS", "OPERATOR_DIFFERS", "FACTOR_DIFFERS", "CONDITIONS_DIFFER", "OLD_BASELINE"] as const;
export type HardReason = (typeof HARD_REASONS)[number];
export type SoftReason = (typeof SOFT_REASONS)[number];

/** Bores within this count as one. */
export const BORE_WITHIN_MM = 0.5;
/** Days after which a baseline is called old. */
export const BASELINE_DAYS_MAX = 90;
/** Rooms further apart than this are stated. Our choice, no source. */
export const ROOM_APART = { temperatureC: 10, pressureShare: 0.03 } as const;

const DAY_MS = 86_400_000;
const differs = (a: string | number | undefined, b: string | number | undefined): boolean => a !== b;
const apart = (a: number | undefined, b: number | undefined, within: number): boolean =>
  a === undefined || b === undefined ? a !== b : Math.abs(a - b) > within + 1e-9;
const listText = (list: readonly (string | number)[] | undefined): string | undefined =>
  list === undefined ? undefined : [...list].map(String).sort().join("|");
const bothApart = (a: number | undefined, b: number | undefined, within: number): boolean =>
  a !== undefined && b !== undefined && Math.abs(a - b) > within;

/**
 * May the two tests be compared? Hard reasons forbid it; soft reasons allow it and are always printed.
 * A hard condition stated by one test only counts as different.
 */
export function comparability(before: TestConditions, after: TestConditions): { comparable: boolean; reasons: readonly (HardReason | SoftReason)[] } {
  const hard: [HardReason, boolean][] = [
    ["PORT_DIFFERS", differs(before.port, after.port)],
    ["DIRECTION_DIFFERS", differs(before.direction, after.direction)],
    ["BENCH_DIFFERS", differs(before.bench, after.bench)],
    ["PRESSURE_DIFFERS", differs(before.statedAtInH2O, after.statedAtInH2O)],
    ["FIXTURE_BORE_DIFFERS", apart(before.fixtureBoreMm, after.fixtureBoreMm, BORE_WITHIN_MM)],
    ["ENTRY_DIFFERS", differs(before.entry, after.entry)],
    ["VALVES_OPEN_DIFFER", differs(listText(before.valvesOpen), listText(after.valvesOpen))],
  ];
  const days = before.takenAt && after.takenAt ? Math.abs(after.takenAt.getTime() - before.takenAt.getTime()) / DAY_MS : 0;
  const soft: [SoftReason, boolean][] = [
    ["VALVE_DIFFERS", differs(listText(before.valveDiametersMm), listText(after.valveDiametersMm)) || differs(before.seat, after.seat)],
    ["OPERATOR_DIFFERS", differs(before.operator, after.operator)],
    ["FACTOR_DIFFERS", differs(before.benchFactor, after.benchFactor)],
    [
      "CONDITIONS_DIFFER",
      bothApart(before.roomC, after.roomC, ROOM_APART.temperatureC) ||
        bothApart(before.roomPa, after.roomPa, ROOM_APART.pressureShare * (before.roomPa ?? 0)),
    ],
    ["OLD_BASELINE", days > BASELINE_DAYS_MAX],
  ];
  const found = <R>(list: [R, boolean][]): R[] => list.filter(([, is]) => is).map(([reason]) => reason);
  const hardFound = found(hard);
  return { comparable: hardFound.length === 0, reasons: [...hardFound, ...found(soft)] };
}
