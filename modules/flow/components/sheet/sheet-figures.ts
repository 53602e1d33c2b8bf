import { exhaustIntakeRatio } from "../../domain/exhaust-intake-ratio";
import type { CurveLine } from "../../domain/curve-geometry";
import type { PortSide } from "../../domain/comparison-reasons";
import type { RawCell, RawTest } from "../../domain/raw-test";
import { sideGain, type SideGain } from "../../domain/side-gain";
import { standingTests } from "../../domain/standing-tests";
import { shownOf } from "../curve-lines";
import { statedPressures, type StatedColumn } from "../../domain/one-pressure";
import { figuresOfTest, type ComputedCell, type FiguresBeside, type TestFigures } from "../../domain/test-figures";
import { headDiametersMm, valvesOfTest, type ValveOfFamily } from "../../domain/valve-list";

export type When = "before" | "after";

export interface SheetColumn {
  readonly side: PortSide;
  readonly when: When;
  readonly test: RawTest;
  readonly figures: TestFigures;
  /** `Before`, `After`, `Pass 2`. */
  readonly head: string;
}
export interface SheetSide {
  readonly side: PortSide;
  readonly before: SheetColumn | null;
  readonly after: SheetColumn | null;
  readonly gain: SideGain | null;
}
export interface SheetFigures {
  readonly sides: readonly SheetSide[];
  /** Every lift of the sheet, increasing. */
  readonly liftsUm: readonly number[];
  /** Pressures the read tests are stated at, the newest test's first. Flows at two of them never share an axis. */
  readonly pressures: readonly number[];
}

/** What is known of the head beside its tests. */
export interface HeadKnown {
  readonly valves?: readonly ValveOfFamily[];
  /** Smallest section of each port, mm2, before and after the work. */
  readonly sections?: readonly { readonly side: PortSide; readonly stage: When; readonly mm2: number }[];
}

function beside(test: RawTest, when: When, before: SheetColumn | null, known: HeadKnown): FiguresBeside {
  const listed = headDiametersMm(known.valves ?? [], test.side);
  // Porting opens the section: each test is held against the one measured beside it.
  const section = known.sections?.find((x) => x.side === test.side && x.stage === when);
  return {
    ...(section ? { minSectionMm2: section.mm2 } : {}),
    // How many valves breathe is known where the family lists them and all are open.
    ...(listed.length > 0 && test.valvesOpen === "all" ? { valveDiametersMm: valvesOfTest(test.valveMm, listed) } : {}),
    ...(before && before.test.nominalInH2O === test.nominalInH2O ? { before: before.figures.readings } : {}),
  };
}

function column(test: RawTest | null, side: PortSide, when: When, known: HeadKnown, before: SheetColumn | null = null): SheetColumn | null {
  if (!test) return null;
  return { side, when, test, figures: figuresOfTest(test, beside(test, when, before, known)), head: when === "before" ? "Before" : test.purpose === "interim" ? `Pass ${test.runNo}` : "After" };
}

/** Both sides of a port as the sheet shows them: a pass in work stands where "after" will. */
export function sheetFigures(tests: readonly RawTest[], benchCheckHours: number, known: HeadKnown = {}): SheetFigures {
  const sides = (["intake", "exhaust"] as const).map((side): SheetSide => {
    const standing = standingTests(tests, side, "draft");
    const pass = standing.interim.at(-1) ?? null;
    const afterTest = pass?.state === "draft" ? pass : (standing.after ?? pass);
    const gain = sideGain({ ...standing, after: afterTest }, side, benchCheckHours);
    const before = column(standing.before, side, "before", known);
    return { side, before, after: column(afterTest, side, "after", known, before), gain: gain.ok ? gain.value : null };
  });
  const columns = sides.flatMap((s) => [s.before, s.after]).filter((c): c is SheetColumn => c !== null);
  const liftsUm = [...new Set(columns.flatMap((c) => [...c.test.lifts.map((l) => l.liftUm), ...c.figures.cells.map((x) => x.liftUm)]))].sort((a, b) => a - b);
  return { sides, liftsUm, pressures: statedPressures(statedColumns(sides)) };
}

/** The columns as far as their pressures go. */
export const statedColumns = (sides: readonly SheetSide[]): StatedColumn[] =>
  sides.flatMap((s) => [s.before, s.after]).flatMap((c) => (c ? [{ name: `${c.side} ${c.head.toLowerCase()}`, atInH2O: c.test.nominalInH2O, startedAt: c.test.startedAt, isRead: c.figures.readings.length > 0 }] : []));

/** Curves of what is stated at this pressure; what is not stands on no axis here. */
export function linesAt(sides: readonly SheetSide[], atInH2O: number): CurveLine[] {
  const at = (col: SheetColumn | null) => (col?.test.nominalInH2O === atInH2O ? col.figures.readings : []);
  return sides.map((s) => ({ side: s.side, before: at(s.before), after: at(s.after), ...shownOf(s.gain) }));
}

/** A test with what is typed laid over what the records hold. */
export function withTyped(test: RawTest, typed: readonly RawCell[]): RawTest {
  if (typed.length === 0) return test;
  const is = (a: RawCell, b: RawCell) => a.liftUm === b.liftUm && a.repeatNo === b.repeatNo;
  return { ...test, cells: [...test.cells.filter((c) => !typed.some((t) => is(c, t))), ...typed] };
}

export const cellAt = (col: SheetColumn | null, liftUm: number, repeatNo = 1): ComputedCell | null => col?.figures.cells.find((c) => c.liftUm === liftUm && c.repeatNo === repeatNo) ?? null;
/** Highest number of a reading at this lift; 1 where there is none yet. */
export const repeatsRead = (col: SheetColumn, liftUm: number): number => Math.max(1, ...col.figures.cells.filter((c) => c.liftUm === liftUm).map((c) => c.repeatNo));
export const flowAt = (col: SheetColumn | null, liftUm: number): number | null => col?.figures.readings.find((r) => r.liftUm === liftUm)?.flowCfm ?? null;

/** Exhaust to intake at the highest lift both were read at in the newest tests, percent; null without one. */
export function exhaustToIntake(f: SheetFigures): { percent: number; liftUm: number } | null {
  const [intake, exhaust] = f.sides.map((s) => ((s.after?.figures.readings.length ?? 0) > 0 ? s.after : s.before));
  if (!intake || !exhaust) return null;
  const common = exhaust.figures.readings.filter((e) => intake.figures.readings.some((i) => i.liftUm === e.liftUm)).at(-1);
  const at = common && flowAt(intake, common.liftUm);
  if (!common || !at) return null;
  const ratio = exhaustIntakeRatio({ exhaustCfm: common.flowCfm, intakeCfm: at, exhaustAtInH2O: exhaust.test.nominalInH2O, intakeAtInH2O: intake.test.nominalInH2O });
  return ratio.ok ? { percent: ratio.value.ratio * 100, liftUm: common.liftUm } : null;
}
