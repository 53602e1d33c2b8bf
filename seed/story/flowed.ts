import { and, eq } from "drizzle-orm";
import { heads } from "@/db/schema";
import { withShop } from "@/db/scope";
import { changeHeadWork } from "@/modules/flow/commands/families";
import { recordBenchCheck } from "@/modules/flow/commands/gear";
import { postWholeTest } from "@/modules/flow/commands/post-test";
import { must, type Cast } from "../cast";
import type { BenchStory } from "../facts/bench-stories";
import { flowFamily } from "../facts/flow-families";
import { OLDER_RANGES } from "../facts/gear";
import { portReadings, type Reading } from "./bench-curves";
import type { BenchRoom } from "./gear";

/** A head on the bench: by its tag, or a casting of the shop's own by its id. */
type OnBench = { readonly tag: string } | { readonly headId: string };
export interface Pass { readonly purpose: "baseline" | "interim" | "after"; /** How much of the gain the work has brought. */ readonly share: number }

const NOMINAL = 28;
const FITTED_FROM = 0.7;

/** The reading as the bench shows it: the bench's factor, the leak and the pressure held are in it, as they are in life. */
function shown(r: Reading, at: { factor: number; leak: number; held: number; byRange: boolean }) {
  const raw = (r.flowCfm * Math.sqrt(at.held / NOMINAL)) / at.factor + at.leak;
  const cell = { lift: r.lift, repeatNo: r.repeatNo, ...(at.held === NOMINAL ? {} : { pressure: at.held.toFixed(1) }) };
  if (!at.byRange) return { ...cell, value: raw.toFixed(1) };
  const range = OLDER_RANGES.find((x) => raw <= x.fullScaleCfm * 0.96);
  if (!range) throw new Error(`${raw.toFixed(1)} CFM is beyond the range bench`);
  return { ...cell, range: range.label, value: ((raw / range.fullScaleCfm) * 100).toFixed(1) };
}

/** One pass over every port of a head, both sides, after a look at the bench. */
export async function flowHead(cast: Cast, room: BenchRoom, who: string, at: string, head: OnBench, pass: Pass, story: BenchStory, salt: number): Promise<void> {
  const family = flowFamily(story.family);
  const byRange = story.bench === "older";
  const benchId = byRange ? room.olderBenchId : room.benchId;
  const before = pass.purpose === "baseline";
  const fixtureMm = (before ? undefined : story.fixtureAfterMm) ?? family.fixtureMm;
  const { factor } = must(await recordBenchCheck(cast.as(who, at), { benchId, isFine: true }), "bench check");
  const held = before && story.heldBefore ? Number(story.heldBefore) : NOMINAL;
  // Valves and seats are fitted late: a rough pass in between still runs on the old ones.
  const fitted = pass.share < FITTED_FROM ? 0 : 1;
  const leak = story.leak[fitted];
  for (let cylinder = 1; cylinder <= family.cylinders; cylinder++) {
    for (const side of ["intake", "exhaust"] as const) {
      const valve = (fitted === 0 ? undefined : story.valveAfter[side]) ?? family[side].headMm;
      must(await postWholeTest(cast.as(who, at), {
        ...head, cylinder, side, purpose: pass.purpose, benchId, fixtureId: room.fixtures.get(fixtureMm) ?? "", nominal: String(NOMINAL), camLift: family[side].camLift, complete: true, liftUnit: "in",
        entry: side === "exhaust" ? "none" : before && story.clayBefore ? "clay" : "radius", liftDeviceId: room.liftDeviceId, camshaftId: story.family === "S250-4V" && side === "intake" ? room.camshaftId : "", valve: String(valve), seatNote: story.seats[fitted], warmUpMinutes: 20, leak, leakPressure: leak && String(NOMINAL), leakScalingAgreed: held !== NOMINAL,
        roomTemperature: `${66 + (salt % 7)} F`, roomPressure: `${(24.7 + (salt % 5) / 10).toFixed(1)} inHg`,
        readings: portReadings(family, side, story, pass.share, { salt, cylinder }).map((r) => shown(r, { factor, leak: Number(leak), held, byRange })),
      }), `flow ${pass.purpose} ${side} ${cylinder} of job ${salt}`);
    }
  }
}

/** The bench's record of a piece. */
export async function headOfPiece(cast: Cast, pieceId: string): Promise<{ id: string; version: number }> {
  const [row] = await withShop(cast.shop.id, (tx) => tx.select({ id: heads.id, version: heads.version }).from(heads).where(and(eq(heads.shopId, cast.shop.id), eq(heads.pieceId, pieceId))));
  if (!row) throw new Error("the piece was not booked in");
  return row;
}

/** Writes on a head what was done to it, as the library looks for it. */
export async function noteWork(cast: Cast, who: string, at: string, pieceId: string, story: Pick<BenchStory, "work" | "words">): Promise<void> {
  const head = await headOfPiece(cast, pieceId);
  must(await changeHeadWork(cast.as(who, at), { ...head, workDone: [...story.work], notes: story.words }), "work done");
}
