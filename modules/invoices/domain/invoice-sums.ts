import type { InvoiceSnapshot } from "./invoice-snapshot";
import { date, decimal } from "@/modules/kernel/format";

export interface InvoiceSum { readonly name: string; readonly minor: number; readonly strong?: boolean }

/** Sums of a document from labor to what the deposit takes off; only those that are there. The same on paper and screen. */
export function invoiceSums(s: InvoiceSnapshot): InvoiceSum[] {
  const t = s.totals;
  const amount = (minor: number) => decimal(minor / 100, 2, s.locale);
  const bp = s.laborDiscountBp;
  const lineDiscount = t.discountMinor - t.laborDiscountMinor;
  const all: (InvoiceSum | null)[] = [
    t.laborMinor === 0 ? null : { name: "Labor", minor: t.laborMinor },
    t.laborDiscountMinor === 0 ? null : { name: `Discount on labor, ${decimal(bp / 100, bp % 100 === 0 ? 0 : 2, s.locale)} %`, minor: -t.laborDiscountMinor },
    t.outsideMinor === 0 ? null : { name: "Outside service", minor: t.outsideMinor },
    t.partsMinor === 0 ? null : { name: "Parts", minor: t.partsMinor },
    t.coreMinor === 0 ? null : { name: "Core charge", minor: t.coreMinor },
    t.suppliesMinor === 0 ? null : { name: "Shop supplies", minor: t.suppliesMinor },
    t.freightMinor === 0 ? null : { name: "Freight & insurance", minor: t.freightMinor },
    lineDiscount === 0 ? null : { name: "Discount", minor: -lineDiscount },
    ...t.groups.filter((g) => g.taxMinor !== 0).map((g) => ({ name: `${s.rules.taxName} ${g.percent} % on ${amount(g.baseMinor)}`, minor: g.taxMinor })),
    s.rules.exemptBy === null ? null : { name: `No tax, certificate ${s.rules.exemptBy}`, minor: 0 },
    { name: "Total", minor: t.totalMinor, strong: true },
    s.deposit.appliedMinor === 0 ? null : { name: `Deposit${s.deposit.on ? `, ${date(s.deposit.on, s.locale)}` : ""}`, minor: -s.deposit.appliedMinor },
  ];
  return all.filter((x) => x !== null);
}
