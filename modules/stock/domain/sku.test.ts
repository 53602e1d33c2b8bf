import { describe, expect, it } from "vitest";
import { checkSku, lookalikeKey } from "./sku";

describe("a part number", () => {
  it.each([["gv-s250-ex", "GV-S250-EX"], ["IV-2080", "IV-2080"], [" EP.04 ", "EP.04"]])("takes %s", (typed, sku) => expect(checkSku(typed)).toEqual({ ok: true, value: sku }));
  it.each([["EP 04", "SKU_BLANKS"], ["EP-4O", "SKU_LOOKALIKE"], ["1I-7", "SKU_LOOKALIKE"], ["-EP", "SKU_SIGNS"], ["E", "SKU_SIGNS"], ["EP/04", "SKU_SIGNS"], ["", "SKU_SIGNS"]])("refuses %j", (typed, code) => {
    expect(checkSku(typed)).toMatchObject({ ok: false, refusal: { code, field: "sku" } });
  });
  it("tells two numbers that read alike", () => expect(lookalikeKey("GO-AI")).toBe(lookalikeKey("G0-A1")));
});
