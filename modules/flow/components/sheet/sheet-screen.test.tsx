import { renderToStaticMarkup } from "react-dom/server";
import { describe, expect, it, vi } from "vitest";
import { heroTest } from "@/tests/support/hero-tests";
import { PlaceProvider } from "@/modules/ui/place";
import { ToastProvider } from "@/modules/ui/toast";
import type { BenchFacts, RawTest } from "../../domain/raw-test";
import type { BenchGear, FlowSheet } from "../../queries/sheet";
import { FlowSheetScreen } from "./flow-sheet";

vi.mock("next/navigation", () => ({ useRouter: () => ({ push: () => undefined, refresh: () => undefined }), usePathname: () => "/", useSearchParams: () => new URLSearchParams() }));

const bench: BenchFacts = { id: "b", name: "Bench 1", scale: "percent_linear", ranges: [{ label: "100", fullScaleCfm: 100 }, { label: "200", fullScaleCfm: 200 }], waterUnit: "conventional" };
const gear: BenchGear = { benches: [{ id: "b", name: "Bench 1", scale: "percent_linear", ranges: [...bench.ranges], nominalPressuresInH2O: [28], checkedAt: null, factor: 1 }], fixtures: [{ id: "f77", name: "77", boreMm: 77 }], liftDevices: [], camshafts: [], operators: [] };
const draft = heroTest("intake", "after", { state: "draft", completedAt: null, bench, nominalInH2O: 10, cells: [{ liftUm: 1270, repeatNo: 1, revision: 1, valueText: "40", valueUnit: "percent", rangeLabel: "200", pressureText: "10", pressureUnit: "inH2O", acceptedReason: null, excludedReason: null, takenAt: "2026-03-12T16:40:00.000Z" }] });
const sheetOf = (tests: RawTest[]): FlowSheet => ({
  head: { id: "h", mark: "260224-07", family: "S250-4V", pieceId: null, workOrderId: null, orderNumber: null, customerName: null, castingNumber: "", seatMaterial: "unknown", cylinders: 1, boreMm: 77, camLiftIntakeUm: 8636, camLiftExhaustUm: 8636, valves: [], version: 1, workDone: [], notes: "" },
  cylinder: 1, ports: [], tests, benchCheckHours: 8, nominalInH2O: 28, canRecord: true, canIssue: true, viewer: { id: "june", name: "June" }, sections: [], cautions: [], comparisons: [],
});
const screen = (tests: RawTest[], isBench: boolean) => renderToStaticMarkup(
  <PlaceProvider place={{ slug: "s", locale: "en-US", currency: "USD", zone: "America/Denver" }}><ToastProvider><FlowSheetScreen sheet={sheetOf(tests)} gear={gear} isBench={isBench} /></ToastProvider></PlaceProvider>,
);

describe("the flow sheet on a screen", () => {
  it("states the pressure of the curve it draws, offers the other, and says what is not drawn", () => {
    const html = screen([heroTest("intake", "before"), draft], false);
    expect(html).toContain("CFM AT 10 IN H₂O");
    expect(html).not.toContain("CFM AT 28 IN H₂O");
    expect(html).toMatch(/aria-pressed="true">At 10 in H₂O<.*aria-pressed="false">At 28 in H₂O</);
    expect(html).toContain("Not on this axis: intake before at 28 in H₂O.");
    const one = screen([heroTest("intake", "before"), heroTest("intake", "after")], false);
    expect(one).toContain("CFM AT 28 IN H₂O");
    expect(one).not.toContain("Pressure that is drawn");
  });
  it("has a key for the range where the bench has ranges", () => {
    expect(screen([draft], false)).toContain("<kbd>Alt</kbd>");
    expect(screen([heroTest("intake", "before", { state: "draft" })], false)).not.toContain("<kbd>Alt</kbd>");
  });
  it("at the bench, keeps range, pressure and one more reading over the keypad, and a way back to the desk", () => {
    const html = screen([draft], true);
    expect(html.indexOf('aria-label="How it is read"')).toBeLessThan(html.indexOf('aria-label="Keypad for'));
    // Opened anew, the first cell in hand is on its own range, not on the bench's first.
    expect(html).toMatch(/aria-pressed="true">200</);
    expect(html).toContain('href="/s/s/flow/h?port=1">Desk view');
    expect(html).toContain("Finish test");
  });
});
