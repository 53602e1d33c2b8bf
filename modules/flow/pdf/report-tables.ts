import type { Content, ContentTable, TableCell } from "pdfmake/interfaces";
import { engraved, FACE, PAPER_INK } from "@/modules/documents/paper";
import { decimal } from "@/modules/kernel/format";
import { meanRows } from "../components/comparison-words";
import { differenceText, flowText, liftWords } from "../components/flow-words";
import { unitWords } from "../components/unit-words";
import { isAssessed } from "../domain/noise-summary";
import type { ReportSide, ReportSnapshot, ReportTest } from "../domain/report-snapshot";
import { SIDE_WORDS } from "./report-words";

export const unitOf = (sides: readonly ReportSide[]): "in" | "mm" => sides.map((x) => x.gain).find((g) => g.state !== "absent")?.liftUnit ?? "in";
export const liftsOf = (sides: readonly ReportSide[]): number[] => [...new Set(sides.flatMap((x) => [...(x.before?.readings ?? []), ...(x.after?.readings ?? [])]).map((r) => r.liftUm))].sort((a, b) => a - b);
export const isJudged = (gain: ReportSide["gain"]): boolean => gain.comparable && isAssessed(gain.noise);

const uncertaintyAt = (gain: ReportSide["gain"], um: number, locale: string): string => {
  const expanded = gain.comparable ? gain.noise?.rows.find((r) => r.liftUm === um)?.expandedCfm : undefined;
  return expanded === undefined || expanded === null ? "" : `±${decimal(expanded, 1, locale)}`;
};
const number = (text: string, fontSize: number, more: object = {}): TableCell => ({ text, font: FACE.table, fontSize, alignment: "right", fontFeatures: ["tnum"], ...more });

export interface TableLook {
  readonly rowHeight: number;
  /** One side, with percent and uncertainty; else both sides beside each other. */
  readonly isWide: boolean;
  readonly fontSize: number;
}

/** Lift and, for each side, before, after and, only where the two may be compared, the difference. */
export function readingsTable(sides: readonly ReportSide[], s: ReportSnapshot, { rowHeight, isWide, fontSize }: TableLook): Content {
  const unit = unitOf(sides);
  // Heads of a table of both sides stand in two rows, so that they keep a size that is read.
  const isTwoRows = s.kind === 4 && !isWide;
  const at = (test: ReportTest | null, um: number): string => { const r = test?.readings.find((x) => x.liftUm === um); return r ? flowText(r.flowCfm, s.locale) : ""; };
  const headsOf = ({ side, gain }: ReportSide): string[] => [isWide || isTwoRows ? "Before" : `${side === "intake" ? "In" : "Ex"} before`, "After", ...(gain.comparable ? ["Gain", ...(isWide ? ["%", ...(isJudged(gain) ? ["U, 95 %"] : [])] : [])] : [])];
  const heads = [`Lift, ${unit}`, ...sides.flatMap(headsOf)];
  const cellsOf = ({ before, after, gain }: ReportSide, um: number): TableCell[] => {
    const row = gain.comparable ? gain.rows.find((r) => r.liftUm === um) : undefined;
    return [
      number(at(before, um), fontSize), number(at(after, um), fontSize),
      ...(gain.comparable ? [
        number(row ? `${row.gainCfm < 0 ? "loss " : ""}${differenceText(row.gainCfm, s.locale)}` : "", fontSize, { bold: true }),
        ...(isWide ? [number(row === undefined || row.gainPercent === null ? "" : decimal(row.gainPercent, 1, s.locale), fontSize, { color: PAPER_INK.soft }), ...(isJudged(gain) ? [number(uncertaintyAt(gain, um, s.locale), fontSize, { color: PAPER_INK.soft })] : [])] : []),
      ] : []),
    ];
  };
  const headLook = isWide ? {} : isTwoRows ? { characterSpacing: 0.2 } : { fontSize: 6.4, characterSpacing: 0.3 };
  const over = (): TableCell[] => ["", ...sides.flatMap((side): TableCell[] => { const span = headsOf(side).length; return [{ text: `${SIDE_WORDS[side.side]}, CFM`, font: FACE.cut, bold: true, fontSize: 8.6, colSpan: span, alignment: "right" }, ...Array.from({ length: span - 1 }, () => "")]; })];
  const headRows = isTwoRows ? 2 : 1;
  const body: TableCell[][] = [
    ...(isTwoRows ? [over()] : []),
    heads.map((h, i) => ({ ...(engraved(h, headLook) as object), alignment: i === 0 ? "left" : "right" } as TableCell)),
    ...liftsOf(sides).map((um): TableCell[] => [{ text: liftWords(um, unit, s.locale), font: FACE.table, fontSize, color: PAPER_INK.soft }, ...sides.flatMap((side) => cellsOf(side, um))]),
  ];
  const pad = Math.max(s.kind === 4 ? 0.3 : 0.6, (rowHeight - 10.6 - (fontSize - 9) * 1.2) / 2);
  return {
    table: { headerRows: headRows, widths: [40, ...heads.slice(1).map((h) => (h === "%" ? 30 : h === "U, 95 %" ? 38 : ("*" as const)))], body },
    layout: {
      hLineWidth: (i) => (i < headRows ? 0 : i === headRows ? 0.9 : 0.5), vLineWidth: () => 0, hLineColor: (i) => (i === headRows ? PAPER_INK.ink : PAPER_INK.line),
      paddingLeft: () => 2, paddingRight: () => 2, paddingTop: () => pad, paddingBottom: () => pad,
    },
  } satisfies ContentTable;
}

/** What a side comes to: means and cam lift, before, after and the difference. Nothing where none is shown. */
export function meansTable({ gain, means }: ReportSide, s: ReportSnapshot, look: { readonly fontSize: number; readonly pad: number }): Content[] {
  if (!gain.comparable) return [];
  const rows = meanRows(gain, means, unitWords("read", gain.liftUnit, s.locale));
  const { fontSize, pad } = look;
  return [
    {
      table: {
        widths: ["*", "auto", "auto", "auto"],
        body: rows.map((r): TableCell[] => [
          { text: r.name, fontSize, color: PAPER_INK.soft }, number(`${r.before} to ${r.after}`, fontSize), number(`${r.isLoss ? "loss " : ""}${r.gain}`, fontSize, { bold: true }), number(r.percent, fontSize, { color: PAPER_INK.soft }),
        ]),
      },
      layout: { hLineWidth: (i, node) => (i === 0 ? 0.9 : i === node.table.body.length ? 0 : 0.5), vLineWidth: () => 0, hLineColor: (i) => (i === 0 ? PAPER_INK.ink : PAPER_INK.line), paddingLeft: (i) => (i === 0 ? 2 : 5), paddingRight: () => 2, paddingTop: () => pad, paddingBottom: () => pad },
      margin: [0, 3, 0, 0],
    },
  ];
}
