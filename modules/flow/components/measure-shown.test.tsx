import { renderToStaticMarkup } from "react-dom/server";
import type { ReactNode } from "react";
import { describe, expect, it, vi } from "vitest";
import { PlaceProvider } from "@/modules/ui/place";
import { ToastProvider } from "@/modules/ui/toast";
import type { MeasurementSheet } from "../queries/measurements";
import { BenchComputerGuide } from "./bench-computer-guide";
import { BenchForm } from "./gear-bench-form";
import { GearCheckForm } from "./gear-check-form";
import { OwnHeadDialog } from "./library-own-head";
import { MeasureCell } from "./measure-cell";
import type { LineQueueState } from "./measure-queue";
import { MeasureSaveState } from "./measure-save-state";
import { MeasureSheet } from "./measure-sheet";
import type { Entry } from "./measure-state";

vi.mock("next/navigation", () => ({ useRouter: () => ({ push: () => undefined, refresh: () => undefined, replace: () => undefined }), usePathname: () => "/", useSearchParams: () => new URLSearchParams() }));
vi.mock("../actions", () => ({ recordBenchCheckAction: () => Promise.resolve(null) }));
vi.mock("../gear-actions", () => ({ changeBenchAction: null, setUpBenchAction: null, addOwnHeadAction: null }));
vi.mock("../measure-actions", () => ({ setMeasurementLimitAction: null }));

const place = { slug: "ninebark", locale: "en-US", currency: "USD", zone: "America/Denver" };
const markup = (children: ReactNode) => renderToStaticMarkup(<PlaceProvider place={place}><ToastProvider>{children}</ToastProvider></PlaceProvider>);
const text = (children: ReactNode) => markup(children).replace(/<[^>]+>/g, "|").replace(/\|+/g, "|");

const cell = (kind: string, valueText: string, unit = "mm") => ({ cylinder: 1, side: "intake" as const, position: "single", kind, stage: "before" as const, revision: 1, valueText, unit, base: Number(valueText), instrument: "", by: "June", at: "2026-03-12T16:40:00.000Z" });
const sheet: MeasurementSheet = {
  head: { id: "h", mark: "261120-01", family: "S250-4V", cylinders: 1, boreMm: 77, strokeMm: 53.6, seatMaterial: "unknown", camLiftIntakeUm: 8640, camLiftExhaustUm: null, version: 1, workDone: [], notes: "" },
  pieceId: null, orderId: null, orderNumber: null, valves: [{ side: "intake", position: "single" }, { side: "exhaust", position: "single" }], valvesGuessed: false,
  cells: [cell("spring-installed", "38.5"), cell("spring-seat-load", "250", "N"), cell("spring-open-load", "600", "N"), cell("spring-solid", "29.2")],
  limits: [], epoxy: [], canRecord: true, canSetUp: false, canFind: false, viewerId: "june",
};

describe("the measurement sheet on a screen", () => {
  it("derives coil bind and rate from what was measured and the cam lift, and says where the lift is missing", () => {
    const shown = text(<MeasureSheet sheet={sheet} />);
    expect(shown).toMatch(/Coil-bind clearance\|0\.66\| \|mm/);
    expect(shown).toMatch(/Rate from the loads\|40\.5\| \|N\/mm/);
    expect(shown).toContain("No cam lift on record, exhaust.");
  });
  it("says what a line waits for and what may be done about it", () => {
    const shown = (entry: Partial<Entry>, link: LineQueueState["link"] = "up") => text(
      <MeasureCell id="c|k" label="Installed height" entry={{ text: "385", unit: "mm", isKeptHere: true, stuck: null, ...entry }} unit="mm" verdict={null} mayWrite link={link} onType={() => undefined} onLeave={() => undefined} onKeep={() => undefined} onForget={() => undefined} />,
    );
    expect(shown({}, "down")).toContain("Kept on this device.");
    expect(shown({ stuck: { kind: "asked", message: "Usually below 70.", theirs: null } })).toMatch(/Usually below 70\..*Keep as it stands.*Forget it/);
    expect(shown({ stuck: { kind: "refused", message: "No number.", theirs: null } })).not.toContain("Keep as it stands");
    expect(shown({ stuck: { kind: "conflict", message: "It says 37.9 mm.", theirs: { revision: 2, valueText: "37.9", unit: "mm" } } })).toMatch(/37\.9 mm.*Keep mine.*Take theirs/);
  });
  it("says when it was saved, and how much is kept on this device and why", () => {
    const said = (state: Partial<LineQueueState>, savedAt: Date | null = null) => text(<MeasureSaveState state={{ lines: new Map(), waiting: 0, others: 0, link: "up", ...state }} savedAt={savedAt} place={place} />);
    const at = new Date("2026-03-12T16:02:00Z");
    expect(said({}, at)).toContain("Saved 10:02");
    expect(said({ waiting: 3, link: "down" }, at)).toContain("Saved 10:02, 3 kept on this device, no link.");
    expect(said({ waiting: 1, link: "signed-out" })).toContain("1 kept on this device. Sign in again to save it.");
    expect(said({ others: 2 })).toContain("2 lines of somebody else until they sign in");
  });
});

describe("forms of the gear on a screen", () => {
  const plate = { id: "p", serial: "P-80", referenceFlowCfm: 80.3, atPressureInH2O: 28, certificate: "", dueOn: null, isOverdue: false, active: true, version: 1 };
  const bench = { id: "b", name: "North", kind: "series_orifice", scale: "percent_linear" as const, ranges: [{ label: "3", fullScaleCfm: 120 }], waterUnit: "conventional" as const, nominalPressuresInH2O: [28], maxFlowCfm: 400, pressureUncertaintyInH2O: null, readingUncertaintyCfm: null, altitudeM: null, active: true, version: 1, check: null };
  it("ask a plate on the bench's own scale, with its range, and a flow only where the bench shows one", () => {
    const scaled = markup(<GearCheckForm bench={bench} plates={[plate]} />);
    expect(scaled).toContain("Plate P-80, percent of its range");
    expect(scaled).toMatch(/<option value="3"[^>]*>Range 3<\/option>/);
    const direct = markup(<GearCheckForm bench={{ id: "b", scale: "direct", ranges: [] }} plates={[plate]} />);
    expect(direct).toContain("Plate P-80, bench shows");
    expect(direct).not.toContain("<option");
  });
  it("ask the head at full scale of a manometer bench only", () => {
    expect(text(<BenchForm bench={bench} />)).not.toContain("Head at full scale");
    expect(text(<BenchForm bench={{ ...bench, scale: "orifice_head" }} />)).toContain("Head at full scale");
  });
  it("open on an own head without a fault", () => expect(text(<OwnHeadDialog families={[{ name: "Twin", cylinders: 2 }]} />)).toContain("Own head"));
});

describe("the guide for a bench computer", () => {
  it("shows each command whole, with the shop in it, and a key to copy it", () => {
    const facts = { origin: "https://shop.example", slug: "ninebark", benchId: "B", fixtureId: "F", operatorId: "O", tag: "260224-07", testId: "T" };
    const html = markup(<BenchComputerGuide facts={facts} documentHref="/api/v1/openapi.json" />);
    expect(html.match(/https:\/\/shop\.example\/api\/v1\/s\/ninebark\/flow\//g)).toHaveLength(4);
    expect(html.match(/aria-label="Copy the command for: /g)).toHaveLength(4);
    expect(html).toContain("Authorization: Bearer $BENCH_TOKEN");
  });
});
