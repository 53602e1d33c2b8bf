import type { Column, Content } from "pdfmake/interfaces";
import { bracket, bigNumber, engraved, FACE, lineTable, PAPER_INK } from "@/modules/documents/paper";
import { curveGeometry } from "@/modules/flow/domain/curve-geometry";
import { curveContent } from "@/modules/flow/pdf/curve-canvas";
import { decimal } from "@/modules/kernel/format";
import { curveUnit } from "../domain/curve-unit";
import { readingsOf, type GainSide } from "../domain/gain-block";
import type { InvoicePiece } from "../domain/invoice-snapshot";

const SIDE_WORDS = { intake: "Intake", exhaust: "Exhaust" } as const;
const signed = (n: number, digits: number, locale: string) => `${n > 0 ? "+" : n < 0 ? "-" : ""}${decimal(Math.abs(n), digits, locale)}`;

/** Lift as on the shop's scale: `.350` where inches are at home, `8.89 mm` elsewhere. */
const liftText = (um: number, inches: boolean, locale: string) => (inches ? decimal(um / 25_400, 3, locale).replace(/^0(?=\D)/, "") : decimal(um / 1000, 2, locale));


const portWord = (sides: readonly GainSide[]) => (new Set(sides.map((s) => s.cylinder)).size > 1 || (sides[0]?.cylinder ?? 1) > 1 ? `, port ${sides[0]?.cylinder ?? 1}` : "");

/** The first port's pair of sides: what the curve shows. */
const firstPort = (sides: readonly GainSide[]) => sides.filter((s) => s.cylinder === Math.min(...sides.map((x) => x.cylinder)));

/** Curve and mean gains in a bracket; or, where the sets are not comparable, the reasons instead of any difference. */
export function gainBracket(piece: InvoicePiece, width: number, locale: string, withTag: boolean): Column {
  const { gain } = piece;
  const sides = firstPort(gain.sides);
  const at = sides[0]?.atInH2O;
  const title = `${gain.comparable ? "Measured gain" : "Measured flow"}${withTag ? ` ${piece.tag}` : ""}${portWord(sides)}${at ? `, ${decimal(at, 0, locale)} in water` : ""}`;
  const inner = width - 24;
  const body: Content[] = [];
  let height = 0;
  if (sides.length > 0) {
    const heightPx = 168;
    const geometry = curveGeometry({
      widthPx: inner, heightPx, mini: true, unit: curveUnit(locale), atInH2O: at ?? 28, camLiftUm: sides[0]?.camLiftUm ?? null,
      lines: sides.map((s) => ({ side: s.side, ...readingsOf(s), gain: s.comparison.comparable ? "shown" as const : "withheld" as const })), decimalText: (v, digits) => decimal(v, digits, locale),
    });
    if (geometry.ok) {
      body.push({ stack: curveContent(geometry.value) });
      height += heightPx;
    }
  }
  if (gain.comparable) {
    const shown = sides.flatMap((s) => (s.comparison.comparable ? [{ side: s.side, c: s.comparison }] : []));
    body.push({
      columns: shown.map(({ side, c }) => ({ width: "*", stack: [
        bigNumber(signed(c.meanGainCfm, 2, locale), 17),
        engraved(`${SIDE_WORDS[side]} CFM, mean of ${c.rows.length}${c.meanPercent === null ? "" : `, ${signed(c.meanPercent, 2, locale)} %`}`, { fontSize: 6.4, characterSpacing: 0.5, margin: [0, 2, 0, 0] }),
      ] })),
      columnGap: 10, margin: [0, 6, 0, 0],
    });
    height += 44;
  } else {
    body.push({ stack: [
      { text: "No gain is stated.", bold: true, fontSize: 9.5, margin: [0, sides.length ? 6 : 4, 0, 2] },
      ...gain.reasons.map((r): Content => ({ text: r, fontSize: 8.8, color: PAPER_INK.soft })),
    ] });
    height += 24 + gain.reasons.reduce((n, r) => n + 12 * Math.ceil((r.length * 4.6) / inner), 0);
  }
  height += 18;
  const labelWidth = title.length * 4.45 + 8;
  return {
    width,
    stack: [
      { canvas: bracket(title, width, height, labelWidth), relativePosition: { x: 0, y: 4 } },
      { ...(engraved(title, { fontSize: 7 }) as object), relativePosition: { x: 14, y: 0 } } as Content,
      { stack: body, margin: [12, 12, 12, 10] },
    ],
    unbreakable: true,
  };
}

/** Each reading of a piece, lifts across; lower numbers stand as they are, in the same type. */
export function gainTables(piece: InvoicePiece, locale: string, withTag: boolean): Content[] {
  const inches = curveUnit(locale) === "in";
  return piece.gain.sides.map((s): Content => {
    const { comparison } = s;
    const rows = comparison.rows;
    const cfm = (v: number | null) => (v === null ? "" : decimal(v, 1, locale));
    const lifts = rows.slice(0, 14);
    const mean = (v: number) => decimal(v, 2, locale);
    const lines: (string | Content)[][] = [
      ["Before", ...lifts.map((r) => cfm(r.beforeCfm)), comparison.comparable ? mean(comparison.meanBeforeCfm) : ""],
      ["After", ...lifts.map((r) => cfm(r.afterCfm)), comparison.comparable ? mean(comparison.meanAfterCfm) : ""],
      ...(comparison.comparable ? [["Gain", ...comparison.rows.slice(0, 14).map((r) => signed(r.gainCfm, 1, locale)), signed(comparison.meanGainCfm, 2, locale)].map((t, i) => (i === 0 ? t : bold(t)))] : []),
    ];
    const title = `${SIDE_WORDS[s.side]} CFM at ${decimal(s.atInH2O, 0, locale)} in water${withTag ? `, ${piece.tag}` : ""}`;
    const notes = [s.conditions, ...comparison.notes.map((n) => n.words), ...(comparison.comparable ? [] : [`No difference is stated: ${comparison.reasons.map((r) => r.words).join(" ")}`])].filter(Boolean);
    return {
      stack: [
        lineTable([{ head: `${SIDE_WORDS[s.side]}, lift ${inches ? "in" : "mm"}`, width: "*" }, ...lifts.map((r) => ({ head: liftText(r.liftUm, inches, locale), width: 34, end: true })), { head: "Mean", width: 40, end: true, strong: true }], lines, { margin: [0, 12, 0, 0] }),
        { text: `${title}. ${notes.join(" ")}`, fontSize: 7.8, color: PAPER_INK.faint, margin: [0, 3, 0, 0] },
      ],
      unbreakable: true,
    };
  });
}

const bold = (text: string): Content => ({ text, bold: true, alignment: "right", font: FACE.table, fontSize: 9.5, fontFeatures: ["tnum"] });
