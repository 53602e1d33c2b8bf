import fc from "fast-check";
import { describe, expect, it } from "vitest";
import { minor } from "@/modules/kernel/money";
import { documentTotals, type TotalsInput } from "./document-totals";
import { checkEntry, type EntryLine } from "./entry";
import { cashBanked, drawerDifference, payoutSettled } from "./posting-money";
import {
  creditNote, creditUsed, depositApplied, depositReceived, invoiceIssued, MONEY_WAYS,
  overpaymentCredited, paymentReceived, REFUND_SOURCES, refunded, writtenOff,
} from "./posting-sales";
import {
  billPaid, carrierBill, costOfParts, countDifference, goodsReceived, ISSUE_PURPOSES, openingStock, outsideBill,
  partsIssued, partsReturned, supplierBilled,
} from "./posting-stock";
import { balanceOf, trialBalance } from "./trial-balance";

const invoice = (labor: number, parts: number) => {
  const input: TotalsInput = {
    lines: [
      { kind: "labor", amountMinor: minor(labor), taxCode: "no" },
      { kind: "part", amountMinor: minor(parts), taxCode: "yes" },
      { kind: "freight", amountMinor: minor(4200), taxCode: "no" },
    ],
    laborDiscountBp: 500,
    supplies: { percentBp: 400, capMinor: minor(6000), taxCode: "yes" },
    taxes: { no: { category: "E", percent: "0" }, yes: { category: "S", percent: "7.35" } },
    taxBasis: "invoice",
  };
  const t = documentTotals(input);
  if (!t.ok) throw new Error(t.refusal.code);
  return t.value;
};
const plain = (lines: readonly EntryLine[]) => lines.map((l) => [l.account, l.amountMinor]);
const m = minor;

describe("posting rules", () => {
  // docs/hero-job.md, journal: account and signed amount, debit positive.
  const hero: [string, EntryLine[], [string, number][]][] = [
    ["deposit", depositReceived({ amountMinor: m(72_310), way: "card" }), [["1020", 72_310], ["2100", -72_310]]],
    ["payout of the deposit", payoutSettled({ clearedMinor: m(72_310), feesMinor: m(1977) }), [["1010", 70_333], ["6100", 1977], ["1020", -72_310]]],
    ["goods received", goodsReceived({ landedMinor: m(22_500) }), [["1200", 22_500], ["2050", -22_500]]],
    ["parts issued", partsIssued({ costMinor: m(26_052) }), [["1250", 26_052], ["1200", -26_052]]],
    ["invoice", invoiceIssued(invoice(203_400, 55_400)), [["1100", 263_343], ["4900", 10_170], ["4000", -203_400], ["4100", -55_400], ["4150", -6000], ["4200", -4200], ["2200", -4513]]],
    ["deposit applied", depositApplied({ amountMinor: m(72_310) }), [["2100", 72_310], ["1100", -72_310]]],
    ["cost of parts", costOfParts({ costMinor: m(26_052) }), [["5000", 26_052], ["1250", -26_052]]],
    ["payment", paymentReceived({ amountMinor: m(191_033), way: "card" }), [["1020", 191_033], ["1100", -191_033]]],
    ["carrier bill", carrierBill({ amountMinor: m(3640) }), [["5200", 3640], ["2000", -3640]]],
    ["payout of the payment", payoutSettled({ clearedMinor: m(191_033), feesMinor: m(5183) }), [["1010", 185_850], ["6100", 5183], ["1020", -191_033]]],
  ];

  it.each(hero)("hero job: %s", (_title, lines, expected) => {
    expect(plain(lines)).toEqual(expected);
    expect(checkEntry(lines).ok).toBe(true);
  });

  it("hero job: balances after the last entry", () => {
    const t = trialBalance(hero.flatMap(([, lines]) => lines));
    const left = t.rows.filter((r) => r.balanceMinor !== 0).map((r) => [r.account.code, r.balanceMinor]);
    expect(left).toEqual([
      ["1010", 256_183], ["1200", -3552], ["2000", -3640], ["2050", -22_500], ["2200", -4513], ["4000", -203_400],
      ["4100", -55_400], ["4150", -6000], ["4200", -4200], ["4900", 10_170], ["5000", 26_052], ["5200", 3640], ["6100", 7160],
    ]);
    expect(t.rows.filter((r) => r.balanceMinor === 0).map((r) => r.account.code)).toEqual(["1020", "1100", "1250", "2100"]);
    expect([t.sumMinor, t.debitMinor - t.creditMinor]).toEqual([0, 0]);
  });

  it("payment of 512.00 on 500.00 leaves a credit of 12.00, used on the next invoice", () => {
    const lines = [
      ...paymentReceived({ amountMinor: m(51_200), way: "bank" }),
      ...overpaymentCredited({ amountMinor: m(1200) }),
    ];
    expect([balanceOf(lines, "1100"), balanceOf(lines, "2110"), balanceOf(lines, "1010")]).toEqual([-50_000, -1200, 51_200]);
    expect(balanceOf([...lines, ...creditUsed({ amountMinor: m(1200) })], "2110")).toBe(0);
  });

  it("a supplier's bill 10.50 over the receipt: 7.00 to stock, 3.50 to variance", () => {
    expect(plain(supplierBilled({ receivedMinor: m(13_200), toStockMinor: m(700), toVarianceMinor: m(350) }))).toEqual([
      ["2050", 13_200], ["1200", 700], ["5050", 350], ["2000", -14_250],
    ]);
  });

  it("parts go to the account of their purpose, and come back from it", () => {
    expect(ISSUE_PURPOSES.map((purpose) => plain(partsIssued({ costMinor: m(744), purpose }))[0])).toEqual([
      ["1250", 744], ["5300", 744], ["5500", 744], ["5400", 744],
    ]);
    expect(plain(partsReturned({ costMinor: m(744) }))).toEqual([["1250", -744], ["1200", 744]]);
  });

  it("a drawer that is 0.60 short, and a count that is", () => {
    expect(plain(drawerDifference({ countedMinor: m(21_340), expectedMinor: m(21_400) }))).toEqual([["1000", -60], ["6300", 60]]);
    expect(plain(countDifference({ differenceMinor: m(-3140) }))).toEqual([["1200", -3140], ["5400", 3140]]);
  });

  it("a refund goes back the way the money came", () => {
    expect(REFUND_SOURCES.map((from) => plain(refunded({ amountMinor: m(8500), way: "card", from })))).toEqual([
      [["2100", 8500], ["1020", -8500]], [["2110", 8500], ["1020", -8500]], [["1100", 8500], ["1020", -8500]],
    ]);
    expect(MONEY_WAYS.map((way) => plain(refunded({ amountMinor: m(1), way, from: "credit" }))[1])).toEqual([["1020", -1], ["1010", -1], ["1000", -1]]);
  });

  it("bills, banking, opening stock and write-off", () => {
    expect(plain(outsideBill({ amountMinor: m(9) }))).toEqual([["5100", 9], ["2000", -9]]);
    expect(plain(billPaid({ amountMinor: m(9) }))).toEqual([["2000", 9], ["1010", -9]]);
    expect(plain(cashBanked({ amountMinor: m(9) }))).toEqual([["1010", 9], ["1000", -9]]);
    expect(plain(openingStock({ valueMinor: m(9) }))).toEqual([["1200", 9], ["3000", -9]]);
    expect(plain(writtenOff({ amountMinor: m(9) }))).toEqual([["6200", 9], ["1100", -9]]);
  });

  it("a credit note undoes its invoice, and an invoice of nothing posts nothing", () => {
    const lines = invoiceIssued(invoice(203_400, 55_400));
    expect(trialBalance([...lines, ...creditNote(lines)]).rows.every((r) => r.balanceMinor === 0)).toBe(true);
    const zero = documentTotals({ lines: [{ kind: "labor", amountMinor: m(0), taxCode: "no" }], laborDiscountBp: 0, supplies: null, taxes: { no: { category: "E", percent: "0" } }, taxBasis: "invoice" });
    expect(zero.ok && invoiceIssued(zero.value)).toEqual([]);
  });

  it("the trial balance of any run of rules sums to 0", () => {
    const amount = fc.integer({ min: 0, max: 10_000_000 }).map((n) => m(n));
    const entry = fc.oneof(
      amount.map((a) => depositReceived({ amountMinor: a, way: "bank" })),
      fc.tuple(amount, amount).map(([a, b]) => payoutSettled({ clearedMinor: a, feesMinor: b })),
      fc.tuple(amount, amount).map(([a, b]) => invoiceIssued(invoice(a, b))),
      fc.tuple(amount, amount).map(([a, b]) => creditNote(invoiceIssued(invoice(a, b)))),
      fc.tuple(amount, amount, amount).map(([a, b, c]) => supplierBilled({ receivedMinor: a, toStockMinor: b, toVarianceMinor: c })),
      amount.map((a) => partsIssued({ costMinor: a })),
      fc.tuple(amount, amount).map(([a, b]) => drawerDifference({ countedMinor: a, expectedMinor: b })),
    );
    fc.assert(fc.property(fc.array(entry, { maxLength: 20 }), (entries) => {
      const t = trialBalance(entries.flat());
      expect(t.sumMinor).toBe(0);
      expect(t.debitMinor).toBe(t.creditMinor);
    }));
  });
});
