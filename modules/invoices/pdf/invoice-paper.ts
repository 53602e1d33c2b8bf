import type { Content, TDocumentDefinitions } from "pdfmake/interfaces";
import { engraved, FACE, factRow, lineTable, masthead, PAPER, PAPER_INK, paperDefinition, paperWidth, sumColumn, type PaperSum } from "@/modules/documents/paper";
import { amount, date, decimal, money } from "@/modules/kernel/format";
import { milliText } from "@/modules/kernel/quantity";
import { qr } from "@/modules/outbound/barcodes/encode";
import { qrRects } from "@/modules/outbound/barcodes/vectors";
import { printCreditorReference } from "../domain/creditor-reference";
import { invoiceSums } from "../domain/invoice-sums";
import type { InvoiceLine, InvoiceSnapshot } from "../domain/invoice-snapshot";
import { gainBracket, gainTables } from "./gain-print";

/** 28 mm: well above the 22 that a hand-held camera needs. */
const QR_SIDE = 80;

const VIA_WORDS: Record<string, string> = { link: "by link", phone: "by telephone", counter: "at the counter" };

function lineTables(s: InvoiceSnapshot): Content[] {
  const p = { locale: s.locale, currency: s.currency };
  const many = s.pieces.length > 1;
  const hours = (minutes: number) => (minutes === 0 ? "" : decimal(minutes / 60, 2, s.locale));
  const name = (l: InvoiceLine) => `${many && l.pieceTag ? `${l.pieceTag}  ` : ""}${l.description}`;
  const each = (l: InvoiceLine) => (l.qtyMilli === 1000 ? "" : `${milliText(l.qtyMilli)} × ${amount(l.unitPriceMinor, p)}`);
  const symbol = s.currency === "USD" ? "$" : s.currency;
  const tight = s.lines.length > 12 ? { margin: [0, 15, 0, 0] as [number, number, number, number] } : {};
  const of = (...kinds: string[]) => s.lines.filter((l) => kinds.includes(l.kind));
  const tables: Content[] = [];
  const labor = of("labor");
  if (labor.length) {
    tables.push(lineTable(
      [{ head: "Labor", width: "*" }, { head: "Each", width: 74, end: true, faint: true }, { head: "Book h", width: 46, end: true, faint: true }, { head: "Worked h", width: 54, end: true }, { head: symbol, width: 64, end: true, strong: true }],
      labor.map((l) => [name(l), each(l), hours(l.bookMinutes), hours(l.actualMinutes), amount(l.amountMinor, p)]), tight));
  }
  const parts = of("part", "core");
  if (parts.length) {
    tables.push(lineTable(
      [{ head: "Parts", width: "*" }, { head: "Count", width: 54, end: true }, { head: "Each", width: 64, end: true, faint: true }, { head: symbol, width: 64, end: true, strong: true }],
      parts.map((l) => [name(l), milliText(l.qtyMilli), amount(l.unitPriceMinor, p), amount(l.amountMinor, p)]), tight));
  }
  const other = of("outside", "discount");
  if (other.length) tables.push(lineTable([{ head: "Other", width: "*" }, { head: symbol, width: 64, end: true, strong: true }], other.map((l) => [name(l), amount(l.amountMinor, p)]), tight));
  return tables;
}

/** A long address in lines, without the scheme: a browser adds it. */
const inLines = (address: string): string => (address.replace(/^https?:\/\//, "").match(/.{1,26}/g) ?? []).join("\n");

function payBlock(s: InvoiceSnapshot, payAddress: string | null, width: number): Content[] {
  const reference = s.reference ? [{ text: [{ text: "Reference  ", color: PAPER_INK.soft }, { text: printCreditorReference(s.reference), bold: true, font: FACE.table }], fontSize: 9, margin: [0, 8, 0, 0] } as Content] : [];
  if (!payAddress || s.balanceMinor <= 0) return reference;
  return [
    {
      columns: [
        { width: QR_SIDE - 6, canvas: qrRects(qr(payAddress), QR_SIDE), margin: [-8, 0, 0, 0] },
        { width: "*", margin: [2, 14, 0, 0], stack: [{ text: "Scan to pay, or go to", bold: true, fontSize: 9.5 }, { text: inLines(payAddress), fontSize: 7.8, color: PAPER_INK.soft, link: payAddress }] },
      ],
      margin: [0, 6, 0, 0], columnGap: 4,
    } as Content,
    ...reference.map((r) => ({ ...(r as object), margin: [0, 2, 0, 0] }) as Content),
  ].map((c) => ({ ...(c as object), width }) as Content);
}

const note = (label: string, lines: readonly string[]): Content[] => lines.length === 0 ? [] : [{
  stack: [engraved(label, { margin: [0, 0, 0, 3] }), ...lines.map((text): Content => ({ text, fontSize: 8.8, color: PAPER_INK.soft, margin: [0, 0, 0, 1.5] }))], margin: [0, 12, 0, 0], unbreakable: true,
}];

/**
 * The invoice or credit note as a paper, from the frozen snapshot alone: hours, parts, the measured gain or why there is
 * none, sums, and where to pay.
 * @param payAddress the customer's link; null prints no code
 */
export function invoicePaper(s: InvoiceSnapshot, payAddress: string | null): TDocumentDefinitions {
  const p = { locale: s.locale, currency: s.currency };
  const full = paperWidth(s.locale);
  const [first, ...more] = s.pieces;
  const many = s.pieces.length > 1;
  const sumWidth = 202;
  const leftWidth = full - sumWidth - PAPER.gap;
  const sums: PaperSum[] = invoiceSums(s).map((x) => ({ name: x.name, value: amount(x.minor, p), ...(x.strong ? { strong: true } : {}) }));
  const total = s.kind === "credit" ? { name: "Credited", value: money(-s.totals.totalMinor, p) } : { name: "To pay", value: money(s.balanceMinor, p) };
  const pieceWords = s.pieces.map((x) => [x.family, x.castingNumber && `casting ${x.castingNumber}`].filter(Boolean).join(", "));
  const right = sumColumn(sumWidth, sums, total) as { width: number; stack: Content[] };
  const content: Content[] = [
    ...masthead({ ...s.shop, locale: s.locale }, s.kind === "credit" ? "Credit note" : "Invoice", s.number ?? "Draft"),
    factRow([
      { label: s.kind === "credit" ? "To" : "Bill to", strong: s.customer.name, more: [s.customer.address, s.customer.taxNumber && `Tax no. ${s.customer.taxNumber}`].filter(Boolean).join("\n") },
      { label: "Job", strong: [...new Set(pieceWords)].join("\n") || `Order ${s.orderNumber}`, more: [`Order ${s.orderNumber}`, s.pieces.length ? `tag ${s.pieces.map((x) => x.tag).join(", ")}` : "", s.customerReference && `your ref. ${s.customerReference}`].filter(Boolean).join(", "), width: 176 },
      { label: "Dated", strong: date(s.date, s.locale), more: s.kind === "credit" ? "" : `supplied ${date(s.supplyOn, s.locale)}`, width: 112 },
      s.credits ? { label: "For invoice", strong: s.credits.number, width: 92 } : { label: "Pay by", strong: s.dueOn === s.date ? "On receipt" : date(s.dueOn, s.locale), ...(s.dueOn === s.date ? {} : { more: s.terms }), width: 92 },
    ]),
    ...(s.credits ? [{ text: s.credits.reason, fontSize: 10, margin: [0, 14, 0, 0] } as Content] : []),
    ...lineTables(s),
    {
      columns: [
        first ? gainBracket(first, leftWidth, s.locale, many) : { width: leftWidth, text: "" },
        { width: right.width, stack: [...right.stack, ...payBlock(s, payAddress, sumWidth)] },
      ],
      columnGap: PAPER.gap, margin: [0, 20, 0, 0], unbreakable: true,
    },
    ...(first ? gainTables(first, s.locale, many) : []),
    ...more.flatMap((x): Content[] => [{ columns: [gainBracket(x, leftWidth, s.locale, many)], margin: [0, 16, 0, 0] }, ...gainTables(x, s.locale, many)]),
    ...(s.pieces.some((x) => x.gain.sides.length > 0) ? [{ text: "Airflow as measured on our bench under the conditions stated; it is no promise of power.", fontSize: 7.8, color: PAPER_INK.faint, margin: [0, 6, 0, 0] } as Content] : []),
    ...note("Notes", s.lines.filter((l) => l.kind === "note").map((l) => l.description)),
    ...note("Found, and not wanted", s.refused.map((r) => `${r.words}. Declined ${date(r.on, s.locale)}.`)),
    ...note("Agreed", s.approvals.map((a) => `Version ${a.version}, ${money(a.totalMinor, p)}: ${a.name}, ${date(a.on, s.locale)}, ${VIA_WORDS[a.via] ?? a.via}.`)),
    ...note("", s.words ? [s.words] : []),
  ];
  const foot = [s.shop.taxNumber && `Tax no. ${s.shop.taxNumber}`, s.number, s.kind === "invoice" && s.pieces.some((x) => x.gain.sides.length > 0) ? "Flow sheet: same link" : ""].filter(Boolean).join("   ");
  return paperDefinition({ shop: { ...s.shop, locale: s.locale }, title: `${s.kind === "credit" ? "Credit note" : "Invoice"} ${s.number ?? ""}`, content, foot });
}
