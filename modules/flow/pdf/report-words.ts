import { dateTimeZone, decimal } from "@/modules/kernel/format";
import { camWords, crossoverWords, lossWords, noCamWords, ratioWords } from "../components/comparison-words";
import { differenceText, flowText, liftWords } from "../components/flow-words";
import { withheldWords } from "../components/gain-words";
import { unitWords } from "../components/unit-words";
import { historyUsed, isAssessed, noiseSummary, notStatedWords } from "../domain/noise-summary";
import type { ReportSide, ReportSnapshot, ReportTest } from "../domain/report-snapshot";

export const SIDE_WORDS = { intake: "Intake", exhaust: "Exhaust" } as const;

/** What the notes on valves and seats say stands with each test already. */
const SHORT_NOTES: Readonly<Record<string, string>> = { VALVE_DIFFERS: "Other valves after than before, see below.", SEAT_DIFFERS: "Other seats after than before, see below." };

/** What the table of one side says, in words: the mean on older papers, what was lost, or why nothing is compared. */
export function toldWords({ gain, means }: ReportSide, s: ReportSnapshot): string[] {
  const unit = gain.state === "absent" ? "in" : gain.liftUnit;
  const withheld = withheldWords(gain);
  const words = withheld ? [withheld] : [];
  if (gain.comparable && s.kind < 4) {
    const cam = typeof gain.atCamLift === "string" ? "" : `; ${differenceText(gain.atCamLift.gainCfm, s.locale)} at cam lift ${liftWords(gain.atCamLift.liftUm, unit, s.locale)}`;
    words.push(`Mean ${differenceText(gain.meanGainCfm, s.locale, 2)} CFM${gain.meanPercent === null ? "" : ` (${decimal(gain.meanPercent, 2, s.locale)} %)`} over ${gain.rows.length} lifts${cam}.`);
    if (gain.losses.length > 0) words.push(`Lower after than before at ${gain.losses.map((l) => `${liftWords(l.liftUm, unit, s.locale)} (${differenceText(l.gainCfm, s.locale)})`).join(", ")}.`);
  }
  if (gain.comparable && s.kind === 4) {
    const w = unitWords("read", unit, s.locale);
    words.push(...[camWords(means, (v) => decimal(v, 0, s.locale)), lossWords(gain, w), crossoverWords(gain, w)].filter((x) => x !== null));
  }
  // Without repeats there is no verdict; that stands once under what was not tested.
  const noise = gain.comparable && isAssessed(gain.noise) ? noiseSummary(gain.noise, (um) => liftWords(um, unit, s.locale)) : null;
  if (noise) words.push(noise);
  if (gain.state !== "absent") words.push(...gain.notes.map((n) => (s.kind === 4 ? (SHORT_NOTES[n.code] ?? n.words) : n.words)));
  return words;
}

/** The session a test belongs to. */
const sessionWords = (test: ReportTest, s: ReportSnapshot): string => [
  `${dateTimeZone(test.takenAt, s)}, ${test.operator}, ${test.bench}`, `bench factor ${decimal(test.benchFactor, 3, s.locale)}`,
  test.benchCheckedAt ? `checked ${dateTimeZone(test.benchCheckedAt, s)}` : "no bench check", test.room ? `room ${test.room}` : "room not noted",
  test.repeats > 1 ? `up to ${test.repeats} readings a lift` : "one reading a lift", ...(test.isConverted ? ["converted from another test pressure"] : []),
].join("; ");

/** Repeats that do not count at lifts that do; a lift left out altogether stands under what was not tested. */
const leftOutWords = (test: ReportTest, unit: "in" | "mm", locale: string): string[] => {
  const byReason = new Map<string, string[]>();
  for (const r of (test.leftOut ?? []).filter((x) => !x.isWhole)) {
    const reason = r.reason.trim().replace(/\.$/, "");
    byReason.set(reason, [...(byReason.get(reason) ?? []), `${liftWords(r.liftUm, unit, locale)} reading ${r.repeatNo}${r.flowCfm === null ? "" : `, ${flowText(r.flowCfm, locale)}`}`]);
  }
  return [...byReason].map(([reason, readings]) => `left out: ${readings.join("; ")} (${reason})`);
};
/** What is the port's own. */
const portParts = (test: ReportTest, shared: readonly string[], unit: "in" | "mm", locale: string): string[] => [
  test.valveMm === null ? "valve not recorded" : `valve ${test.valveMm} mm`, `seats: ${test.seatNote || "not recorded"}`, ...test.conditions.filter((c) => !shared.includes(c)), ...leftOutWords(test, unit, locale),
];

/** Who read what, when and how; sides of one session share its sentence. */
export function whoWords(s: ReportSnapshot, shared: readonly string[], unit: "in" | "mm"): string[] {
  return (["before", "after"] as const).flatMap((when) => {
    const sessions = new Map<string, { name: string; parts: string[] }[]>();
    for (const side of s.sides) {
      const test = side[when];
      if (!test) continue;
      const session = sessionWords(test, s);
      sessions.set(session, [...(sessions.get(session) ?? []), { name: SIDE_WORDS[side.side], parts: portParts(test, shared, unit, s.locale) }]);
    }
    return [...sessions].map(([session, ports]) => {
      // What both sides have alike is said once.
      const common = s.kind === 4 && ports.length > 1 ? (ports[0]?.parts ?? []).filter((p) => ports.every((x) => x.parts.includes(p))) : [];
      const own = ports.flatMap(({ name, parts }) => { const rest = parts.filter((p) => !common.includes(p)); return rest.length === 0 ? [] : [`${name}: ${rest.join("; ")}.`]; });
      return `${when === "before" ? "Before" : "After"}: ${[...(common.length > 0 ? [`${session}; ${common.join("; ")}.`] : [`${session}.`]), ...own].join(" ")}`;
    });
  });
}

/** What the dotted band is, and what it leaves out; nothing on a paper without a verdict. */
export const bandWords = (s: ReportSnapshot): string[] => {
  const judged = s.sides.flatMap(({ gain }) => (gain.comparable && isAssessed(gain.noise) ? [gain.noise] : []));
  return judged.length === 0 ? [] : [`The dotted band on the curve is the measurement noise about the before test (95 %)${judged.some((n) => historyUsed(n) !== null) ? ", by bench history where a lift was read once" : ""}.`, ...new Set(judged.flatMap((n) => notStatedWords(n) ?? []))];
};

/** Why a mean over the cam is not on the paper, said once where it holds for both sides. */
export function camMissingWords(s: ReportSnapshot): string[] {
  const told = s.sides.flatMap((side) => { const words = noCamWords(side.means); return words === null ? [] : [{ side: side.side, words }]; });
  const [first] = told;
  return told.length > 1 && told.every((t) => t.words === first?.words) ? [first?.words ?? ""] : told.map((t) => `${SIDE_WORDS[t.side]}: ${t.words[0]?.toLowerCase() ?? ""}${t.words.slice(1)}`);
}

/** The ratio of the port's sides, and the report this one stands in for. */
export const ratioLine = (s: ReportSnapshot, unit: "in" | "mm"): string | null => ratioWords(s.ratios ?? [], unitWords("read", unit, s.locale));
export const replacesLine = (s: ReportSnapshot): string | null =>
  (s.replaces ? `Replaces report ${s.replaces.comparisonNo} of ${dateTimeZone(s.replaces.issuedAt, s)}: ${s.replaces.why}.` : null);
