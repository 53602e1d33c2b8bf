import { describe, expect, it } from "vitest";
import { bankLinesOf, checkClosing, guessMapping, readBankAmount, readBankDate, type BankMapping } from "./bank-file";

const mapping: BankMapping = { hasHeader: true, dateColumn: 0, dateOrder: "ymd", textColumns: [1], amountColumn: 2, outColumn: null, decimalComma: false };

// Common practice of bank exports, no one source; dates by the Gregorian calendar.
describe("a bank's file", () => {
  it.each([
    ["1,910.33", false, 191033], ["-318.40", false, -31840], ["318.40-", false, -31840], ["(85.00)", false, -8500], ["$1,264.10", false, 126410],
    ["1.910,33", true, 191033], ["-85,00", true, -8500], ["12,5", true, 1250], ["12.345", false, null], ["abc", false, null], ["", false, null],
  ] as const)("reads %s (comma %s) as %s", (text, comma, expected) => expect(readBankAmount(text, comma)).toBe(expected));

  it.each([["2026-03-14", "ymd", "2026-03-14"], ["03/14/2026", "mdy", "2026-03-14"], ["14.03.26", "dmy", "2026-03-14"], ["31.02.2026", "dmy", null], ["29/02/2024", "dmy", "2024-02-29"], ["20260314", "ymd", "2026-03-14"], ["soon", "ymd", null]] as const)(
    "reads the date %s (%s) as %s", (text, order, expected) => expect(readBankDate(text, order)).toBe(expected));

  it("counts two like lines as two, and names the rows it refuses", () => {
    const { lines, refused } = bankLinesOf([["Date", "Text", "Amount"], ["2026-03-14", "Fee", "-1.00"], ["2026-03-14", "Fee", "-1.00"], ["yesterday", "x", "1.00"], ["2026-03-14", "y", "1.005"]], mapping);
    expect(lines.map((l) => [l.row, l.amountMinor])).toEqual([[2, -100], [3, -100]]);
    expect(new Set(lines.map((l) => l.key)).size).toBe(2);
    expect(refused.map((r) => r.row)).toEqual([4, 5]);
  });
  it("takes money out from a column of its own", () => {
    const { lines } = bankLinesOf([["d", "t", "in", "out"], ["2026-03-14", "a", "10.00", ""], ["2026-03-14", "b", "", "4.00"]], { ...mapping, outColumn: 3 });
    expect(lines.map((l) => l.amountMinor)).toEqual([1000, -400]);
  });
  it("says when closing is not opening and the lines", () => {
    const { lines } = bankLinesOf([["2026-03-14", "a", "10.00"]], { ...mapping, hasHeader: false });
    expect(checkClosing(500, 1500, lines)).toBeNull();
    expect(checkClosing(500, 1600, lines)).toContain("15.00, not 16.00");
  });
  it("guesses from the header, with the decimal comma of the amounts", () => {
    expect(guessMapping([["Buchungstag", "Datum", "Verwendungszweck", "Betrag"], ["x", "14.03.2026", "RF95", "1.910,33"]], "de-DE")).toMatchObject({ dateColumn: 1, dateOrder: "dmy", textColumns: [2], amountColumn: 3, decimalComma: true, hasHeader: true });
    expect(guessMapping([["Date", "Description", "Amount"], ["03/14/2026", "x", "1.00"]], "en-US")).toMatchObject({ dateOrder: "mdy", decimalComma: false });
  });
});
