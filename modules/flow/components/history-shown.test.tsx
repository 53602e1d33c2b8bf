import { renderToStaticMarkup } from "react-dom/server";
import { describe, expect, it } from "vitest";
import { HERO_CAM_UM } from "@/tests/support/hero-flow";
import { heroTest, readAgain } from "@/tests/support/hero-tests";
import type { BenchHistory } from "../domain/noise";
import { marginsOf } from "../domain/noise-band";
import type { RawTest } from "../domain/raw-test";
import { notTestedWords, reportTest, type ReportSnapshot } from "../domain/report-snapshot";
import { sideGain, type ComparableGain, type PortGain } from "../domain/side-gain";
import { standingTests } from "../domain/standing-tests";
import { figuresOfTest } from "../domain/test-figures";
import { renderPdf } from "@/modules/outbound/pdf/render";
import { flowReport } from "../pdf/flow-report";
import { linesOfPort } from "./curve-lines";
import { CustomerGain } from "./customer-gain";
import { FlowCheckPort } from "./flow-check";
import { geometryOf } from "./gain-curve";
import { LibraryCurves } from "./library-curves";
import { bandHint, NoiseLines, NoiseVerdicts } from "./noise-verdicts";
import { ReadingGrid } from "./sheet/reading-grid";
import { sheetFigures } from "./sheet/sheet-figures";

/** u_c = 0.2 x sqrt(2) with 24 degrees of freedom: U = 2.06 x 0.2828 = 0.58. The hero's gain at .050 is 0.4, from .100 on 2.7 and more. */
const HISTORY: BenchHistory = { pooledCfm: 0.2, pairs: 24 };
const BASIS = "by bench history (24 repeat pairs in 12 months)";
const single = (history: BenchHistory | null = HISTORY): RawTest[] => [heroTest("intake", "before"), heroTest("intake", "after", history ? { history } : {})];
/** Read again at .050 and .100 only: those keep their own repeats. */
const mixed = (): RawTest[] => [readAgain(heroTest("intake", "before"), [-0.2, 0.2], [1270, 2540]), readAgain(heroTest("intake", "after", { history: HISTORY }), [-0.2, 0.2], [1270, 2540])];

function gainOf(tests: readonly RawTest[]): ComparableGain {
  const gain = sideGain(standingTests(tests, "intake", "complete"), "intake", 8);
  if (!gain.ok || !gain.value.comparable) throw new Error("withheld");
  return gain.value;
}
const portOf = (tests: readonly RawTest[]): PortGain => ({ cylinder: 1, intake: gainOf(tests), exhaust: { state: "absent", comparable: false, side: "exhaust", absent: "both" } });
const words = (html: string): string => html.replace(/<[^>]+>/g, " ").replaceAll("&#x27;", "'").replace(/ +/g, " ");
function snapshot(tests: readonly RawTest[], kind: ReportSnapshot["kind"] = 3): ReportSnapshot {
  const port = portOf(tests);
  const sides = (["intake", "exhaust"] as const).map((side) => ({ side, standing: standingTests(tests, side, "complete"), gain: port[side] }));
  return {
    kind, shop: { name: "Ninebark Headworks", address: "", phone: "", email: "" }, locale: "en-US", zone: "America/Denver", head: { mark: "260224-07", family: "S250-4V", castingNumber: "", orderNumber: null, customerName: null },
    cylinder: 1, cylinders: 1, comparisonNo: 1, sides: sides.map((s) => ({ side: s.side, gain: s.gain, before: s.standing.before && reportTest(s.standing.before), after: s.standing.after && reportTest(s.standing.after) })),
    notTested: notTestedWords(sides, 1, 1, String), customerWords: "", issuedBy: "June", issuedAt: "2026-03-12T18:00:00.000Z",
  };
}
const paper = (tests: readonly RawTest[], kind?: ReportSnapshot["kind"]): string => JSON.stringify(flowReport(snapshot(tests, kind)).content);

const PLACES: Record<string, (t: readonly RawTest[]) => string> = {
  "the sheet": (t) => words(renderToStaticMarkup(<NoiseLines gains={sheetFigures(t, 8).sides.map((s) => s.gain)} locale="en-US" />)),
  "the order's flow check": (t) => words(renderToStaticMarkup(<FlowCheckPort port={portOf(t)} locale="en-US" />)),
  "the customer's page": (t) => words(renderToStaticMarkup(<CustomerGain gain={{ pieceId: "p", headId: "h", mark: "m", family: "f", ports: [portOf(t)] }} locale="en-US" zone="America/Denver" />)),
  "the report": paper,
};

describe("a verdict by bench history", () => {
  it.each(Object.entries(PLACES))("says so in words on %s", (_, told) => {
    const text = told(single());
    expect(text.toLowerCase()).toContain(`change, ${BASIS}: larger than the measurement noise (95 %) at .100 to .400; not distinguishable from zero at .050.`);
    expect(text).not.toMatch(/significant|not assessed, no lift/i);
  });
  it.each(Object.entries(PLACES))("is told apart from repeats of its own on %s", (_, told) => {
    expect(told(mixed()).toLowerCase()).toContain(`larger than the measurement noise (95 %) at .100; not distinguishable from zero at .050; ${BASIS}: larger than the measurement noise (95 %) at .150 to .400.`);
  });
  it("has shapes of its own in the grid, with the words for the ear, and a legend", () => {
    const figures = sheetFigures(single(), 8);
    const nothing = () => undefined;
    const sheet = { figures, textAt: () => "", stuckAt: () => null, keptAt: () => undefined, type: nothing, commit: nothing };
    const html = words(renderToStaticMarkup(<ReadingGrid sheet={sheet} unit="in" locale="en-US" port={1} canRecord isBench={false} active={null} onActive={nothing} onKey={nothing} />));
    expect(html).toContain("◇ not distinguishable from zero, by bench history, +0.4");
    expect(html).toContain("◆ larger than the measurement noise (95 %), by bench history, +2.7");
    expect(PLACES["the sheet"]?.(single())).toContain("◆ and ◇ the same, by bench history where a lift was read once.");
    expect(PLACES["the sheet"]?.(mixed())).toContain("◆ and ◇");
    expect(PLACES["the sheet"]?.([heroTest("intake", "before"), heroTest("intake", "after")])).not.toMatch(/[◆◇]/);
  });
  it("stands in the table of figures with the pooled spread", () => {
    const { noise } = gainOf(single());
    const html = words(renderToStaticMarkup(<NoiseVerdicts port={{ noise: noise?.rows ?? null, history: noise?.history, withheld: [], notStated: [], liftUnit: "in" }} locale="en-US" />));
    expect(html).toContain("+2.7 ±0.6 1, 1 ◆ larger than the measurement noise (95 %), by bench history");
    expect(html).toContain(`Where a lift was read once its noise is taken ${BASIS}: pooled standard deviation 0.20 CFM at this test pressure.`);
  });
  it("is drawn as a band, named in the curve's words, in the report's legend and in what was not tested", () => {
    const g = geometryOf({ lines: linesOfPort(portOf(single())), unit: "in", atInH2O: 28, camLiftUm: HERO_CAM_UM, width: 620, height: 420, locale: "en-US" });
    expect([g?.bands.length, g?.bars.length]).toEqual([1, 8]);
    expect(g?.description).toContain("±0.6 at .050 by bench history");
    expect(paper(single())).toContain("measurement noise about the before test (95 %), by bench history where a lift was read once.");
    expect(paper(single())).toContain("No repeat readings; bench history stood in.");
    expect(paper(single(null))).toContain("No repeat readings, so a difference was not judged against the bench's noise.");
    expect(PLACES["the customer's page"]?.(single())).toContain("that noise is what this bench's repeats showed in 12 months");
  });
  it("stays away with fewer than ten pairs, and the count is said", () => {
    for (const place of ["the sheet", "the order's flow check", "the customer's page"]) {
      expect(PLACES[place]?.(single({ pooledCfm: 0.2, pairs: 9 })).toLowerCase()).toContain("not assessed, no lift was read twice both before and after, and this bench has 9 of the 10 repeat pairs in 12 months that could stand in.");
      expect(PLACES[place]?.(single({ pooledCfm: 0, pairs: 40 })).toLowerCase()).toContain("the repeats of this bench in 12 months never differed");
    }
    expect(paper(single({ pooledCfm: 0.2, pairs: 9 }))).not.toMatch(/history/);
  });
  it("keeps the report on one page, with losses and two bases of verdicts, over 8 lifts and over 24", async () => {
    for (const count of [8, 24]) {
      const ladder = Array.from({ length: count }, (_, i) => Math.round((10_160 * (i + 1)) / count));
      const both = (["intake", "exhaust"] as const).flatMap((side) => (["before", "after"] as const).map((when): RawTest => {
        const test = heroTest(side, when, { history: HISTORY, lifts: ladder.map((liftUm) => ({ liftUm, text: String(liftUm) })) });
        const flow = (i: number) => 20 + (80 * i) / count + (when === "before" ? 0 : i < 2 ? -0.6 : 1 + (i % 3));
        const once = { ...test, cells: ladder.map((liftUm, i) => ({ ...(test.cells[0] as RawTest["cells"][number]), liftUm, valueText: flow(i).toFixed(1) })) };
        return readAgain(once, [0.3], ladder.slice(count / 2));
      }));
      const sides = (["intake", "exhaust"] as const).map((side) => {
        const standing = standingTests(both, side, "complete");
        const gain = sideGain(standing, side, 8);
        if (!gain.ok) throw new Error("no gain");
        return { side, standing, gain: gain.value };
      });
      const s: ReportSnapshot = { ...snapshot(single()), notTested: notTestedWords(sides, 1, 1, String), sides: sides.map(({ side, standing, gain }) => ({ side, gain, before: standing.before && reportTest(standing.before), after: standing.after && reportTest(standing.after) })) };
      const bytes = await renderPdf(flowReport(s), { creationDate: new Date(s.issuedAt) });
      expect(bytes.toString("latin1").match(/\/Type \/Page\b(?!s)/g)).toHaveLength(1);
    }
  });
  it("leaves a paper of the second kind as it was: the same words, and plates where they stood", () => {
    const repeats = (["before", "after"] as const).map((when) => readAgain(heroTest("intake", when), [-0.2, 0.2]));
    expect(paper(repeats, 2)).toBe(paper(repeats, 3));
    expect(paper(repeats, 2)).not.toMatch(/history/);
    // A loss at .050: the plate of the third kind is placed for the paper.
    const lost = [heroTest("intake", "before"), heroTest("intake", "after", { flows: [24, 51.6, 76.9, 98.2, 116.5, 130.2, 139.6, 143.6] })];
    expect(paper(lost, 2)).not.toBe(paper(lost, 3));
  });
});

describe("the noise on two tests over each other", () => {
  const curves = (tests: readonly RawTest[]) => tests.map((t, i) => ({ name: i === 0 ? "O-1" : "O-2", look: i === 0 ? "thin" as const : "thick" as const, readings: figuresOfTest(t).readings }));
  const overlay = (tests: readonly RawTest[], rows = gainOf(tests).noise?.rows ?? []) =>
    renderToStaticMarkup(<LibraryCurves curves={curves(tests)} margins={marginsOf(rows)} unit="in" atInH2O={28} camLiftUm={HERO_CAM_UM} locale="en-US" title="Two tests over each other" />);
  it("is a band about the first, named in the words of the drawing and in its hint", () => {
    const html = overlay(single());
    expect(html.match(/class="band"/g)).toHaveLength(1);
    expect(html.match(/class="bar-u"/g)).toHaveLength(8);
    expect(html).toContain("Band of the measurement noise about O-1: ±0.6 at .050");
    expect(bandHint(gainOf(single()).noise ?? null, "the first", "the second")).toBe(`The dotted band about the first is the measurement noise (95 %), ${BASIS} where a lift was read once: where the second stays inside it, no difference can be told.`);
  });
  it("has its bars at the first curve's readings, as high as what a change must exceed", () => {
    const bars = [...overlay(single()).matchAll(/class="bar-u" d="M[\d.]+ ([\d.]+)h6M([\d.]+) [\d.]+V([\d.]+)M/g)].map((m) => ({ x: Number(m[2]), top: Number(m[1]), bottom: Number(m[3]) }));
    const first = curves(single())[0]?.readings ?? [];
    // Both axes begin at zero: the middle of a bar is its reading, so the bars' middles stand to each other as the readings.
    const base = 294;
    const [low, high] = [bars[0], bars.at(-1)];
    const height = (b: typeof low) => base - ((b?.top ?? 0) + (b?.bottom ?? 0)) / 2;
    expect(height(high) / height(low)).toBeCloseTo((first.at(-1)?.flowCfm ?? 0) / (first[0]?.flowCfm ?? 1), 6);
    const margin = gainOf(single()).noise?.rows[0]?.marginCfm ?? 0;
    expect(((low?.bottom ?? 0) - (low?.top ?? 0)) / 2 / height(low)).toBeCloseTo(margin / (first[0]?.flowCfm ?? 1), 6);
  });
  it("is not there without a verdict or where the difference is withheld", () => {
    for (const html of [overlay(single(null)), overlay(single(), [])]) {
      expect(html).not.toMatch(/class="(band|bar-u)"/);
      expect(html).not.toContain("measurement noise");
    }
    expect(bandHint(gainOf(single(null)).noise ?? null, "the first", "the second")).toBeNull();
    expect(bandHint(null, "the first", "the second")).toBeNull();
  });
});
