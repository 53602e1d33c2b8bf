import { BASELINE_DAYS_MAX, BORE_WITHIN_MM } from "./comparability";

export type PortSide = "intake" | "exhaust";
export type EntryKind = "radius" | "clay" | "manifold" | "none";

/** Under what a set of readings was taken. */
export interface ReadingSetConditions {
  readonly side: PortSide;
  readonly benchId: string;
  readonly benchName: string;
  readonly fixtureId: string;
  readonly fixtureName: string;
  readonly fixtureBoreMm: number;
  /** The pressure the flows are stated at. */
  readonly nominalInH2O: number;
  /** Set when readings were converted to the nominal from another pressure. */
  readonly isConverted?: boolean;
  readonly entry: EntryKind;
  readonly valvesOpen: readonly string[];
  /** The lifts the set was planned for, whether read yet or not. */
  readonly liftsUm: readonly number[];
  /** Last bench check before the set was taken; null = none. */
  readonly benchCheckAt: Date | null;
  readonly takenAt: Date;
  readonly operator: string;
  readonly benchFactor: number;
  /** Valves and seats in the shop's words; printed beside each table. */
  readonly valve: string;
  readonly seat: string;
}

export type WithheldCode =
  | "SIDE_DIFFERS"
  | "BENCH_DIFFERS"
  | "FIXTURE_DIFFERS"
  | "FIXTURE_BORE_DIFFERS"
  | "PRESSURE_DIFFERS"
  | "ENTRY_DIFFERS"
  | "VALVES_OPEN_DIFFER"
  | "LIFTS_DIFFER"
  | "BENCH_CHECK_MISSING"
  | "BENCH_CHECK_OLD"
  | "NO_COMMON_LIFT";
export type NoteCode = "VALVE_DIFFERS" | "SEAT_DIFFERS" | "OPERATOR_DIFFERS" | "FACTOR_DIFFERS" | "CONVERTED_PRESSURE" | "OLD_BASELINE";

/** Why a gain is withheld, or what is printed beside it, in words for the bench and the customer. */
export interface Reason<C extends string> {
  readonly code: C;
  readonly words: string;
}

/** A bench check holds so long unless the shop says otherwise, hours. */
export const BENCH_CHECK_HOURS_MAX = 8;

const HOUR_MS = 3_600_000;
const ENTRY_WORDS: Readonly<Record<EntryKind, string>> = {
  radius: "a radius entry",
  clay: "a clay entry",
  manifold: "the manifold",
  none: "no entry piece",
};
const sorted = (list: readonly (string | number)[]): string => [...list].map(String).sort().join(", ");
const hours = (h: number): string => String(Math.round(h * 10) / 10);

function benchCheckReason(when: "before" | "after", set: ReadingSetConditions, limitHours: number): Reason<WithheldCode>[] {
  if (set.benchCheckAt === null || set.benchCheckAt > set.takenAt) {
    return [{ code: "BENCH_CHECK_MISSING", words: `No bench check was made before the ${when} readings.` }];
  }
  const age = (set.takenAt.getTime() - set.benchCheckAt.getTime()) / HOUR_MS;
  if (age <= limitHours) return [];
  return [
    {
      code: "BENCH_CHECK_OLD",
      words: `The bench check was ${hours(age)} h old when the ${when} readings were taken; it holds for ${hours(limitHours)} h.`,
    },
  ];
}

/** Every reason that forbids comparing two sets; empty = comparable. @param limitHours age a bench check may have. */
export function withheldReasons(before: ReadingSetConditions, after: ReadingSetConditions, limitHours: number): Reason<WithheldCode>[] {
  const reasons: Reason<WithheldCode>[] = [];
  const add = (code: WithheldCode, is: boolean, words: string) => is && reasons.push({ code, words });
  add("SIDE_DIFFERS", before.side !== after.side, `Before is ${before.side}, after is ${after.side}.`);
  add("BENCH_DIFFERS", before.benchId !== after.benchId, `Before was read on ${before.benchName}, after on ${after.benchName}.`);
  const boreApart = Math.abs(before.fixtureBoreMm - after.fixtureBoreMm) > BORE_WITHIN_MM + 1e-9;
  add("FIXTURE_BORE_DIFFERS", boreApart, `Bore fixture differs: before ${before.fixtureBoreMm} mm, after ${after.fixtureBoreMm} mm.`);
  add(
    "FIXTURE_DIFFERS",
    !boreApart && before.fixtureId !== after.fixtureId,
    `Another fixture of like bore: before ${before.fixtureName}, after ${after.fixtureName}.`,
  );
  add(
    "PRESSURE_DIFFERS",
    before.nominalInH2O !== after.nominalInH2O,
    `Test pressure differs: before ${before.nominalInH2O} in H₂O, after ${after.nominalInH2O} in H₂O.`,
  );
  add("ENTRY_DIFFERS", before.entry !== after.entry, `Before was read with ${ENTRY_WORDS[before.entry]}, after with ${ENTRY_WORDS[after.entry]}.`);
  add(
    "VALVES_OPEN_DIFFER",
    sorted(before.valvesOpen) !== sorted(after.valvesOpen),
    `Open valves differ: before ${sorted(before.valvesOpen) || "none"}, after ${sorted(after.valvesOpen) || "none"}.`,
  );
  add("LIFTS_DIFFER", sorted(before.liftsUm) !== sorted(after.liftsUm), "The two sets were read at different lifts.");
  return [...reasons, ...benchCheckReason("before", before, limitHours), ...benchCheckReason("after", after, limitHours)];
}

/** What may differ but is always printed. */
export function comparisonNotes(before: ReadingSetConditions, after: ReadingSetConditions): Reason<NoteCode>[] {
  const notes: Reason<NoteCode>[] = [];
  const add = (code: NoteCode, is: boolean, words: string) => is && notes.push({ code, words });
  add("VALVE_DIFFERS", before.valve !== after.valve, `Valves: before ${before.valve}, after ${after.valve}.`);
  add("SEAT_DIFFERS", before.seat !== after.seat, `Seats: before ${before.seat}, after ${after.seat}.`);
  add("OPERATOR_DIFFERS", before.operator !== after.operator, `Read by ${before.operator} before and ${after.operator} after.`);
  // Four decimals: a check plate is not known more finely.
  const [was, is] = [before.benchFactor.toFixed(4), after.benchFactor.toFixed(4)];
  add("FACTOR_DIFFERS", was !== is, `Bench factor: before ${was}, after ${is}.`);
  add(
    "CONVERTED_PRESSURE",
    before.isConverted === true || after.isConverted === true,
    `Converted to ${after.nominalInH2O} in H₂O from another test pressure.`,
  );
  const days = Math.abs(after.takenAt.getTime() - before.takenAt.getTime()) / HOUR_MS / 24;
  add("OLD_BASELINE", days > BASELINE_DAYS_MAX, `The before readings are ${Math.floor(days)} days older.`);
  return notes;
}
