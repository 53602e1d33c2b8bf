import { describe, expect, it } from "vitest";
import { minor } from "@/modules/kernel/money";
import { milli, pieces } from "@/modules/kernel/quantity";
import { issue, receive, EMPTY_STOCK, unitCost6 } from "./moving-average";
import { checkPieces, toStockUnits } from "./unit-factor";

describe("purchase and stock units", () => {
  it.each([
    ["a 1,000 g epoxy kit at 124.00, 42 g used", { num: 1000, den: 1 }, 12_400, 42, "0.124000", 521],
    ["a 10 lb tube of rod at 86.00, 24 sticks to the pound, 5 used", { num: 240, den: 1 }, 8600, 5, "0.358333", 179],
  ])("%s", (_words, factor, value, used, unitCost, costMinor) => {
    const units = toStockUnits(pieces(1), factor);
    if (!units.ok) throw new Error(units.refusal.code);
    const stock = receive(EMPTY_STOCK, units.value, minor(value));
    if (!stock.ok) throw new Error(stock.refusal.code);
    expect(unitCost6(stock.value)).toBe(unitCost);
    expect(issue(stock.value, pieces(used))).toMatchObject({ ok: true, value: { costMinor } });
  });

  it.each([null, { num: 0, den: 1 }, { num: 1, den: 0 }, { num: -2, den: 1 }, { num: 1.5, den: 1 }])("refuses the factor %o", (factor) => {
    expect(toStockUnits(pieces(1), factor)).toMatchObject({ ok: false, refusal: { code: "FACTOR_MISSING", field: "factor" } });
  });

  it("refuses a factor that would have to be rounded", () => {
    expect(toStockUnits(pieces(3), { num: 1, den: 3 })).toEqual({ ok: true, value: 1000 });
    expect(toStockUnits(pieces(1), { num: 1, den: 3 })).toMatchObject({ ok: false, refusal: { code: "NOT_WHOLE_THOUSANDTHS" } });
  });

  it("has no half a valve, but half a gram", () => {
    expect(checkPieces(milli(500), true)).toMatchObject({ ok: false, refusal: { code: "NOT_WHOLE_PIECES", field: "qty" } });
    expect(checkPieces(milli(500), false)).toEqual({ ok: true, value: 500 });
    expect(checkPieces(pieces(2), true)).toEqual({ ok: true, value: 2000 });
  });
});
