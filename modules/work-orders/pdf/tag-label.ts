import type { Content, TDocumentDefinitions } from "pdfmake/interfaces";
import { FACE, PAPER_INK } from "@/modules/documents/paper";
import { date } from "@/modules/kernel/format";
import { code128, qr } from "@/modules/outbound/barcodes/encode";
import { code128Rects, qrRects } from "@/modules/outbound/barcodes/vectors";

export interface TagFacts {
  readonly tag: string;
  /** Where the square code leads: the piece. */
  readonly address: string;
  readonly customer: string;
  readonly family: string;
  readonly castingNumber: string;
  readonly serial: string;
  readonly orderNumber: string;
  readonly promisedOn: string | null;
  readonly ownerKind: string;
  readonly locale: string;
}

const MM = 72 / 25.4;
/** Roll of 62 mm; a millimetre and a half is left on both sides for printers that cannot reach the edge. */
export const TAG_WIDTH = 62 * MM;
const SIDE = 3 * MM;
const HEIGHT = 92 * MM;
const NAME_MOST = 26;

/** Short enough for a wire tag; the whole name stands on the papers. */
export const shortName = (name: string): string => (name.length <= NAME_MOST ? name : `${name.slice(0, NAME_MOST - 1).trimEnd()}…`);

/**
 * The tag that is wired on: number at 36 points, square code to the piece, Code 128 of the number for the scanner, whose
 * it is in one big letter (C customer's, S the shop's own), and the promise. The wire end is the top.
 */
export function tagLabel(t: TagFacts): TDocumentDefinitions {
  const width = TAG_WIDTH - 2 * SIDE;
  const square = 24 * MM;
  const owner = t.ownerKind === "shop" ? "S" : "C";
  const content: Content[] = [
    { canvas: [{ type: "ellipse", x: width / 2, y: 6, r1: 4.5, r2: 4.5, lineWidth: 0.75, lineColor: PAPER_INK.edge }], margin: [0, 0, 0, 6] },
    { text: t.tag, font: FACE.numeral, fontSize: 36, alignment: "center", lineHeight: 0.95 },
    {
      columns: [
        { width: square, canvas: qrRects(qr(t.address), square) },
        { width: "*", margin: [6, 4, 0, 0], stack: [
          { text: owner, font: FACE.cut, bold: true, fontSize: 30, alignment: "right", lineHeight: 0.9 },
          { text: shortName(t.customer), bold: true, fontSize: 10 }, { text: t.family, fontSize: 10 },
          { text: [t.castingNumber, t.serial].filter(Boolean).join("  "), fontSize: 8 },
        ] },
      ],
      margin: [0, 4, 0, 0],
    },
    { columns: [{ text: t.orderNumber, fontSize: 9 }, { text: t.promisedOn ? `Promised ${date(t.promisedOn, t.locale)}` : "No day promised", fontSize: 9, bold: true, alignment: "right", width: "auto" }], margin: [0, 6, 0, 6] },
    { canvas: code128Rects(code128(t.tag), width, 13 * MM) },
    { text: t.tag, font: FACE.table, fontSize: 9, alignment: "center", margin: [0, 3, 0, 0] },
  ];
  return { pageSize: { width: TAG_WIDTH, height: HEIGHT }, pageMargins: [SIDE, 6, SIDE, 4], info: { title: `Tag ${t.tag}` }, defaultStyle: { font: FACE.text, fontSize: 9, color: PAPER_INK.ink }, content };
}
