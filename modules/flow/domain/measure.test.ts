import { describe, expect, it } from "vitest";
import { valueOf } from "@/tests/support/value-of";
import { cylinderFigures, headFigures, valveFigures } from "./measure-derived";
import { DERIVED_KINDS, MEASURE_KINDS, measureKind, UNITS_OF } from "./measure-kinds";
import { againstLimit, limitWords, measuredValue, measureQuestion, type MeasureLimit } from "./measure-value";

const kindOf = (key: string) => {
  const kind = measureKind(key);
  if (!kind) throw new Error(`no kind ${key}`);
  return kind;
};
const limit = (min: number | null, max: number | null): MeasureLimit => ({ min, max, minText: min === null ? "" : String(min), maxText: max === null ? "" : String(max), unit: "mm", source: "manual 4-12" });
const none = () => null;

describe("the kinds", () => {
  it("are each there once, and every one has a unit and a place for usual values", () => {
    const keys = [...MEASURE_KINDS.map((k) => k.key), ...DERIVED_KINDS.map((k) => k.key)];
    expect(new Set(keys).size).toBe(keys.length);
    for (const k of MEASURE_KINDS) { expect(k.usual[0]).toBeLessThan(k.usual[1]); expect(UNITS_OF[k.dimension].length).toBeGreaterThan(0); }
  });
});

describe("a value as typed", () => {
  it("takes the sheet's unit or its own, point or comma", () => {
    expect(valueOf(measuredValue("33,5", kindOf("spring-installed"), "mm"))).toEqual({ valueText: "33,5", unit: "mm", base: 33.5 });
    // 1 in is 25.4 mm by definition; 1 lbf is 4.448 221 615 N (NIST SP 811 B.8).
    expect(valueOf(measuredValue("1.319 in", kindOf("spring-installed"), "mm")).base).toBeCloseTo(33.5026, 9);
    expect(valueOf(measuredValue('.044"', kindOf("seat-width"), "mm"))).toMatchObject({ unit: "in" });
    expect(valueOf(measuredValue("46 LBF", kindOf("spring-seat-load"), "N")).base).toBeCloseTo(46 * 4.448221615, 5);
    // 1 in2 is 25.4 x 25.4 mm2.
    expect(valueOf(measuredValue("0.868 in2", kindOf("section-intake"), "mm²")).base).toBeCloseTo(559.999, 3);
    expect(valueOf(measuredValue("560 mm²", kindOf("section-intake"), "in²"))).toEqual({ valueText: "560", unit: "mm²", base: 560 });
    expect(valueOf(measuredValue("-0.2", kindOf("deck-clearance"), "mm")).base).toBe(-0.2);
  });
  it("is refused when it is no number, below zero or in a unit of another kind", () => {
    const code = (text: string, key = "spring-installed") => { const r = measuredValue(text, kindOf(key), "mm"); return r.ok ? "ok" : r.refusal.code; };
    expect(code("about 33")).toBe("NUMBER_NOT_FINITE");
    expect(code("")).toBe("NUMBER_NOT_FINITE");
    expect(code("1,234.5")).toBe("NUMBER_NOT_FINITE");
    expect(code("33 N")).toBe("UNIT_KIND_MISMATCH");
    expect(code("-3")).toBe("MEASURE_NEGATIVE");
  });
  it("asks inch or mm when it is 25.4 times off, and only then", () => {
    const ask = (text: string, key: string, unit = "mm") => measureQuestion(valueOf(measuredValue(text, kindOf(key), unit)), kindOf(key))?.code ?? null;
    expect(ask("1.319", "spring-installed")).toBe("INCH_OR_MM");
    expect(ask("33.5", "spring-installed", "in")).toBe("INCH_OR_MM");
    expect(ask("33.5", "spring-installed")).toBeNull();
    expect(ask("900", "spring-installed")).toBe("UNUSUAL");
    expect(ask("0", "seat-runout")).toBeNull();
    expect(ask("5000", "spring-open-load", "N")).toBe("UNUSUAL");
  });
});

describe("a limit", () => {
  it("takes its ends as within, after 11.2 - 8.6 as well as typed", () => {
    expect(againstLimit(0.1, limit(0.1, 0.15))).toBe("within");
    expect(againstLimit(11.2 - 8.6, limit(2.6, null))).toBe("within");
    expect(againstLimit(0.0999, limit(0.1, 0.15))).toBe("below");
    expect(againstLimit(0.151, limit(0.1, 0.15))).toBe("above");
    expect(againstLimit(0.1, null)).toBe("no-limit");
    expect(limitWords("below", limit(0.1, null))).toBe("below 0.1 mm (manual 4-12)");
    expect(limitWords("no-limit", null)).toBe("defer to the service manual");
    expect(limitWords("within", limit(null, 0.05))).toBe("within up to 0.05 mm (manual 4-12)");
  });
});

describe("figures out of measurements", () => {
  const by = (list: { label: string; value: number }[], label: string) => list.find((d) => d.label === label)?.value;
  it("give 0.66 mm to coil bind and 40.5 N/mm for 38.5 fitted, 250 and 600 N, solid 29.2 at 8.64 lift: Hooke's law, worked by hand", () => {
    // 38.5 - 8.64 - 29.2 = 0.66; (600 - 250)/8.64 = 40.51.
    const m = new Map([["spring-installed", 38.5], ["spring-seat-load", 250], ["spring-open-load", 600], ["spring-solid", 29.2]]);
    const figures = valveFigures(m, 8.64, none);
    expect(figures.find((f) => f.label === "Coil-bind clearance")?.value).toBeCloseTo(0.66, 9);
    expect(figures.find((f) => f.label === "Rate from the loads")?.value).toBeCloseTo(40.509, 3);
    expect(valveFigures(m, null, none).map((f) => f.label)).not.toContain("Coil-bind clearance");
  });
  it("give spring rate and coil-bind clearance: 205 N at 33.5, 560 N at 8.6 lift, solid 22.8 (worked example)", () => {
    const m = new Map([["spring-installed", 33.5], ["spring-seat-load", 205], ["spring-open-load", 560], ["spring-solid", 22.8]]);
    const figures = valveFigures(m, 8.6, none);
    expect(by(figures, "Rate from the loads")).toBeCloseTo(41.279, 3);
    expect(by(figures, "Coil-bind clearance")).toBeCloseTo(2.1, 9);
    expect(valveFigures(m, 8.6, (k) => (k === "coil-bind-clearance" ? limit(2.5, null) : null)).find((d) => d.key === "coil-bind-clearance")?.words[0]).toMatch(/under the minimum/);
    expect(valveFigures(new Map([...m, ["spring-solid", 24.9]]), 8.6, none).find((d) => d.key === "coil-bind-clearance")?.words[0]).toMatch(/Coil bind/);
  });
  it("find the shims: 1.85 and 0.05 for 0.10 to 0.15 give 1.80 or 1.75 (published workshop example)", () => {
    const [shim] = valveFigures(new Map([["lash-shim", 1.85], ["lash-measured", 0.05]]), null, () => limit(0.1, 0.15));
    expect(shim).toMatchObject({ label: "Shim to fit", value: 1.8, words: ["leaves 0.1 mm", "or 1.75 mm for 0.15 mm"] });
    expect(valveFigures(new Map([["lash-shim", 1.85], ["lash-measured", 0.05]]), null, none)).toEqual([]);
  });
  it("give valve to piston 1.95 - 0.30 cos 14 and retainer to seal 11.2 - 8.6 (worked examples)", () => {
    const figures = valveFigures(new Map([["piston-clay", 1.95], ["piston-milled", 0.3], ["piston-angle", 14], ["retainer-closed", 11.2]]), 8.6, none);
    expect(by(figures, "Valve to piston")).toBeCloseTo(1.6589, 4);
    expect(by(figures, "Retainer to seal at full lift")).toBe(2.6);
  });
  it("give the worst stem clearance of six places, and say how many were measured", () => {
    const six = ["guide-top-x", "guide-top-y", "guide-mid-x", "guide-mid-y", "guide-low-x", "guide-low-y"].map((k, i) => [k, 5.51 + i * 0.004] as const);
    const [whole] = valveFigures(new Map([...six, ["stem", 5.48]]), null, none);
    expect(whole).toMatchObject({ key: "stem-clearance", words: [] });
    expect(whole?.value).toBeCloseTo(0.05, 9);
    expect(valveFigures(new Map([...six.slice(0, 2), ["stem", 5.48]]), null, none)[0]?.words).toEqual(["2 of 6 places measured"]);
  });
  it("give chamber and ratio: 410.25 swept-sized bore and stroke with 59.06 cc give the printed 7.946", () => {
    // Bore and stroke chosen to sweep 410.25 cc; the published example prints 7.95 for 50 + 9.06 cc.
    const boreMm = 80;
    const strokeMm = (410.25 * 4000) / (Math.PI * boreMm ** 2);
    const figures = cylinderFigures(new Map([["fill-1", 50], ["fill-2", 50.1], ["fill-3", 49.9], ["piston-pockets", 9.06], ["deck-clearance", 0], ["gasket-bore", 80], ["gasket-thickness", 0]]), boreMm, strokeMm);
    expect(by(figures, "Compression ratio")).toBeCloseTo(7.946, 3);
    expect(figures[0]).toMatchObject({ key: "chamber", words: ["spread 0.2 cc"] });
    expect(cylinderFigures(new Map([["fill-1", 50], ["fill-2", 50.4], ["fill-3", 50]]), null, null)[0]?.words).toContain("Burette fills differ by more than 0.2 cc. Fill again.");
    expect(cylinderFigures(new Map([["fill-1", 50]]), 80, 60)).toEqual([]);
  });
  it("take the largest feeler of the lines laid on the deck", () => {
    expect(headFigures(new Map([["deck-flat-1", 0.03], ["deck-flat-4", 0.05]]))).toMatchObject([{ value: 0.05, words: ["2 of 6 lines laid"] }]);
    expect(headFigures(new Map())).toEqual([]);
  });
});
