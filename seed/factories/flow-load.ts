import { randomUUID } from "node:crypto";
import { sql } from "drizzle-orm";
import { benches, fixtures, flowTests, flowTestSummaries, heads } from "@/db/schema";
import { withShop, type Tx } from "@/db/scope";
import { FLOW_CONSTANTS_VERSION, summaryOfTest } from "@/modules/flow/domain/test-summary";
import type { RawTest } from "@/modules/flow/domain/raw-test";
import { steadyNumbers } from "./steady-numbers";

export interface FlowLoad { tests: number; heads: number; readings: number; families: readonly string[]; aTest: string; sameFamilyTests: readonly [string, string] }

const SIDES = ["intake", "exhaust"] as const;
const PURPOSES = ["baseline", "after"] as const;
const WORK = ["epoxy", "weld", "valve size", "seat", "port shape"] as const;
const HEADS_AT_ONCE = 100;

/** Flow of an invented port: rises with lift and levels off. */
const flowAt = (liftMm: number, top: number): number => Math.round(top * (1 - Math.exp(-liftMm / 4.2)) * 10) / 10;

/**
 * Puts `tests` finished tests of `lifts` lifts into a shop, four to a head (both sides, before and after), over a few families
 * and years, with their raw readings and summaries. For measuring only; every figure is invented.
 */
export async function loadFlow(shopId: string, options: { operatorId: string; tests: number; lifts?: number; now: Date; mark?: string; families?: number }): Promise<FlowLoad> {
  const { operatorId, tests, lifts = 24, now, mark = "L", families = 8 } = options;
  const names = Array.from({ length: families }, (_, i) => `Load family ${mark}${i + 1}`);
  const next = steadyNumbers(tests * 31 + lifts);
  const [benchId, fixtureId] = [randomUUID(), randomUUID()];
  await withShop(shopId, async (tx) => {
    await tx.insert(benches).values({ shopId, id: benchId, name: `Load bench ${mark}` });
    await tx.insert(fixtures).values({ shopId, id: fixtureId, name: `Load fixture ${mark}`, boreMm: 77 });
  });
  const ladder = Array.from({ length: lifts }, (_, i) => ({ liftUm: (i + 1) * 500, text: ((i + 1) / 2).toFixed(2) }));
  const headCount = Math.ceil(tests / 4);
  const made: { id: string; family: string; side: string; purpose: string }[] = [];
  for (let from = 0; from < headCount; from += HEADS_AT_ONCE) {
    await withShop(shopId, async (tx) => {
      const batch: Batch = { heads: [], tests: [], readings: [], summaries: [] };
      for (let h = from; h < Math.min(headCount, from + HEADS_AT_ONCE); h++) {
        const headId = randomUUID();
        const family = names[h % names.length] ?? "";
        batch.heads.push({
          shopId, id: headId, mark: `${mark}-${String(h + 1).padStart(5, "0")}`, family, ownerKind: h % 7 === 0 ? "development" : "customer", camLiftIntakeUm: 8600, camLiftExhaustUm: 8200,
          workDone: WORK.filter((_, i) => (h >> i) % 2 === 1),
        });
        // The oldest came in about six years ago.
        const day = new Date(now.getTime() - (headCount - h) * (2_190 / headCount) * 86_400_000);
        for (const purpose of PURPOSES) for (const side of SIDES) {
          if (made.length >= tests) continue;
          const id = randomUUID();
          const startedAt = new Date(day.getTime() + (purpose === "after" ? 12 : 0) * 86_400_000 + (side === "exhaust" ? 1_200_000 : 0));
          const top = (side === "intake" ? 130 : 96) * (0.94 + next() * 0.12) * (purpose === "after" ? 1.05 + next() * 0.08 : 1);
          const cells = ladder.map((l) => ({ ...l, valueText: flowAt(l.liftUm / 1000, top).toFixed(1) }));
          const camLiftUm = side === "intake" ? 8600 : 8200;
          const checkedAt = new Date(startedAt.getTime() - 3_600_000);
          batch.tests.push({
            shopId, id, headId, side, purpose, benchId, benchFactor: 1, benchCheckedAt: checkedAt, fixtureId, nominalPressureInH2O: 28, camLiftUm, lifts: ladder, liftUnit: "mm",
            entry: side === "intake" ? "radius" : "none", valveMm: side === "intake" ? 30 + (h % 4) * 0.5 : 26, seatNote: h % 3 === 0 ? "three angles" : "five angles", operatorId, startedAt, completedAt: startedAt, state: "complete",
          });
          for (const c of cells) batch.readings.push({ id: randomUUID(), test_id: id, lift_um: c.liftUm, lift_text: c.text, value_text: c.valueText, taken_at: startedAt.toISOString() });
          const s = summaryOfTest(rawOf(id, side, purpose, cells, camLiftUm, startedAt, { benchId, fixtureId, operatorId, ladder }));
          batch.summaries.push({
            shopId, testId: id, headId, benchId, family, side, purpose, startedAt, atInH2O: 28, liftsUm: [...s.liftsUm], flowsCfm: [...s.flowsCfm], peakCfm: s.peakCfm, peakLiftUm: s.peakLiftUm,
            meanToCamCfm: s.meanToCamCfm, doubts: s.doubts, isConverted: s.isConverted, repeatSquaresCfm2: s.repeats.squaresCfm2, repeatDof: s.repeats.dof, constantsVersion: FLOW_CONSTANTS_VERSION, madeAt: startedAt,
          });
          made.push({ id, family, side, purpose });
        }
      }
      await write(tx, shopId, operatorId, batch);
    });
  }
  const [one] = made;
  const same = made.filter((m) => m.family === one?.family && m.side === one.side && m.purpose === "after");
  if (!one) throw new RangeError("at least one test");
  return { tests: made.length, heads: headCount, readings: made.length * lifts, families: names, aTest: one.id, sameFamilyTests: [same[0]?.id ?? one.id, same[1]?.id ?? one.id] };
}

interface Batch {
  heads: (typeof heads.$inferInsert)[];
  tests: (typeof flowTests.$inferInsert)[];
  readings: { id: string; test_id: string; lift_um: number; lift_text: string; value_text: string; taken_at: string }[];
  summaries: (typeof flowTestSummaries.$inferInsert)[];
}

async function write(tx: Tx, shopId: string, personId: string, batch: Batch): Promise<void> {
  if (batch.heads.length > 0) await tx.insert(heads).values(batch.heads);
  if (batch.tests.length === 0) return;
  await tx.insert(flowTests).values(batch.tests);
  await tx.insert(flowTestSummaries).values(batch.summaries);
  await tx.execute(sql`insert into flow_readings (shop_id, id, test_id, lift_um, lift_text, lift_unit, repeat_no, revision, value_text, value_unit, pressure_text, pressure_unit, taken_at, person_id, source)
    select ${shopId}::uuid, r.id, r.test_id, r.lift_um, r.lift_text, 'mm', 1, 1, r.value_text, 'cfm', '28.0', 'inH2O', r.taken_at, ${personId}::uuid, 'typed'
    from jsonb_to_recordset(${JSON.stringify(batch.readings)}::jsonb) as r(id uuid, test_id uuid, lift_um int, lift_text text, value_text text, taken_at timestamptz)`);
}

function rawOf(id: string, side: RawTest["side"], purpose: RawTest["purpose"], cells: readonly { liftUm: number; valueText: string }[], camLiftUm: number, startedAt: Date, at: { benchId: string; fixtureId: string; operatorId: string; ladder: RawTest["lifts"] }): RawTest {
  const iso = startedAt.toISOString();
  return {
    id, side, purpose, runNo: 1, state: "complete", version: 1, bench: { id: at.benchId, name: "Load bench", scale: "direct", ranges: [], waterUnit: "conventional" }, benchFactor: 1, benchCheckedAt: iso,
    fixture: { id: at.fixtureId, name: "Load fixture", boreMm: 77 }, nominalInH2O: 28, lifts: at.ladder, liftUnit: "mm", camLiftUm, entry: side === "intake" ? "radius" : "none", valvesOpen: "all",
    valveMm: null, seatNote: "", plugClosed: true, testSprings: true, warmUpMinutes: null, roomTemperatureText: "", roomPressureText: "", roomHumidityText: "", leakText: "", leakPressureText: "", notes: "",
    operator: { id: at.operatorId, name: "Load" }, startedAt: iso, completedAt: iso, correctsTestId: null, voidReason: null,
    cells: cells.map((c) => ({ liftUm: c.liftUm, repeatNo: 1, revision: 1, valueText: c.valueText, valueUnit: "cfm", rangeLabel: null, pressureText: "28.0", pressureUnit: "inH2O", acceptedReason: null, excludedReason: null, takenAt: iso })),
  };
}
