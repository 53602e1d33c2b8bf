import { amount, decimal, money, type Place } from "@/modules/kernel/format";
import { SumList, type SumLine } from "@/modules/ui/kv";
import type { DocumentTotals } from "@/modules/books/domain/document-totals";
import type { DocumentRules } from "../domain/document-rules";

/** Sums of an estimate, live or frozen: only those that are there. */
export function EstimateSums({ totals: t, rules, discountBp, bookMinutes, place, label = "Estimate" }: {
  totals: DocumentTotals; rules: DocumentRules; discountBp: number; bookMinutes: number; place: Pick<Place, "locale" | "currency">; label?: string;
}) {
  const lines: (SumLine | null)[] = [
    { name: `Labor, ${decimal(bookMinutes / 60, 1, place.locale)} h book`, value: amount(t.laborMinor, place) },
    t.laborDiscountMinor === 0 ? null : { name: `Discount on labor, ${decimal(discountBp / 100, discountBp % 100 === 0 ? 0 : 2, place.locale)} %`, value: amount(-t.laborDiscountMinor, place) },
    t.partsMinor === 0 ? null : { name: "Parts", value: amount(t.partsMinor, place) },
    t.outsideMinor === 0 ? null : { name: "Outside service", value: amount(t.outsideMinor, place) },
    t.suppliesMinor === 0 ? null : { name: "Shop supplies", value: amount(t.suppliesMinor, place) },
    t.freightMinor === 0 ? null : { name: "Freight & insurance", value: amount(t.freightMinor, place) },
    ...t.groups.filter((g) => g.taxMinor !== 0).map((g): SumLine => ({ name: `${rules.taxName} ${g.percent} % on ${amount(g.baseMinor, place)}`, value: amount(g.taxMinor, place) })),
    rules.exemptBy === null ? null : { name: `No tax, certificate ${rules.exemptBy}`, value: amount(0, place) },
    { name: label, value: money(t.totalMinor, place), total: true },
  ];
  return <SumList lines={lines.filter((l) => l !== null)} />;
}
