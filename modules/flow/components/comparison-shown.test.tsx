import { renderToStaticMarkup } from "react-dom/server";
import { describe, expect, it } from "vitest";
import { PlaceProvider } from "@/modules/ui/place";
import { HERO_CAM_UM, HERO_FLOWS } from "@/tests/support/hero-flow";
import { heroTest, readAgain } from "@/tests/support/hero-tests";
import { reportOf } from "@/tests/support/report-snapshot";
import { valueOf } from "@/tests/support/value-of";
import { coefficientTable } from "../domain/coefficient-rows";
import type { PortSide } from "../domain/comparison-reasons";
import { comparisonMeans, type NamedCam } from "../domain/comparison-means";
import type { Units } from "../domain/curve-measure";
import { gainHeadline } from "../domain/gain-headline";
import { sampledPath } from "../domain/sampled-path";
import { ratiosOfPort } from "../domain/port-ratios";
import type { RawTest } from "../domain/raw-test";
import { sideGain, type GainOfPiece, type SideGain } from "../domain/side-gain";
import { standingTests } from "../domain/standing-tests";
import { figuresOfTest } from "../domain/test-figures";
import { flowReport } from "../pdf/flow-report";
import type { PortFigures } from "../queries/head-figures";
import { CustomerGain, gainHeading } from "./customer-gain";
import type { CurveView } from "./curve-views";
import { HeadViews } from "./head-views";
import { IssuedReports } from "./issued-reports";
import { LibraryCurves } from "./library-curves";
import { sheetFigures } from "./sheet/sheet-figures";
import { SheetSummary } from "./sheet/sheet-summary";
import { unitsAsked, unitViews } from "./unit-words";

const PLACE = { slug: "s", locale: "en-US", currency: "USD", zone: "America/Denver" };
const CAM: NamedCam = { label: "Sport", maxLiftUm: HERO_CAM_UM, durationDeg: 240, profile: [] };
const SIDES = ["intake", "exhaust"] as const;
const words = (html: string): string => html.replace(/<[^>]+>/g, " ").replaceAll("&#x27;", "'").replace(/\s+/g, " ");

const hero = (more: Partial<RawTest> & { exhaustFlows?: readonly number[] } = {}): RawTest[] => {
  const { exhaustFlows, ...rest } = more;
  return [heroTest("intake", "before", rest), heroTest("exhaust", "before", rest), heroTest("intake", "after", rest), heroTest("exhaust", "after", { ...rest, ...(exhaustFlows ? { flows: exhaustFlows } : {}) })];
};
const gainOf = (tests: readonly RawTest[], side: PortSide): SideGain => valueOf(sideGain(standingTests(tests, side, "complete"), side, 8));
function figuresOf(tests: readonly RawTest[], side: PortSide, cam: NamedCam | null, sizes: readonly number[] = [31, 31]): PortFigures {
  const { before, after } = standingTests(tests, side, "complete");
  const gain = gainOf(tests, side);
  const readings = (t: RawTest | null) => (t ? figuresOfTest(t).readings : []);
  const table = (t: RawTest | null) => (t && sizes.length > 0 ? coefficientTable({ readings: readings(t), side, valveDiametersMm: sizes, atInH2O: t.nominalInH2O }) : null);
  return {
    cylinder: 1, side, liftUnit: "in", atInH2O: 28, camLiftUm: HERO_CAM_UM, valves: "31 mm + 31 mm", before: table(before), after: table(after), readings: { before: readings(before), after: readings(after) },
    gain, means: gain.comparable ? comparisonMeans(gain, cam) : null, noise: gain.comparable ? (gain.noise?.rows ?? null) : null, withheld: [], notStated: [],
  };
}
const page = (tests: readonly RawTest[], { units = "read", view = "flow", cam = CAM, sizes }: { units?: Units; view?: CurveView; cam?: NamedCam | null; sizes?: readonly number[] } = {}): string => renderToStaticMarkup(
  <PlaceProvider place={PLACE}><HeadViews ports={SIDES.map((side) => figuresOf(tests, side, cam, sizes))} ratios={[{ cylinder: 1, ratios: ratiosOfPort(standingTests(tests, "intake", "complete"), standingTests(tests, "exhaust", "complete")) }]} units={units} view={view} /></PlaceProvider>,
);
const pieceOf = (tests: readonly RawTest[]): GainOfPiece => ({ pieceId: "p", headId: "h", mark: "m", family: "f", ports: [{ cylinder: 1, intake: gainOf(tests, "intake"), exhaust: gainOf(tests, "exhaust") }] });
const customer = (tests: readonly RawTest[]): string => words(renderToStaticMarkup(<CustomerGain gain={pieceOf(tests)} locale="en-US" zone="America/Denver" />));
/** Loses at .050 and .100, gains above. */
const CROSSED = [21.2, 42.6, ...HERO_FLOWS.exhaust.after.slice(2)];

describe("what before and after come to", () => {
  it("stands on the page of figures: the mean of the lifts read as the hero job has it, over lift, over the cam, at cam lift, and the ratio with its basis", () => {
    const text = words(page(hero()));
    expect(text).toMatch(/Mean of the 8 lifts read 88\.91 98\.36 \+9\.45 10\.63 %/);
    expect(text).toMatch(/Mean of the 8 lifts read 70\.10 76\.35 \+6\.25 8\.92 %/);
    expect(text).toMatch(/Mean over lift \.050 to \.340 [\d.]+ [\d.]+ \+[\d.]+ [\d.]+ %/);
    expect(text).toMatch(/Mean over the cam \* [\d.]+ [\d.]+ \+[\d.]+ [\d.]+ %/);
    expect(text).toContain("* its curve is synthetic, drawn from lift and duration, an assumption");
    // SciPy's PCHIP of the hero readings at .340: 123.513510 before, 138.936440 after.
    expect(text).toMatch(/At cam lift \.340 123\.5 138\.9 \+15\.4/);
    expect(text).toContain("No lift read lower after than before. Before and after do not cross.");
    expect(text).toMatch(/Exhaust to intake [\d.]+ % before, [\d.]+ % after, each side at its own cam lift \(intake \.340, exhaust \.340\)\./);
  });
  it("tells losses and crossovers as plainly", () => {
    // Between .100 (−0.4) and .150 (+4.1) the difference is nothing at .100 + .050 × 0.4/4.5 = .1044.
    for (const text of [words(page(hero({ exhaustFlows: CROSSED }))), JSON.stringify(flowReport(reportOf(hero({ exhaustFlows: CROSSED }))).content)]) {
      expect(text).toContain("Lower after than before at .050 (−0.6), .100 (−0.4).");
      expect(text).toContain("Turns from loss to gain at .104 (crossover).");
    }
  });
  it("is told short on the sheet, both sides in a line, and not where the two may not be compared", () => {
    const text = (tests: readonly RawTest[]) => words(renderToStaticMarkup(<SheetSummary figures={sheetFigures(tests, 8)} locale="en-US" />));
    expect(text(hero({ exhaustFlows: CROSSED }))).toMatch(/Mean over the lift, CFM: intake \+8\.2 over \.050 to \.340, exhaust \+[\d.]+ over \.050 to \.340\. Exhaust turns from loss to gain at \.104 \(crossover\)\./);
    expect(text([...hero().slice(0, 2), ...hero({ nominalInH2O: 25 }).slice(2)])).not.toContain("Mean over the lift");
  });
  it("says why there is no mean over the cam, and shows nothing where the two may not be compared", () => {
    expect(words(page(hero(), { cam: null }))).toContain("No mean over the cam: no camshaft is named on the tests.");
    const apart = [...hero().slice(0, 2), ...hero({ nominalInH2O: 25 }).slice(2)];
    const text = words(page(apart));
    expect(text).toContain("Test pressure differs");
    expect(text).not.toMatch(/Mean over|[+]\d/);
  });
  it("stands on the report with what it replaces", () => {
    const text = JSON.stringify(flowReport(reportOf(hero(), { cam: CAM, comparisonNo: 2, replaces: { comparisonNo: 1, issuedAt: "2026-03-12T17:00:00.000Z", why: "intake after corrected (wrong range plate)" } })).content);
    for (const figure of ["Mean of the 8 lifts read", "+9.45", "10.63 %", "Mean over lift .050 to .340", "Mean over the cam *", "At cam lift .340", "+15.4", "each side at its own cam lift"]) expect(text).toContain(figure);
    expect(text).toContain("Replaces report 1 of Mar 12, 2026, 11:00 MDT: intake after corrected (wrong range plate).");
  });
});

describe("views and units of the page of figures", () => {
  it("draw flow, coefficient and speed with the same keys to read them, and name them in words", () => {
    for (const [view, axis] of [["flow", "Flow in CFM against"], ["cd", "Discharge coefficient on curtain area against"], ["speed", "Mean speed through the curtain in ft/s against"]] as const) {
      const html = page(hero(), { view });
      expect(html).toContain(axis);
      expect(html.match(/role="slider"/g)).toHaveLength(2);
      // The tables stay, whatever the curve shows.
      expect(html).toContain("Discharge coefficient on curtain area and mean speed through the curtain");
    }
    expect(page(hero(), { view: "flow" })).toContain('class="gain"');
    expect(page(hero(), { view: "cd" })).not.toMatch(/class="gain2?"/);
    expect(words(page(hero(), { view: "cd", sizes: [] }))).toContain("there is nothing to draw here");
  });
  it("govern every figure: 24.6 CFM is 11.6 L/s, .050 in is 1.3 mm, 28 in H₂O is 6.97 kPa (NIST SP 811, B.8)", () => {
    const text = words(page(hero().map((t) => readAgain(t, [-0.2, 0.2])), { units: "si" }));
    expect(text).toContain("L/s at 6.97 kPa");
    expect(text).toMatch(/1\.3 0\.041 11\.6/);
    expect(text).toContain("Change, L/s");
    expect(text).not.toMatch(/CFM|in H₂O|ft\/s|Lift, in\b/);
    // Flow at .400 after: 143.6 × 0.3048³/60 × 1000 = 67.8 L/s.
    expect(page(hero(), { units: "si" })).toContain("67.8 after");
  });
  it("come from the address, and offer inches where lifts were read in millimetres", () => {
    expect(["si", "us", "x", undefined].map(unitsAsked)).toEqual(["si", "us", "read", "read"]);
    expect(unitViews("in", (u) => u).map((v) => v.label)).toEqual(["CFM, in, in H₂O", "L/s, mm, kPa"]);
    expect(unitViews("mm", (u) => u).map((v) => v.label)).toEqual(["CFM, mm, in H₂O", "CFM, in, in H₂O", "L/s, mm, kPa"]);
  });
});

describe("the customer's headline", () => {
  const repeats = (tests: readonly RawTest[]) => tests.map((t) => readAgain(t, [-0.2, 0.2]));
  it("is the gain at the cam's full lift, not the largest one past it", () => {
    const text = customer(hero());
    expect(text).toContain("+15.4 CFM intake 123.5 to 138.9 at your cam's full lift, .340");
    // The table may name +16.6 at .400; no headline does.
    expect(text).not.toMatch(/16\.6 CFM/);
  });
  it("is the mean of the lifts read without a cam lift, and where it was not reached", () => {
    expect(customer(hero({ camLiftUm: null }))).toContain("+9.45 CFM intake 88.91 to 98.36 on the mean of the 8 lifts read");
    expect(customer(hero({ camLiftUm: 11_000 }))).toContain("+9.45 CFM intake");
  });
  it("says more air only when the change is larger than the noise, and else qualifies the figure", () => {
    expect(gainHeading(pieceOf(repeats(hero())))).toBe("Your head flows more air");
    expect(customer(repeats(hero()))).not.toContain("not assessed");
    expect(gainHeading(pieceOf(hero()))).toBe("Your head read higher after the work");
    expect(customer(hero())).toContain("Whether the change is larger than the noise of the measurement was not assessed.");
    expect(customer(hero())).toContain("not assessed against the noise");
    const close = repeats(hero({ exhaustFlows: HERO_FLOWS.exhaust.before.map((v) => v + 0.1) }));
    expect(gainHeading(pieceOf(close))).toBe("Your head read higher after the work");
    expect(customer(close)).toContain("Not all of the change can be told from the noise of the measurement.");
    expect(gainHeading(pieceOf(repeats(hero({ exhaustFlows: HERO_FLOWS.exhaust.before.map((v) => v - 2) }))))).toBe("Your head, before and after");
  });
  it("takes the verdict of the lifts either side of the cam's, and for the mean that of most lifts", () => {
    const verdict = (lifts: number[], camLiftUm: number | null) => { const g = gainOf(hero({ camLiftUm }).map((t) => readAgain(t, [-0.2, 0.2], lifts)), "intake"); return g.comparable ? gainHeadline(g).verdict : null; };
    expect(verdict([7620, 8890], HERO_CAM_UM)).toBe("larger_than_noise");
    expect(verdict([7620], HERO_CAM_UM)).toBe("not_assessed");
    expect(verdict([2540, 3810, 5080, 6350, 7620], null)).toBe("larger_than_noise");
    expect(verdict([2540, 3810], null)).toBe("not_assessed");
  });
});

describe("issued reports of a head", () => {
  it("are all reachable, and say which one stands in for which, and why", () => {
    const report = (id: string, comparisonNo: number, replaces: { comparisonNo: number; issuedAt: string; why: string } | null) => ({ id, headId: "h", cylinder: 1, comparisonNo, issuedAt: "2026-03-12T18:00:00.000Z", issuedBy: "June", replaces });
    const html = renderToStaticMarkup(<IssuedReports reports={[report("b", 2, { comparisonNo: 1, issuedAt: "", why: "intake after corrected (wrong plate)" }), report("a", 1, null)]} slug="s" locale="en-US" zone="America/Denver" />);
    expect([...html.matchAll(/href="([^"]+)"/g)].map((m) => m[1])).toEqual(["/s/s/flow/reports/b", "/s/s/flow/reports/a"]);
    expect(words(html)).toContain("Replaces report 1: intake after corrected (wrong plate).");
    expect(words(html)).toContain("Replaced by report 2.");
  });
});

describe("the library's curves", () => {
  const draw = (units: Units) => renderToStaticMarkup(<LibraryCurves
    curves={[{ name: "AUDC0806 intake before", look: "thin", readings: [18, 38, 56, 72].map((flowCfm, i) => ({ liftUm: (i + 1) * 1000, flowCfm })) }, { name: "After", look: "thick", readings: [20, 38, 55, 67, 78, 86, 93, 97].map((flowCfm, i) => ({ liftUm: (i + 1) * 1000, flowCfm })) }]}
    unit="mm" atInH2O={28} camLiftUm={7600} locale="en-US" title="Two" units={units} width={820} height={420}
  />);
  it("keep a name off the other lines, and give readings before small points", () => {
    const html = draw("read");
    const name = /x="([\d.]+)" y="([\d.]+)">AUDC0806 intake before</.exec(html);
    const [x, y] = [Number(name?.[1]), Number(name?.[2])];
    const after = /class="aft" d="([^"]+)"/.exec(html)?.[1] ?? "";
    const numbers = [...after.matchAll(/-?[\d.]+/g)].map((m) => Number(m[0]));
    const segments = [{ kind: "move" as const, x: numbers[0] ?? 0, y: numbers[1] ?? 0 }, ...Array.from({ length: (numbers.length - 2) / 6 }, (_, i) => { const [x1 = 0, y1 = 0, x2 = 0, y2 = 0, px = 0, py = 0] = numbers.slice(2 + i * 6, 8 + i * 6); return { kind: "curve" as const, x1, y1, x2, y2, x: px, y: py }; })];
    const hits = sampledPath(segments).flat().filter((p) => p.x >= x && p.x <= x + 22 * 7.2 && p.y >= y - 11 && p.y <= y + 4);
    expect(hits).toEqual([]);
    expect(html.match(/class="pt bf"/g)).toHaveLength(4);
  });
  it("change units as a whole", () => {
    expect(words(draw("si"))).toContain("L/s at 6.97 kPa");
    expect(draw("si")).toContain("45.8 L/s at 8.0 mm");
    expect(draw("us")).toContain("97.0 CFM at .315 in");
  });
});
