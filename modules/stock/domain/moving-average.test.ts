import fc from "fast-check";
import { describe, expect, it } from "vitest";
import { minor } from "@/modules/kernel/money";
import { milli, pieces } from "@/modules/kernel/quantity";
import { EMPTY_STOCK, issue, receive, returnFromJob, unitCost6, type StockValue } from "./moving-average";

const have = (qty: number, valueMinor: number): StockValue => ({ qtyMilli: pieces(qty), valueMinor: minor(valueMinor) });

describe("moving average", () => {
  // Figures: docs/hero-job.md. 6 guides at 7.50, then 10 for 83.57 landed.
  it("mixes a landed receipt into the value and issues two guides at 16.07", () => {
    const received = receive(have(6, 4500), pieces(10), minor(8357));
    if (!received.ok) throw new Error(received.refusal.code);
    expect(unitCost6(received.value)).toBe("8.035625");
    const out = issue(received.value, pieces(2));
    if (!out.ok) throw new Error(out.refusal.code);
    expect(out.value.costMinor).toBe(1607);
    expect(out.value.stock).toEqual(have(14, 11250));
    expect(unitCost6(out.value.stock)).toBe("8.035714");
  });

  it("gives the last unit whatever value is left", () => {
    let stock = have(3, 1000);
    const costs: number[] = [];
    for (let i = 0; i < 3; i += 1) {
      const out = issue(stock, pieces(1));
      if (!out.ok) throw new Error(out.refusal.code);
      costs.push(out.value.costMinor);
      stock = out.value.stock;
    }
    expect(costs).toEqual([333, 334, 333]);
    expect(stock).toEqual(EMPTY_STOCK);
    expect(unitCost6(stock)).toBeNull();
  });

  it("refuses more than is on hand and says how many there are", () => {
    const out = issue(have(2, 3600), pieces(3));
    expect(out).toMatchObject({
      ok: false,
      refusal: { code: "INSUFFICIENT_STOCK", field: "qty", data: { onHandMilli: 2000, wantedMilli: 3000 } },
    });
    expect(!out.ok && out.refusal.message).toContain("There are 2 on hand, not 3");
  });

  it.each([
    [receive(EMPTY_STOCK, milli(0), minor(1)), "QTY_NOT_POSITIVE"],
    [receive(EMPTY_STOCK, pieces(1), minor(-1)), "COST_NEGATIVE"],
    [issue(have(2, 10), milli(-1000)), "QTY_NOT_POSITIVE"],
    [returnFromJob(EMPTY_STOCK, { qtyMilli: pieces(1), costMinor: minor(5) }, pieces(2)), "RETURN_EXCEEDS_ISSUE"],
    [returnFromJob(EMPTY_STOCK, { qtyMilli: pieces(1), costMinor: minor(5) }, milli(0)), "QTY_NOT_POSITIVE"],
  ])("refuses impossible amounts (%#)", (result, code) => {
    expect(result).toMatchObject({ ok: false, refusal: { code } });
  });

  it("takes unused parts back at the cost they left at, whatever the average is today", () => {
    const back = returnFromJob(have(10, 50_000), { qtyMilli: pieces(4), costMinor: minor(3940) }, pieces(1));
    expect(back).toMatchObject({ ok: true, value: { costMinor: 985, stock: { qtyMilli: 11_000, valueMinor: 50_985 } } });
  });

  it("never leaves value on an empty shelf, nor loses a cent on the way", () => {
    const step = fc.oneof(
      fc.record({ kind: fc.constant("in" as const), qty: fc.integer({ min: 1, max: 50_000 }), value: fc.integer({ min: 0, max: 500_000 }) }),
      fc.record({ kind: fc.constant("out" as const), qty: fc.integer({ min: 1, max: 50_000 }), value: fc.constant(0) }),
    );
    fc.assert(
      fc.property(fc.array(step, { maxLength: 40 }), (steps) => {
        let stock = EMPTY_STOCK;
        let valueIn = 0;
        let costOut = 0;
        for (const s of steps) {
          if (s.kind === "in") {
            const r = receive(stock, milli(s.qty), minor(s.value));
            if (!r.ok) throw new Error(r.refusal.code);
            stock = r.value;
            valueIn += s.value;
          } else {
            const before = stock;
            const r = issue(stock, milli(s.qty));
            expect(r.ok).toBe(s.qty <= before.qtyMilli);
            if (r.ok) {
              stock = r.value.stock;
              costOut += r.value.costMinor;
            }
          }
          expect(stock.valueMinor).toBeGreaterThanOrEqual(0);
          if (stock.qtyMilli === 0) expect(stock.valueMinor).toBe(0);
          expect(costOut + stock.valueMinor).toBe(valueIn);
        }
        if (stock.qtyMilli > 0) {
          const rest = issue(stock, stock.qtyMilli);
          expect(rest.ok && rest.value.stock).toEqual(EMPTY_STOCK);
        }
      }),
    );
  });
});
