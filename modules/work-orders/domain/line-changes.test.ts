import { describe, expect, it } from "vitest";
import type { SnapshotLine } from "./estimate-snapshot";
import { lineChanges } from "./line-changes";

const line = (code: string, amountMinor: number, qtyMilli = 1000): SnapshotLine => ({ lineNo: 1, kind: "labor", pieceNo: 1, code, description: code, qtyMilli, unitPriceMinor: amountMinor, amountMinor, bookMinutes: 0 });

describe("what a version changes", () => {
  it("names new, changed and dropped lines, each copy once", () => {
    const c = lineChanges([line("CLN", 1), line("PIN", 2), line("PIN", 2)], [line("PIN", 2), line("GDE", 3), line("CLN", 4)]);
    expect(c.more.map((l) => [l.code, l.amountMinor])).toEqual([["GDE", 3], ["CLN", 4]]);
    expect(c.less.map((l) => [l.code, l.amountMinor])).toEqual([["CLN", 1], ["PIN", 2]]);
  });
});
