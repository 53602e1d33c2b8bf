import type { Content, TDocumentDefinitions } from "pdfmake/interfaces";
import { bigNumber, engraved, FACE, factRow, lineTable, PAPER_INK, paperDefinition, paperWidth, ruler } from "@/modules/documents/paper";
import { date, hours } from "@/modules/kernel/format";
import { milliText } from "@/modules/kernel/quantity";
import { code128, qr } from "@/modules/outbound/barcodes/encode";
import { code128Rects, qrRects } from "@/modules/outbound/barcodes/vectors";
import { trayText } from "../domain/tray-kinds";
import { USE_WORDS, type Use } from "../domain/uses";

export interface TravelerHead {
  readonly tag: string | null;
  readonly pieceNo: number;
  readonly address: string;
  readonly family: string;
  readonly castingNumber: string;
  readonly serial: string;
  readonly ownerKind: string;
  readonly tray: Readonly<Record<string, number>> | null;
  readonly damage: string;
  readonly benchNotes: string;
  readonly operations: readonly { readonly sequence: number; readonly code: string; readonly name: string; readonly skill: string; readonly qtyMilli: number; readonly bookMinutes: number; readonly mustRecord: string; readonly benchNote: string; readonly state: string }[];
  readonly parts: readonly { readonly sku: string; readonly description: string; readonly neededMilli: number; readonly bin: string }[];
  readonly cautions: readonly { readonly title: string; readonly words: string; readonly source: string }[];
}
export interface TravelerFacts {
  readonly shop: { readonly name: string; readonly address: string; readonly phone: string; readonly email: string; readonly locale: string };
  readonly orderNumber: string;
  readonly customer: string;
  readonly use: string;
  readonly wants: string;
  readonly promisedOn: string | null;
  readonly printedAt: string;
  readonly heads: readonly TravelerHead[];
}

/** What ends the cautions: the product defers to the place and the maker. */
const CLOSE = "Local law, your safety data sheets and the service manual come first.";

/**
 * The sheet that goes with a head: route, book hours, what to record with blanks for dirty hands, parts and bins, cautions.
 * No prices and no pay.
 */
export function traveler(t: TravelerFacts): TDocumentDefinitions {
  const width = paperWidth(t.shop.locale);
  const square = 62;
  const sheet = (h: TravelerHead, i: number): Content[] => [
    {
      columns: [
        { width: "*", stack: [engraved(`Traveler, ${t.orderNumber}`), bigNumber(h.tag ?? `Head ${h.pieceNo}`, 40, { margin: [0, 3, 0, 0] }), { text: `${t.customer}  ${h.family}`, font: FACE.cut, bold: true, fontSize: 13, margin: [0, 4, 0, 0] }] },
        ...(h.tag ? [{ width: 150, margin: [0, 8, 10, 0] as [number, number, number, number], stack: [{ canvas: code128Rects(code128(h.tag), 150, 34) }, { text: h.tag, font: FACE.table, fontSize: 8, alignment: "center" as const, margin: [0, 2, 0, 0] as [number, number, number, number] }] }] : []),
        { width: square, canvas: qrRects(qr(h.address), square) },
      ],
      ...(i > 0 ? { pageBreak: "before" as const } : {}), margin: [0, 0, 0, 8],
    },
    ruler(width),
    factRow([
      { label: "Promised", strong: t.promisedOn ? date(t.promisedOn, t.shop.locale) : "Not set" },
      { label: "Casting, serial", strong: [h.castingNumber, h.serial].filter(Boolean).join(", ") || "none stamped" },
      { label: "Use", strong: USE_WORDS[t.use as Use] ?? t.use },
      { label: "Owner", strong: h.ownerKind === "shop" ? "The shop's own" : "Customer's" },
      { label: "Book", strong: `${hours(h.operations.reduce((n, o) => n + o.bookMinutes, 0), t.shop.locale)} h`, width: 60 },
    ]),
    ...(t.wants ? [{ text: t.wants, margin: [0, 12, 0, 0], fontSize: 10 } as Content] : []),
    { text: [{ text: "Tray: ", bold: true }, h.tray ? trayText(h.tray) : "not booked in yet", h.damage ? { text: `   Damage seen: ${h.damage}` } : "", h.benchNotes ? { text: `   ${h.benchNotes}` } : ""], margin: [0, 10, 0, 0] },
    lineTable(
      [{ head: "Op", width: 26, faint: true }, { head: "Operation", width: 150 }, { head: "Machine, skill", width: 76, faint: true }, { head: "Book h", width: 38, end: true }, { head: "Record", width: "*" }, { head: "By, time", width: 74 }],
      h.operations.map((o) => [
        String(o.sequence), { stack: [{ text: `${o.name}${o.qtyMilli === 1000 ? "" : ` × ${milliText(o.qtyMilli)}`}`, bold: true, fontSize: 9.5 }, ...(o.benchNote ? [{ text: o.benchNote, fontSize: 8.4 }] : [])] },
        o.skill, hours(o.bookMinutes, t.shop.locale), { stack: [{ text: o.mustRecord, fontSize: 8.4, color: PAPER_INK.soft }, { text: " ", fontSize: 12 }] }, o.state === "done" ? "done" : o.state === "skipped" ? "skipped" : "",
      ]),
    ),
    ...(h.parts.length > 0 ? [lineTable([{ head: "Bin", width: 46, faint: true }, { head: "Part", width: 96 }, { head: "Description", width: "*" }, { head: "Need", width: 46, end: true, strong: true }], h.parts.map((p) => [p.bin, p.sku, p.description, milliText(p.neededMilli)]))] : []),
    ...(h.cautions.length > 0 ? [{
      stack: [engraved("Cautions", { margin: [0, 0, 0, 5] }), ...h.cautions.map((c): Content => ({ text: [{ text: `${c.title} `, bold: true }, c.words, { text: `  ${c.source}`, color: PAPER_INK.faint, fontSize: 7.8 }], fontSize: 8.8, margin: [0, 0, 0, 3] })), { text: CLOSE, bold: true, fontSize: 8.8, margin: [0, 3, 0, 0] }],
      margin: [0, 18, 0, 0],
    } as Content] : []),
  ];
  return paperDefinition({ shop: t.shop, title: `Traveler ${t.orderNumber}`, content: t.heads.flatMap(sheet), foot: `${t.shop.name}  ${t.orderNumber}  printed ${t.printedAt}` });
}
