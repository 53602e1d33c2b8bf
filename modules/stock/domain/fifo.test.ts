import { describe, expect, it } from "vitest";
import { minor } from "@/modules/kernel/money";
import { pieces } from "@/modules/kernel/quantity";
import { addLayer, issueFifo, restoreLayer, type CostLayer } from "./fifo";

const layer = (receipt: number, qty: number, valueMinor: number): CostLayer => ({
  receipt, qtyMilli: pieces(qty), valueMinor: minor(valueMinor),
});

describe("first in, first out", () => {
  // Method: IAS 2 para 27. 8 at 31.40, 6 at 33.10.
  const two = [layer(2, 6, 19_860), layer(1, 8, 25_120)];

  it("takes the oldest receipt first, whatever order the rows come in", () => {
    const out = issueFifo(two, pieces(10));
    expect(out).toMatchObject({
      ok: true,
      value: {
        costMinor: 31_740,
        parts: [{ receipt: 1, qtyMilli: 8000, costMinor: 25_120 }, { receipt: 2, qtyMilli: 2000, costMinor: 6620 }],
        layers: [{ receipt: 2, qtyMilli: 4000, valueMinor: 13_240 }],
      },
    });
  });

  it("puts an unused part back in the layer it left, even one that had run out", () => {
    const out = issueFifo(two, pieces(10));
    if (!out.ok) throw new Error(out.refusal.code);
    const back = restoreLayer(out.value.layers, { receipt: 1, qtyMilli: pieces(1), costMinor: minor(3140) });
    if (!back.ok) throw new Error(back.refusal.code);
    expect(back.value.map((l) => l.receipt)).toEqual([1, 2]);
    const again = restoreLayer(back.value, { receipt: 2, qtyMilli: pieces(1), costMinor: minor(3310) });
    expect(again).toMatchObject({ ok: true, value: [{ qtyMilli: 1000 }, { qtyMilli: 5000, valueMinor: 16_550 }] });
  });

  it("leaves no cent behind when a layer that does not divide is used up piece by piece", () => {
    let layers: readonly CostLayer[] = [layer(1, 3, 1000)];
    let cost = 0;
    for (let i = 0; i < 3; i += 1) {
      const out = issueFifo(layers, pieces(1));
      if (!out.ok) throw new Error(out.refusal.code);
      cost += out.value.costMinor;
      layers = out.value.layers;
    }
    expect(layers).toEqual([]);
    expect(cost).toBe(1000);
  });

  it.each([
    [issueFifo(two, pieces(15)), "INSUFFICIENT_STOCK"],
    [issueFifo(two, pieces(0)), "QTY_NOT_POSITIVE"],
    [addLayer([], layer(1, 0, 10)), "QTY_NOT_POSITIVE"],
    [addLayer([], layer(1, 1, -10)), "COST_NEGATIVE"],
    [restoreLayer([], { receipt: 1, qtyMilli: pieces(0), costMinor: minor(0) }), "QTY_NOT_POSITIVE"],
  ])("refuses impossible amounts (%#)", (result, code) => {
    expect(result).toMatchObject({ ok: false, refusal: { code } });
  });
});
