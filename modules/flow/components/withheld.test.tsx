import { renderToStaticMarkup } from "react-dom/server";
import { describe, expect, it } from "vitest";
import { HERO_FLOWS } from "@/tests/support/hero-flow";
import { HERO_FIXTURES as FIXTURES, heroTest, readAgain } from "@/tests/support/hero-tests";
import { reportOf } from "@/tests/support/report-snapshot";
import type { PortSide } from "../domain/comparison-reasons";
import type { RawTest } from "../domain/raw-test";
import { sideGain, type GainOfPiece, type PortGain } from "../domain/side-gain";
import { standingTests } from "../domain/standing-tests";
import { flowReport } from "../pdf/flow-report";
import { reportPaper } from "../pdf/report-on-one-page";
import { CustomerGain, gainHeading } from "./customer-gain";
import { CurveReader } from "./curve-reader";
import { linesOfPort } from "./curve-lines";
import { FlowCheckPort } from "./flow-check";
import { MiniCurve } from "./mini-curve";
import { sheetFigures } from "./sheet/sheet-figures";
import { notesOf, SheetNotes } from "./sheet/sheet-notes";
import { SheetSummary } from "./sheet/sheet-summary";

const PLACE = { locale: "en-US", zone: "America/Denver" };
const testsOf = (after: Partial<RawTest> & { exhaustFlows?: readonly number[] } = {}): RawTest[] => {
  const { exhaustFlows, ...more } = after;
  return [heroTest("intake", "before"), heroTest("exhaust", "before"), heroTest("intake", "after", more), heroTest("exhaust", "after", { ...more, ...(exhaustFlows ? { flows: exhaustFlows } : {}) })];
};
function portOf(tests: readonly RawTest[]): PortGain {
  const side = (s: PortSide) => {
    const gain = sideGain(standingTests(tests, s, "complete"), s, 8);
    if (!gain.ok) throw new Error(gain.refusal.code);
    return gain.value;
  };
  return { cylinder: 1, intake: side("intake"), exhaust: side("exhaust") };
}
const pieceOf = (tests: readonly RawTest[]): GainOfPiece => ({ pieceId: "p", headId: "h", mark: "260224-07", family: "S250-4V", ports: [portOf(tests)] });

/** All words of a paper's description. */
const paperWords = (node: unknown): string => (typeof node === "string" ? ` ${node}` : Array.isArray(node) ? node.map(paperWords).join("") : typeof node === "object" && node !== null ? Object.entries(node).filter(([k]) => k === "text" || typeof node === "object").map(([k, v]) => (k === "text" || typeof v === "object" ? paperWords(v) : "")).join("") : "");

/** Every place of this module that tells what changed between two tests, as the words a reader meets there. */
const PLACES: Record<string, (tests: readonly RawTest[]) => string> = {
  "the order's flow check": (t) => renderToStaticMarkup(<FlowCheckPort port={portOf(t)} locale="en-US" />),
  "the mini curve": (t) => renderToStaticMarkup(<MiniCurve port={portOf(t)} locale="en-US" />),
  "the curve that is read point by point": (t) => renderToStaticMarkup(<CurveReader lines={linesOfPort(portOf(t))} unit="in" atInH2O={28} camLiftUm={8636} width={560} height={366} locale="en-US" label="Read the curve" />),
  "the customer's page": (t) => renderToStaticMarkup(<CustomerGain gain={pieceOf(t)} {...PLACE} />),
  "the sheet's summary": (t) => renderToStaticMarkup(<SheetSummary figures={sheetFigures(t, 8)} locale="en-US" />),
  "the sheet's notes": (t) => renderToStaticMarkup(<SheetNotes notes={notesOf(sheetFigures(t, 8), 8, "en-US")} />),
  "the flow report": (t) => paperWords(flowReport(reportOf(t)).content),
};
const words = (html: string): string => html.replace(/<[^>]+>/g, " ").replace(/ +/g, " ");
/** Class names of filled areas count as saying it too. */
const saysGain = (html: string): boolean => /\bgain/i.test(html) || /class="gain2?"/.test(html) || /more air/i.test(html) || /[+]\d/.test(words(html));

const APART: Record<string, Partial<RawTest>> = {
  "another bore adapter": { fixture: FIXTURES["79"] },
  "another depression": { nominalInH2O: 25 },
  "an old bench check": { benchCheckedAt: "2026-03-11T15:00:00.000Z" },
  "no bench check": { benchCheckedAt: null },
  "another bench": { bench: { id: "b2", name: "Bench 2", scale: "direct", ranges: [], waterUnit: "conventional" } },
};

describe.each(Object.entries(PLACES))("%s", (_, render) => {
  it.each(Object.entries(APART))("never says gain after %s", (_name, change) => {
    expect(saysGain(render(testsOf(change)))).toBe(false);
  });
  it("never says gain before the after test", () => {
    expect(saysGain(render(testsOf().filter((t) => t.purpose === "baseline")))).toBe(false);
  });
  it("never promises power", () => {
    expect(words(render(testsOf())).replace(/not power\.|Power depends on [^;]*;|wet flow and power were not measured/gi, "")).not.toMatch(/\b(power|horsepower|hp|kW)\b/i);
  });
});

// The notes only speak up when something is wrong.
describe.each(Object.entries(PLACES).filter(([name]) => name !== "the sheet's notes"))("%s", (_, render) => {
  it("speaks of a gain when the tests may be compared", () => expect(saysGain(render(testsOf()))).toBe(true));
});

describe("what is told", () => {
  const LOSS = [21.2, ...HERO_FLOWS.exhaust.after.slice(1)];
  it("is the hero's mean on every place that prints it", () => {
    for (const place of ["the order's flow check", "the customer's page", "the sheet's summary", "the flow report"]) {
      const text = words(PLACES[place]?.(testsOf()) ?? "");
      expect(text, place).toContain("+9.45");
      expect(text, place).toContain("+6.25");
    }
    expect(words(PLACES["the flow report"]?.(testsOf()) ?? "")).toMatch(/88\.91 to 98\.36 tnum \+9\.45 tnum 10\.63 %[\s\S]*70\.10 to 76\.35 tnum \+6\.25 tnum 8\.92 %/);
  });
  it("names a loss wherever it names a gain", () => {
    for (const place of ["the order's flow check", "the customer's page", "the flow report"]) {
      const text = words(PLACES[place]?.(testsOf({ exhaustFlows: LOSS })) ?? "");
      expect(text, place).toMatch(/▼|loss|lower/);
      expect(text, place).toContain(".050");
    }
    expect(words(PLACES["the sheet's notes"]?.(testsOf({ exhaustFlows: LOSS })) ?? "")).toContain("Exhaust .050 lost 0.6 CFM.");
  });
  it("gives the reason where the gain would stand", () => {
    for (const place of ["the order's flow check", "the customer's page", "the sheet's notes", "the flow report"]) {
      expect(words(PLACES[place]?.(testsOf(APART["another bore adapter"])) ?? ""), place).toContain("Bore fixture differs: before 77 mm, after 79.5 mm.");
    }
  });
  it("heads the customer's page by what was found", () => {
    // Read once: higher, but not shown to be more than the noise.
    expect(gainHeading(pieceOf(testsOf()))).toBe("Your head read higher after the work");
    expect(gainHeading(pieceOf(testsOf().map((t) => readAgain(t, [-0.2, 0.2]))))).toBe("Your head flows more air");
    expect(gainHeading(pieceOf(testsOf({ exhaustFlows: HERO_FLOWS.exhaust.before.map((v) => v - 1) })))).toBe("Your head, before and after");
    expect(gainHeading(pieceOf(testsOf(APART["another bench"])))).toBe("Your head on the flow bench");
  });
  it("fits on one page, and comes out the same twice", async () => {
    const long = Array.from({ length: 24 }, (_, i) => 1270 * (i + 1));
    const wide = testsOf().map((t): RawTest => ({ ...t, lifts: long.map((liftUm) => ({ liftUm, text: String(liftUm) })), cells: long.map((liftUm, i) => ({ ...(t.cells[0] as RawTest["cells"][number]), liftUm, valueText: String(20 + i * 5 + (t.purpose === "after" ? 2 : 0)) })) }));
    for (const tests of [testsOf(), testsOf(APART["another bore adapter"]), wide, testsOf().map((t) => readAgain(t, [-0.2, 0.2])), wide.map((t) => readAgain(t, [-0.2, 0.2])), testsOf({ exhaustFlows: LOSS }), testsOf({ exhaustFlows: LOSS }).map((t) => readAgain(t, [-0.2, 0.2], [1270, 2540, 6350]))]) {
      const make = () => reportPaper(reportOf(tests));
      const [one, two] = [await make(), await make()];
      expect(one.equals(two)).toBe(true);
      expect(one.toString("latin1").match(/\/Type \/Page\b(?!s)/g)).toHaveLength(1);
    }
  }, 60_000);
});
