import { describe, expect, it } from "vitest";
import type { RawCell } from "../../domain/raw-test";
import { nextEdit } from "./next-edit";
import type { CellEdit } from "./reading-queue";

const THEN = "2026-03-12T16:20:00.000Z";
const NOW = "2026-03-12T16:40:00.000Z";
const saved = (more: Partial<RawCell> = {}): RawCell => ({ liftUm: 1270, repeatNo: 1, revision: 1, valueText: "24.6", valueUnit: "cfm", rangeLabel: null, pressureText: "27.2", pressureUnit: "inH2O", acceptedReason: null, excludedReason: null, takenAt: THEN, ...more });
const edit = (input: Partial<Parameters<typeof nextEdit>[0]>): CellEdit => nextEdit({ scale: "direct", value: "24.6", more: {}, was: null, saved: null, held: "", range: null, requestId: "r", at: NOW, ...input });

describe("the next edit of a cell", () => {
  it("reads a new value as the bench stands now", () => {
    expect(edit({ held: "27.9", range: "200" })).toMatchObject({ value: "24.6", pressure: "27.9", range: "200", takenAt: NOW });
    expect(edit({ value: "2", saved: saved(), held: "" })).toMatchObject({ pressure: "" });
  });
  it("keeps the pressure it was held at when it is only left out, and its time and reason", () => {
    const left = edit({ saved: saved({ acceptedReason: "read it twice" }), more: { excludedReason: "clay had moved" }, held: "20" });
    expect(left).toMatchObject({ pressure: "27.2", excludedReason: "clay had moved", acceptedReason: "read it twice", takenAt: THEN });
    expect(edit({ saved: saved({ excludedReason: "clay had moved" }), more: { excludedReason: null } })).toMatchObject({ excludedReason: null, pressure: "27.2" });
  });
  it("asks again for a reason once the value or its range changes", () => {
    expect(edit({ value: "25", saved: saved({ acceptedReason: "read it twice" }) }).acceptedReason).toBeNull();
    expect(edit({ saved: saved({ acceptedReason: "read it twice" }), more: { range: "200" } })).toMatchObject({ acceptedReason: null, range: "200" });
  });
  it("keeps the unit of a reading from a file when it is marked or corrected, until the cell is emptied", () => {
    const file = saved({ valueText: "8.4", valueUnit: "L/s", pressureText: "6.9", pressureUnit: "kPa" });
    const marked = edit({ value: "8.4", saved: file, more: { excludedReason: "clay had moved" } });
    expect(marked).toMatchObject({ valueUnit: "L/s", pressure: "6.9", pressureUnit: "kPa" });
    expect(edit({ value: "8.5", was: { ...marked, value: "8." }, saved: file }).valueUnit).toBe("L/s");
    expect(edit({ value: "1", was: { ...marked, value: "" }, saved: file }).valueUnit).toBeUndefined();
    expect(edit({ value: "8.4", saved: file, more: { pressure: "28" } })).toMatchObject({ pressure: "28" });
    expect(edit({ value: "8.4", saved: file, more: { pressure: "28" } }).pressureUnit).toBeUndefined();
  });
  it("names no unit where it is that of the bench", () => expect("valueUnit" in edit({ saved: saved() })).toBe(false));
});
