import { readFileSync } from "node:fs";
import path from "node:path";
import { describe, expect, it } from "vitest";
import { instantOf } from "@/modules/kernel/instant";
import { minor, minorText, parseMinor, sumMinor } from "@/modules/kernel/money";
import { pieces } from "@/modules/kernel/quantity";
import { invoiceTotals } from "@/modules/invoices/domain/totals";
import { chargeFee, payoutSum } from "@/modules/payments/domain/payout";
import { landReceipt } from "@/modules/stock/domain/landed-freight";
import { EMPTY_STOCK, issue, receive, type StockValue } from "@/modules/stock/domain/moving-average";
import { elapsedMinutes } from "@/modules/time/domain/elapsed";
import { jobProfit, laborCost } from "@/modules/work-orders/domain/costing";
import { valueOf } from "./shop-case";

/** Rows of the table under a heading of docs/hero-job.md whose first cell passes; cells trimmed, bold marks removed. */
const text = readFileSync(path.join(import.meta.dirname, "../../docs/hero-job.md"), "utf8");
const rowsUnder = (heading: string, hasCells: number): string[][] => {
  const part = text.split(/^## /m).find((p) => p.startsWith(heading)) ?? "";
  return part.split("\n").filter((l) => /^\|(?!-)/.test(l)).map((l) => l.split("|").slice(1, -1).map((c) => c.replaceAll("*", "").trim())).filter((r) => r.length === hasCells);
};
const money = (cell: string | undefined) => {
  const m = parseMinor(cell ?? "");
  if (m === null) throw new Error(`not money: ${String(cell)}`);
  return m;
};
const isMoney = (cell: string | undefined) => parseMinor(cell ?? "") !== null;

const FEES = { percent: "2.7", fixedMinor: minor(25) };
const issued = (stock: StockValue, n: number) => valueOf(issue(stock, pieces(n))).costMinor;
const bought = (n: number, value: number) => valueOf(receive(EMPTY_STOCK, pieces(n), minor(value)));

describe("the hero job, worked through from its inputs", () => {
  const operations = rowsUnder("Estimate", 3).filter((r) => isMoney(r[1]) && r[0] !== "Sum" && /^\d+\.\d$/.test(r[1] ?? ""));
  const labor1 = sumMinor(operations.map((r) => money(r[2])));
  const parts1 = sumMinor([18_900, 4 * 650, 4 * 725, 3850, 1400, 2 * 6200]);
  const labor2 = minor(labor1 + 2 * 4200);
  const parts2 = minor(parts1 + 2 * 4800 + 2 * 1875);
  const totals = (labor: number, parts: number, deposit: number) =>
    valueOf(invoiceTotals(
      {
        lines: [
          { kind: "labor", amountMinor: minor(labor), taxCode: "no" },
          { kind: "part", amountMinor: minor(parts), taxCode: "yes" },
          { kind: "freight", amountMinor: minor(4200), taxCode: "no" },
        ],
        laborDiscountBp: 500, supplies: { percentBp: 400, capMinor: minor(6000), taxCode: "yes" },
        taxes: { no: { category: "E", percent: "0" }, yes: { category: "S", percent: "7.35" } }, taxBasis: "invoice",
      },
      minor(deposit),
    ));

  it("estimate and invoice", () => {
    expect(operations).toHaveLength(14);
    expect(operations.reduce((h, r) => h + Math.round(Number(r[1]) * 10), 0)).toBe(181);
    expect([labor1, parts1, labor2, parts2].map((m) => minorText(m))).toEqual(["1950.00", "420.50", "2034.00", "554.00"]);
    expect(totals(labor1, parts1, 0).totalMinor).toBe(241_032);
    expect(totals(labor2, parts2, 72_310)).toMatchObject({ totalMinor: 263_343, balanceMinor: 191_033 });
    expect(totals(labor2, parts2, 0).totalMinor - totals(labor1, parts1, 0).totalMinor).toBe(22_311);
  });

  const punches = rowsUnder("Bench clock", 5).filter((r) => r[3]?.includes(" - ") && /\d/.test(r[3]));
  const minutesOf = (r: string[]) => {
    const [day = "", month = ""] = (r[0] ?? "").split(" ");
    const [from = "", to = ""] = (r[3] ?? "").split(" - ");
    const date = `2026-${month === "Feb" ? "02" : "03"}-${day.padStart(2, "0")}`;
    return elapsedMinutes(instantOf(`${date}T${from}`, "America/Denver"), instantOf(`${date}T${to}`, "America/Denver"));
  };
  const people = rowsUnder("Bench clock", 4).filter((r) => /^\d+$/.test(r[1] ?? "") && isMoney(r[2]) && r[2] !== "");
  const loaded = laborCost(people.map((r) => ({ minutes: Number(r[1]), rateMinorPerHour: money(r[2]) })), 1800);

  it("bench minutes by punch and by person, and what they cost", () => {
    expect(punches).toHaveLength(16);
    for (const r of punches) expect([r[1], minutesOf(r)]).toEqual([r[1], Number(r[4])]);
    expect(people).toHaveLength(6);
    for (const [name, minutes, rate, cost] of people) {
      const own = punches.filter((p) => p[2] === name).reduce((sum, p) => sum + minutesOf(p), 0);
      expect([name, own]).toEqual([name, Number(minutes)]);
      expect([name, laborCost([{ minutes: own, rateMinorPerHour: money(rate) }], 0).directMinor]).toEqual([name, money(cost)]);
    }
    expect(loaded).toEqual({ minutes: 1149, directMinor: 60_454, burdenMinor: 10_882, loadedMinor: 71_336 });
  });

  const [valves, guides] = landReceipt(
    [{ valueMinor: minor(6 * 2200), qtyMilli: pieces(6), weightGrams: 0 }, { valueMinor: minor(10 * 780), qtyMilli: pieces(10), weightGrams: 0 }],
    minor(1500),
  ).map((l) => l.landedMinor);
  const guideStock = valueOf(receive(bought(6, 6 * 750), pieces(10), minor(guides ?? NaN)));
  const partsCost = sumMinor([
    4 * 985, 4 * 860, 8 * 125, 4 * 210, 4 * 245, 4 * 260, 1690,
    issued(bought(1000, 12_400), 42), 2 * 3140, issued(bought(6, valves ?? NaN), 2), issued(guideStock, 2),
  ]);

  it("landed valves and guides, and the parts issued", () => {
    expect([valves, guides]).toEqual([14_143, 8357]);
    expect(partsCost).toBe(26_052);
    const printed = rowsUnder("Parts", 3).filter((r) => isMoney(r[2]) && r[0] !== "Sum" && r[0] !== "the spring kit");
    expect(sumMinor(printed.map((r) => money(r[2])))).toBe(partsCost);
  });

  it("fees, payout and profit", () => {
    const fees = [72_310, 191_033].map((a) => chargeFee(minor(a), FEES));
    const charges = [191_033, 41_250].map((a) => ({ amountMinor: minor(a), feeMinor: chargeFee(minor(a), FEES) }));
    expect(payoutSum({ charges, refundsMinor: [minor(8500)], disputesMinor: [], adjustmentsMinor: [] }).payoutMinor).toBe(217_461);
    expect(jobProfit({
      netSalesMinor: totals(labor2, parts2, 0).netMinor, partsCostMinor: partsCost, loadedLaborMinor: loaded.loadedMinor,
      outsideMinor: minor(0), freightOutMinor: minor(3640), paymentFeesMinor: sumMinor(fees),
    })).toMatchObject({ profitMinor: 150_642, marginPercent: "58.20" });
  });
});
