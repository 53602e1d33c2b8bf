import { describe, expect, it } from "vitest";
import { fileRows, guessMapping, type FileMapping } from "./file-rows";
import { decodeText } from "./file-text";

const mapping: FileMapping = {
  headerRows: 1, decimal: ".", lift: 0, flow: 1, pressure: null, side: null, cylinder: null, repeat: null, range: null, liftUnit: "in", fixedSide: "intake", fixedCylinder: 1,
};
const rows = (text: string) => text.split("\n").map((l) => l.split(";"));

describe("rows of a file", () => {
  it("become readings by the mapping, with row numbers as a spreadsheet counts", () => {
    const { readings, refusals } = fileRows(rows("lift;flow\n.050;24.6\n\n0.100 in;48.9"), mapping, 1);
    expect(refusals).toEqual([]);
    expect(readings.map((r) => [r.row, r.liftUm, r.valueText])).toEqual([[2, 1270, "24.6"], [4, 2540, "48.9"]]);
  });
  it("take the next repeat for a lift that comes again, and know a row said twice", () => {
    const { readings, duplicates } = fileRows(rows("lift;flow\n.1;48.9\n.1;49.0\n.1;48.9"), mapping, 1);
    expect(readings.map((r) => [r.row, r.repeatNo])).toEqual([[2, 1], [3, 2]]);
    expect(duplicates).toEqual([{ row: 4, of: 2 }]);
  });
  it("are refused by number and column, in words that say what would do", () => {
    const wide: FileMapping = { ...mapping, pressure: 2, side: 3, cylinder: 4, repeat: 5 };
    const { readings, refusals } = fileRows(rows([
      "lift;flow;held;side;port;run", ".1;48.9;28;in;1;1", "x;48.9;28;in;1;1", ".2;forty;28;in;1;1", ".2;1,048.9;28;in;1;1", ".2;60;0;in;1;1", ".2;60;28;up;1;1", ".2;60;28;ex;3;1", ".2;60;28;ex;2;x", ".1;50.0;28;in;1;1", "60;60;28;in;1;1",
    ].join("\n")), wide, 2);
    expect(readings).toHaveLength(1);
    expect(refusals.map((r) => [r.row, r.column])).toEqual([[3, "lift"], [4, "flow"], [5, "flow"], [6, "pressure"], [7, "side"], [8, "cylinder"], [9, "repeat"], [10, "repeat"], [11, "lift"]]);
    expect(refusals[6]?.words).toMatch(/1 to 9/);
    expect(refusals[7]?.words).toMatch(/^Row 2 has this port, lift and repeat already, with 48.9/);
  });
  it("keep a decimal comma apart from a thousands point", () => {
    const comma = { ...mapping, decimal: "," as const, liftUnit: "mm" as const };
    const { readings, refusals } = fileRows(rows("lift;flow\n1,25;24,6\n2,5;48.9\n2,5;1.048,9"), comma, 1);
    expect(readings.map((r) => r.valueText)).toEqual(["24,6"]);
    expect(refusals.map((r) => r.row)).toEqual([3, 4]);
  });
});

describe("the guess of a mapping", () => {
  it("reads head lines, the decimal sign and the unit of the lifts", () => {
    expect(guessMapping(rows("Cyl;Side;Valve lift mm;Flow CFM;Depression inH2O;Run\n1;in;1,27;24,6;28,0;1"))).toMatchObject({ headerRows: 1, decimal: ",", cylinder: 0, side: 1, lift: 2, flow: 3, pressure: 4, repeat: 5, liftUnit: "mm" });
    expect(guessMapping(rows("0.050;24.6\n0.100;48.9"))).toMatchObject({ headerRows: 0, decimal: ".", lift: 0, flow: 1, liftUnit: "in", side: null });
    expect(guessMapping(rows("1;24.6\n2;48.9\n9.5;120"))).toMatchObject({ liftUnit: "mm" });
  });
});

describe("text of a file", () => {
  it("is read as UTF-8, UTF-16 or Windows-1252 by its marks and bytes", () => {
    const utf8 = new TextEncoder().encode("Hub;Fluß");
    expect(decodeText(utf8)).toEqual({ text: "Hub;Fluß", encoding: "UTF-8" });
    expect(decodeText(new Uint8Array([0xef, 0xbb, 0xbf, ...utf8]))).toEqual({ text: "Hub;Fluß", encoding: "UTF-8" });
    expect(decodeText(new Uint8Array([0xff, 0xfe, 0x48, 0x00, 0x3b, 0x00]))).toEqual({ text: "H;", encoding: "UTF-16" });
    expect(decodeText(new Uint8Array([0xfe, 0xff, 0x00, 0x48, 0x00, 0x3b]))).toEqual({ text: "H;", encoding: "UTF-16" });
    // 0xDF alone is no UTF-8; in Windows-1252 it is ß.
    expect(decodeText(new Uint8Array([0x46, 0x6c, 0x75, 0xdf]))).toEqual({ text: "Fluß", encoding: "Windows-1252" });
  });
});
