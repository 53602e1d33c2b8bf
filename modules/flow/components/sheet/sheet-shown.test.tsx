import { renderToStaticMarkup } from "react-dom/server";
import { describe, expect, it } from "vitest";
import { HERO_FLOWS } from "@/tests/support/hero-flow";
import { heroTest, readAgain } from "@/tests/support/hero-tests";
import { startSheetInput } from "../../input";
import type { BenchFacts, RawCell, RawTest } from "../../domain/raw-test";
import { CellPanel, type PanelSheet } from "./cell-panel";
import { liftTargets, unreadAt } from "./add-lift-dialog";
import { passLines } from "../../domain/pass-lines";
import { PassChart, PassCurves, PassTable, sidesWithPasses } from "./pass-curves";
import { posOf, ReadingGrid, type GridSheet } from "./reading-grid";
import { readingsLabel } from "./scale-words";
import { sheetFigures, withTyped } from "./sheet-figures";
import { benchHint } from "./start-sheet-form";
import type { Pos } from "./use-sheet";

const PLACE = { locale: "en-US", zone: "America/Denver" };
const nothing = () => undefined;
const words = (html: string): string => html.replace(/<[^>]+>/g, " ").replace(/ +/g, " ");

/** The state of a sheet with `typed` laid over what the records hold, as `useSheet` makes it on every key. */
function sheetOf(tests: readonly RawTest[], typed: Record<string, RawCell[]> = {}, held = ""): GridSheet & PanelSheet {
  const live = tests.map((t) => withTyped(t, typed[t.id] ?? []));
  const textAt = (pos: Pos) => live.find((t) => t.id === pos.testId)?.cells.find((c) => c.liftUm === pos.liftUm && c.repeatNo === pos.repeatNo)?.valueText ?? "";
  return {
    figures: sheetFigures(live, 8), textAt, stuckAt: () => null, keptAt: () => undefined, type: nothing, commit: nothing, rangeAt: (pos) => live.find((t) => t.id === pos.testId)?.cells.find((c) => c.liftUm === pos.liftUm)?.rangeLabel ?? null, pressRange: nothing, held, setHeld: nothing, mark: nothing,
    keepWithReason: nothing, discard: nothing, insist: nothing, takeFromBench: () => Promise.resolve(0),
  };
}
const grid = (sheet: GridSheet) => renderToStaticMarkup(<ReadingGrid sheet={sheet} unit="in" locale="en-US" port={1} canRecord isBench={false} active={null} onActive={nothing} onKey={nothing} />);
/** Text of the gain cells, row by row: intake, exhaust. */
const gainCells = (html: string): string[] => [...html.matchAll(/<td class="g">(.*?)<\/td>/g)].map((m) => words(m[1] ?? "").trim());
const draft = (side: "intake" | "exhaust", flows: readonly number[]): RawTest => heroTest(side, "after", { flows, state: "draft", completedAt: null });
const cellOf = (test: RawTest, liftUm: number, valueText: string, more: Partial<RawCell> = {}): RawCell => {
  const [like] = test.cells;
  if (!like) throw new Error("no cell");
  return { ...like, liftUm, valueText, ...more };
};

describe("gain cells", () => {
  const before = heroTest("intake", "before");
  const after = draft("intake", HERO_FLOWS.intake.after.slice(0, 2));
  it("stand empty until a lift is read, then show the difference as it is typed", () => {
    expect(gainCells(grid(sheetOf([before, after]))).filter((_, i) => i % 2 === 0).slice(0, 4)).toEqual(["+0.4", "+2.7", "", ""]);
    for (const [typed, gain] of [["7", "▼ −64.2"], ["76", "+4.8"], ["76.9", "+5.7"], ["76,9", "+5.7"], ["", ""], ["seventy", ""]] as const) {
      const cells = gainCells(grid(sheetOf([before, after], { [after.id]: [cellOf(after, 3810, typed, { revision: 0 })] })));
      expect(cells[4], `typed ${typed}`).toBe(gain);
    }
  });
  it("show a loss as a flag and a gain as a bar, whose length is its share of the largest", () => {
    const lost = draft("intake", [24, ...HERO_FLOWS.intake.after.slice(1)]);
    const html = grid(sheetOf([before, lost]));
    expect(html).toContain('<span class="flag">▼ −0.6</span>');
    expect(html.match(/--g:[\d.]+/g)?.at(-1)).toBe("--g:1");
    expect(html.match(/class="loss/g)).toHaveLength(1);
  });
  it("stay empty where the two may not be compared", () => {
    const apart = heroTest("intake", "after", { nominalInH2O: 25 });
    expect(gainCells(grid(sheetOf([before, apart]))).every((c) => c === "")).toBe(true);
    expect(words(grid(sheetOf([before, apart])))).toContain("Withheld");
  });
  it("carry the verdict against the noise in shape and words, and none without repeats", () => {
    const twice = sheetOf([readAgain(before, [-0.2, 0.2]), readAgain(heroTest("intake", "after"), [-0.2, 0.2])]);
    expect(gainCells(grid(twice)).filter((c) => c !== "").slice(0, 2)).toEqual(["○ not distinguishable from zero, +0.4", "● larger than the measurement noise (95 %), +2.7"]);
    expect(grid(sheetOf([before, after]))).not.toMatch(/[●○◌]/);
  });
});

describe("a bench read by range", () => {
  const RANGES: BenchFacts["ranges"] = [{ label: "100", fullScaleCfm: 100, fullScaleHead: 16 }, { label: "200", fullScaleCfm: 200, fullScaleHead: 16 }];
  const bench = (scale: BenchFacts["scale"]): BenchFacts => ({ id: "b", name: "Bench 1", scale, ranges: RANGES, waterUnit: "conventional" });
  const read = (scale: BenchFacts["scale"], valueText: string, rangeLabel: string | null, pressureText = "28"): RawTest => {
    const test = heroTest("intake", "before", { state: "draft", completedAt: null, bench: bench(scale) });
    return { ...test, cells: [cellOf(test, 3810, valueText, { valueUnit: scale === "percent_linear" ? "percent" : "head", rangeLabel, pressureText })] };
  };
  const cellText = (test: RawTest) => /id="c-intake-before-3810"[^>]*value="([^"]*)"[\s\S]*?<\/td>/.exec(grid(sheetOf([test])))?.[0] ?? "";
  // Range times percent, and range times the root of the head over the head at full scale: the worked figures of flowFromRangePercent and flowFromOrificeHead.
  it.each([
    ["73.5 % of 100 is 73.5 cfm", read("percent_linear", "73.5", "100"), "73.5"],
    ["with a comma, on the other range", read("percent_linear", "73,5", "200"), "147.0"],
    ["a head of 6.25 of 16 on 100 is 62.5 cfm", read("orifice_head", "6.25", "100"), "62.5"],
    ["121 cfm held at 10 in H2O is 202.5 at 28", read("percent_linear", "60.5", "200", "10"), "202.5"],
  ])("%s, beside what was typed", (_, test, flow) => {
    const html = cellText(test);
    expect(html).toContain(`value="${test.cells[0]?.valueText ?? ""}"`);
    expect(html).toContain(`<span class="cor">${flow}</span>`);
  });
  it("says low on the scale, and gives no flow beyond its end", () => {
    expect(words(cellText(read("percent_linear", "12", "100")))).toContain("low on scale");
    expect(words(grid(sheetOf([read("percent_linear", "12", "100")])))).toContain("Before %");
    expect(cellText(read("percent_linear", "112", "100"))).not.toContain('class="cor"');
  });
  it("offers its ranges beside the cell and writes the reading out", () => {
    const test = read("percent_linear", "73.5", "200");
    const sheet = sheetOf([test]);
    const col = sheet.figures.sides[0]?.before;
    if (!col) throw new Error("no column");
    const html = renderToStaticMarkup(<CellPanel sheet={sheet} pos={posOf(col, 3810)} col={col} locale="en-US" asked={1} onAgain={nothing} />);
    expect(html).toMatch(/aria-label="Range"/);
    expect(html).toMatch(/<button[^>]*aria-pressed="true"[^>]*>200<\/button>/);
    expect(words(html)).toContain("73.5 % of range 200 = 147.0 CFM at 28 in H₂O");
    const direct = sheetOf([heroTest("intake", "before", { state: "draft" })]);
    const plain = direct.figures.sides[0]?.before;
    if (!plain) throw new Error("no column");
    expect(renderToStaticMarkup(<CellPanel sheet={direct} pos={posOf(plain, 3810)} col={plain} locale="en-US" asked={1} onAgain={nothing} />)).not.toContain('aria-label="Range"');
  });
  it("is told in the start dialog and over the grid", () => {
    const listed = { name: "Bench 1", id: "b", nominalPressuresInH2O: [28], checkedAt: null, factor: 1, ranges: [...RANGES] };
    expect(benchHint({ ...listed, scale: "percent_linear" })).toBe("Readings are typed as percent of the range, on range 100, 200; the flow in CFM stands beside each.");
    expect(benchHint({ ...listed, scale: "orifice_head" })).toContain("head on the manometer");
    expect(benchHint({ ...listed, scale: "direct" })).toBe("Readings are typed in CFM.");
    expect(readingsLabel(["percent_linear", "percent_linear"])).toBe("Readings, % and CFM");
    expect(readingsLabel(["direct"])).toBe("Readings, CFM");
    expect(startSheetInput.safeParse({ headId: crypto.randomUUID(), purpose: "baseline", benchId: crypto.randomUUID(), fixtureId: crypto.randomUUID(), nominal: "28", step: "0.050", camLiftForLadder: "0.340", intake: {} }).success).toBe(true);
  });
});

describe("every pass of a port", () => {
  const pass = (runNo: number, by: number): RawTest => heroTest("intake", "before", { id: `pass-${runNo}`, purpose: "interim", runNo, startedAt: `2026-03-0${runNo}T10:00:00.000Z`, flows: HERO_FLOWS.intake.before.map((f) => f + by) });
  const open: RawTest = { ...pass(3, 5), state: "draft", completedAt: null };
  const tests = [heroTest("intake", "before"), heroTest("exhaust", "before"), pass(1, 2), pass(2, 4), open, heroTest("intake", "after"), { ...pass(4, 9), state: "void" as const }];
  const lines = passLines(tests, "intake");

  it("stands in the order of the work, without void ones", () => {
    expect(lines.map((l) => l.name)).toEqual(["Before", "Pass 1", "Pass 2", "Pass 3, open", "After"]);
    expect(sidesWithPasses(tests)).toEqual(["intake"]);
    expect(sidesWithPasses(tests.filter((t) => t.purpose !== "interim"))).toEqual([]);
  });
  it("is told apart by stroke and point, not by colour", () => {
    expect(new Set(lines.map((l) => `${l.mark}/${l.dash}`)).size).toBe(lines.length);
    const many = passLines([tests[0] as RawTest, ...Array.from({ length: 19 }, (_, i) => ({ ...pass(1, i), id: `p${i}`, runNo: i + 1, startedAt: `2026-03-01T10:${10 + i}:00.000Z` }))], "intake");
    expect(new Set(many.map((l) => `${l.mark}/${l.dash}`)).size).toBe(20);
    const html = renderToStaticMarkup(<PassChart lines={lines} unit="in" atInH2O={28} camLiftUm={8636} locale="en-US" title="Every pass, intake" width={560} height={366} />);
    expect(html.match(/data-pass=/g)).toHaveLength(5);
    expect(new Set([...html.matchAll(/stroke="([^"]+)"/g)].map((m) => m[1]))).toEqual(new Set(["var(--ink)"]));
    for (const l of lines) expect(html).toContain(`>${l.name}</text>`);
  });
  it("has its figures in a table", () => {
    const table = words(renderToStaticMarkup(<PassTable lines={lines} unit="in" place={PLACE} title="Every pass, intake, CFM" />));
    expect(table).toContain("Before Pass 1 Pass 2 Pass 3, open After");
    expect(table).toContain(".050 24.6 26.6 28.6 29.6 25.0");
    expect(words(renderToStaticMarkup(<PassCurves tests={tests} place={PLACE} sides={["intake"]} />))).toContain(".400 127.0 129.0 131.0 132.0 143.6");
  });
  it("is not drawn over another where they are stated at other pressures", () => {
    const html = renderToStaticMarkup(<PassCurves tests={[...tests, { ...pass(5, 1), nominalInH2O: 10 }]} place={PLACE} sides={["intake"]} />);
    expect(html).not.toContain("data-pass");
    expect(words(html)).toContain("different test pressures");
    expect(html).toContain("<table");
  });
});

describe("a lift that is added", () => {
  const drafts = [draft("intake", []), draft("exhaust", [])];
  it("goes to both drafts of the sheet, or to the side that is chosen", () => {
    expect(liftTargets(drafts, "both")).toEqual({ testId: "intake-after", version: 2, also: { testId: "exhaust-after", version: 2 } });
    expect(liftTargets(drafts, "exhaust")).toEqual({ testId: "exhaust-after", version: 2, also: undefined });
    expect(liftTargets([], "both")).toBeNull();
  });
  it("may be taken off only while no draft was read there", () => {
    const [intake, exhaust] = drafts as [RawTest, RawTest];
    expect(unreadAt(drafts, 3810)).toMatchObject({ testId: "intake-after", also: { testId: "exhaust-after" } });
    expect(unreadAt([intake, { ...exhaust, cells: [cellOf(heroTest("exhaust", "after"), 3810, "64.8")] }], 3810)).toBeNull();
    expect(unreadAt([{ ...intake, lifts: intake.lifts.filter((l) => l.liftUm !== 3810) }, exhaust], 3810)).toEqual({ testId: "exhaust-after", version: 2, also: undefined });
    expect(unreadAt([{ ...intake, lifts: intake.lifts.slice(0, 1) }], 1270)).toBeNull();
    expect(unreadAt(drafts, 99)).toBeNull();
  });
});
