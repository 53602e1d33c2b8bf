import { describe, expect, it } from "vitest";
import { heroTest } from "@/tests/support/hero-tests";
import { unreadLifts } from "./unread-lifts";

describe("what a draft lacks before it is finished", () => {
  const whole = heroTest("intake", "before", { state: "draft" });
  it("is nothing when every planned lift was read, left out or not", () => {
    expect(unreadLifts([whole, { ...whole, cells: whole.cells.map((c) => ({ ...c, excludedReason: "clay moved" })) }])).toEqual([]);
  });
  it("names the lifts without a reading; a cleared one has none", () => {
    expect(unreadLifts([{ ...whole, cells: whole.cells.map((c) => (c.liftUm === 2540 ? { ...c, valueText: "" } : c)).filter((c) => c.liftUm !== 1270) }])).toMatchObject([{ liftsUm: [1270, 2540], isEmpty: false }]);
  });
  it("says where nothing was read at all", () => {
    expect(unreadLifts([{ ...whole, cells: [] }])[0]).toMatchObject({ isEmpty: true, test: { side: "intake" } });
  });
});
