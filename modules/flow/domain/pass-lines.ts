import type { PortSide } from "./comparison-reasons";
import type { LiftUnit } from "./lift-ladder";
import type { RawTest } from "./raw-test";
import type { LiftReading } from "./repeats";
import { standingTests } from "./standing-tests";
import { figuresOfTest } from "./test-figures";

/** Shapes of the points: told apart without colour and without the line. */
export const PASS_MARKS = ["circle", "square", "triangle", "diamond", "cross"] as const;
export type PassMark = (typeof PASS_MARKS)[number];
/** Strokes of the lines, px on and off; empty = unbroken. Four of them beside five marks repeat only after twenty lines. */
export const PASS_DASHES = ["", "9 4", "2.5 3.5", "10 3 2 3"] as const;

/** One run over the lifts, as drawn beside the others of its port. */
export interface PassLine {
  readonly testId: string;
  /** `Before`, `Pass 1`, `After`; a draft says so. */
  readonly name: string;
  readonly takenAt: string;
  readonly operator: string;
  readonly readings: readonly LiftReading[];
  readonly mark: PassMark;
  readonly dash: string;
}

/**
 * Every run of one side that counts, in the order of the work: before, each pass in between, after. Void ones and those a
 * finished correction replaced are left out; one without a reading yet is too.
 */
export function passLines(tests: readonly RawTest[], side: PortSide): PassLine[] {
  const { before, interim, after } = standingTests(tests, side, "draft");
  const named = [...(before ? [{ test: before, name: "Before" }] : []), ...interim.map((test) => ({ test, name: `Pass ${test.runNo}` })), ...(after ? [{ test: after, name: "After" }] : [])];
  return named
    .map(({ test, name }) => ({ test, name: test.state === "draft" ? `${name}, open` : name, readings: figuresOfTest(test).readings.map(({ liftUm, flowCfm }) => ({ liftUm, flowCfm })) }))
    .filter((p) => p.readings.length > 0)
    .map(({ test, name, readings }, i) => ({
      testId: test.id, name, takenAt: test.startedAt, operator: test.operator.name, readings, mark: PASS_MARKS[i % PASS_MARKS.length] ?? "circle", dash: PASS_DASHES[i % PASS_DASHES.length] ?? "",
    }));
}

/** Lift unit and pressure the passes are stated at; null where they differ and cannot stand on one scale. */
export function passScale(tests: readonly RawTest[], lines: readonly PassLine[]): { unit: LiftUnit; atInH2O: number } | null {
  const used = tests.filter((t) => lines.some((l) => l.testId === t.id));
  const [first] = used;
  return first && used.every((t) => t.nominalInH2O === first.nominalInH2O) ? { unit: first.liftUnit, atInH2O: first.nominalInH2O } : null;
}

/** Outline of a mark about a point, as the `d` of an SVG path. @param r half its size, px. */
export function markPath(mark: PassMark, x: number, y: number, r: number): string {
  switch (mark) {
    case "circle": return `M${x - r} ${y}a${r} ${r} 0 1 0 ${2 * r} 0a${r} ${r} 0 1 0 ${-2 * r} 0Z`;
    case "square": return `M${x - r} ${y - r}h${2 * r}v${2 * r}h${-2 * r}Z`;
    case "triangle": return `M${x} ${y - r}L${x + r} ${y + r}H${x - r}Z`;
    case "diamond": return `M${x} ${y - r * 1.3}L${x + r * 1.3} ${y}L${x} ${y + r * 1.3}L${x - r * 1.3} ${y}Z`;
    case "cross": return `M${x - r} ${y - r}L${x + r} ${y + r}M${x + r} ${y - r}L${x - r} ${y + r}`;
  }
}
