import { describe, expect, it } from "vitest";
import { minor } from "@/modules/kernel/money";
import { economicOrderQuantity, hasEnoughHistory, reorderPoint } from "./replenishment";

describe("order quantity", () => {
  // Published exercise: D 2500, S 18.75, H 1.50 -> 250 (formula of Harris 1913).
  it("orders 250 where ordering and holding cost both come to 187.50", () => {
    expect(economicOrderQuantity({ annualDemand: "2500", orderCostMinor: minor(1875), holdingPerUnitYearMinor: "150" })).toEqual({
      ok: true,
      value: { exact: "250.0000", units: 250, ordersPerYear: "10.0000", orderingCostMinor: 18_750, holdingCostMinor: 18_750 },
    });
  });

  it("rounds 25.34 up to 26 in packs of two, and never above the yearly limit", () => {
    const intake = { annualDemand: "180", orderCostMinor: minor(1400), holdingPerUnitYearMinor: "785", pack: 2 };
    expect(economicOrderQuantity(intake)).toMatchObject({ ok: true, value: { exact: "25.3385", units: 26 } });
    expect(economicOrderQuantity({ ...intake, unitsMax: 21 })).toMatchObject({ ok: true, value: { units: 20 } });
  });

  it.each([
    [{ annualDemand: "0" }, "annualDemand"],
    [{ annualDemand: "many" }, "annualDemand"],
    [{ holdingPerUnitYearMinor: "-1" }, "holdingPerUnitYearMinor"],
    [{ orderCostMinor: minor(0) }, "orderCostMinor"],
    [{ pack: 0 }, "pack"],
  ])("refuses %o beside its field", (wrong, field) => {
    const base = { annualDemand: "180", orderCostMinor: minor(1400), holdingPerUnitYearMinor: "785" };
    expect(economicOrderQuantity({ ...base, ...wrong })).toMatchObject({ ok: false, refusal: { code: "NOT_POSITIVE", field } });
  });
});

describe("reorder point", () => {
  it("adds z * sigma of the lead time: 30 + 6.60 -> 37", () => {
    expect(reorderPoint({ demand: "2500", days: "250", leadTimeDays: "3", spread: { sigmaLeadTime: "4" } })).toEqual({
      ok: true, value: { leadTimeDemand: "30.0000", sigmaLeadTime: "4.0000", safetyStock: "6.6000", exact: "36.6000", units: 37 },
    });
  });

  it("spreads a daily sigma by the root of the lead time: 15 + 5.7158 -> 21", () => {
    expect(reorderPoint({ demand: "5", days: "1", leadTimeDays: "3", spread: { sigmaDaily: "2" } })).toMatchObject({
      ok: true, value: { sigmaLeadTime: "3.4641", safetyStock: "5.7158", units: 21 },
    });
  });

  // Intake valve S250-4V: 180 a year over 250 days, 10 days' lead, sigma 3.1.
  it("intake valve: 7.2 + 5.115 = 12.315 -> 13", () => {
    expect(reorderPoint({ demand: "180", days: "250", leadTimeDays: "10", spread: { sigmaLeadTime: "3.1" } })).toMatchObject({
      ok: true, value: { leadTimeDemand: "7.2000", safetyStock: "5.1150", exact: "12.3150", units: 13 },
    });
  });

  it("stays at a whole number that is met exactly", () => {
    expect(reorderPoint({ demand: "10", days: "1", leadTimeDays: "1", spread: { sigmaLeadTime: "2" }, z: "1" })).toMatchObject({ ok: true, value: { units: 12 } });
  });

  it.each([
    [{ demand: "0" }, "demand"], [{ days: "0" }, "days"], [{ leadTimeDays: "0" }, "leadTimeDays"], [{ spread: { sigmaLeadTime: "-1" } }, "spread"],
  ])("refuses %o beside its field", (wrong, field) => {
    const base = { demand: "10", days: "1", leadTimeDays: "1", spread: { sigmaLeadTime: "2" } };
    expect(reorderPoint({ ...base, ...wrong })).toMatchObject({ ok: false, refusal: { code: "NOT_POSITIVE", field } });
  });

  it("does not trust fewer than eight issues a year", () => {
    expect([hasEnoughHistory(7), hasEnoughHistory(8)]).toEqual([false, true]);
  });
});
