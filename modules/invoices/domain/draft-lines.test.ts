import { describe, expect, it } from "vitest";
import { draftLines, type AgreedLine } from "./draft-lines";

const line = (id: string, kind: string, pieceId: string | null, more: Partial<AgreedLine> = {}): AgreedLine => ({
  id, kind, pieceId, description: id, qtyMilli: 1000, unitPriceMinor: 100, amountMinor: 100, bookMinutes: 0, actualMinutes: 0, isDone: true, ...more,
});
const pieces = [{ id: "p1", tag: "T-1", released: true, stopped: false }, { id: "p2", tag: "T-2", released: false, stopped: false }, { id: "p3", tag: "T-3", released: false, stopped: true }];
const base = { pieces, billedIds: new Set<string>(), which: "all" as const, freightMinor: 0 };

// Common practice, no source: one agreed line is billed once; a stopped piece pays for what was done on it.
describe("lines of a draft", () => {
  it("puts labor before parts, in the agreed order, and freight last", () => {
    const lines = draftLines({ ...base, agreed: [line("part", "part", "p1"), line("port", "labor", "p1"), line("seat", "labor", "p1"), line("words", "note", null)], freightMinor: 4200 });
    expect(lines.map((l) => l.description)).toEqual(["port", "seat", "part", "Freight & insurance"]);
    expect(lines[0]).toMatchObject({ pieceTag: "T-1", sourceId: "port" });
  });
  it("bills a line once", () => expect(draftLines({ ...base, agreed: [line("a", "labor", "p1"), line("b", "labor", "p1")], billedIds: new Set(["a"]) }).map((l) => l.description)).toEqual(["b"]));
  it("bills of a stopped piece only the work that was done, no parts", () => {
    expect(draftLines({ ...base, agreed: [line("teardown", "labor", "p3"), line("port", "labor", "p3", { isDone: false }), line("valve", "part", "p3")] }).map((l) => l.description)).toEqual(["teardown"]);
  });
  it("bills only released pieces when asked so", () => {
    expect(draftLines({ ...base, which: "released", agreed: [line("one", "labor", "p1"), line("two", "labor", "p2")] }).map((l) => l.description)).toEqual(["one"]);
  });
});
