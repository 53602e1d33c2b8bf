import type { Content, TDocumentDefinitions } from "pdfmake/interfaces";
import { bigNumber, engraved, FACE, PAPER_INK } from "@/modules/documents/paper";
import { date } from "@/modules/kernel/format";

/** Rectangles of a bar code, drawn by the caller's encoder. */
export interface CodeArt { readonly qr: readonly object[]; readonly bars: readonly object[] }

export interface TagFacts {
  readonly tag: string;
  readonly customer: string;
  readonly family: string;
  readonly castingNumber: string;
  readonly orderNumber: string;
  readonly promisedOn: string | null;
  /** C the customer's, S the shop's own. */
  readonly ownerLetter: string;
  readonly locale: string;
}

const MM = 72 / 25.4;
/** Label stock 62 mm wide; the length follows the content. */
export const TAG_WIDTH = 62 * MM;
const SIDE = 4 * MM;
export const TAG_QR = 24 * MM;
export const TAG_BARS = { width: TAG_WIDTH - 2 * SIDE, height: 11 * MM } as const;

/** The tag wired to a head: number first, QR to its page, Code 128 for a scanner, whose it is in a big letter. */
export const tagLabel = (f: TagFacts, art: CodeArt): TDocumentDefinitions => ({
  pageSize: { width: TAG_WIDTH, height: 92 * MM },
  pageMargins: [SIDE, 4 * MM, SIDE, 3 * MM],
  info: { title: `Tag ${f.tag}` },
  defaultStyle: { font: FACE.text, fontSize: 9, color: PAPER_INK.ink },
  content: [
    // The hole for the wire, clear of everything printed.
    { canvas: [{ type: "ellipse", x: TAG_BARS.width / 2, y: 7, r1: 5, r2: 5, lineWidth: 0.9, lineColor: PAPER_INK.ink }], margin: [0, 0, 0, 6] },
    bigNumber(f.tag, 37, { margin: [0, 0, 0, 4] }),
    {
      columns: [
        { width: "*", stack: [
          { text: f.customer.slice(0, 28), bold: true, fontSize: 10.5 }, { text: f.family, fontSize: 9.5 }, { text: f.castingNumber, fontSize: 8.5, color: PAPER_INK.soft },
          engraved("Promised", { margin: [0, 6, 0, 1] }), { text: f.promisedOn ? date(f.promisedOn, f.locale) : "open", bold: true }, { text: f.orderNumber, fontSize: 8.5, color: PAPER_INK.soft, margin: [0, 3, 0, 0] },
        ] },
        { width: TAG_QR, stack: [{ canvas: art.qr }, bigNumber(f.ownerLetter, 26, { alignment: "center", margin: [0, 4, 0, 0] })] },
      ],
    } as Content,
    { canvas: art.bars, margin: [0, 8, 0, 2] } as Content,
    { text: f.tag, alignment: "center", fontSize: 8.5 },
  ],
});
