import type { CanvasElement, Column, Content, ContentTable, ContentText, TableCell, TDocumentDefinitions } from "pdfmake/interfaces";
import { paper } from "@/modules/ui/tokens";

/**
 * Blocks that every paper of the shop is laid out with: masthead, ruler, facts, tables, sums, foot. Pure: values in,
 * description out. Lengths are points; drawings are vectors of the page, never picture files.
 */
export interface PaperShop {
  readonly name: string;
  readonly address: string;
  readonly phone: string;
  readonly email: string;
  /** BCP 47; chooses letter or A4. */
  readonly locale: string;
}

/** Space at the page's edges and between columns. */
export const PAPER = { side: 46.5, top: 42, bottom: 52, gap: 22 } as const;
const SHEETS = { LETTER: { width: 612, height: 792 }, A4: { width: 595.28, height: 841.89 } } as const;
export type SheetName = keyof typeof SHEETS;

/** Letter where it is at home (United States, Canada, Mexico), A4 elsewhere. Source: ANSI/ASME Y14.1, ISO 216. */
const sheetFor = (locale: string): SheetName => (/-(US|CA|MX)$/i.test(locale) ? "LETTER" : "A4");
/** Width between the margins. */
export const paperWidth = (locale: string): number => SHEETS[sheetFor(locale)].width - 2 * PAPER.side;

export const FACE = { text: "SpecialGothic", table: "SpecialGothicTable", numeral: "SpecialGothicNumeral", cut: "NationalPark" } as const;

/** Letters and digits that all of the documents' fonts have; the rest is put in words or refused before sending. */
export const PAPER_INK = { ink: paper.ink, soft: paper["ink-2"], faint: paper["ink-3"], line: paper.line, edge: paper["line-2"], fluid: paper.fluid } as const;

/** Small caps-like heading of a column or a fact. */
export const engraved = (text: string, more: Partial<ContentText> = {}): Content => ({
  text: text.toUpperCase(), font: FACE.cut, fontSize: 7.6, characterSpacing: 0.75, color: PAPER_INK.soft, ...more,
});

/** A big narrow number. */
export const bigNumber = (text: string, fontSize: number, more: Partial<ContentText> = {}): Content => ({
  text, font: FACE.numeral, fontSize, fontFeatures: ["tnum"], lineHeight: 0.9, ...more,
});

/** The mark: two split keepers on a grooved stem, `width` points wide. */
function markCanvas(width: number): CanvasElement[] {
  const k = width / 34;
  const at = (points: readonly (readonly [number, number])[]) => points.map(([x, y]) => ({ x: x * k, y: y * k }));
  const left = [[0.4, 6], [1.4, 5.5], [12, 5.5], [12.7, 6.3], [12.7, 10.6], [14.2, 12.2], [14.2, 14.8], [12.7, 16.4], [12.7, 33.5], [10.5, 33.5], [8.6, 32.2]] as const;
  const shape = (points: readonly (readonly [number, number])[]): CanvasElement => ({ type: "polyline", points: at(points), closePath: true, color: PAPER_INK.ink, lineWidth: 0 });
  return [
    shape(left),
    shape(left.map(([x, y]) => [34 - x, y] as const)),
    {
      type: "polyline", closePath: true, color: PAPER_INK.fluid, lineColor: PAPER_INK.ink, lineWidth: 1.2 * k,
      points: at([[14.5, 2.6], [15.6, 1], [18.4, 1], [19.5, 2.6], [19.5, 9.9], [18.2, 11.4], [18.2, 15.6], [19.5, 17.1], [19.5, 37], [14.5, 37], [14.5, 17.1], [15.8, 15.6], [15.8, 11.4], [14.5, 9.9]]),
    },
  ];
}

/** The ruler line under the masthead: a tick every 7.6 points standing on a line. */
export function ruler(width: number, tick = 4.6): Content {
  const step = width / Math.round(width / 7.6);
  const ticks: CanvasElement[] = [];
  for (let i = 0; i * step <= width + 0.01; i++) {
    const x = Math.min(width - 0.25, Math.max(0.25, i * step));
    ticks.push({ type: "line", x1: x, y1: 0, x2: x, y2: tick, lineWidth: 0.6, lineColor: PAPER_INK.ink });
  }
  return { canvas: [...ticks, { type: "line", x1: 0, y1: tick, x2: width, y2: tick, lineWidth: 0.9, lineColor: PAPER_INK.ink }] };
}

const rule = (width: number, color: string = PAPER_INK.ink, lineWidth = 0.9): Content =>
  ({ canvas: [{ type: "line", x1: 0, y1: 0, x2: width, y2: 0, lineWidth, lineColor: color }] });

/** Shop at the left, kind and number of the paper at the right, ruler under both. */
export function masthead(shop: PaperShop, kind: string, number: string): Content[] {
  const lines = shop.address.split("\n").map((l) => l.trim()).filter(Boolean);
  const under = [lines.join(", "), [shop.phone, shop.email].filter(Boolean).join("  ")].filter(Boolean).join("\n");
  const wide = number.length > 9;
  return [
    {
      columns: [
        { canvas: markCanvas(27), width: 40 },
        { width: "*", stack: [
          { text: shop.name, font: FACE.cut, bold: true, fontSize: 15, margin: [0, 0, 0, 2] },
          { text: under, color: PAPER_INK.soft, fontSize: 9.5, lineHeight: 1.12 },
        ] },
        { width: wide ? 230 : 150, stack: [engraved(kind, { alignment: "right" }), bigNumber(number, wide ? 30 : 37, { alignment: "right", margin: [0, wide ? 4 : 2, 0, 0] })] },
      ],
      margin: [0, 0, 0, 12],
    },
    ruler(paperWidth(shop.locale)),
  ];
}

export interface PaperFact { readonly label: string; readonly strong: string; readonly more?: string | undefined; readonly width?: number | "*" | "auto" }

/** The row of facts under the ruler; the last one stands at the right edge. */
export const factRow = (facts: readonly PaperFact[]): Content => ({
  columns: facts.map((f, i) => ({
    width: f.width ?? "*",
    stack: [
      engraved(f.label, { margin: [0, 0, 0, 4] }),
      { text: f.strong, bold: true, fontSize: 10 },
      ...(f.more ? [{ text: f.more, fontSize: 9.5, color: PAPER_INK.soft, lineHeight: 1.1 }] : []),
    ],
    ...(i === facts.length - 1 && i > 0 ? { alignment: "right" as const } : {}),
  })),
  columnGap: 14,
  margin: [0, 18, 0, 0],
});

export interface PaperColumn { readonly head: string; readonly width: number | "*"; readonly end?: boolean; readonly faint?: boolean; readonly strong?: boolean }

/** Ink rule under the head, hairlines between the rows, numbers at the right. The head is repeated on the next page. */
export function lineTable(columns: readonly PaperColumn[], rows: readonly (readonly (string | Content)[])[], more: Partial<ContentTable> = {}): Content {
  const head: TableCell[] = columns.map((c) => ({ ...(engraved(c.head) as object), alignment: c.end ? "right" : "left" } as TableCell));
  const body = rows.map((row) => columns.map((c, i): TableCell => {
    const value = row[i] ?? "";
    if (typeof value !== "string") return value;
    return {
      text: value, font: c.end ? FACE.table : FACE.text, fontSize: 9.5,
      ...(c.end ? { alignment: "right" as const, fontFeatures: ["tnum"] } : {}), ...(c.strong ? { bold: true } : {}), ...(c.faint ? { color: PAPER_INK.faint } : {}),
    };
  }));
  return {
    table: { headerRows: 1, dontBreakRows: true, keepWithHeaderRows: 1, widths: columns.map((c) => c.width), body: [head, ...body] },
    layout: {
      hLineWidth: (i: number) => (i === 0 ? 0 : i === 1 ? 0.9 : 0.6),
      vLineWidth: () => 0,
      hLineColor: (i: number) => (i === 1 ? PAPER_INK.ink : PAPER_INK.line),
      paddingLeft: (i: number) => (i === 0 ? 0 : 6), paddingRight: (i: number, node: { table: { widths?: unknown } }) => (Array.isArray(node.table.widths) && i === node.table.widths.length - 1 ? 0 : 6),
      paddingTop: (i: number) => (i === 0 ? 0 : 3.9), paddingBottom: (i: number) => (i === 0 ? 4.6 : 3.4),
    },
    margin: [0, 18, 0, 0],
    ...more,
  };
}

export interface PaperSum { readonly name: string; readonly value: string; readonly strong?: boolean }

/** Amounts that add up, and under an ink rule the one that matters. */
export const sumColumn = (width: number, sums: readonly PaperSum[], total: { readonly name: string; readonly value: string }): Column => ({
  width,
  stack: [
    ...sums.map((s): Content => ({
      columns: [
        { text: s.name, width: "*", fontSize: 9.8, bold: s.strong ?? false },
        { text: s.value, width: "auto", alignment: "right", font: FACE.table, fontSize: 9.8, bold: true, fontFeatures: ["tnum"] },
      ],
      columnGap: 8, margin: [0, 0, 0, 5.6],
    })),
    { ...(rule(width) as object), margin: [0, 2.5, 0, 8] } as Content,
    { columns: [{ text: total.name, width: "auto", bold: true, fontSize: 10, margin: [0, 9, 0, 0] }, bigNumber(total.value, 24, { alignment: "right" })], columnGap: 8 },
    { ...(rule(width, PAPER_INK.line, 0.6) as object), margin: [0, 9, 0, 0] } as Content,
  ],
});

/** A frame with its label in a break of the line, `width` by `height`, drawn behind `content`. */
export function bracket(label: string, width: number, height: number, labelWidth: number): CanvasElement[] {
  const r = 3.5;
  const line = (x1: number, y1: number, x2: number, y2: number): CanvasElement => ({ type: "line", x1, y1, x2, y2, lineWidth: 0.75, lineColor: PAPER_INK.edge });
  const from = 13 + (label === "" ? 0 : labelWidth);
  return [
    line(r, 0, label === "" ? r : 9, 0), line(from, 0, width - r, 0), line(width, r, width, height - r), line(width - r, height, r, height), line(0, height - r, 0, r),
    line(0, r, r, 0), line(width - r, 0, width, r), line(width, height - r, width - r, height), line(r, height, 0, height - r),
  ];
}

export interface Paper {
  readonly shop: PaperShop;
  /** Of the file: what a reader shows in its title bar. */
  readonly title: string;
  readonly content: Content[];
  /** Left end of the foot; the right end counts the pages. */
  readonly foot: string;
}

/** The sheet around the blocks: size, margins, type, foot with page numbers. */
export const paperDefinition = (p: Paper): TDocumentDefinitions => ({
  pageSize: sheetFor(p.shop.locale),
  pageMargins: [PAPER.side, PAPER.top, PAPER.side, PAPER.bottom],
  info: { title: p.title, author: p.shop.name },
  defaultStyle: { font: FACE.text, fontSize: 9.5, color: PAPER_INK.ink, lineHeight: 1.08 },
  content: p.content,
  footer: (page: number, pages: number): Content => ({
    columns: [
      { text: p.foot, color: PAPER_INK.faint, fontSize: 8.2 },
      { text: `Page ${page} of ${pages}`, alignment: "right", width: 80, color: PAPER_INK.faint, fontSize: 8.2 },
    ],
    margin: [PAPER.side, 16, PAPER.side, 0],
  }),
});
