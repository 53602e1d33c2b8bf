import { describe, expect, it } from "vitest";
import { gs1CheckDigit, gs1Date, isGtin, readGs1Label } from "./gs1";

describe("GS1 check digit", () => {
  // Published worked examples of GS1 and its member organisations.
  it.each([["629104150021", "3"], ["730001100001", "7"], ["03600024145", "7"]])("of %s is %s", (body, digit) => {
    expect(gs1CheckDigit(body)).toEqual({ ok: true, value: digit });
    expect(isGtin(`${body}${digit}`)).toBe(true);
    expect(isGtin(`${body}${(Number(digit) + 1) % 10}`)).toBe(false);
  });

  it("refuses letters and odd lengths", () => {
    expect(gs1CheckDigit("62910415002X")).toMatchObject({ ok: false, refusal: { code: "NOT_DIGITS" } });
    expect(gs1CheckDigit("")).toMatchObject({ ok: false, refusal: { code: "NOT_DIGITS" } });
    expect(isGtin("123")).toBe(false);
  });
});

describe("GS1-128 label", () => {
  const gtin = "38425876095074";

  // Published test vector for the bracketed form.
  it("reads article, expiry and count", () => {
    expect(readGs1Label("(01)38425876095074(17)181119(37)1", 2026)).toMatchObject({ ok: true, value: { gtin, expiry: "2018-11-19", count: 1 } });
  });

  it("reads the same from a scanner with separators, in any order", () => {
    expect(readGs1Label(`]C101${gtin}10E-2604\u001d17261000` + "21A1193", 2026)).toMatchObject({
      ok: true, value: { gtin, lot: "E-2604", expiry: "2026-10-31", serial: "A1193" },
    });
    expect(readGs1Label("17260831" + "10E-2602", 2026)).toMatchObject({ ok: true, value: { lot: "E-2602", expiry: "2026-08-31" } });
  });

  it.each([
    ["(01)38425876095075", "LABEL_CHECK_DIGIT"],
    ["(17)261301", "LABEL_DATE"],
    ["(17)260230", "LABEL_DATE"],
    ["(99)X", "LABEL_UNREADABLE"],
    ["(01)384", "LABEL_UNREADABLE"],
    ["(01", "LABEL_UNREADABLE"],
    ["(37)1A", "LABEL_UNREADABLE"],
    ["", "LABEL_UNREADABLE"],
    ["Widget 7", "LABEL_UNREADABLE"],
    [`01${gtin}17`, "LABEL_UNREADABLE"],
  ])("refuses %s with %s", (text, code) => {
    expect(readGs1Label(text, 2026)).toMatchObject({ ok: false, refusal: { code } });
  });
});

describe("GS1 date", () => {
  it.each([
    ["260200", 2026, "2026-02-28"],
    ["280200", 2026, "2028-02-29"],
    ["261200", 2026, "2026-12-31"],
    ["761231", 2026, "2076-12-31"],
    ["771231", 2026, "1977-12-31"],
    ["200101", 2070, "2120-01-01"],
    ["26133", 2026, null],
  ])("%s seen in %i is %s", (text, year, date) => expect(gs1Date(text, year)).toBe(date));
});
