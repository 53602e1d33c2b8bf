import { ok, type Refusal, type Result } from "@/modules/kernel/result";
import { geometryFlags } from "./geometry-flags";
import type { PortSide } from "./comparison-reasons";
import { computedReading, heldInH2O, type ReadingRules } from "./computed-reading";
import { readingQuestion, type EntryQuestion } from "./entry-questions";
import type { FlowFlag, LiftFlag } from "./flow-flags";
import type { RawCell, RawTest } from "./raw-test";
import { meanOfRepeats, type LiftMean, type LiftReading } from "./repeats";
import { sanityFlagsOfTest } from "./sanity-flags";
import type { SanityLimits } from "./sanity-limits";
import type { ReadingSet } from "./shop-comparison";
import { roomDensity } from "./room-air";
import { typedNumber } from "./typed-number";

/** One cell with what comes out of it. No number = refused, and why. */
export interface ComputedCell extends RawCell {
  readonly flowCfm: number | null;
  readonly refusal: Refusal | null;
  readonly flags: readonly FlowFlag[];
  readonly question: EntryQuestion | null;
}
export interface LiftDoubt {
  readonly flag: LiftFlag | FlowFlag;
  /** Null: the whole test. */
  readonly liftUm: number | null;
}
export interface TestFigures {
  readonly side: PortSide;
  /** Cells that hold a text, lifts increasing, repeats in order. */
  readonly cells: readonly ComputedCell[];
  /** One figure a lift, excluded readings left out. */
  readonly readings: readonly LiftMean[];
  readonly doubts: readonly LiftDoubt[];
  readonly isConverted: boolean;
  /** What the doubts were held against, where the shop set it. */
  readonly limits?: SanityLimits;
}

/** Leak, scale and air of a test, read from its typed conditions. A leak, or the air of a bench that needs it, that cannot be read refuses the whole computation. */
export function rulesOfTest(test: RawTest): Result<ReadingRules> {
  const air = test.bench.kind === "absolute_meter" ? roomDensity(test) : ok({ densityKgM3: null });
  if (!air.ok) return air;
  const rules = { densityKgM3: air.value.densityKgM3, scale: test.bench.scale, ranges: test.bench.ranges, waterUnit: test.bench.waterUnit, benchFactor: test.benchFactor, nominalInH2O: test.nominalInH2O, limits: test.limits };
  if (test.leakText.trim() === "") return ok({ ...rules, leak: null });
  const leak = typedNumber(test.leakText, "leak");
  if (!leak.ok) return leak;
  const at = test.leakPressureText.trim() === "" ? ok(test.nominalInH2O) : heldInH2O(test.leakPressureText, "inH2O", test.bench.waterUnit);
  return at.ok ? ok({ ...rules, leak: { indicatedCfm: leak.value, atInH2O: at.value, scalingAgreed: test.leakScalingAgreed === true } }) : at;
}

/** What is known beside the test itself. Each check of it runs where its facts are given; figures do not depend on them. */
export interface FiguresBeside {
  /** Flows of the test it is held against, stated at the same pressure. */
  readonly before?: readonly LiftReading[];
  /** Head diameter of every open valve of the side, mm. Left out where their number is not known. */
  readonly valveDiametersMm?: readonly number[];
  /** Smallest section of the port, mm2. */
  readonly minSectionMm2?: number;
}

/** Every figure of a test, computed from its raw cells. The same code runs in the browser, on the server and for the paper. */
export function figuresOfTest(test: RawTest, beside: FiguresBeside = {}): TestFigures {
  const rules = rulesOfTest(test);
  const typed = test.cells.filter((c) => c.valueText.trim() !== "").sort((a, b) => a.liftUm - b.liftUm || a.repeatNo - b.repeatNo);
  const computed = typed.map((cell) => ({ cell, result: rules.ok ? computedReading(rules.value, cell) : rules }));
  const flows = computed.flatMap(({ cell, result }): LiftReading[] => (result.ok && cell.excludedReason === null ? [{ liftUm: cell.liftUm, flowCfm: result.value.flowCfm }] : []));
  const readings = meanOfRepeats(flows);
  const cells = computed.map(({ cell, result }): ComputedCell => {
    const asTyped = typedNumber(cell.valueText);
    // A flow below zero has no figure but still a question.
    const forQuestion = result.ok ? result.value.flowCfm : asTyped.ok && asTyped.value < 0 ? asTyped.value : null;
    return {
      ...cell,
      flowCfm: result.ok ? result.value.flowCfm : null,
      refusal: result.ok ? null : result.refusal,
      flags: result.ok ? [...result.value.flags, ...geometryFlags({ ...beside, liftUm: cell.liftUm, flowCfm: result.value.flowCfm, side: test.side, atInH2O: test.nominalInH2O, limits: test.limits })] : [],
      question: forQuestion === null ? null : readingQuestion({ liftUm: cell.liftUm, flowCfm: forQuestion }, readings),
    };
  });
  const lifts = readings.map((r) => r.liftUm);
  const sane = sanityFlagsOfTest({
    lifts, flowsCfm: readings.map((r) => r.flowCfm),
    ...(rules.ok && rules.value.leak ? { leakCfm: rules.value.leak.indicatedCfm } : {}),
    ...(beside.before ? { beforeCfm: lifts.map((um) => beside.before?.find((b) => b.liftUm === um)?.flowCfm ?? null) } : {}),
    ...(typeof test.zeroReturnUm === "number" ? { zeroReturnMm: test.zeroReturnUm / 1000 } : {}),
    ...(test.camLiftUm === null || test.state === "draft" ? {} : { camMaxLift: test.camLiftUm }),
  }, test.limits);
  const doubts = (sane.ok ? sane.value : []).map((flag): LiftDoubt => {
    const [name = "", at] = flag.split("@");
    return { flag: name as LiftDoubt["flag"], liftUm: at === undefined ? null : Number(at) };
  });
  return { side: test.side, cells, readings, doubts, isConverted: cells.some((c) => c.flags.includes("CONVERTED_PRESSURE")), ...(test.limits ? { limits: test.limits } : {}) };
}

/** Every reading that counts, repeats apart: those with a flow that were not excluded. */
export const countingFlows = (figures: Pick<TestFigures, "cells">): LiftReading[] => figures.cells.flatMap(({ liftUm, flowCfm, excludedReason }) => (flowCfm === null || excludedReason !== null ? [] : [{ liftUm, flowCfm }]));

const valvesOf = (text: string): string[] => text.split(",").map((v) => v.trim()).filter(Boolean);
export const valveWords = (test: Pick<RawTest, "valveMm">): string => (test.valveMm === null ? "not recorded" : `${test.valveMm} mm`);
export const seatWords = (test: Pick<RawTest, "seatNote">): string => test.seatNote.trim() || "not recorded";

/** A test as one side of a comparison: its conditions and one figure a lift. */
export function readingSetOf(test: RawTest, figures: { readonly readings: readonly LiftReading[]; readonly isConverted: boolean } = figuresOfTest(test)): ReadingSet {
  return {
    conditions: {
      side: test.side, benchId: test.bench.id, benchName: test.bench.name,
      fixtureId: test.fixture.id, fixtureName: test.fixture.name, fixtureBoreMm: test.fixture.boreMm,
      nominalInH2O: test.nominalInH2O, isConverted: figures.isConverted, entry: test.entry, valvesOpen: valvesOf(test.valvesOpen),
      liftsUm: [...new Set([...test.lifts.map((l) => l.liftUm), ...figures.readings.map((r) => r.liftUm)])].sort((a, b) => a - b),
      benchCheckAt: test.benchCheckedAt === null ? null : new Date(test.benchCheckedAt), takenAt: new Date(test.startedAt),
      operator: test.operator.name, benchFactor: test.benchFactor, valve: valveWords(test), seat: seatWords(test),
    },
    readings: figures.readings.map(({ liftUm, flowCfm }) => ({ liftUm, flowCfm })),
  };
}
