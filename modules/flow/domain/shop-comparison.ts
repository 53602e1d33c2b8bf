import { ok, type Result } from "@/modules/kernel/result";
import { gainAtCamLift } from "./cam-lift";
import {
  BENCH_CHECK_HOURS_MAX,
  comparisonNotes,
  withheldReasons,
  type NoteCode,
  type ReadingSetConditions,
  type Reason,
  type WithheldCode,
} from "./comparison-reasons";
import { crossoversOf, type Crossover } from "./crossovers";
import { refuseFlow, refuseNotFinite } from "./flow-refusal";
import { gainAt, gainPercentAt, withoutDust } from "./gain";
import type { LiftReading } from "./repeats";

export interface ReadingSet {
  readonly conditions: ReadingSetConditions;
  /** One reading for each lift, any order; fold repeats first (`meanOfRepeats`). */
  readonly readings: readonly LiftReading[];
}

export interface ComparedRow {
  readonly liftUm: number;
  readonly beforeCfm: number;
  readonly afterCfm: number;
  readonly gainCfm: number;
  readonly gainPercent: number | null;
}
/** Both tables side by side, without any difference. */
export interface PlainRow {
  readonly liftUm: number;
  readonly beforeCfm: number | null;
  readonly afterCfm: number | null;
}
/** The figures at the cam's maximum lift, between the tested ones. */
export interface AtCamLift {
  readonly liftUm: number;
  readonly beforeCfm: number;
  readonly afterCfm: number;
  readonly gainCfm: number;
}

/** A gain exists only in the comparable variant, so none can be printed by mistake. */
export type ShopComparison = ComparableSets | IncomparableSets;
export interface ComparableSets {
  readonly comparable: true;
  readonly notes: readonly Reason<NoteCode>[];
  /** Lifts read in both sets, increasing. */
  readonly rows: readonly ComparedRow[];
  /** Lifts read in one set only. */
  readonly unpairedRows: readonly PlainRow[];
  readonly meanBeforeCfm: number;
  readonly meanAfterCfm: number;
  /** Mean of the gains over the common lifts. */
  readonly meanGainCfm: number;
  /** `(sum after - sum before)/sum before`, percent; null when nothing flowed before. */
  readonly meanPercent: number | null;
  /** Largest gain and its lift; the lower lift wins a tie. Negative when every lift lost. */
  readonly peak: { readonly liftUm: number; readonly gainCfm: number };
  readonly losses: readonly ComparedRow[];
  readonly crossovers: readonly Crossover[];
  /** `not_tested`: no common lift reaches cam lift. `not_given`: no cam lift is recorded. */
  readonly atCamLift: AtCamLift | "not_tested" | "not_given";
}
export interface IncomparableSets {
  readonly comparable: false;
  readonly reasons: readonly Reason<WithheldCode>[];
  readonly notes: readonly Reason<NoteCode>[];
  readonly rows: readonly PlainRow[];
}

type Paired = { readonly liftUm: number; readonly beforeCfm: number; readonly afterCfm: number };

function sideBySide(before: readonly LiftReading[], after: readonly LiftReading[]): PlainRow[] {
  const b = new Map(before.map((r) => [r.liftUm, r.flowCfm]));
  const a = new Map(after.map((r) => [r.liftUm, r.flowCfm]));
  return [...new Set([...b.keys(), ...a.keys()])]
    .sort((x, y) => x - y)
    .map((liftUm) => ({ liftUm, beforeCfm: b.get(liftUm) ?? null, afterCfm: a.get(liftUm) ?? null }));
}
const isPaired = (row: PlainRow): row is Paired => row.beforeCfm !== null && row.afterCfm !== null;

function refuseReadings(set: ReadingSet, field: "before" | "after") {
  const bad = refuseNotFinite({ [field]: set.readings.flatMap((r) => [r.liftUm, r.flowCfm]) });
  if (bad) return bad;
  if (set.readings.some((r) => r.flowCfm < 0 || r.liftUm < 0)) return refuseFlow("READING_OUT_OF_RANGE", field, { min: 0 });
  const lifts = new Set(set.readings.map((r) => r.liftUm));
  return lifts.size === set.readings.length ? null : refuseFlow("LIFTS_NOT_INCREASING", field);
}

function atCam(rows: readonly Paired[], camLiftUm: number | null): Result<ComparableSets["atCamLift"]> {
  if (camLiftUm === null) return ok("not_given");
  const answer = gainAtCamLift({
    lifts: rows.map((r) => r.liftUm),
    beforeCfm: rows.map((r) => r.beforeCfm),
    afterCfm: rows.map((r) => r.afterCfm),
    camMaxLift: camLiftUm,
  });
  if (!answer.ok) return answer.refusal.code === "TOO_FEW_POINTS" ? ok("not_tested") : answer;
  const { value } = answer;
  if (!value.testedToCamLift) return ok("not_tested");
  return ok({ liftUm: camLiftUm, beforeCfm: value.beforeCfm, afterCfm: value.afterCfm, gainCfm: value.gainCfm });
}

/**
 * Before against after for the shop and the customer. Comparable only when side, bench, fixture, pressure, entry, open
 * valves and lift list match and each set has a bench check not older than the shop's limit; otherwise both tables and the reasons.
 * Order of readings does not matter. Losses are listed as plainly as gains.
 * @param camLiftUm null when no cam is recorded. @param benchCheckHoursMax default 8.
 * Source: arithmetic. Errors: NUMBER_NOT_FINITE, READING_OUT_OF_RANGE (a flow or lift < 0), LIFTS_NOT_INCREASING (a lift twice in one set).
 */
export function compareSets(input: {
  before: ReadingSet;
  after: ReadingSet;
  camLiftUm: number | null;
  benchCheckHoursMax?: number;
}): Result<ShopComparison> {
  const { before, after, camLiftUm, benchCheckHoursMax = BENCH_CHECK_HOURS_MAX } = input;
  const bad = refuseReadings(before, "before") ?? refuseReadings(after, "after");
  if (bad) return bad;
  const plain = sideBySide(before.readings, after.readings);
  const both = plain.filter(isPaired);
  const reasons = withheldReasons(before.conditions, after.conditions, benchCheckHoursMax);
  if (reasons.length === 0 && both.length === 0) reasons.push({ code: "NO_COMMON_LIFT", words: "No lift has been read both before and after yet." });
  const notes = comparisonNotes(before.conditions, after.conditions);
  if (reasons.length > 0) return ok({ comparable: false, reasons, notes, rows: plain });

  const rows = both.map(({ liftUm, beforeCfm, afterCfm }) => ({
    liftUm,
    beforeCfm,
    afterCfm,
    gainCfm: gainAt(beforeCfm, afterCfm),
    gainPercent: gainPercentAt(beforeCfm, afterCfm),
  }));
  const sum = (pick: (r: ComparedRow) => number) => rows.reduce((s, r) => s + pick(r), 0);
  const sumBefore = sum((r) => r.beforeCfm);
  const cam = atCam(both, camLiftUm);
  if (!cam.ok) return cam;
  const peak = rows.reduce((best, r) => (r.gainCfm > best.gainCfm ? r : best));
  return ok({
    comparable: true,
    notes,
    rows,
    unpairedRows: plain.filter((r) => !isPaired(r)),
    meanBeforeCfm: withoutDust(sumBefore / rows.length),
    meanAfterCfm: withoutDust(sum((r) => r.afterCfm) / rows.length),
    meanGainCfm: withoutDust(sum((r) => r.gainCfm) / rows.length),
    meanPercent: gainPercentAt(sumBefore, sum((r) => r.afterCfm)),
    peak: { liftUm: peak.liftUm, gainCfm: peak.gainCfm },
    losses: rows.filter((r) => r.gainCfm < 0),
    crossovers: crossoversOf(rows.map((r) => ({ lift: r.liftUm, gainCfm: r.gainCfm }))),
    atCamLift: cam.value,
  });
}
