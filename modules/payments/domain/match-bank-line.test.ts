import { describe, expect, it } from "vitest";
import { minor } from "@/modules/kernel/money";
import { matchBankLine, type PayableDocument } from "./match-bank-line";

const doc = (documentId: string, number: string, reference: string, open: number): PayableDocument => ({ documentId, number, reference, openMinor: minor(open) });
const hero = doc("hero", "INV-2026-00318", "RF95NB202600318", 191_033);
const other = doc("other", "INV-2026-00319", "RF18539007547034", 191_033);
const line = (amount: number, text: string, reference: string | null = null) => ({ amountMinor: minor(amount), text, reference });

describe("matching a bank line", () => {
  it.each([
    ["structured reference", line(191_033, "BRENNAN", "RF95 NB20 2600 318")],
    ["reference in the text", line(191_033, "brennan rf95nb202600318")],
  ])("%s, open and equal: matched", (_title, l) => {
    expect(matchBankLine(l, [other, hero])).toEqual({ kind: "matched", documentId: "hero" });
  });

  it.each([
    ["reference, other amount", line(190_000, "x", "RF95NB202600318"), ["hero"], -1033],
    ["reference, other amount", line(382_066, "RF95NB202600318, RF18539007547034"), ["hero", "other"], 0],
    ["document number in the text", line(191_033, "invoice inv-2026-00318"), ["hero"], 0],
    ["same amount only", line(191_033, "transfer"), ["hero", "other"], null],
  ])("%s: offered, not booked", (why, l, documentIds, differenceMinor) => {
    expect(matchBankLine(l, [hero, other])).toEqual({ kind: "offered", why, documentIds, differenceMinor });
  });

  it("a reference whose check digits are wrong counts for nothing", () => {
    expect(matchBankLine(line(191_033, "x", "RF94NB202600318"), [hero])).toMatchObject({ kind: "offered", why: "same amount only", differenceMinor: 0 });
  });

  it("a paid document, money going out, and a strange sum match nothing", () => {
    expect(matchBankLine(line(191_033, "x", "RF95NB202600318"), [doc("hero", "INV-2026-00318", "RF95NB202600318", 0)])).toEqual({ kind: "unknown" });
    expect(matchBankLine(line(-191_033, "INV-2026-00318"), [hero])).toEqual({ kind: "unknown" });
    expect(matchBankLine(line(5, "thanks"), [hero])).toEqual({ kind: "unknown" });
  });
});
