import { describe, expect, it } from "vitest";
import { suggestFor, type ShortOrder } from "./suggest";

// Shop rule; the reorder point is the one of the standard inventory texts: at or below it, order.
const order = (more: Partial<ShortOrder> = {}): ShortOrder => ({ workOrderId: "w1", number: "WO-2026-0118", promise: "2026-03-20", shortMilli: 2000, comingMilli: 0, ...more });
const part = { partId: "p", freeMilli: 0, reorderPointMilli: null, orderQtyMilli: null, comingForShelfMilli: 0, short: [] };

describe("what to buy", () => {
  it("names the order that waits", () => {
    expect(suggestFor({ ...part, freeMilli: -2000, short: [order()] })).toEqual([{ partId: "p", qtyMilli: 2000, why: "short", workOrderId: "w1", workOrderNumber: "WO-2026-0118" }]);
  });
  it("leaves out what is on its way, for the order or for the shelf", () => {
    expect(suggestFor({ ...part, short: [order({ comingMilli: 2000 })] })).toEqual([]);
    expect(suggestFor({ ...part, comingForShelfMilli: 1000, short: [order()] }).map((s) => s.qtyMilli)).toEqual([1000]);
  });
  it("gives goods on their way to the earlier promise", () => {
    const list = suggestFor({ ...part, comingForShelfMilli: 3000, short: [order(), order({ workOrderId: "w2", number: "WO-2026-0121", promise: "2026-03-27" })] });
    expect(list).toEqual([{ partId: "p", qtyMilli: 1000, why: "short", workOrderId: "w2", workOrderNumber: "WO-2026-0121" }]);
  });
  it("fills the shelf at the reorder point, not above it", () => {
    expect(suggestFor({ ...part, freeMilli: 13_000, reorderPointMilli: 13_000, orderQtyMilli: 26_000 })[0]).toMatchObject({ why: "reorder", qtyMilli: 26_000 });
    expect(suggestFor({ ...part, freeMilli: 14_000, reorderPointMilli: 13_000, orderQtyMilli: 26_000 })).toEqual([]);
    expect(suggestFor({ ...part, freeMilli: 3000, reorderPointMilli: 13_000, comingForShelfMilli: 11_000 })).toEqual([]);
    expect(suggestFor({ ...part, freeMilli: 3500, reorderPointMilli: 13_000 })[0]?.qtyMilli).toBe(10_000);
  });
});
