import type { Content, TDocumentDefinitions } from "pdfmake/interfaces";
import { engraved, factRow, lineTable, masthead, paperDefinition, PAPER_INK, paperWidth, type PaperShop } from "@/modules/documents/paper";
import { date, decimal } from "@/modules/kernel/format";

export interface TravelerFacts {
  readonly shop: PaperShop;
  readonly orderNumber: string;
  readonly customer: string;
  readonly wants: string;
  readonly promisedOn: string | null;
  readonly pieces: readonly {
    readonly label: string; readonly family: string; readonly castingNumber: string; readonly serial: string; readonly tray: string;
    readonly operations: readonly { readonly code: string; readonly name: string; readonly station: string; readonly bookMinutes: number; readonly done: boolean; readonly record: string }[];
  }[];
  /** Short cautions of the hazards on the route; they end by deferring to local law and the data sheets. */
  readonly cautions: readonly string[];
}

/** The sheet that walks with the heads: route, book hours, what to record, blank boxes for dirty hands. No prices, no pay. */
export function travelerPaper(f: TravelerFacts): TDocumentDefinitions {
  const width = paperWidth(f.shop.locale);
  const content: Content[] = [
    ...masthead(f.shop, "Traveler", f.orderNumber),
    factRow([{ label: "For", strong: f.customer }, { label: "Promised", strong: f.promisedOn ? date(f.promisedOn, f.shop.locale) : "open" }, { label: "Heads", strong: String(f.pieces.length), width: 60 }]),
    ...(f.wants ? [{ stack: [engraved("Wanted", { margin: [0, 14, 0, 3] }), { text: f.wants }] } as Content] : []),
    ...f.pieces.flatMap((p, i): Content[] => [
      { text: `${p.label}   ${p.family}`, fontSize: 15, bold: true, margin: [0, 20, 0, 2], ...(i > 0 ? { pageBreak: "before" as const } : {}) },
      { text: [[p.castingNumber && `casting ${p.castingNumber}`, p.serial && `serial ${p.serial}`, p.tray].filter(Boolean).join(", ")], color: PAPER_INK.soft, margin: [0, 0, 0, 8] },
      lineTable(
        [{ head: "Op", width: 34 }, { head: "Operation", width: "*", strong: true }, { head: "Station", width: 72 }, { head: "Book h", width: 40, end: true }, { head: "To record", width: 120, faint: true }, { head: "Who, when", width: 86 }],
        p.operations.map((o) => [o.code, o.done ? `${o.name}, done` : o.name, o.station, decimal(o.bookMinutes / 60, 1, f.shop.locale), o.record, ""]),
      ),
    ]),
    ...(f.cautions.length ? [{ stack: [engraved("Cautions", { margin: [0, 18, 0, 4] }), ...f.cautions.map((c) => ({ text: c, fontSize: 8.6, margin: [0, 0, 0, 3] as [number, number, number, number] }))], unbreakable: true } as Content] : []),
    { canvas: [{ type: "line", x1: 0, y1: 30, x2: width, y2: 30, lineWidth: 0.6, lineColor: PAPER_INK.edge }, { type: "line", x1: 0, y1: 56, x2: width, y2: 56, lineWidth: 0.6, lineColor: PAPER_INK.edge }] },
    { text: "Notes", fontSize: 8, color: PAPER_INK.faint, margin: [0, 3, 0, 0] },
  ];
  return paperDefinition({ shop: f.shop, title: `Traveler ${f.orderNumber}`, content, foot: `${f.shop.name}  ${f.orderNumber}` });
}
