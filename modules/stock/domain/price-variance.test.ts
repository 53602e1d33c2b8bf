import { describe, expect, it } from "vitest";
import { minor } from "@/modules/kernel/money";
import { pieces } from "@/modules/kernel/quantity";
import { priceVariance } from "./price-variance";

const bill = (billedMinor: number, onHand: number) =>
  priceVariance({
    receivedMilli: pieces(6), onHandMilli: pieces(onHand), receiptValueMinor: minor(13_200), billedMinor: minor(billedMinor),
    toleranceBp: 200, toleranceMinor: minor(500),
  });

describe("price variance", () => {
  it("splits 10.50 over six valves, four on the shelf: 7.00 to stock, 3.50 to variance", () => {
    expect(bill(14_250, 4)).toEqual({ ok: true, value: { differenceMinor: 1050, toStockMinor: 700, toVarianceMinor: 350, asksPerson: true } });
  });

  it.each([
    [13_700, 6, 500, 0, false],
    [13_701, 0, 0, 501, true],
    [12_700, 3, -250, -250, false],
  ])("bill %i with %i on hand: stock %i, variance %i, asks %s", (billed, onHand, toStockMinor, toVarianceMinor, asksPerson) => {
    expect(bill(billed, onHand)).toMatchObject({ ok: true, value: { toStockMinor, toVarianceMinor, asksPerson } });
  });

  it("refuses more on hand than came in", () => {
    expect(bill(13_200, 7)).toMatchObject({ ok: false, refusal: { code: "ON_HAND_OUT_OF_RANGE" } });
  });
});
