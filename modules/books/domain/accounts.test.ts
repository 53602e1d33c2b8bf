import { describe, expect, it } from "vitest";
import { ACCOUNTS, accountOf } from "./accounts";

describe("chart of accounts", () => {
  it("names each code once, in ascending order", () => {
    const codes = ACCOUNTS.map((a) => a.code);
    expect(codes).toEqual([...new Set(codes)].sort());
    expect(new Set(ACCOUNTS.map((a) => a.name)).size).toBe(ACCOUNTS.length);
  });

  it("puts each first digit on its side of the books", () => {
    const kindOf = { "1": "asset", "2": "liability", "3": "equity", "4": "income", "5": "expense", "6": "expense" };
    for (const a of ACCOUNTS) expect([a.code, a.kind]).toEqual([a.code, kindOf[a.code.slice(0, 1) as keyof typeof kindOf]]);
  });

  it("finds by code", () => {
    expect(accountOf("1020")?.name).toBe("Card clearing");
    expect(accountOf("9999")).toBeUndefined();
  });
});
