import type { TDocumentDefinitions } from "pdfmake/interfaces";
import { factRow, lineTable, masthead, paperDefinition, paperWidth, engraved, PAPER_INK, type PaperShop } from "@/modules/documents/paper";
import { amount, date, money } from "@/modules/kernel/format";
import { extend } from "@/modules/kernel/money";
import { milliText } from "@/modules/kernel/quantity";
import { code128 } from "@/modules/outbound/barcodes/encode";
import { code128Rects } from "@/modules/outbound/barcodes/vectors";
import { unitMark } from "@/modules/stock/domain/part-words";

/** All that stands on the paper. Dates are business dates. */
export interface OrderSheet {
  readonly shop: PaperShop;
  readonly currency: string;
  readonly number: string;
  readonly revision: number;
  readonly orderedOn: string;
  readonly neededBy: string | null;
  readonly expectedOn: string | null;
  readonly terms: string;
  readonly contact: string;
  readonly notes: string;
  readonly supplier: { readonly name: string; readonly address: string; readonly email: string; readonly phone: string };
  readonly lines: readonly { readonly lineNo: number; readonly supplierNumber: string; readonly sku: string; readonly description: string; readonly stockUnit: string; readonly qtyMilli: number; readonly unitPriceMinor: number; readonly forOrder: string | null }[];
}

const block = (label: string, lines: readonly string[]) => ({ width: "*", stack: [engraved(label, { margin: [0, 0, 0, 4] }), ...lines.filter(Boolean).map((text, i) => ({ text, bold: i === 0, fontSize: 10, lineHeight: 1.12 }))] });

/** A purchase order on paper: both addresses, their numbers and ours, prices, dates, and its number as Code 128. */
export function orderPaper(s: OrderSheet): TDocumentDefinitions {
  const place = { locale: s.shop.locale, currency: s.currency };
  const width = paperWidth(s.shop.locale);
  const total = s.lines.reduce((sum, l) => sum + extend(l.unitPriceMinor, l.qtyMilli), 0);
  const bars = code128Rects(code128(s.number), 190, 30);
  const unit = (u: string) => (unitMark(u) ? ` ${unitMark(u)}` : "");
  return paperDefinition({
    shop: s.shop, title: `Purchase order ${s.number}`, foot: `${s.shop.name}, purchase order ${s.number}${s.revision > 1 ? `, revision ${s.revision}` : ""}`,
    content: [
      ...masthead(s.shop, s.revision > 1 ? `Purchase order, revision ${s.revision}` : "Purchase order", s.number),
      { columns: [
        block("To", [s.supplier.name, ...s.supplier.address.split("\n"), s.supplier.email, s.supplier.phone]),
        block("Ship to", [s.shop.name, ...s.shop.address.split("\n"), s.shop.phone]),
        { width: 190, stack: [{ canvas: bars }, { text: s.number, alignment: "center", fontSize: 9, margin: [0, 3, 0, 0] }] },
      ], columnGap: 18, margin: [0, 18, 0, 0] },
      factRow([
        { label: "Ordered", strong: date(s.orderedOn, s.shop.locale) },
        { label: "Needed by", strong: s.neededBy ? date(s.neededBy, s.shop.locale) : "As soon as you can" },
        { label: "Expected", strong: s.expectedOn ? date(s.expectedOn, s.shop.locale) : "Please tell us" },
        { label: "Terms", strong: s.terms },
        { label: "Questions to", strong: s.contact },
      ]),
      lineTable([
        { head: "Line", width: 26, faint: true }, { head: "Your number", width: 84 }, { head: "Our number", width: 84 }, { head: "Part", width: "*", strong: true },
        { head: "Quantity", width: 62, end: true }, { head: "Each", width: 56, end: true }, { head: `Sum ${s.currency}`, width: 62, end: true, strong: true },
      ], s.lines.map((l) => [
        String(l.lineNo), l.supplierNumber || "–", l.sku, l.forOrder ? `${l.description}, for ${l.forOrder}` : l.description, `${milliText(l.qtyMilli)}${unit(l.stockUnit)}`, amount(l.unitPriceMinor, place), amount(extend(l.unitPriceMinor, l.qtyMilli), place),
      ])),
      { columns: [{ text: s.notes, width: "*", color: PAPER_INK.soft }, { width: 230, columns: [{ width: "*", text: "Parts, without freight", bold: true }, { width: "auto", text: money(total, place), bold: true, alignment: "right", fontSize: 12 }], columnGap: 8 }], columnGap: 18, margin: [0, 12, 0, 0] },
      { text: "Please put our number on the delivery note and on the bill, and tell us by mail when a date or a price differs.", color: PAPER_INK.soft, margin: [0, 20, width / 3, 0] },
    ],
  });
}
