import { saveMeasurements, setMeasurementLimit } from "@/modules/flow/commands/measurements";
import { must, type Cast } from "../cast";
import { MEASURED_AFTER, MEASURED_BEFORE, S250_LIMITS, type MeasuredHead } from "../facts/measures";
import { headOfPiece } from "./flowed";

type Rows = Parameters<typeof saveMeasurements>[1]["rows"];
const PLACES = [["intake", "left"], ["intake", "right"], ["exhaust", "left"], ["exhaust", "right"]] as const;

const rowsOf = (m: MeasuredHead): Rows => [
  ...m.valves.flatMap(([kind, unit, values]) => values.map((value, i) => { const [side, position] = PLACES[i] ?? PLACES[0]; return { cylinder: 1, side, position, kind, value, unit }; })),
  ...[...m.cylinder, ...m.head].map(([kind, unit, value]) => ({ cylinder: 1, kind, value, unit })),
];

/** The limits of the S250-4V as the shop read them in the manual. */
export async function limitsOfTheManual(cast: Cast, who: string, at: string): Promise<void> {
  for (const limit of S250_LIMITS) must(await setMeasurementLimit(cast.as(who, at), { family: "S250-4V", version: 0, ...limit }), limit.kind);
}

/** A head measured when it came apart and again on its new seats. */
export async function measured(cast: Cast, who: string, pieceId: string, days: { before: string; after: string }): Promise<void> {
  const head = await headOfPiece(cast, pieceId);
  for (const [stage, m] of [["before", MEASURED_BEFORE], ["after", MEASURED_AFTER]] as const) {
    const kept = must(await saveMeasurements(cast.as(who, days[stage]), { headId: head.id, stage, instrument: m.instrument, rows: rowsOf(m) }), `measured ${stage}`);
    const [no] = kept.refused;
    if (no) throw new Error(`${stage} ${no.key} refused: ${no.message}`);
  }
}
