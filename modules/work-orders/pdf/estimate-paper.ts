import type { Content, TDocumentDefinitions } from "pdfmake/interfaces";
import { FACE, engraved, factRow, lineTable, masthead, PAPER_INK, paperDefinition, paperWidth, sumColumn, type PaperSum } from "@/modules/documents/paper";
import { amount, date, decimal, money } from "@/modules/kernel/format";
import { milliText } from "@/modules/kernel/quantity";
import type { EstimateSnapshot, SnapshotLine } from "../domain/estimate-snapshot";
import { USE_WORDS, type Use } from "../domain/uses";

const percent = (bp: number, locale: string) => `${decimal(bp / 100, bp % 100 === 0 ? 0 : 2, locale)} %`;

/** Sums of an estimate from labor to total; only those that are there. */
export function estimateSums(s: EstimateSnapshot): PaperSum[] {
  const p = { locale: s.locale, currency: s.currency };
  const t = s.totals;
  const hours = s.lines.reduce((sum, l) => sum + l.bookMinutes, 0) / 60;
  const sums: (PaperSum | null)[] = [
    t.laborMinor === 0 ? null : { name: `Labor, ${decimal(hours, 1, s.locale)} h book`, value: amount(t.laborMinor, p) },
    t.laborDiscountMinor === 0 ? null : { name: `Discount on labor, ${percent(s.laborDiscountBp, s.locale)}`, value: amount(-t.laborDiscountMinor, p) },
    t.partsMinor === 0 ? null : { name: "Parts", value: amount(t.partsMinor, p) },
    t.outsideMinor === 0 ? null : { name: "Outside service", value: amount(t.outsideMinor, p) },
    t.suppliesMinor === 0 ? null : { name: "Shop supplies", value: amount(t.suppliesMinor, p) },
    t.freightMinor === 0 ? null : { name: "Freight & insurance", value: amount(t.freightMinor, p) },
    ...t.groups.filter((g) => g.taxMinor !== 0).map((g) => ({ name: `${s.rules.taxName} ${g.percent} % on ${amount(g.baseMinor, p)}`, value: amount(g.taxMinor, p) })),
    s.rules.exemptBy === null ? null : { name: `No tax, certificate ${s.rules.exemptBy}`, value: amount(0, p) },
  ];
  return sums.filter((x) => x !== null);
}

const rowOf = (l: SnapshotLine, s: EstimateSnapshot): (string | Content)[] => {
  const p = { locale: s.locale, currency: s.currency };
  const name: Content = {
    stack: [{ text: l.description, fontSize: 9.5 }, ...(l.kind === "part" ? [{ text: `${l.code}  new`, fontSize: 8, color: PAPER_INK.faint }] : [])],
  };
  return l.kind === "note" ? ["", name, "", "", "", ""] : [
    l.kind === "labor" ? l.code : "", name, l.bookMinutes > 0 ? decimal(l.bookMinutes / 60, 1, s.locale) : "", milliText(l.qtyMilli), amount(l.unitPriceMinor, p), amount(l.amountMinor, p),
  ];
};

/** The estimate as a paper: every job and part with its price, tax apart, what a yes means, and where to say it. */
export function estimatePaper(s: EstimateSnapshot, link: string | null): TDocumentDefinitions {
  const p = { locale: s.locale, currency: s.currency };
  const width = paperWidth(s.locale);
  const pieceOf = (no: number) => s.pieces.find((x) => x.pieceNo === no);
  const groups = s.pieces.length > 1
    ? [...s.pieces.map((x) => ({ title: `${x.family}${x.tag ? `, tag ${x.tag}` : `, piece ${x.pieceNo}`}`, lines: s.lines.filter((l) => l.pieceNo === x.pieceNo) })), { title: "For the whole order", lines: s.lines.filter((l) => l.pieceNo === null || !pieceOf(l.pieceNo)) }].filter((g) => g.lines.length > 0)
    : [{ title: "", lines: [...s.lines] }];
  const head = s.pieces.map((x) => [x.family, x.castingNumber && `casting ${x.castingNumber}`, x.serial && `serial ${x.serial}`].filter(Boolean).join(", ")).join("\n");
  const content: Content[] = [
    ...masthead({ ...s.shop, locale: s.locale }, `Estimate, version ${s.version}`, s.number),
    factRow([
      { label: "For", strong: s.customer.name, more: s.customer.address || s.customer.email },
      { label: s.pieces.length > 1 ? "Heads" : "Head", strong: head, more: [`Use: ${USE_WORDS[s.use as Use] ?? s.use}`, s.customerReference && `Your reference ${s.customerReference}`].filter(Boolean).join("\n"), width: 170 },
      { label: "Date", strong: date(s.date, s.locale), more: `Good until ${date(s.validUntil, s.locale)}${s.readyOn ? `\nReady about ${date(s.readyOn, s.locale)}` : ""}`, width: 120 },
    ]),
    ...(s.message ? [{ text: s.message, margin: [0, 16, 0, 0], fontSize: 10 } as Content] : []),
    ...(s.findings.length > 0 ? [{ stack: [engraved("What we found", { margin: [0, 0, 0, 5] }), ...s.findings.map((f): Content => ({ text: [f.position ? { text: `${f.position}: `, bold: true } : "", f.words], margin: [0, 0, 0, 3] }))], margin: [0, 16, 0, 0] } as Content] : []),
    ...groups.flatMap((g): Content[] => [
      ...(g.title ? [{ text: g.title, font: FACE.cut, bold: true, fontSize: 11, margin: [0, 16, 0, -10] } as Content] : []),
      lineTable(
        [{ head: "Code", width: 42, faint: true }, { head: "Work and parts", width: "*" }, { head: "Book h", width: 42, end: true, faint: true }, { head: "Qty", width: 32, end: true }, { head: "Each", width: 58, end: true }, { head: "Amount", width: 64, end: true, strong: true }],
        g.lines.map((l) => rowOf(l, s)),
      ),
    ]),
    {
      columns: [
        { width: "*", stack: [
          ...(s.change ? [engraved(`Against version ${s.change.fromVersion}`, { margin: [0, 0, 0, 4] }), { text: `${money(s.change.changeMinor, p)} on ${money(s.change.fromTotalMinor, p)}`, bold: true, margin: [0, 0, 0, 12] } as Content] : []),
          engraved("Deposit", { margin: [0, 0, 0, 4] }),
          { text: s.depositMinor === 0 ? "None." : s.depositStands ? `${money(s.depositMinor, p)} of the first agreement stands; none is asked again.` : `${money(s.depositMinor, p)} (${percent(s.depositBp, s.locale)}) when you say yes, taken off the invoice.`, margin: [0, 0, 0, 12] },
          ...(s.exclusions ? [engraved("Not included", { margin: [0, 0, 0, 4] }), { text: s.exclusions, margin: [0, 0, 0, 12] } as Content] : []),
        ] },
        sumColumn(220, estimateSums(s), { name: "Estimate", value: money(s.totals.totalMinor, p) }),
      ],
      columnGap: 28, margin: [0, 20, 0, 0], unbreakable: true,
    },
    { stack: [
      engraved("What a yes means", { margin: [0, 0, 0, 5] }), { text: s.words, lineHeight: 1.15 },
      { text: "Rules for written estimates and consent differ by place; local law applies. Replaced parts are returned if you ask before work starts.", fontSize: 8.4, color: PAPER_INK.faint, margin: [0, 5, 0, 0] },
      ...(link ? [{ text: ["Answer on your phone: ", { text: link, bold: true }], margin: [0, 8, 0, 0] } as Content] : []),
      { columns: [{ width: "*", stack: [{ canvas: [{ type: "line", x1: 0, y1: 26, x2: width * 0.55, y2: 26, lineWidth: 0.75, lineColor: PAPER_INK.edge }] }, { text: "Name and signature", fontSize: 8.2, color: PAPER_INK.faint, margin: [0, 3, 0, 0] }] }, { width: 150, stack: [{ canvas: [{ type: "line", x1: 0, y1: 26, x2: 150, y2: 26, lineWidth: 0.75, lineColor: PAPER_INK.edge }] }, { text: "Date", fontSize: 8.2, color: PAPER_INK.faint, margin: [0, 3, 0, 0] }] }], margin: [0, 10, 0, 0] },
    ], margin: [0, 24, 0, 0], unbreakable: true },
  ];
  return paperDefinition({ shop: { ...s.shop, locale: s.locale }, title: `Estimate ${s.number} version ${s.version}`, content, foot: `${s.shop.name}  ${s.number} version ${s.version}` });
}
