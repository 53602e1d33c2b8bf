import { z } from "@/modules/kernel/zod";
import { timesDecimal, minor, minorText, type Minor } from "@/modules/kernel/money";
import { fixedText, fraction } from "@/modules/kernel/fraction";
import { depositDue } from "@/modules/books/domain/deposit-due";
import { documentTotals, taxOutOf, type TaxBasis, type TotalsLine } from "@/modules/books/domain/document-totals";
import { checkEntry } from "@/modules/books/domain/entry";
import { trialBalance } from "@/modules/books/domain/trial-balance";
import { agingOf } from "@/modules/invoices/domain/aging";
import { en16931Totals, invoiceTotals } from "@/modules/invoices/domain/totals";
import { chargeFee, payoutSum } from "@/modules/payments/domain/payout";
import { moneyText, percentBp, reads, valueOf, type Adapter } from "./shop-case";

const vatGroups = reads(
  { groups: z.array(z.strictObject({ rate: z.string(), taxable: moneyText })), sum_of_lines: moneyText.optional() },
  (i) => {
    const lines = i.groups.map((g): TotalsLine => ({ kind: "part", amountMinor: g.taxable, taxCode: g.rate }));
    const taxes = Object.fromEntries(i.groups.map((g) => [g.rate, { category: "S", percent: g.rate }]));
    const t = valueOf(documentTotals({ lines, laborDiscountBp: 0, supplies: null, taxes, taxBasis: "invoice" }));
    const e = valueOf(en16931Totals(t, minor(0), minor(0)));
    if (i.sum_of_lines !== undefined && i.sum_of_lines !== e.lineSumMinor) throw new Error("the lines do not sum to the case's sum");
    return {
      group_tax: t.groups.map((g) => minorText(g.taxMinor)), tax_total: minorText(e.vatMinor),
      total_with_tax: minorText(e.withVatMinor), payable: minorText(e.payableMinor),
    };
  },
);

const job = reads(
  {
    labor_gross: moneyText, parts: moneyText, deposit_pct: percentBp.optional(), deposit_applied: moneyText.optional(),
    discount_on_labor_pct: percentBp, supplies_pct_of_gross_labor: percentBp, supplies_cap: moneyText, freight: moneyText,
    tax_rate_pct: z.string(), taxable: z.literal("parts and shop supplies"), tax_basis: z.enum(["invoice", "line"]),
  },
  (i) => {
    const t = valueOf(invoiceTotals(
      {
        lines: [
          { kind: "labor", amountMinor: i.labor_gross, taxCode: "untaxed" },
          { kind: "part", amountMinor: i.parts, taxCode: "taxed" },
          { kind: "freight", amountMinor: i.freight, taxCode: "untaxed" },
        ],
        laborDiscountBp: i.discount_on_labor_pct,
        supplies: { percentBp: i.supplies_pct_of_gross_labor, capMinor: i.supplies_cap, taxCode: "taxed" },
        taxes: { untaxed: { category: "E", percent: "0" }, taxed: { category: "S", percent: i.tax_rate_pct } },
        taxBasis: i.tax_basis,
      },
      i.deposit_applied ?? minor(0),
    ));
    return {
      labor_gross: minorText(t.laborMinor), labor_discount: minorText(t.laborDiscountMinor), labor_net: minorText(t.laborNetMinor),
      parts: minorText(t.partsMinor), shop_supplies: minorText(t.suppliesMinor), freight: minorText(t.freightMinor),
      taxable: minorText(t.taxableMinor), tax: minorText(t.taxMinor), total: minorText(t.totalMinor),
      balance_due: minorText(t.balanceMinor),
      ...(i.deposit_pct === undefined ? {} : { deposit: minorText(valueOf(depositDue(t.totalMinor, i.deposit_pct))) }),
    };
  },
);

const taxOf = (lines: readonly Minor[], percent: string, taxBasis: TaxBasis): string =>
  minorText(valueOf(documentTotals({
    lines: lines.map((amountMinor): TotalsLine => ({ kind: "part", amountMinor, taxCode: "t" })),
    laborDiscountBp: 0, supplies: null, taxes: { t: { category: "S", percent } }, taxBasis,
  })).taxMinor);

const entryLine = z.strictObject({ account: z.string(), amount: moneyText });
const draft = (lines: readonly z.output<typeof entryLine>[]) => lines.map((l) => ({ account: l.account, amountMinor: l.amount }));

export const booksAdapters: Readonly<Record<string, Adapter>> = {
  "P-TAX-01": vatGroups, "P-TAX-02": vatGroups,
  "P-TAX-03": reads({ gross: moneyText, rate_pct: z.string() }, (i) => {
    const r = taxOutOf(i.gross, i.rate_pct);
    return { net: minorText(r.netMinor), tax: minorText(r.taxMinor) };
  }),
  "P-INV-01": job, "P-INV-02": job,
  "P-RND-01": reads({ lines: z.array(moneyText), rate_pct: z.string() }, (i) => ({
    tax_per_line_basis: taxOf(i.lines, i.rate_pct, "line"), tax_per_invoice_basis: taxOf(i.lines, i.rate_pct, "invoice"),
  })),
  // 100 minor units times the value: the rounding every amount goes through.
  "P-RND-02": reads({ values: z.array(z.string()) }, (i) => ({ half_up_away_from_zero: i.values.map((v) => minorText(timesDecimal(100, v))) })),
  "P-RND-03": reads({ values: z.array(z.string()) }, (i) => ({ rounded: i.values.map((v) => fixedText(fraction(v), 2)) })),
  "P-AGE-01": reads({ as_of: z.string(), items: z.array(z.strictObject({ due: z.string(), open: moneyText })) }, (i) => {
    const a = agingOf(i.items.map((x) => ({ due: x.due, openMinor: x.open })), i.as_of);
    return {
      not_due: minorText(a.buckets["not due"]), "1-30": minorText(a.buckets["1-30"]), "31-60": minorText(a.buckets["31-60"]),
      "61-90": minorText(a.buckets["61-90"]), over_90: minorText(a.buckets["over 90"]), total: minorText(a.totalMinor),
    };
  }),
  "P-GL-01": reads(
    { sign: z.string(), entries: z.array(z.strictObject({ date: z.string(), text: z.string(), lines: z.array(entryLine) })) },
    (i) => {
      const t = trialBalance(i.entries.flatMap((e) => valueOf(checkEntry(draft(e.lines)))));
      const name: Record<string, string> = { "1010": "bank", "1020": "card clearing", "1100": "accounts receivable", "1200": "parts stock", "1250": "work in process", "2000": "accounts payable", "2050": "goods received not invoiced", "2100": "customer deposits", "2200": "sales tax payable", "4000": "labor revenue", "4100": "parts revenue", "4150": "shop supplies revenue", "4200": "freight revenue", "4900": "discounts given", "5000": "cost of parts", "5200": "freight out", "6100": "payment fees" };
      return {
        balances: Object.fromEntries(t.rows.map((r) => [`${r.account.code} ${name[r.account.code] ?? r.account.name}`, minorText(r.balanceMinor)])),
        sum: minorText(t.sumMinor),
      };
    },
  ),
  "P-GL-02": reads({ lines: z.array(entryLine) }, (i) => {
    const r = checkEntry(draft(i.lines));
    return { accepted: r.ok, difference: minorText(r.ok ? 0 : Number(r.refusal.data?.differenceMinor)) };
  }),
  "P-PAY-01": reads({ charges: z.array(moneyText), refunds: z.array(moneyText), fee_pct: z.string(), fee_fixed: moneyText }, (i) => {
    const charges = i.charges.map((amountMinor) => ({ amountMinor, feeMinor: chargeFee(amountMinor, { percent: i.fee_pct, fixedMinor: i.fee_fixed }) }));
    const p = payoutSum({ charges, refundsMinor: i.refunds, disputesMinor: [], adjustmentsMinor: [] });
    return { fees: charges.map((c) => minorText(c.feeMinor)), payout: minorText(p.payoutMinor), fees_total: minorText(p.feesMinor) };
  }),
};
