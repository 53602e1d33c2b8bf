import { renderToStaticMarkup } from "react-dom/server";
import { describe, expect, it } from "vitest";
import { HERO_CAM_UM } from "@/tests/support/hero-flow";
import { heroTest, readAgain } from "@/tests/support/hero-tests";
import type { KnownUncertainty, RawTest } from "../domain/raw-test";
import { sideGain, type ComparableGain, type PortGain } from "../domain/side-gain";
import { notTestedWords, reportTest, type ReportSnapshot } from "../domain/report-snapshot";
import { standingTests } from "../domain/standing-tests";
import { flowReport } from "../pdf/flow-report";
import { linesOfPort } from "./curve-lines";
import { CustomerGain } from "./customer-gain";
import { FlowCheckPort } from "./flow-check";
import { GainCurve, geometryOf } from "./gain-curve";
import { NoiseLines } from "./noise-verdicts";
import { sheetFigures } from "./sheet/sheet-figures";

const KNOWN: KnownUncertainty = { pressureInH2O: 0.1, readingCfm: 0.1, liftMm: 0.01, liftStepMm: null };
/** Each lift of before read 0.2 above and below as well; after likewise. Gains from 0.4 at .050 to 16.6 at .400. */
const repeated = (known?: KnownUncertainty): RawTest[] => (["before", "after"] as const).map((when) => readAgain(heroTest("intake", when, known ? { known } : {}), [-0.2, 0.2]));
function gainOf(tests: readonly RawTest[]): ComparableGain {
  const gain = sideGain(standingTests(tests, "intake", "complete"), "intake", 8);
  if (!gain.ok || !gain.value.comparable) throw new Error("withheld");
  return gain.value;
}
const portOf = (tests: readonly RawTest[]): PortGain => ({ cylinder: 1, intake: gainOf(tests), exhaust: { state: "absent", comparable: false, side: "exhaust", absent: "both" } });
const words = (html: string): string => html.replace(/<[^>]+>/g, " ").replace(/ +/g, " ");
const curveOf = (tests: readonly RawTest[]) => ({ lines: linesOfPort(portOf(tests)), unit: "in", atInH2O: 28, camLiftUm: HERO_CAM_UM, width: 620, height: 420, locale: "en-US" } as const);

describe("the change against the noise", () => {
  // Three readings 0.2 apart: s = 0.2, u = 0.2/sqrt(3) a side, u_c = 0.16330; nu = 4, t95 = 2.776 (NIST TN 1297, Table B.1): U = 0.4534.
  it("is judged at every lift that was read twice on both sides", () => {
    const { noise } = gainOf(repeated());
    expect(noise?.rows).toHaveLength(8);
    expect(noise?.rows[0]).toMatchObject({ liftUm: 1270, verdict: "within_noise", before: 3, after: 3 });
    expect(noise?.rows[0]?.expandedCfm).toBeCloseTo(2.776 * Math.sqrt(2 * (0.04 / 3)), 3);
    expect(noise?.rows.slice(1).map((r) => r.verdict)).toEqual(Array.from({ length: 7 }, () => "larger_than_noise"));
    expect(noise?.notStated).toEqual(["pressure held", "reading", "lift"]);
  });
  it("counts what the bench is known to", () => {
    const plain = gainOf(repeated()).noise?.rows.at(-1)?.expandedCfm ?? 0;
    const known = gainOf(repeated(KNOWN)).noise;
    expect(known?.notStated).toEqual([]);
    expect(known?.rows.at(-1)?.expandedCfm).toBeGreaterThan(plain);
  });
  it("asks 3 % of the before reading more across a converted pressure", () => {
    const held = repeated().map((t) => ({ ...t, cells: t.cells.map((c) => ({ ...c, pressureText: "25" })) }));
    const [row] = gainOf(held).noise?.rows ?? [];
    // Stated at 28 from 25 in H2O: each flow goes up by sqrt(28/25).
    expect((row?.marginCfm ?? 0) - (row?.expandedCfm ?? 0)).toBeCloseTo(0.03 * 24.6 * Math.sqrt(28 / 25), 6);
  });
  it("is not assessed without repeats, and no band is drawn", () => {
    const single = [heroTest("intake", "before"), heroTest("intake", "after")];
    expect(gainOf(single).noise?.rows.map((r) => r.verdict)).toEqual(Array.from({ length: 8 }, () => "not_assessed"));
    const g = geometryOf(curveOf(single));
    expect([g?.bands, g?.bars]).toEqual([[], []]);
    expect(words(renderToStaticMarkup(<NoiseLines gains={[gainOf(single)]} locale="en-US" />))).toContain("not assessed, no lift was read twice both before and after");
  });
});

describe("the band", () => {
  it("is the before curve moved by the margin, at its knots and between them", () => {
    const tests = repeated();
    const g = geometryOf(curveOf(tests));
    const [band] = g?.bands ?? [];
    if (!g || !band) throw new Error("no band");
    const before = g.lines.find((l) => l.when === "before" && l.side === "intake");
    if (!before) throw new Error("no line");
    const margin = gainOf(tests).noise?.rows[0]?.marginCfm ?? 0;
    const bar = g.bars[0];
    const shift = ((bar?.bottom ?? 0) - (bar?.top ?? 0)) / 2;
    expect(g.bars.map((b) => b.marginCfm)).toEqual(gainOf(tests).noise?.rows.map((r) => r.marginCfm));
    // The margin is the same at all lifts here, so the upper edge is the drawn line, control points and all, moved up.
    expect(shift).toBeCloseTo((margin / 143.6 / 1.05) * (g.plot.bottom - g.plot.top), 6);
    const upper = band.segments.slice(0, before.segments.length);
    upper.forEach((s, i) => {
      const line = before.segments[i];
      if (s.kind === "close" || !line || line.kind === "close") throw new Error("closed too soon");
      expect(s.x).toBeCloseTo(line.x, 6);
      expect(s.y).toBeCloseTo(line.y - shift, 6);
      if (s.kind === "curve" && line.kind === "curve") expect([s.x1, s.x2, s.y1 + shift, s.y2 + shift].map((v) => v.toFixed(6))).toEqual([line.x1, line.x2, line.y1, line.y2].map((v) => v.toFixed(6)));
    });
  });
  it("stops at lifts that were not judged", () => {
    const lifts = [1270, 2540, 6350];
    const tests = (["before", "after"] as const).map((when) => readAgain(heroTest("intake", when), [-0.2, 0.2], lifts));
    const g = geometryOf(curveOf(tests));
    expect(g?.bars.map((b) => b.liftUm)).toEqual(lifts);
    // One stretch from .050 to .100; .250 stands alone as a bar.
    expect(g?.bands).toHaveLength(1);
    expect(g?.description).toContain("Band of the measurement noise about intake before: ±0.5 at .050, ±0.5 at .100, ±0.5 at .250.");
  });
  it("is drawn on the screen and never below no flow", () => {
    const html = renderToStaticMarkup(<GainCurve {...curveOf(repeated())} />);
    expect(html.match(/class="band"/g)).toHaveLength(1);
    expect(html.match(/class="bar-u"/g)).toHaveLength(8);
    const low = geometryOf({ ...curveOf(repeated()), lines: [{ side: "intake", gain: "shown", before: [{ liftUm: 1000, flowCfm: 1 }, { liftUm: 2000, flowCfm: 9 }], after: [{ liftUm: 1000, flowCfm: 2 }, { liftUm: 2000, flowCfm: 12 }], margins: [{ liftUm: 1000, marginCfm: 3 }, { liftUm: 2000, marginCfm: 3 }] }] });
    expect(low?.bars[0]?.bottom).toBeCloseTo(low?.plot.bottom ?? 0, 6);
  });
});

describe("the verdict is told", () => {
  const PLACES: Record<string, (t: readonly RawTest[]) => string> = {
    "the sheet": (t) => words(renderToStaticMarkup(<NoiseLines gains={sheetFigures(t, 8).sides.map((s) => s.gain)} locale="en-US" />)),
    "the order's flow check": (t) => words(renderToStaticMarkup(<FlowCheckPort port={portOf(t)} locale="en-US" />)),
    "the customer's page": (t) => words(renderToStaticMarkup(<CustomerGain gain={{ pieceId: "p", headId: "h", mark: "m", family: "f", ports: [portOf(t)] }} locale="en-US" zone="America/Denver" />)),
    "the report": (t) => JSON.stringify(flowReport(snapshot(t)).content),
  };
  it.each(Object.entries(PLACES))("on %s", (_, told) => {
    const text = told(repeated(KNOWN)).toLowerCase();
    expect(text).toContain("larger than the measurement noise (95 %) at .100 to .400; not distinguishable from zero at .050.");
    expect(text).not.toContain("significant");
  });
  it("with the uncertainty beside each gain of the report", () => {
    expect(PLACES["the report"]?.(repeated())).toMatch(/"U, 95 %"/i);
    expect(PLACES["the report"]?.(repeated())).toContain("±0.5");
    expect(PLACES["the report"]?.([heroTest("intake", "before"), heroTest("intake", "after")])).not.toMatch(/"U, 95 %"/i);
  });
  it("keeps a paper of the first kind as it was issued", () => {
    const old = { ...snapshot(repeated()), kind: 1 as const };
    const drawing = (s: ReportSnapshot) => JSON.stringify(flowReport(s).content).match(/"dash":\{"length":1,"space":1.8\}/g)?.length ?? 0;
    expect(drawing(old)).toBe(0);
    expect(drawing(snapshot(repeated()))).toBe(1);
  });
});

function snapshot(tests: readonly RawTest[]): ReportSnapshot {
  const port = portOf(tests);
  const sides = (["intake", "exhaust"] as const).map((side) => ({ side, standing: standingTests(tests, side, "complete"), gain: port[side] }));
  return {
    kind: 2, shop: { name: "Ninebark Headworks", address: "", phone: "", email: "" }, locale: "en-US", zone: "America/Denver", head: { mark: "260224-07", family: "S250-4V", castingNumber: "", orderNumber: null, customerName: null },
    cylinder: 1, cylinders: 1, comparisonNo: 1, sides: sides.map((s) => ({ side: s.side, gain: s.gain, before: s.standing.before && reportTest(s.standing.before), after: s.standing.after && reportTest(s.standing.after) })),
    notTested: notTestedWords(sides, 1, 1, String), customerWords: "", issuedBy: "June", issuedAt: "2026-03-12T18:00:00.000Z",
  };
}
