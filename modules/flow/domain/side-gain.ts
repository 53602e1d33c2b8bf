import { ok, type Result } from "@/modules/kernel/result";
import { historyOfPair } from "./bench-history";
import type { NoteCode, PortSide, Reason, WithheldCode } from "./comparison-reasons";
import type { LiftUnit } from "./lift-ladder";
import { noiseOfTests, type GainNoise } from "./noise-rows";
import type { RawTest } from "./raw-test";
import { compareSets, type ComparableSets, type PlainRow } from "./shop-comparison";
import type { Standing } from "./standing-tests";
import { figuresOfTest, readingSetOf, seatWords, valveWords } from "./test-figures";

/** Who read a set, when, and what is printed beside its table. */
export interface SetFacts {
  readonly testId: string;
  readonly operator: string;
  readonly takenAt: string;
  readonly valve: string;
  readonly seat: string;
}
interface BothSets {
  readonly side: PortSide;
  readonly liftUnit: LiftUnit;
  readonly atInH2O: number;
  readonly camLiftUm: number | null;
  readonly before: SetFacts;
  readonly after: SetFacts;
  /** Conditions that both sets share, in words, ready to print one after the other. */
  readonly conditions: readonly string[];
  readonly notes: readonly Reason<NoteCode>[];
}
export interface ComparableGain extends BothSets, Omit<ComparableSets, "comparable" | "notes"> {
  readonly state: "comparable";
  readonly comparable: true;
  /** Absent only in papers that were issued before verdicts were frozen with them. */
  readonly noise?: GainNoise;
}
/** Both tables and why no difference is shown. There is no figure here to print by mistake. */
export interface WithheldGain extends BothSets {
  readonly state: "withheld";
  readonly comparable: false;
  readonly reasons: readonly Reason<WithheldCode>[];
  readonly rows: readonly PlainRow[];
}
/** One of the two sets, or both, have not been read. */
export interface AbsentGain {
  readonly state: "absent";
  readonly comparable: false;
  readonly absent: "before" | "after" | "both";
  readonly side: PortSide;
}
export type SideGain = ComparableGain | WithheldGain | AbsentGain;

const ENTRY_WORDS: Readonly<Record<RawTest["entry"], string>> = { radius: "radius entry", clay: "clay entry", manifold: "manifold fitted", none: "no entry piece" };

/** Conditions of one test in words; pressure first. */
export function conditionWords(test: RawTest): string[] {
  return [
    `${test.nominalInH2O} in H₂O`,
    `bore adapter "${test.fixture.name}", ${test.fixture.boreMm} mm`,
    ENTRY_WORDS[test.entry],
    test.valvesOpen === "all" ? "all valves of the port open" : `open: ${test.valvesOpen}`,
    test.testSprings ? "test springs" : "own springs",
    test.plugClosed ? "plug hole closed" : "plug hole open",
    test.leakText.trim() === "" ? "leak not measured" : `leak ${test.leakText.trim()} CFM taken off`,
    ...(test.bench.kind === "absolute_meter" ? [`brought to dry air of 20 °C and 101.325 kPa${test.roomHumidityText.trim() === "" ? ", humidity not noted and taken as none" : ""}`] : []),
    ...(test.liftDevice ? [`lift read on "${test.liftDevice.name}"`] : []),
  ];
}

const setFacts = (test: RawTest): SetFacts => ({ testId: test.id, operator: test.operator.name, takenAt: test.startedAt, valve: valveWords(test), seat: seatWords(test) });

/**
 * What may be said about one side of one port: a gain, both tables with the reasons why none, or that a set is missing.
 * @param benchCheckHoursMax the shop's limit, hours. Errors: as `compareSets`.
 */
export function sideGain(standing: Standing, side: PortSide, benchCheckHoursMax: number): Result<SideGain> {
  const { before, after } = standing;
  if (!before || !after) return ok({ state: "absent", comparable: false, side, absent: before ? "after" : after ? "before" : "both" });
  const camLiftUm = after.camLiftUm ?? before.camLiftUm;
  const [figuresBefore, figuresAfter] = [figuresOfTest(before), figuresOfTest(after)];
  const compared = compareSets({ before: readingSetOf(before, figuresBefore), after: readingSetOf(after, figuresAfter), camLiftUm, benchCheckHoursMax });
  if (!compared.ok) return compared;
  const shared = conditionWords(before).filter((words) => conditionWords(after).includes(words));
  const both: BothSets = {
    side, liftUnit: after.liftUnit, atInH2O: after.nominalInH2O, camLiftUm, before: setFacts(before), after: setFacts(after), conditions: shared, notes: compared.value.notes,
  };
  if (!compared.value.comparable) return ok({ ...both, state: "withheld", comparable: false, reasons: compared.value.reasons, rows: compared.value.rows });
  return ok({ ...compared.value, ...both, state: "comparable", noise: noiseOfTests(figuresBefore, figuresAfter, after, historyOfPair(before, after)) });
}

/** One port pair of a head. */
export interface PortGain {
  readonly cylinder: number;
  readonly intake: SideGain;
  readonly exhaust: SideGain;
}
/** What others print: invoice, customer page, release. Ports with no test at all are left out. */
export interface GainOfPiece {
  readonly pieceId: string;
  readonly headId: string | null;
  readonly mark: string;
  readonly family: string;
  readonly ports: readonly PortGain[];
}
