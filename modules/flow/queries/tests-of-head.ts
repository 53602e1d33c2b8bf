import "server-only";
import { and, asc, desc, eq, inArray } from "drizzle-orm";
import { benches, camshafts, fixtures, flowReadings, flowTests, liftDevices, people, shopSettings } from "@/db/schema";
import { inShop, type ShopContext } from "@/modules/access/context";
import { ownLimits, sanityLimits } from "../domain/sanity-limits";
import type { BenchKind, BenchRange, RawCell, RawTest } from "../domain/raw-test";

/** The newest revision of every cell of the given tests; cleared cells come with an empty text. */
export async function cellsOf(ctx: ShopContext, testIds: readonly string[]): Promise<Map<string, RawCell[]>> {
  const byTest = new Map<string, RawCell[]>();
  if (testIds.length === 0) return byTest;
  const rows = await inShop(ctx, (tx) => tx.selectDistinctOn([flowReadings.testId, flowReadings.liftUm, flowReadings.repeatNo]).from(flowReadings)
    .where(and(eq(flowReadings.shopId, ctx.shop.id), inArray(flowReadings.testId, [...testIds])))
    .orderBy(flowReadings.testId, asc(flowReadings.liftUm), asc(flowReadings.repeatNo), desc(flowReadings.revision)));
  for (const r of rows) {
    const cell: RawCell = {
      liftUm: r.liftUm, repeatNo: r.repeatNo, revision: r.revision, valueText: r.clearedAt ? "" : r.valueText, valueUnit: r.valueUnit as RawCell["valueUnit"], rangeLabel: r.rangeLabel,
      pressureText: r.pressureText, pressureUnit: r.pressureUnit as RawCell["pressureUnit"], ...(r.portTemperatureText ? { portTemperatureText: r.portTemperatureText } : {}), ...(r.orificeTemperatureText ? { orificeTemperatureText: r.orificeTemperatureText } : {}), acceptedReason: r.acceptedReason, excludedReason: r.excludedReason, takenAt: r.takenAt.toISOString(),
    };
    const cells = byTest.get(r.testId) ?? [];
    cells.push(cell);
    byTest.set(r.testId, cells);
  }
  return byTest;
}

/**
 * Tests by head (one or many), or by their own ids, with cells as typed. Oldest first. No rights are asked here: callers do.
 * `cells: false` leaves the cells out, for who has the figures already.
 */
export async function rawTests(ctx: ShopContext, which: ({ headIds: readonly string[] } | { testIds: readonly string[] }) & { cells?: boolean }): Promise<(RawTest & { headId: string; cylinder: number })[]> {
  const ids = "headIds" in which ? which.headIds : which.testIds;
  if (ids.length === 0) return [];
  const rows = await inShop(ctx, (tx) => tx.select({ t: flowTests, bench: benches, fixture: fixtures, operator: { id: people.id, name: people.shortName }, liftDevice: liftDevices, camshaft: { id: camshafts.id, label: camshafts.label }, limits: shopSettings.flowLimits }).from(flowTests)
    .innerJoin(benches, and(eq(benches.shopId, flowTests.shopId), eq(benches.id, flowTests.benchId)))
    .innerJoin(fixtures, and(eq(fixtures.shopId, flowTests.shopId), eq(fixtures.id, flowTests.fixtureId)))
    .innerJoin(people, and(eq(people.shopId, flowTests.shopId), eq(people.id, flowTests.operatorId)))
    .leftJoin(liftDevices, and(eq(liftDevices.shopId, flowTests.shopId), eq(liftDevices.id, flowTests.liftDeviceId)))
    .leftJoin(camshafts, and(eq(camshafts.shopId, flowTests.shopId), eq(camshafts.id, flowTests.camshaftId)))
    .leftJoin(shopSettings, eq(shopSettings.shopId, flowTests.shopId))
    .where(and(eq(flowTests.shopId, ctx.shop.id), inArray("headIds" in which ? flowTests.headId : flowTests.id, [...ids])))
    .orderBy(asc(flowTests.startedAt), desc(flowTests.side), asc(flowTests.runNo), asc(flowTests.id)));
  const cells = await cellsOf(ctx, which.cells === false ? [] : rows.map((r) => r.t.id));
  return rows.map(({ t, bench, fixture, operator, liftDevice, camshaft, limits }) => ({
    headId: t.headId, cylinder: t.cylinder,
    id: t.id, side: t.side as RawTest["side"], purpose: t.purpose as RawTest["purpose"], runNo: t.runNo, state: t.state as RawTest["state"], version: t.version,
    bench: { id: bench.id, name: bench.name, kind: bench.kind as BenchKind, scale: bench.scale as RawTest["bench"]["scale"], ranges: bench.ranges as BenchRange[], waterUnit: bench.waterUnit as RawTest["bench"]["waterUnit"] },
    benchFactor: t.benchFactor, benchCheckedAt: t.benchCheckedAt?.toISOString() ?? null,
    known: { pressureInH2O: bench.pressureUncertaintyInH2O, readingCfm: bench.readingUncertaintyCfm, liftMm: liftDevice?.uncertaintyMm ?? null, liftStepMm: liftDevice?.resolutionMm ?? null },
    liftDevice: liftDevice ? { id: liftDevice.id, name: liftDevice.name } : null, camshaft,
    ...(Object.keys(ownLimits(limits)).length > 0 ? { limits: sanityLimits(limits) } : {}),
    fixture: { id: fixture.id, name: fixture.name, boreMm: fixture.boreMm },
    nominalInH2O: t.nominalPressureInH2O, lifts: t.lifts, liftUnit: t.liftUnit as RawTest["liftUnit"], camLiftUm: t.camLiftUm,
    entry: t.entry as RawTest["entry"], valvesOpen: t.valvesOpen, valveMm: t.valveMm, seatNote: t.seatNote, plugClosed: t.plugClosed, testSprings: t.testSprings, warmUpMinutes: t.warmUpMinutes,
    roomTemperatureText: t.roomTemperatureText, roomPressureText: t.roomPressureText, roomHumidityText: t.roomHumidityText, leakText: t.leakText, leakPressureText: t.leakPressureText, leakScalingAgreed: t.leakScalingAgreed, zeroReturnUm: t.zeroReturnUm, notes: t.notes,
    operator, startedAt: t.startedAt.toISOString(), completedAt: t.completedAt?.toISOString() ?? null, correctsTestId: t.correctsTestId, voidReason: t.voidReason,
    cells: cells.get(t.id) ?? [],
  }));
}
