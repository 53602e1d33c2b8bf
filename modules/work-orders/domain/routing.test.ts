import { describe, expect, it } from "vitest";
import { mergeNeeds, routingChange, type WantedOperation } from "./routing";

const want = (code: string, pieceId = "p1"): WantedOperation => ({ pieceId, code, name: code, qtyMilli: 1000, bookMinutes: 60, priceMinor: 100, lineId: `l-${code}` });
const has = (id: string, code: string, isTouched = false, pieceId = "p1") => ({ id, code, isTouched, pieceId });

describe("routing of an agreed version", () => {
  it("keeps what stands, adds what is new, removes what nobody wants", () => {
    const c = routingChange([has("1", "CLN", true), has("2", "EPX"), has("3", "PIN")], [want("CLN"), want("PIN"), want("GDE")]);
    expect(c.keep.map((k) => k.id)).toEqual(["1", "3"]);
    expect(c.add.map((a) => a.code)).toEqual(["GDE"]);
    expect(c.remove).toEqual(["2"]);
  });
  it("never removes what was started", () => {
    expect(routingChange([has("1", "EPX", true)], []).remove).toEqual([]);
  });
  it("tells pieces apart and matches the same code twice once each", () => {
    const c = routingChange([has("1", "WLD"), has("2", "WLD", false, "p2")], [want("WLD"), want("WLD")]);
    expect(c.keep).toHaveLength(1);
    expect(c.add).toHaveLength(1);
    expect(c.remove).toEqual(["2"]);
  });
});

describe("needs of parts", () => {
  it("adds up the same part of one piece, and not of two", () => {
    const n = (pieceId: string, partId: string, neededMilli: number) => ({ pieceId, partId, neededMilli, lineId: `${pieceId}${partId}` });
    expect(mergeNeeds([n("p1", "a", 2000), n("p1", "a", 1000), n("p2", "a", 500)])).toEqual([n("p1", "a", 3000), n("p2", "a", 500)]);
  });
});
