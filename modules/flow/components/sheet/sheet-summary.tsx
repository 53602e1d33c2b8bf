import { decimal } from "@/modules/kernel/format";
import { shortWords } from "../comparison-words";
import { differenceText, liftWords } from "../flow-words";
import { unitWords } from "../unit-words";
import { exhaustToIntake, type SheetFigures, type SheetSide } from "./sheet-figures";

/** `+9.45` of a side that may be compared; null otherwise. */
export const meanText = (side: SheetSide | undefined, locale: string): string | null => (side?.gain?.comparable ? differenceText(side.gain.meanGainCfm, locale, 2) : null);

const WITHHELD = { comparable: "", withheld: "withheld", absent: "" } as const;

export function SheetSummary({ figures, locale }: { figures: SheetFigures; locale: string }) {
  const [intake, exhaust] = figures.sides;
  const ratio = exhaustToIntake(figures);
  const unit = (figures.sides[0]?.before ?? figures.sides[1]?.before)?.test.liftUnit ?? "in";
  const columns = figures.sides.flatMap((s) => (s.after ? [s.after] : s.before ? [s.before] : []));
  const read = columns.reduce((n, c) => n + c.figures.readings.length, 0);
  const planned = columns.reduce((n, c) => n + new Set([...c.test.lifts.map((l) => l.liftUm), ...c.figures.readings.map((r) => r.liftUm)]).size, 0);
  const mean = (side: SheetSide | undefined, name: string): [string, string] => [meanText(side, locale) ?? "–", `Mean ${name}${side?.gain && WITHHELD[side.gain.state] ? `, ${WITHHELD[side.gain.state]}` : ""}`];
  const cells: [string, string][] = [
    mean(intake, "intake"), mean(exhaust, "exhaust"),
    [ratio ? `${decimal(ratio.percent, 0, locale)} %` : "–", ratio ? `Ex to in, ${liftWords(ratio.liftUm, unit, locale)}` : "Ex to in"],
    [`${read} of ${planned}`, "Lifts read"],
  ];
  const more = shortWords(figures.sides.map((s) => s.gain), (gain) => unitWords("read", gain.liftUnit, locale));
  return (
    <>
      {more === null ? null : <p className="hint">{more}</p>}
      <div className="sumr">{cells.map(([value, label]) => <div key={label}><span className="num n-m">{value}</span><span className="unit">{label}</span></div>)}</div>
    </>
  );
}
