import type { Content, TDocumentDefinitions } from "pdfmake/interfaces";
import { engraved, FACE, factRow, masthead, PAPER_INK, paperDefinition, paperWidth } from "@/modules/documents/paper";
import { dateTimeZone, decimal } from "@/modules/kernel/format";
import { linesOfPort } from "../components/curve-lines";
import { curveGeometry } from "../domain/curve-geometry";
import { flowMeasure } from "../domain/curve-measure";
import { historyUsed } from "../domain/noise-summary";
import { AIRFLOW_WORDS, type ReportSide, type ReportSnapshot, type ReportTest } from "../domain/report-snapshot";
import { curveContent } from "./curve-canvas";
import { isJudged, liftsOf, meansTable, readingsTable, unitOf } from "./report-tables";
import { bandWords, camMissingWords, ratioLine, replacesLine, SIDE_WORDS, toldWords, whoWords } from "./report-words";

/** Sizes of a report, points. */
export interface Density {
  readonly row: number;
  readonly table: number;
  /** Curve over the tables; beside them. */
  readonly curve: number;
  readonly curveBeside: number;
  readonly told: number;
  readonly small: number;
  readonly caution: number;
  readonly lineHeight: number;
  readonly facts: number;
  /** Between the blocks. */
  readonly gap: number;
  readonly meanPad: number;
  /** More lifts than this stand beside the curve. */
  readonly liftsUnder: number;
}

/** From roomy to close; no type under 7.5 points. A report takes the first that keeps it on one page. */
export const DENSITIES = [
  { row: 13.4, table: 9, curve: 172, curveBeside: 190, told: 8.4, small: 8.2, caution: 8.6, lineHeight: 1.1, facts: 15, gap: 8, meanPad: 0.9, liftsUnder: 10 },
  { row: 12, table: 8.6, curve: 150, curveBeside: 170, told: 8, small: 7.9, caution: 8.4, lineHeight: 1.06, facts: 12, gap: 6, meanPad: 0.5, liftsUnder: 10 },
  { row: 11, table: 8, curve: 132, curveBeside: 150, told: 7.6, small: 7.6, caution: 8, lineHeight: 1.02, facts: 9, gap: 4, meanPad: 0.2, liftsUnder: 10 },
  { row: 10.2, table: 7.6, curve: 116, curveBeside: 126, told: 7.5, small: 7.5, caution: 7.8, lineHeight: 1, facts: 7, gap: 3, meanPad: 0, liftsUnder: 10 },
  { row: 10.2, table: 7.6, curve: 116, curveBeside: 118, told: 7.5, small: 7.5, caution: 7.8, lineHeight: 1, facts: 7, gap: 2, meanPad: 0, liftsUnder: 8 },
] as const satisfies readonly Density[];

/** Points on the sheet that tables of older papers may take; rows close up when a ladder is long. */
const TABLE_HEIGHT = 330;
const ROW_MAX = 14.5;

/** A curve beside its table on older papers, points: it gives way to what is said below it. Sizes as they come out on the paper. */
function curveBeside(told: readonly string[], lifts: number): number {
  const [line, perLine, heads, row, headRow] = [12.3, 46, 45, 14, 17];
  const lines = told.reduce((n, words) => n + Math.ceil(words.length / perLine), 0);
  return Math.min(210, Math.max(136, headRow + row * lifts - heads - line * lines));
}

/** Sizes of papers issued before reports were set to one page: kept, so that those stay as they were. */
function olderDensity(s: ReportSnapshot, lifts: number): Density {
  const hasVerdict = s.sides.some((side) => isJudged(side.gain));
  // What is said of the bench's history takes a line or two more; the curve gives them.
  const hasHistory = s.sides.some(({ gain }) => gain.comparable && historyUsed(gain.noise) !== null);
  return {
    row: hasVerdict ? Math.min(ROW_MAX - 2.3, (TABLE_HEIGHT - 40) / (lifts + 1)) : Math.min(ROW_MAX, TABLE_HEIGHT / (lifts + 1)), table: 9,
    curve: hasHistory ? 146 : hasVerdict ? 170 : 190, curveBeside: s.kind === 3 ? curveBeside(s.sides.map((side) => toldWords(side, s).join(" ")), lifts) : 210,
    told: 8.4, small: 8.2, caution: 8.6, lineHeight: 1.14, facts: 18, gap: 10, meanPad: 0, liftsUnder: 10,
  };
}

/** What holds for both sides in the same words stands once, under them. */
function saidOfBoth(s: ReportSnapshot): string[] {
  const [first = [], ...others] = s.sides.map((side) => toldWords(side, s));
  return others.length === 0 ? [] : first.filter((words) => others.every((o) => o.includes(words)));
}
const sideHead = (side: ReportSide): Content => ({ text: `${SIDE_WORDS[side.side]}, CFM`, font: FACE.cut, bold: true, fontSize: 10.5, margin: [2, 0, 0, 4] });

/** The flow report of one port pair on one sheet: figures, curve, conditions, who and when, and what was not tested. */
export function flowReport(s: ReportSnapshot, asked: Density = DENSITIES[0]): TDocumentDefinitions {
  const width = paperWidth(s.locale);
  const isNew = s.kind === 4;
  const port = { cylinder: s.cylinder, intake: gainOf(s, "intake"), exhaust: gainOf(s, "exhaust") };
  const stated = [port.intake, port.exhaust].find((g) => g.state !== "absent");
  const tests = s.sides.flatMap((side) => [side.before, side.after]).filter((t): t is ReportTest => t !== null);
  const lifts = Math.max(1, liftsOf(s.sides).length);
  const d = isNew ? asked : olderDensity(s, lifts);
  // A long ladder stands beside its curve, both sides in one table; a short one under it, a table a side.
  const isLong = lifts > d.liftsUnder;
  const shared = tests.reduce<readonly string[]>((common, t, i) => (i === 0 ? t.conditions : common.filter((c) => t.conditions.includes(c))), []);
  // Sides without a comparison are drawn from their tests, so that a single test has its curve too.
  const lines = linesOfPort(port).map((line, i) => (line.before.length + line.after.length > 0 ? line : { ...line, before: s.sides[i]?.before?.readings ?? [], after: s.sides[i]?.after?.readings ?? [] }));
  const unit = unitOf(s.sides);
  // Two tests at unlike pressures stand on one drawing, but its axis is of neither.
  const pressures = new Set(tests.map((t) => t.conditions[0]));
  const measure = isNew && pressures.size > 1 ? { measure: flowMeasure("read", "pressures that differ, see below") } : {};
  const geometry = curveGeometry({
    ...measure,
    widthPx: isLong ? 216 : width, heightPx: isLong ? d.curveBeside : d.curve, unit, atInH2O: stated?.atInH2O ?? 28, camLiftUm: stated?.camLiftUm ?? null, lines, mini: isLong, paper: isNew,
    decimalText: (v, digits) => decimal(v, digits, s.locale),
  });
  const curve = geometry.ok ? curveContent(geometry.value, s.kind) : [];
  const saidBoth = isNew ? saidOfBoth(s) : [];
  const saidOf = (side: ReportSide): string => toldWords(side, s).filter((words) => !saidBoth.includes(words)).join(" ");
  const told = (words: string, top = 6): Content[] => (isNew && words === "" ? [] : [{ text: words, fontSize: d.told, margin: [2, isNew ? Math.min(top, d.gap) : top, 0, 0], lineHeight: d.lineHeight }]);
  const small = (text: string): Content => ({ text, fontSize: d.small, lineHeight: isNew ? d.lineHeight : 1.12, color: PAPER_INK.soft, margin: [0, 0, 0, isNew ? 1.5 : 2.5] });
  const looks = { rowHeight: d.row, fontSize: d.table };
  const meansOf = (side: ReportSide): Content[] => (isNew ? meansTable(side, s, { fontSize: Math.min(d.table, 8.4), pad: d.meanPad }) : []);
  const [ratio, replaces] = [isNew ? ratioLine(s, unit) : null, replacesLine(s)];
  const facts = factRow([
    { label: "For", strong: s.head.customerName ?? "The shop's own head", more: s.head.orderNumber ?? undefined },
    { label: "Head", strong: s.head.family, more: [s.head.castingNumber && `casting ${s.head.castingNumber}`, s.cylinders > 1 && `port ${s.cylinder} of ${s.cylinders}`].filter(Boolean).join(", ") },
    { label: "Issued", strong: dateTimeZone(s.issuedAt, s), more: s.issuedBy },
  ]);
  const content: Content[] = [
    ...masthead({ ...s.shop, locale: s.locale }, `Flow report ${s.comparisonNo}`, s.head.mark),
    isNew ? ({ ...(facts as object), margin: [0, d.facts, 0, 0] } as Content) : facts,
    ...(replaces === null ? [] : [{ text: replaces, fontSize: 9, bold: true, margin: [0, d.gap, 0, 0] } as Content]),
    { text: shared.length > 0 ? `Tested at ${shared.join(", ")}.` : "Conditions differ; they stand below.", fontSize: isNew ? Math.min(9.2, d.table + 0.4) : 9.2, margin: [0, d.gap, 0, 0] },
    ...(isLong ? [{ columns: [
      { width: 216, stack: [...curve, ...s.sides.flatMap((side) => [{ text: SIDE_WORDS[side.side], font: FACE.cut, bold: true, fontSize: 9.5, margin: [2, isNew ? d.gap : 8, 0, isNew ? -2 : -4] }, ...meansOf(side), ...(isNew ? [] : told(saidOf(side)))])] },
      { width: "*", stack: [readingsTable(s.sides, s, { ...looks, isWide: false })] },
    ], columnGap: 16, margin: [0, 6, 0, 0] } as Content, ...(isNew ? s.sides.flatMap((side) => { const words = saidOf(side); return words === "" ? [] : told(`${SIDE_WORDS[side.side]}: ${words}`, 3); }) : [])] : [
      { stack: curve, margin: [0, isNew ? 4 : 0, 0, isNew ? 0 : -20] } as Content,
      { columns: s.sides.map((side): Content => ({ stack: [sideHead(side), ...(liftsOf([side]).length > 0 ? [readingsTable([side], s, { ...looks, isWide: true })] : isNew ? [] : told("Not tested.")), ...meansOf(side), ...told(saidOf(side))] })), columnGap: 22, margin: [0, 4, 0, 0] } as Content,
    ]),
    ...(saidBoth.length === 0 ? [] : told(`Both sides: ${saidBoth.join(" ")}`, 3)),
    ...(ratio === null ? [] : [{ text: ratio, fontSize: d.told, bold: true, margin: [2, d.gap, 0, 0] } as Content]),
    ...(s.customerWords ? [{ text: s.customerWords, margin: [0, isNew ? d.gap : 8, 0, 0], ...(isNew ? { fontSize: Math.min(9.5, d.table + 0.6) } : {}) } as Content] : []),
    { stack: [
      engraved("Who, when, how", { margin: [0, d.gap, 0, isNew ? 2 : 3] }),
      ...whoWords(s, shared, unit).map(small),
      engraved("What was not tested", { margin: [0, isNew ? Math.min(6, d.gap) : 6, 0, isNew ? 2 : 3] }), small([...s.notTested, ...(isNew ? camMissingWords(s) : []), ...bandWords(s)].join(" ")),
      { text: AIRFLOW_WORDS, fontSize: d.caution, bold: true, margin: [0, isNew ? Math.min(5, d.gap) : 6, 0, 0] },
    ] },
  ];
  return paperDefinition({ shop: { ...s.shop, locale: s.locale }, title: `Flow report ${s.head.mark} ${s.comparisonNo}`, content, foot: `${s.shop.name}  ${s.head.mark} flow report ${s.comparisonNo}` });
}

function gainOf(s: ReportSnapshot, side: "intake" | "exhaust"): ReportSide["gain"] {
  return s.sides.find((x) => x.side === side)?.gain ?? { state: "absent", comparable: false, side, absent: "both" };
}
