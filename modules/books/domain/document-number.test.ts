import { describe, expect, it } from "vitest";
import { documentNumbersIn, printDocumentNumber, readDocumentNumber } from "./document-number";

describe("document numbers", () => {
  it.each([
    ["INV", 2026, 318, "INV-2026-00318"],
    ["WO", 2026, 118, "WO-2026-0118"],
    ["PO", 2026, 231, "PO-2026-0231"],
    ["CN", null, 7, "CN-00007"],
    ["INV", 2026, 1_234_567, "INV-2026-1234567"],
  ])("%s %s %i prints as %s and reads back", (series, year, number, text) => {
    expect(printDocumentNumber({ series, year, number })).toEqual({ ok: true, value: text });
    expect(readDocumentNumber(` ${text.toLowerCase()} `)).toEqual({ series, year, number });
  });

  it.each([["inv", 1, "SERIES_NOT_LETTERS"], ["INV", 0, "NUMBER_OUT_OF_RANGE"], ["INV", 1.5, "NUMBER_OUT_OF_RANGE"]])("refuses %s %d", (series, number, code) => {
    expect(printDocumentNumber({ series, year: 2026, number })).toMatchObject({ ok: false, refusal: { code } });
  });

  it("finds numbers in a bank text, each once", () => {
    expect(documentNumbersIn("pmt inv-2026-00318 and INV-2026-00319, again INV-2026-00318; ref 2026-00318")).toEqual(["INV-2026-00318", "INV-2026-00319"]);
    expect(documentNumbersIn("thanks for the head")).toEqual([]);
    expect(readDocumentNumber("318")).toBeNull();
  });
});
