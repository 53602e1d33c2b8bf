import { comparisonMeans, type ComparisonMeans, type NamedCam } from "./comparison-means";
import type { PortSide } from "./comparison-reasons";
import { historyUsed } from "./noise-summary";
import type { RawTest } from "./raw-test";
import type { LiftReading } from "./repeats";
import type { PortRatio } from "./port-ratios";
import type { ReplacedReport } from "./report-replaces";
import type { SideGain } from "./side-gain";
import type { Standing } from "./standing-tests";
import { conditionWords } from "./side-gain";
import { figuresOfTest, type TestFigures } from "./test-figures";

/** What stands on every flow paper. */
export const AIRFLOW_WORDS = "Airflow as measured on our bench, not power. Power depends on cam, compression, fuel, ignition, intake and exhaust; measure it on a dynamometer.";

/** A reading that was taken and does not count. */
export interface LeftOut {
  readonly liftUm: number;
  readonly repeatNo: number;
  /** Null where no flow came out of it. */
  readonly flowCfm: number | null;
  readonly reason: string;
  /** No other reading at this lift counts. */
  readonly isWhole: boolean;
}
/** One test as a paper shows it. */
export interface ReportTest {
  readonly testId: string;
  readonly purpose: RawTest["purpose"];
  readonly runNo: number;
  readonly operator: string;
  readonly takenAt: string;
  readonly bench: string;
  readonly benchFactor: number;
  readonly benchCheckedAt: string | null;
  readonly valveMm: number | null;
  readonly seatNote: string;
  readonly room: string;
  readonly conditions: readonly string[];
  readonly readings: readonly LiftReading[];
  /** Most readings at one lift. */
  readonly repeats: number;
  readonly isConverted: boolean;
  /** Absent in papers issued before they were listed. */
  readonly leftOut?: readonly LeftOut[];
}
export interface ReportSide {
  readonly side: PortSide;
  readonly before: ReportTest | null;
  readonly after: ReportTest | null;
  readonly gain: SideGain;
  /** Only where the two may be compared. */
  readonly means?: ComparisonMeans;
}
/** A comparison as issued: everything its paper needs, so that it can be made again unchanged. */
export interface ReportSnapshot {
  /** 1: issued before the noise and the hatched loss were drawn. 2: before plates of losses kept off the curves on paper. 3: before means
   * over lift and cam, crossovers and leaders stood on it, and before it was set to one page. Such papers stay as they were. */
  readonly kind: 1 | 2 | 3 | 4;
  readonly shop: { readonly name: string; readonly address: string; readonly phone: string; readonly email: string };
  readonly locale: string;
  readonly zone: string;
  readonly head: { readonly mark: string; readonly family: string; readonly castingNumber: string; readonly orderNumber: string | null; readonly customerName: string | null };
  readonly cylinder: number;
  readonly cylinders: number;
  readonly comparisonNo: number;
  readonly sides: readonly ReportSide[];
  readonly ratios?: readonly PortRatio[];
  /** Absent on a first report. */
  readonly replaces?: ReplacedReport;
  readonly notTested: readonly string[];
  readonly customerWords: string;
  readonly issuedBy: string;
  readonly issuedAt: string;
}

const roomWords = (t: RawTest): string => [t.roomTemperatureText, t.roomPressureText, t.roomHumidityText].filter(Boolean).join(", ");

/** Readings taken and left out, lifts increasing, each with the reason given. */
export function leftOutOf(figures: TestFigures): LeftOut[] {
  return figures.cells.flatMap(({ liftUm, repeatNo, flowCfm, excludedReason }) =>
    (excludedReason === null ? [] : [{ liftUm, repeatNo, flowCfm, reason: excludedReason, isWhole: !figures.readings.some((r) => r.liftUm === liftUm) }]));
}

/** A test for the paper: figures by lift, conditions in words. */
export function reportTest(test: RawTest): ReportTest {
  const figures = figuresOfTest(test);
  return {
    testId: test.id, purpose: test.purpose, runNo: test.runNo, operator: test.operator.name, takenAt: test.startedAt, bench: test.bench.name, benchFactor: test.benchFactor,
    benchCheckedAt: test.benchCheckedAt, valveMm: test.valveMm, seatNote: test.seatNote, room: roomWords(test), conditions: conditionWords(test),
    readings: figures.readings.map(({ liftUm, flowCfm }) => ({ liftUm, flowCfm })), repeats: Math.max(0, ...figures.readings.map((r) => r.count)), isConverted: figures.isConverted, leftOut: leftOutOf(figures),
  };
}

/** One side for the paper. @param cam the one the tests name; null where they name none. */
export const reportSide = ({ side, standing, gain }: { side: PortSide; standing: Standing; gain: SideGain }, cam: NamedCam | null): ReportSide => ({
  side, gain, before: standing.before && reportTest(standing.before), after: standing.after && reportTest(standing.after), ...(gain.comparable ? { means: comparisonMeans(gain, cam) } : {}),
});

const SIDE_WORDS: Readonly<Record<PortSide, string>> = { intake: "Intake", exhaust: "Exhaust" };

/** What the paper says was not tested. @param liftWords lift in micrometres as words. */
export function notTestedWords(sides: readonly { side: PortSide; standing: Standing; gain: SideGain }[], cylinder: number, cylinders: number, liftWords: (um: number) => string): string[] {
  const words = sides.flatMap(({ side, standing, gain }) => {
    const name = SIDE_WORDS[side];
    const out: string[] = [];
    if (gain.state === "absent") {
      out.push(gain.absent === "both" ? `${name}: not tested.` : `${name}: no ${gain.absent} test.`);
      return out;
    }
    for (const [when, test] of [["before", standing.before], ["after", standing.after]] as const) {
      if (!test) continue;
      const figures = figuresOfTest(test);
      const whole = leftOutOf(figures).filter((r) => r.isWhole);
      const unread = test.lifts.filter((l) => !figures.readings.some((r) => r.liftUm === l.liftUm) && !whole.some((r) => r.liftUm === l.liftUm));
      for (const um of new Set(whole.map((r) => r.liftUm))) out.push(`${name} ${when}: ${liftWords(um)} read and left out: ${[...new Set(whole.filter((r) => r.liftUm === um).map((r) => r.reason.trim().replace(/\.$/, "")))].join("; ")}.`);
      if (unread.length > 0) out.push(`${name} ${when}: ${unread.map((l) => liftWords(l.liftUm)).join(", ")} planned, not read.`);
    }
    if (gain.camLiftUm !== null && !(standing.after && figuresOfTest(standing.after).readings.some((r) => r.liftUm >= (gain.camLiftUm ?? 0)))) out.push(`${name}: not read up to cam lift.`);
    return out;
  });
  const tests = sides.flatMap(({ standing }) => [standing.before, standing.after]).filter((x): x is RawTest => x !== null);
  const single = tests.filter((x) => figuresOfTest(x).readings.every((r) => r.count < 2));
  const byHistory = sides.some(({ gain }) => gain.comparable && historyUsed(gain.noise) !== null);
  const judged = byHistory ? "; bench history stood in." : ", so a difference was not judged against the bench's noise.";
  const repeats = single.length === 0 ? [] : [`${single.length === tests.length ? "No" : "Some tests have no"} repeat readings${judged}`];
  return [...words, ...repeats, ...(cylinders > 1 ? [`This page is port ${cylinder} of ${cylinders}.`] : []), "Swirl, tumble, wet flow and power were not measured."];
}
