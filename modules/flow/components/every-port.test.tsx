import { renderToStaticMarkup } from "react-dom/server";
import { describe, expect, it } from "vitest";
import { heroTest } from "@/tests/support/hero-tests";
import { HERO_FLOWS } from "@/tests/support/hero-flow";
import type { RawTest } from "../domain/raw-test";
import { sideGain, type GainOfPiece, type PortGain } from "../domain/side-gain";
import { standingTests } from "../domain/standing-tests";
import { headWorkInput } from "../gear-input";
import { flowReport } from "../pdf/flow-report";
import { reportTest } from "../domain/report-snapshot";
import { FlowCheckHead } from "./flow-check";
import { workWords } from "./head-work";

const words = (html: string): string => html.replace(/<[^>]+>/g, " ").replace(/ +/g, " ");
function side(tests: readonly RawTest[], name: "intake" | "exhaust"): PortGain["intake"] {
  const gain = sideGain(standingTests(tests, name, "complete"), name, 8);
  if (!gain.ok) throw new Error(gain.refusal.code);
  return gain.value;
}
/** A port whose intake gained `by` at every lift. */
function port(cylinder: number, by: number): PortGain {
  const tests = [heroTest("intake", "before"), heroTest("intake", "after", { flows: HERO_FLOWS.intake.before.map((f) => f + by) })];
  return { cylinder, intake: side(tests, "intake"), exhaust: side(tests, "exhaust") };
}
const head = (ports: readonly PortGain[]): GainOfPiece => ({ pieceId: "p", headId: "h1", mark: "260224-07", family: "F4", ports });
const shown = (gain: GainOfPiece) => renderToStaticMarkup(<FlowCheckHead gain={gain} slug="ninebark" locale="en-US" />);

describe("the flow check of an order", () => {
  it("shows every tested port and cylinder, each with its curve, figures and sheet", () => {
    const html = shown(head([port(1, 2), port(2, 3), port(4, 5)]));
    for (const [n, mean] of [[1, "+2.00"], [2, "+3.00"], [4, "+5.00"]] as const) {
      expect(html).toContain(`aria-label="Port ${n}"`);
      expect(html).toContain(`/s/ninebark/flow/h1?port=${n}`);
      expect(words(html)).toContain(mean);
    }
    expect(html).not.toContain('aria-label="Port 3"');
    expect(html.match(/<svg class="ch"/g)).toHaveLength(3);
  });
  it("needs no heading for one port, and shows nothing of a head that was not flowed", () => {
    expect(shown(head([port(1, 2)]))).not.toContain("Port 1");
    expect(words(shown(head([port(1, 2)])))).toContain("+2.00");
    expect(shown(head([]))).toBe("");
    expect(shown({ ...head([port(1, 2)]), headId: null })).toBe("");
  });
});

describe("a loss on the paper's curve", () => {
  const drawn = (exhaustAfter: readonly number[]) => {
    const tests = [heroTest("exhaust", "before"), heroTest("exhaust", "after", { flows: exhaustAfter })];
    const sides = (["intake", "exhaust"] as const).map((name) => {
      const standing = standingTests(tests, name, "complete");
      return { side: name, gain: side(tests, name), before: standing.before && reportTest(standing.before), after: standing.after && reportTest(standing.after) };
    });
    return JSON.stringify(flowReport({
      kind: 2, shop: { name: "Ninebark Headworks", address: "", phone: "", email: "" }, locale: "en-US", zone: "America/Denver", head: { mark: "260224-07", family: "F4", castingNumber: "", orderNumber: null, customerName: null },
      cylinder: 1, cylinders: 1, comparisonNo: 1, sides, notTested: [], customerWords: "", issuedBy: "June", issuedAt: "2026-03-12T18:00:00.000Z",
    }).content);
  };
  it("is hatched, marked and plated with its figure", () => {
    const paper = drawn([20.8, ...HERO_FLOWS.exhaust.after.slice(1)]);
    expect(paper).toContain("▼ loss −1.0");
    expect(paper).toContain("loss −1.0");
    // Strokes of the hatch are the only lines of that weight.
    expect(paper.match(/"lineWidth":0.75,/g)?.length ?? 0).toBeGreaterThan(0);
    expect(drawn(HERO_FLOWS.exhaust.after)).not.toContain("▼");
    expect(drawn(HERO_FLOWS.exhaust.after)).not.toContain('"lineWidth":0.75,');
  });
});

describe("work done on a head", () => {
  it("is said in the order of the list", () => {
    expect(workWords(["weld", "epoxy"])).toBe("epoxy in a port, welded");
    expect(workWords([])).toBe("none noted");
  });
  it("is of the kinds the library looks for", () => {
    const id = "11111111-1111-4111-8111-111111111111";
    expect(headWorkInput.safeParse({ id, version: 1, workDone: ["epoxy", "valve size"], notes: "31 mm intake" }).success).toBe(true);
    expect(headWorkInput.safeParse({ id, version: 1, workDone: ["chrome"], notes: "" }).success).toBe(false);
  });
});
