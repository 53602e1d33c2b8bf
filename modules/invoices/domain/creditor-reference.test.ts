import fc from "fast-check";
import { describe, expect, it } from "vitest";
import { creditorReferencesIn, documentReference, makeCreditorReference, printCreditorReference, readCreditorReference } from "./creditor-reference";

describe("creditor reference", () => {
  // Published example of ISO 11649.
  it("makes, prints and reads RF18 5390 0754 7034", () => {
    expect(makeCreditorReference("539007547034")).toEqual({ ok: true, value: "RF18539007547034" });
    expect(printCreditorReference("RF18539007547034")).toBe("RF18 5390 0754 7034");
    expect(readCreditorReference("rf18 5390 0754 7034")).toBe("RF18539007547034");
    expect(readCreditorReference("RF17 5390 0754 7034")).toBeNull();
  });

  it("of the hero invoice is RF95NB202600318", () => {
    expect(documentReference({ prefix: "NB", year: 2026, number: 318 })).toEqual({ ok: true, value: "RF95NB202600318" });
    expect(printCreditorReference("RF95NB202600318")).toBe("RF95 NB20 2600 318");
  });

  it.each(["", "A".repeat(22), "INV-1", "ÄB"])("refuses the body %s", (body) => {
    expect(makeCreditorReference(body)).toMatchObject({ ok: false, refusal: { code: "REFERENCE_BODY" } });
  });

  it.each([
    ["payment RF95NB202600318 thank you", ["RF95NB202600318"]],
    ["rf95 nb20 2600 318 odalys", ["RF95NB202600318"]],
    ["RF95NB202600318,RF18 5390 0754 7034", ["RF95NB202600318", "RF18539007547034"]],
    ["RF17539007547034", []],
    ["WRF95NB202600318", []],
    ["no reference", []],
  ])("finds valid references in %s", (text, found) => expect(creditorReferencesIn(text)).toEqual(found));

  it("every reference made can be read back, and one changed character is seen", () => {
    const alphabet = "0123456789ABCDEFGHIJKLMNOPQRSTUVWXYZ";
    const body = fc.string({ unit: fc.constantFrom(...alphabet), minLength: 1, maxLength: 21 });
    fc.assert(fc.property(body, fc.nat(), fc.constantFrom(...alphabet), (text, at, other) => {
      const made = makeCreditorReference(text);
      if (!made.ok) throw new Error(made.refusal.code);
      const ref = made.value;
      expect(readCreditorReference(printCreditorReference(ref).toLowerCase())).toBe(ref);
      const i = 4 + (at % text.length);
      // ISO 7064 mod 97-10 detects every single substitution of like kind (digit by digit, letter by letter).
      const likeKind = /\d/.test(ref.charAt(i)) === /\d/.test(other);
      if (likeKind && ref.charAt(i) !== other) expect(readCreditorReference(`${ref.slice(0, i)}${other}${ref.slice(i + 1)}`)).toBeNull();
    }));
  });
});
