import type { Content, ContentTable, TableCell, TDocumentDefinitions } from "pdfmake/interfaces";
import { engraved, FACE, factRow, masthead, PAPER_INK, paperDefinition, paperWidth } from "@/modules/documents/paper";
import { dateTimeZone, decimal } from "@/modules/kernel/format";
import { linesOfPort } from "../components/curve-lines";
import { differenceText, flowText, liftWords } from "../components/flow-words";
import { withheldWords } from "../components/gain-words";
import { historyUsed, isAssessed, noiseSummary, notStatedWords } from "../domain/noise-summary";
import { curveGeometry } from "../domain/curve-geometry";
import { AIRFLOW_WORDS, type ReportSide, type ReportSnapshot, type ReportTest } from "../domain/report-snapshot";
import { curveContent } from "./curve-canvas";

const SIDE_WORDS = { intake: "Intake", exhaust: "Exhaust" } as const;
/** Points on the sheet that tables may take; rows close up when a ladder is long. */
const TABLE_HEIGHT = 330;
const ROW_MAX = 14.5;
/** More lifts than this stand beside the curve. */
const LIFTS_UNDER = 10;

/** A curve beside its table, points: it gives way to what is said below it, so that both columns end together. Sizes as they come out on the paper. */
function curveBeside(told: readonly string[], lifts: number): number {
  const [line, perLine, heads, row, headRow] = [12.3, 46, 45, 14, 17];
  const lines = told.reduce((n, words) => n + Math.ceil(words.length / perLine), 0);
  return Math.min(210, Math.max(136, headRow + row * lifts - heads - line * lines));
}

const number = (text: string, more: object = {}): TableCell => ({ text, font: FACE.table, fontSize: 9, alignment: "right", fontFeatures: ["tnum"], ...more });

const unitOf = (sides: readonly ReportSide[]): "in" | "mm" => sides.map((x) => x.gain).find((g) => g.state !== "absent")?.liftUnit ?? "in";
const liftsOf = (sides: readonly ReportSide[]): number[] => [...new Set(sides.flatMap((x) => [...(x.before?.readings ?? []), ...(x.after?.readings ?? [])]).map((r) => r.liftUm))].sort((a, b) => a - b);

const isJudged = (gain: ReportSide["gain"]): boolean => gain.comparable && isAssessed(gain.noise);
const uncertaintyAt = (gain: ReportSide["gain"], um: number, locale: string): string => {
  const expanded = gain.comparable ? gain.noise?.rows.find((r) => r.liftUm === um)?.expandedCfm : undefined;
  return expanded === undefined || expanded === null ? "" : `±${decimal(expanded, 1, locale)}`;
};

/** Lift and, for each side, before, after and, only where the two may be compared, the difference. */
function readingsTable(sides: readonly ReportSide[], s: ReportSnapshot, rowHeight: number, isWide: boolean): Content {
  const unit = unitOf(sides);
  const at = (test: ReportTest | null, um: number): string => { const r = test?.readings.find((x) => x.liftUm === um); return r ? flowText(r.flowCfm, s.locale) : ""; };
  const heads = [`Lift, ${unit}`, ...sides.flatMap(({ side, gain }) => [isWide ? "Before" : `${side === "intake" ? "In" : "Ex"} before`, "After", ...(gain.comparable ? ["Gain", ...(isWide ? ["%", ...(isJudged(gain) ? ["U, 95 %"] : [])] : [])] : [])])];
  const cellsOf = ({ before, after, gain }: ReportSide, um: number): TableCell[] => {
    const row = gain.comparable ? gain.rows.find((r) => r.liftUm === um) : undefined;
    return [
      number(at(before, um)), number(at(after, um)),
      ...(gain.comparable ? [
        number(row ? `${row.gainCfm < 0 ? "loss " : ""}${differenceText(row.gainCfm, s.locale)}` : "", { bold: true }),
        ...(isWide ? [number(row === undefined || row.gainPercent === null ? "" : decimal(row.gainPercent, 1, s.locale), { color: PAPER_INK.soft }), ...(isJudged(gain) ? [number(uncertaintyAt(gain, um, s.locale), { color: PAPER_INK.soft })] : [])] : []),
      ] : []),
    ];
  };
  const body: TableCell[][] = [
    heads.map((h, i) => ({ ...(engraved(h, isWide ? {} : { fontSize: 6.4, characterSpacing: 0.3 }) as object), alignment: i === 0 ? "left" : "right" } as TableCell)),
    ...liftsOf(sides).map((um): TableCell[] => [{ text: liftWords(um, unit, s.locale), font: FACE.table, fontSize: 9, color: PAPER_INK.soft }, ...sides.flatMap((side) => cellsOf(side, um))]),
  ];
  const pad = Math.max(0.6, (rowHeight - 10.6) / 2);
  return {
    table: { headerRows: 1, widths: [40, ...heads.slice(1).map((h) => (h === "%" ? 30 : h === "U, 95 %" ? 38 : ("*" as const)))], body },
    layout: {
      hLineWidth: (i) => (i === 0 ? 0 : i === 1 ? 0.9 : 0.5), vLineWidth: () => 0, hLineColor: (i) => (i === 1 ? PAPER_INK.ink : PAPER_INK.line),
      paddingLeft: () => 2, paddingRight: () => 2, paddingTop: () => pad, paddingBottom: () => pad,
    },
  } satisfies ContentTable;
}

/** What the table of one side says, in words: the mean, what was lost, or why nothing is compared. */
function toldWords({ gain }: ReportSide, s: ReportSnapshot): string {
  const unit = gain.state === "absent" ? "in" : gain.liftUnit;
  const withheld = withheldWords(gain);
  const words = withheld ? [withheld] : [];
  if (gain.comparable) {
    const cam = typeof gain.atCamLift === "string" ? "" : `; ${differenceText(gain.atCamLift.gainCfm, s.locale)} at cam lift ${liftWords(gain.atCamLift.liftUm, unit, s.locale)}`;
    words.push(`Mean ${differenceText(gain.meanGainCfm, s.locale, 2)} CFM${gain.meanPercent === null ? "" : ` (${decimal(gain.meanPercent, 2, s.locale)} %)`} over ${gain.rows.length} lifts${cam}.`);
    if (gain.losses.length > 0) words.push(`Lower after than before at ${gain.losses.map((l) => `${liftWords(l.liftUm, unit, s.locale)} (${differenceText(l.gainCfm, s.locale)})`).join(", ")}.`);
  }
  // Without repeats there is no verdict; that stands once under what was not tested.
  const noise = gain.comparable && isAssessed(gain.noise) ? noiseSummary(gain.noise, (um) => liftWords(um, unit, s.locale)) : null;
  if (noise) words.push(noise);
  if (gain.state !== "absent") words.push(...gain.notes.map((n) => n.words));
  return words.join(" ");
}
const told = (words: string): Content => ({ text: words, fontSize: 8.4, margin: [2, 6, 0, 0], lineHeight: 1.14 });
const sideHead = (side: ReportSide): Content => ({ text: `${SIDE_WORDS[side.side]}, CFM`, font: FACE.cut, bold: true, fontSize: 10.5, margin: [2, 0, 0, 4] });

/** The session a test belongs to. */
const sessionWords = (test: ReportTest, s: ReportSnapshot): string => [
  `${dateTimeZone(test.takenAt, s)}, ${test.operator}, ${test.bench}`, `bench factor ${decimal(test.benchFactor, 3, s.locale)}`,
  test.benchCheckedAt ? `checked ${dateTimeZone(test.benchCheckedAt, s)}` : "no bench check", test.room ? `room ${test.room}` : "room not noted",
  test.repeats > 1 ? `up to ${test.repeats} readings a lift` : "one reading a lift", ...(test.isConverted ? ["converted from another test pressure"] : []),
].join("; ");
/** What is the port's own. */
const portWords = (test: ReportTest, shared: readonly string[]): string => [
  test.valveMm === null ? "valve not recorded" : `valve ${test.valveMm} mm`, `seats: ${test.seatNote || "not recorded"}`, ...test.conditions.filter((c) => !shared.includes(c)),
].join("; ");

/** Who read what, when and how; sides of one session share its sentence. */
function whoWords(s: ReportSnapshot, shared: readonly string[]): string[] {
  return (["before", "after"] as const).flatMap((when) => {
    const sessions = new Map<string, string[]>();
    for (const side of s.sides) {
      const test = side[when];
      if (!test) continue;
      const session = sessionWords(test, s);
      sessions.set(session, [...(sessions.get(session) ?? []), `${SIDE_WORDS[side.side]}: ${portWords(test, shared)}.`]);
    }
    return [...sessions].map(([session, ports]) => `${when === "before" ? "Before" : "After"}: ${session}. ${ports.join(" ")}`);
  });
}

/** What the dotted band is, and what it leaves out; nothing on a paper without a verdict. */
const bandWords = (s: ReportSnapshot): string[] => {
  const judged = s.sides.flatMap(({ gain }) => (gain.comparable && isAssessed(gain.noise) ? [gain.noise] : []));
  return judged.length === 0 ? [] : [`The dotted band on the curve is the measurement noise about the before test (95 %)${judged.some((n) => historyUsed(n) !== null) ? ", by bench history where a lift was read once" : ""}.`, ...new Set(judged.flatMap((n) => notStatedWords(n) ?? []))];
};

const small = (text: string): Content => ({ text, fontSize: 8.2, lineHeight: 1.12, color: PAPER_INK.soft, margin: [0, 0, 0, 2.5] });

/** The flow report of one port pair on one sheet: figures, curve, conditions, who and when, and what was not tested. */
export function flowReport(s: ReportSnapshot): TDocumentDefinitions {
  const width = paperWidth(s.locale);
  const port = { cylinder: s.cylinder, intake: gainOf(s, "intake"), exhaust: gainOf(s, "exhaust") };
  const stated = [port.intake, port.exhaust].find((g) => g.state !== "absent");
  const tests = s.sides.flatMap((side) => [side.before, side.after]).filter((t): t is ReportTest => t !== null);
  const lifts = Math.max(1, liftsOf(s.sides).length);
  // A long ladder stands beside its curve, both sides in one table; a short one under it, a table a side.
  const isLong = lifts > LIFTS_UNDER;
  const hasVerdict = s.sides.some((side) => isJudged(side.gain));
  // What is said of the bench's history takes a line or two more; the curve gives them. Older papers keep their sizes.
  const hasHistory = s.sides.some(({ gain }) => gain.comparable && historyUsed(gain.noise) !== null);
  const rowHeight = hasVerdict ? Math.min(ROW_MAX - 2.3, (TABLE_HEIGHT - 40) / (lifts + 1)) : Math.min(ROW_MAX, TABLE_HEIGHT / (lifts + 1));
  const shared = tests.reduce<readonly string[]>((common, t, i) => (i === 0 ? t.conditions : common.filter((c) => t.conditions.includes(c))), []);
  // Sides without a comparison are drawn from their tests, so that a single test has its curve too.
  const lines = linesOfPort(port).map((line, i) => (line.before.length + line.after.length > 0 ? line : { ...line, before: s.sides[i]?.before?.readings ?? [], after: s.sides[i]?.after?.readings ?? [] }));
  const unit = unitOf(s.sides);
  const geometry = curveGeometry({
    widthPx: isLong ? 216 : width, heightPx: isLong ? (s.kind === 3 ? curveBeside(s.sides.map((side) => toldWords(side, s)), lifts) : 210) : hasHistory ? 146 : hasVerdict ? 170 : 190, unit, atInH2O: stated?.atInH2O ?? 28, camLiftUm: stated?.camLiftUm ?? null, lines, mini: isLong,
    decimalText: (v, d) => decimal(v, d, s.locale),
  });
  const curve = geometry.ok ? curveContent(geometry.value, s.kind) : [];
  const content: Content[] = [
    ...masthead({ ...s.shop, locale: s.locale }, `Flow report ${s.comparisonNo}`, s.head.mark),
    factRow([
      { label: "For", strong: s.head.customerName ?? "The shop's own head", more: s.head.orderNumber ?? undefined },
      { label: "Head", strong: s.head.family, more: [s.head.castingNumber && `casting ${s.head.castingNumber}`, s.cylinders > 1 && `port ${s.cylinder} of ${s.cylinders}`].filter(Boolean).join(", ") },
      { label: "Issued", strong: dateTimeZone(s.issuedAt, s), more: s.issuedBy },
    ]),
    { text: shared.length > 0 ? `Tested at ${shared.join(", ")}.` : "Conditions differ; they stand below.", fontSize: 9.2, margin: [0, 10, 0, 0] },
    ...(isLong ? [{ columns: [
      { width: 216, stack: [...curve, ...s.sides.flatMap((side) => [{ text: SIDE_WORDS[side.side], font: FACE.cut, bold: true, fontSize: 9.5, margin: [2, 8, 0, -4] }, told(toldWords(side, s))])] },
      { width: "*", stack: [readingsTable(s.sides, s, rowHeight, false)] },
    ], columnGap: 16, margin: [0, 6, 0, 0] } as Content] : [
      { stack: curve, margin: [0, 0, 0, -20] } as Content,
      { columns: s.sides.map((side): Content => ({ stack: [sideHead(side), liftsOf([side]).length > 0 ? readingsTable([side], s, rowHeight, true) : told("Not tested."), told(toldWords(side, s))] })), columnGap: 22, margin: [0, 4, 0, 0] } as Content,
    ]),
    ...(s.customerWords ? [{ text: s.customerWords, margin: [0, 8, 0, 0] } as Content] : []),
    { stack: [
      engraved("Who, when, how", { margin: [0, 10, 0, 3] }),
      ...whoWords(s, shared).map(small),
      engraved("What was not tested", { margin: [0, 6, 0, 3] }), small([...s.notTested, ...bandWords(s)].join(" ")),
      { text: AIRFLOW_WORDS, fontSize: 8.6, bold: true, margin: [0, 6, 0, 0] },
    ] },
  ];
  return paperDefinition({ shop: { ...s.shop, locale: s.locale }, title: `Flow report ${s.head.mark} ${s.comparisonNo}`, content, foot: `${s.shop.name}  ${s.head.mark} flow report ${s.comparisonNo}` });
}

function gainOf(s: ReportSnapshot, side: "intake" | "exhaust"): ReportSide["gain"] {
  return s.sides.find((x) => x.side === side)?.gain ?? { state: "absent", comparable: false, side, absent: "both" };
}
