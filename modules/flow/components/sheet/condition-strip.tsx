import type { ReactNode } from "react";
import { decimal } from "@/modules/kernel/format";
import type { RawTest } from "../../domain/raw-test";
import { headDiametersMm, type ValveOfFamily } from "../../domain/valve-list";
import { liftWords } from "../flow-words";
import type { SheetFigures } from "./sheet-figures";

const newest = (f: SheetFigures, i: 0 | 1): RawTest | null => (f.sides[i]?.after ?? f.sides[i]?.before)?.test ?? null;

/** Depression, bore, air, valves and cam of the tests in hand; valves as the family lists them where the test states none. */
export function ConditionStrip({ figures, valves, locale, change }: { figures: SheetFigures; valves: readonly ValveOfFamily[]; locale: string; change?: ReactNode }) {
  const intake = newest(figures, 0);
  const exhaust = newest(figures, 1);
  const test = intake ?? exhaust;
  if (!test) return null;
  const both = (of: (t: RawTest) => string | null) => [intake && of(intake), exhaust && of(exhaust)].map((v) => v ?? "–").join(" / ");
  const mm = (v: number) => decimal(v, Number.isInteger(v) ? 0 : 1, locale);
  const camOf = (t: RawTest | null) => (t === null || t.camLiftUm === null ? null : `${liftWords(t.camLiftUm, t.liftUnit, locale)} ${t.liftUnit}`);
  const [camIn, camEx] = [camOf(intake), camOf(exhaust)];
  const cam = camIn !== null && camIn === camEx ? `${camIn}, both sides` : [camIn && `intake ${camIn}`, camEx && `exhaust ${camEx}`].filter(Boolean).join(", ") || "not noted";
  const cells: [string, ReactNode][] = [
    ["Depression", intake && exhaust && intake.nominalInH2O !== exhaust.nominalInH2O ? `${both((t) => decimal(t.nominalInH2O, 1, locale))} in H₂O` : `${decimal(test.nominalInH2O, 1, locale)} in H₂O`],
    ["Bore adapter", test.fixture.name.includes(String(test.fixture.boreMm)) ? `${test.fixture.name} mm` : `${test.fixture.name}, ${mm(test.fixture.boreMm)} mm`],
    ["Air", [test.roomTemperatureText, test.roomPressureText].filter(Boolean).join(", ") || "not noted"],
    ["Valves, mm", both((t) => (t.valveMm === null ? headDiametersMm(valves, t.side).map(mm).join("+") || null : mm(t.valveMm)))],
    ["Cam lift at valve", cam],
  ];
  return (
    <div className="set">
      {cells.map(([label, value], i) => (
        <div key={label}>
          <span className="eng">{label}</span>
          <b>{value}</b>
          {i === cells.length - 1 && change ? <span className="set-c">{change}</span> : null}
        </div>
      ))}
    </div>
  );
}
