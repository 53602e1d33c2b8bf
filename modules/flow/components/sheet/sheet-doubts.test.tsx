import { renderToStaticMarkup } from "react-dom/server";
import { describe, expect, it } from "vitest";
import { HERO_FLOWS } from "@/tests/support/hero-flow";
import { heroTest } from "@/tests/support/hero-tests";
import type { RawCell, RawTest } from "../../domain/raw-test";
import { leftOutWords } from "../../domain/one-pressure";
import type { ValveOfFamily } from "../../domain/valve-list";
import { CellPanel, type PanelSheet } from "./cell-panel";
import { ConditionStrip } from "./condition-strip";
import { ZeroReturn } from "./finish-dialog";
import { posOf, ReadingGrid, type GridSheet } from "./reading-grid";
import type { KeptCell, QueueState, Stuck } from "./reading-queue";
import { SaveState } from "./save-state";
import { linesAt, sheetFigures, statedColumns } from "./sheet-figures";
import { notesOf } from "./sheet-notes";
import type { Pos } from "./use-sheet";

const nothing = () => undefined;
const words = (html: string): string => html.replace(/<[^>]+>/g, " ").replace(/ +/g, " ");
const TWO: readonly ValveOfFamily[] = (["left", "right"] as const).map((position) => ({ side: "intake", position, headMm: 31, stemMm: null, seatAngleDeg: null }));

interface Typing { at: Pos; text: string }
function sheetOf(tests: readonly RawTest[], { valves = [], typing, stuck = null }: { valves?: readonly ValveOfFamily[]; typing?: Typing; stuck?: Stuck | null } = {}): GridSheet & PanelSheet {
  const is = (pos: Pos) => typing?.at.testId === pos.testId && typing.at.liftUm === pos.liftUm;
  const cellOf = (pos: Pos) => tests.find((t) => t.id === pos.testId)?.cells.find((c) => c.liftUm === pos.liftUm && c.repeatNo === pos.repeatNo);
  return {
    figures: sheetFigures(tests, 8, { valves }), textAt: (pos) => (is(pos) ? (typing?.text ?? "") : (cellOf(pos)?.valueText ?? "")), stuckAt: (pos) => (is(pos) ? stuck : null),
    keptAt: (pos) => (is(pos) ? ({ isReady: false } as KeptCell) : undefined), type: nothing, commit: nothing, rangeAt: () => "100", pressRange: nothing, held: "", setHeld: nothing, mark: nothing,
    keepWithReason: nothing, discard: nothing, insist: nothing, takeFromBench: () => Promise.resolve(0),
  };
}
const grid = (sheet: GridSheet, active: Pos | null = null) => renderToStaticMarkup(<ReadingGrid sheet={sheet} unit="in" locale="en-US" port={1} canRecord isBench={false} active={active} onActive={nothing} onKey={nothing} />);
const cellHtml = (html: string, side: string, when: string, um: number) => new RegExp(`<td class="r cell [ab]f">(?:(?!</td>)[\\s\\S])*id="c-${side}-${when}-${um}"[\\s\\S]*?</td>`).exec(html)?.[0] ?? "";
const draft = (when: "before" | "after", more: Parameters<typeof heroTest>[2] = {}) => heroTest("intake", when, { state: "draft", completedAt: null, ...more });
const withCell = (test: RawTest, liftUm: number, more: Partial<RawCell>): RawTest => ({ ...test, cells: test.cells.map((c) => (c.liftUm === liftUm ? { ...c, ...more } : c)) });

describe("tests at two pressures", () => {
  const before = heroTest("intake", "before");
  const after = heroTest("intake", "after", { nominalInH2O: 10, flows: HERO_FLOWS.intake.after.map((f) => f * Math.sqrt(10 / 28)), cells: heroTest("intake", "after").cells.map((c) => ({ ...c, pressureText: "10" })) });
  const { sides, pressures } = sheetFigures([before, after], 8);
  it("never share an axis: the newest is drawn, the other named as left out", () => {
    expect(pressures).toEqual([10, 28]);
    expect(linesAt(sides, 10)[0]).toMatchObject({ before: [], gain: "withheld" });
    expect(linesAt(sides, 10)[0]?.after).toHaveLength(8);
    expect(linesAt(sides, 28)[0]).toMatchObject({ after: [] });
    expect(linesAt(sides, 28)[0]?.before).toHaveLength(8);
    expect(leftOutWords(statedColumns(sides), 10, String)).toBe("Drawn at 10 in H₂O. Not on this axis: intake before at 28 in H₂O.");
  });
  it("say their pressure at the head of the column; at one pressure nothing is said", () => {
    expect(words(grid(sheetOf([before, after])))).toMatch(/Before at 28.*After at 10/);
    expect(words(grid(sheetOf([before, heroTest("intake", "after")])))).not.toContain("at 28");
  });
});

describe("checks on the sheet", () => {
  const before = heroTest("intake", "before");
  it("a gain over 40 % is marked at its lift, in words and shape, and may be kept with a reason", () => {
    const up = (by: number) => sheetOf([before, draft("after", { flows: HERO_FLOWS.intake.before.map((f) => f * by) })]);
    const sheet = up(1.45);
    expect(words(cellHtml(grid(sheet), "intake", "after", 1270))).toContain("▲ gain over 40 %");
    expect(words(cellHtml(grid(up(1.35)), "intake", "after", 1270))).not.toContain("▲");
    const col = sheet.figures.sides[0]?.after;
    if (!col) throw new Error("no column");
    const panel = words(renderToStaticMarkup(<CellPanel sheet={sheet} pos={posOf(col, 1270)} col={col} locale="en-US" asked={1} onAgain={nothing} />));
    expect(panel).toContain("Gain over 40 %. Check range and pressure of both tests.");
    expect(panel).toContain("Keep it with a reason");
  });
  it("a coefficient over 1 is impossible where the valves are known, and not judged where they are not", () => {
    const wrong = draft("before", { flows: [246, ...HERO_FLOWS.intake.before.slice(1)] });
    expect(words(cellHtml(grid(sheetOf([wrong], { valves: TWO })), "intake", "before", 1270))).toContain("▲ impossible");
    expect(words(cellHtml(grid(sheetOf([wrong])), "intake", "before", 1270))).not.toContain("impossible");
    expect(words(cellHtml(grid(sheetOf([{ ...wrong, valvesOpen: "left" }], { valves: TWO })), "intake", "before", 1270))).not.toContain("impossible");
  });
  it("more than the smallest section can pass is marked on the test it was measured beside", () => {
    // 127 cfm through 500 mm2 is 119.9 m/s; the ideal speed at 28 in H2O is about 107 m/s.
    const marked = (stage: "before" | "after") => sheetFigures([before], 8, { sections: [{ side: "intake", stage, mm2: 500 }] }).sides[0]?.before?.figures.cells.at(-1)?.flags;
    expect(marked("before")).toContain("ABOVE_IDEAL_PORT_LIMIT");
    expect(marked("after")).not.toContain("ABOVE_IDEAL_PORT_LIMIT");
  });
  it("flow at zero lift has its own words on the chip, before any other", () => {
    const test = draft("before");
    const [first] = test.cells;
    if (!first) throw new Error("no cell");
    const shut = { ...test, cells: [{ ...first, liftUm: 0, valueText: "3", pressureText: "26" }, ...test.cells] };
    expect(words(cellHtml(grid(sheetOf([shut])), "intake", "before", 0))).toContain("▲ flows when shut");
  });
  it("a finished test that stops short of cam lift, or whose indicator drifted, is told in words", () => {
    const short = heroTest("intake", "before", { flows: HERO_FLOWS.intake.before.slice(0, 4), zeroReturnUm: 80 });
    const said = notesOf(sheetFigures([short], 8), 8, "en-US").map((n) => `${n.title} ${n.words}`);
    expect(said).toContain("Intake, before. No reading at or above the cam's maximum lift.");
    expect(said).toContain("Intake, before. Indicator did not return to zero. Read it again.");
    expect(notesOf(sheetFigures([draft("before", { flows: HERO_FLOWS.intake.before.slice(0, 4) })], 8), 8, "en-US").map((n) => n.words)).not.toContain("No reading at or above the cam's maximum lift.");
  });
});

describe("a reading while it is typed", () => {
  const percent = { bench: { id: "b", name: "Bench 1", scale: "percent_linear" as const, ranges: [{ label: "100", fullScaleCfm: 100 }], waterUnit: "conventional" as const } };
  const typed = (text: string, more: Partial<RawTest> = {}) => {
    const test = withCell(draft("before", more), 3810, { valueText: text, ...(more.bench ? { valueUnit: "percent", rangeLabel: "100" } : {}) });
    const at: Pos = { side: "intake", when: "before", testId: test.id, liftUm: 3810, repeatNo: 1 };
    return cellHtml(grid(sheetOf([test], { typing: { at, text } }), at), "intake", "before", 3810);
  };
  it.each([["101", percent, "look again"], ["abc", {}, "look again"], ["-5", {}, "sure?"]])("%s is marked at once", (text, more, short) => {
    expect(typed(text, more)).toContain('aria-invalid="true"');
    expect(words(typed(text, more))).toContain(`▲ ${short}`);
  });
  it.each([["7"], ["-"], ["1,"]])("%s may still become a sound one", (text) => expect(typed(text)).not.toContain("aria-invalid"));
});

describe("a reading in another unit", () => {
  // 1 L/s is 2.118880 cfm (NIST SP 811 B.8: 1 ft3/min = 4.719474 E-04 m3/s).
  const test = withCell(draft("before"), 1270, { valueText: "11.6", valueUnit: "L/s" });
  it("says its unit beside it, and the flow in CFM", () => {
    const html = words(cellHtml(grid(sheetOf([test])), "intake", "before", 1270));
    expect(html).toContain("in L/s =");
    expect(html).toContain("24.6 CFM");
    expect(words(cellHtml(grid(sheetOf([test])), "intake", "before", 2540))).not.toContain("CFM");
  });
});

describe("around the sheet", () => {
  it("the cam lift names its sides and its unit", () => {
    const strip = (exhaustUm: number) => words(renderToStaticMarkup(<ConditionStrip figures={sheetFigures([heroTest("intake", "before"), heroTest("exhaust", "before", { camLiftUm: exhaustUm })], 8)} valves={[]} locale="en-US" />));
    expect(strip(8636)).toContain(".340 in, both sides");
    expect(strip(8128)).toContain("intake .340 in, exhaust .320 in");
  });
  it("what waits for a person is a sentence of its own", () => {
    const state = (waiting: number, link: QueueState["link"]): QueueState => ({ waiting, link, cells: new Map([["a", { stuck: { kind: "asked" } } as KeptCell]]) });
    const said = (s: QueueState) => words(renderToStaticMarkup(<SaveState state={s} savedAt={null} place={{ locale: "en-US", zone: "America/Denver" }} />)).trim();
    expect(said(state(2, "down"))).toBe("2 waiting, no link. Kept on this tablet. 1 for you to look at.");
    expect(said(state(0, "up"))).toBe("Saved as typed. 1 for you to look at.");
  });
  it("the indicator after the last lift says at once when it drifted", () => {
    const test = draft("before");
    const field = (text: string) => renderToStaticMarkup(<ZeroReturn drafts={[test]} values={{ [test.id]: text }} onChange={nothing} />);
    expect(words(field(".003"))).toContain("▲ Indicator did not return to zero");
    expect(field(".001")).not.toContain("aria-invalid");
    expect(field("-")).not.toContain("aria-invalid");
  });
});
