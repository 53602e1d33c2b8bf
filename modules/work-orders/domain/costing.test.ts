import { describe, expect, it } from "vitest";
import { minor } from "@/modules/kernel/money";
import { effectiveRate, efficiencyPercent, jobProfit, laborCost, productivityPercent, quoteToActual, workInProcess } from "./costing";

const person = (minutes: number, rate: number) => ({ minutes, rateMinorPerHour: minor(rate) });

describe("cost of a job", () => {
  // docs/hero-job.md: six people, 1149 minutes, burden 18 %.
  it("loaded labor of the hero job is 713.36", () => {
    const people = [person(66, 1900), person(253, 2950), person(140, 3000), person(345, 3800), person(195, 3100), person(150, 2800)];
    expect(people.map((p) => laborCost([p], 0).directMinor)).toEqual([2090, 12_439, 7000, 21_850, 10_075, 7000]);
    expect(laborCost(people, 1800)).toEqual({ minutes: 1149, directMinor: 60_454, burdenMinor: 10_882, loadedMinor: 71_336 });
  });

  it("efficiency 98.69 %, effective rate 100.90, quote to actual 1.01", () => {
    expect(efficiencyPercent("18.90", 1149)).toBe("98.69");
    expect(effectiveRate(minor(193_230), 1149)).toBe("100.90");
    expect(quoteToActual(1149, "18.90")).toBe("1.01");
    // 98.69 % efficiency at 75 % utilisation.
    expect(productivityPercent("18.90", 1532)).toBe("74.02");
  });

  it("profit of the hero job is 1,506.42, 58.20 % of net sales", () => {
    expect(jobProfit({
      netSalesMinor: minor(258_830), partsCostMinor: minor(26_052), loadedLaborMinor: minor(71_336), outsideMinor: minor(0),
      freightOutMinor: minor(3640), paymentFeesMinor: minor(7160),
    })).toEqual({ costMinor: 108_188, profitMinor: 150_642, marginPercent: "58.20" });
  });

  it("a development head (11.5 h at 38.00, burden, 60 g epoxy) comes to 523.10; a comeback to 80.13", () => {
    const dev = laborCost([person(690, 3800)], 1800);
    expect([dev.directMinor, dev.burdenMinor, dev.loadedMinor + 744]).toEqual([43_700, 7866, 52_310]);
    const comeback = laborCost([person(84, 2950)], 1800);
    expect([comeback.directMinor, comeback.burdenMinor, comeback.loadedMinor + 3140]).toEqual([4130, 743, 8013]);
  });

  it("has no figure where there is nothing to divide by, and negative margins stay negative", () => {
    const f = { netSalesMinor: minor(0), partsCostMinor: minor(100), loadedLaborMinor: minor(0), outsideMinor: minor(0), freightOutMinor: minor(0), paymentFeesMinor: minor(0) };
    expect(jobProfit(f)).toEqual({ costMinor: 100, profitMinor: -100, marginPercent: null });
    expect(jobProfit({ ...f, netSalesMinor: minor(50) }).marginPercent).toBe("-100.00");
    expect([efficiencyPercent("1", 0), effectiveRate(minor(1), 0), quoteToActual(1, "0")]).toEqual([null, null, null]);
  });

  it("work in process is what was issued and not billed yet", () => {
    expect(workInProcess(minor(26_052), minor(0))).toBe(26_052);
    expect(workInProcess(minor(26_052), minor(26_052))).toBe(0);
  });
});
