import { describe, expect, it } from "vitest";
import { valueOf } from "@/tests/support/value-of";
import { benchFactorFromPlates } from "./bench-factor";
import { checkDoubt, type FlowedPlate } from "./plate-doubt";
import { plateFlowCfm } from "./plate-reading";

const plates = (...shown: number[]): FlowedPlate[] => [30, 60, 90].slice(0, shown.length).map((referenceCfm, i) => ({ serial: `P${referenceCfm}`, referenceCfm, indicatedCfm: shown[i] ?? 0 }));
const doubt = (flowed: FlowedPlate[], lastFactor?: number) => {
  const last = lastFactor === undefined ? {} : { lastFactor };
  return checkDoubt({ plates: flowed, made: valueOf(benchFactorFromPlates({ referenceCfm: flowed.map((p) => p.referenceCfm), indicatedCfm: flowed.map((p) => p.indicatedCfm), ...last })), ...last });
};

describe("what is asked of a bench check", () => {
  it("is nothing where plates agree and the factor stands (30, 60, 90 shown as 29.6, 59.4, 88.9: K 1.0118)", () => {
    expect(doubt(plates(29.6, 59.4, 88.9))).toBeNull();
    expect(doubt(plates(29.6, 59.4, 88.9), 1.0118)).toBeNull();
  });
  it("names the plate of a slip of the keys, and what was to be expected", () => {
    // One plate of 58 typed as 580: the factor would fall to a tenth.
    expect(doubt([{ serial: "P58", referenceCfm: 58, indicatedCfm: 580 }], 1.262)).toMatchObject({ code: "PLATE_MISTYPED" });
    expect(doubt([{ serial: "P58", referenceCfm: 58, indicatedCfm: 580 }])?.words).toContain("Plate P58 shows 580 CFM where about 58 was to be expected, and the factor would become 0.1000.");
    // Among three the one that leaves the others is named, with and without a check before.
    expect(doubt(plates(29.6, 594, 88.9))?.words).toContain("Plate P60 shows 594 CFM where about 59.3");
    expect(doubt(plates(29.6, 594, 88.9), 1.0118)?.words).toContain("Plate P60 shows 594 CFM");
    // A point left out of the least plate hardly moves the factor: the plate itself gives it away.
    expect(doubt(plates(296, 59.4, 88.9), 1.0118)).toMatchObject({ code: "PLATE_MISTYPED" });
    expect(doubt(plates(2.96, 59.4, 88.9), 1.0118)?.words).toContain("Plate P30 shows 3 CFM");
  });
  it("is a plate that misses by more than 5 %, and a factor that moved by more than 1 %", () => {
    expect(doubt(plates(27.5, 59.4, 88.9), 1.0118)).toMatchObject({ code: "PLATE_OFF" });
    expect(doubt(plates(27.5, 59.4, 88.9), 1.0118)?.words).toContain("Plate P30");
    expect(doubt(plates(29, 58, 87), 1.0118)).toMatchObject({ code: "FACTOR_MOVED" });
    expect(doubt(plates(29, 58, 87), 1.0118)?.words).toContain("from 1.0118 to 1.0345");
    // 1 % itself is no drift, and a bench never checked has none.
    expect(doubt([{ serial: "P", referenceCfm: 60, indicatedCfm: 60 / 1.0099 }], 1)).toBeNull();
    expect(doubt(plates(29, 58, 87))).toBeNull();
  });
});

describe("a plate on the bench's own scale", () => {
  const percent = { scale: "percent_linear" as const, ranges: [{ label: "3", fullScaleCfm: 100 }] };
  const head = { scale: "orifice_head" as const, ranges: [{ label: "3", fullScaleCfm: 100, fullScaleHead: 16 }, { label: "4", fullScaleCfm: 200 }] };
  const code = (bench: Parameters<typeof plateFlowCfm>[0], indicated: string, range: string) => { const r = plateFlowCfm(bench, { indicated, range }); return r.ok ? "ok" : `${r.refusal.code} ${r.refusal.field}`; };
  it("becomes flow without a factor: 73.5 % of 100; head 6.25 of 16 on 100 is 62.5 (root of the differential pressure, ISO 5167-1)", () => {
    expect(valueOf(plateFlowCfm(percent, { indicated: "73,5", range: "3" }))).toBeCloseTo(73.5, 9);
    expect(valueOf(plateFlowCfm(head, { indicated: "6.25", range: "3" }))).toBeCloseTo(62.5, 9);
    expect(valueOf(plateFlowCfm({ scale: "direct", ranges: [] }, { indicated: "58", range: "" }))).toBe(58);
    // A percent bench may still be told a flow, under no range.
    expect(valueOf(plateFlowCfm(percent, { indicated: "58", range: "" }))).toBe(58);
  });
  it("is refused beside its field off the scale, on a range that is not there or has no end", () => {
    expect(code(percent, "101", "3")).toBe("READING_OUT_OF_RANGE indicated");
    expect(code(percent, "0", "3")).toBe("READING_OUT_OF_RANGE indicated");
    expect(code(percent, "x", "3")).toBe("NUMBER_NOT_FINITE indicated");
    expect(code(percent, "50", "9")).toBe("READING_OUT_OF_RANGE range");
    expect(code(head, "16.1", "3")).toBe("READING_OUT_OF_RANGE indicated");
    expect(code(head, "6", "4")).toBe("READING_OUT_OF_RANGE range");
  });
});
