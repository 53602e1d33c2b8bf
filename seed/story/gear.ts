import { addCamshaft } from "@/modules/flow/commands/families";
import { addBench, addFamily, addFixture, recordBenchCheck } from "@/modules/flow/commands/gear";
import { addCheckPlate, addLiftDevice } from "@/modules/flow/commands/gear-set-up";
import { addDays } from "@/modules/kernel/instant";
import { must, type Cast } from "../cast";
import { FLOW_FAMILIES } from "../facts/flow-families";
import { BENCH_1_CHECKS, CAMSHAFTS, CHECK_PLATES, FIXTURES, LIFT_DEVICES, OLDER_BENCH_CHECKS, OLDER_RANGES } from "../facts/gear";

export interface BenchRoom {
  readonly benchId: string;
  readonly olderBenchId: string;
  /** Fixture by its bore, mm. */
  readonly fixtures: ReadonlyMap<number, string>;
  readonly liftDeviceId: string;
  /** Of the S250-4V family, intake; its lift is tabled. */
  readonly camshaftId: string;
}

/** The bench room as it is used: benches, plates with their checks by date, fixtures, lift devices, camshafts. */
export async function benchRoom(cast: Cast, who: string, at: string, today: string): Promise<BenchRoom> {
  const ctx = cast.as(who, at);
  const bench = must(await addBench(ctx, { name: "Bench 1", maxFlowCfm: 400, nominalPressuresInH2O: [28, 10], pressureUncertaintyInH2O: 0.1, readingUncertaintyCfm: 0.2, altitudeM: 1540 }));
  const older = must(await addBench(ctx, {
    name: "Range bench", scale: "percent_linear", ranges: [...OLDER_RANGES], maxFlowCfm: 320, nominalPressuresInH2O: [28, 10], pressureUncertaintyInH2O: 0.2, readingUncertaintyCfm: 0.5, altitudeM: 1540,
  }));
  const fixtures = new Map<number, string>();
  for (const f of FIXTURES) fixtures.set(Number(f.boreMm), must(await addFixture(ctx, f)).id);
  for (const { dueInDays, ...plate } of CHECK_PLATES) must(await addCheckPlate(ctx, { ...plate, atPressure: "28", dueOn: addDays(today, dueInDays) }), plate.serial);
  const devices: string[] = [];
  for (const device of LIFT_DEVICES) devices.push(must(await addLiftDevice(ctx, device), device.name).id);
  const cams: string[] = [];
  for (const cam of CAMSHAFTS) cams.push(must(await addCamshaft(ctx, cam), cam.label).id);
  for (const [benchId, days] of [[bench.id, BENCH_1_CHECKS], [older.id, OLDER_BENCH_CHECKS]] as const) {
    for (const day of days) {
      must(await recordBenchCheck(cast.as(who, day.at), { benchId, note: day.note, reason: day.reason ?? "", plates: CHECK_PLATES.map((p, i) => ({ serial: p.serial, reference: p.referenceFlow, indicated: day.shown[i] ?? "" })) }), `plates of ${day.at}`);
    }
  }
  return { benchId: bench.id, olderBenchId: older.id, fixtures, liftDeviceId: devices[0] ?? "", camshaftId: cams[0] ?? "" };
}

/** Engine families as the shop describes them: valve lists, bores and cam lifts of those it flows. */
export async function engineFamilies(cast: Cast, who: string, at: string, names: readonly string[]): Promise<void> {
  for (const name of names) {
    const f = FLOW_FAMILIES[name];
    must(await addFamily(cast.as(who, at), f ? {
      name, cylinders: f.cylinders, boreMm: f.boreMm, strokeMm: f.strokeMm, camLiftIntake: f.intake.camLift, camLiftExhaust: f.exhaust.camLift, notes: f.notes,
      valves: (["intake", "exhaust"] as const).flatMap((side) => f[side].places.map((position) => ({ side, position, headMm: f[side].headMm, stemMm: f[side].stemMm, seatAngleDeg: 45 }))),
    } : { name }), name);
  }
}
