import "server-only";
import { and, asc, desc, eq, isNull, sql } from "drizzle-orm";
import { alias } from "drizzle-orm/pg-core";
import { benchChecks, benches, camshafts, checkPlates, engineFamilies, fixtures, flowTests, liftDevices, people } from "@/db/schema";
import { ableTo, inShop, mustBeAble, NotFound, settingsOf, type ShopContext } from "@/modules/access/context";
import { localDate } from "@/modules/kernel/instant";
import { standingCheck } from "../bench-check-sql";
import type { CamPoint } from "../domain/cam-table";
import type { PortSide } from "../domain/comparison-reasons";
import type { BenchRange, BenchScale, WaterUnit } from "../domain/raw-test";
import { ownLimits, type OwnLimits } from "../domain/sanity-limits";
import type { ValveOfFamily } from "../domain/valve-list";

export interface BenchCheckView {
  id: string; at: string; by: string | null; factor: number; maxResidualPercent: number; driftPercent: number | null; flags: string[]; note: string;
  /** Why a doubtful check was kept. */
  reason: string | null;
  /** Put out of use: when, by whom and why. */
  struck: { at: string; by: string | null; reason: string } | null;
  plates: { serial: string; referenceCfm: number; indicatedText: string; rangeLabel: string | null; indicatedCfm: number }[];
}
export interface BenchView {
  id: string; name: string; kind: string; scale: BenchScale; ranges: BenchRange[]; waterUnit: WaterUnit; nominalPressuresInH2O: number[]; maxFlowCfm: number;
  pressureUncertaintyInH2O: number | null; readingUncertaintyCfm: number | null; altitudeM: number | null; active: boolean; version: number;
  check: { at: string; factor: number; maxResidualPercent: number; driftPercent: number | null; flags: string[]; ageHours: number; isOld: boolean } | null;
}
export interface PlateView { id: string; serial: string; referenceFlowCfm: number; atPressureInH2O: number; certificate: string; dueOn: string | null; isOverdue: boolean; active: boolean; version: number }
export interface FixtureView { id: string; name: string; boreMm: number; lengthMm: number | null; headPattern: string; plate: string; active: boolean; version: number }
export interface LiftDeviceView { id: string; name: string; resolutionMm: number; uncertaintyMm: number | null; active: boolean; version: number }
export interface CamshaftView { id: string; label: string; side: PortSide; maxLiftUm: number; durationDeg: number | null; profile: CamPoint[]; dataSource: string; active: boolean; version: number }
export interface FamilyView { id: string; name: string; cylinders: number; boreMm: number | null; strokeMm: number | null; valves: ValveOfFamily[]; camLiftIntakeUm: number | null; camLiftExhaustUm: number | null; notes: string; version: number }
export interface GearRoom {
  benches: BenchView[]; plates: PlateView[]; fixtures: FixtureView[]; liftDevices: LiftDeviceView[]; camshafts: CamshaftView[]; families: FamilyView[];
  benchCheckHours: number; canSetUp: boolean; canRecord: boolean;
  /** Limits of the checks that the shop set itself, with the version of its settings. */
  limits: { own: OwnLimits; version: number; maySet: boolean };
}

const HOUR_MS = 3_600_000;

function checkOf(row: typeof benchChecks.$inferSelect | undefined, now: Date, hoursMax: number): BenchView["check"] {
  if (!row) return null;
  const ageHours = (now.getTime() - row.at.getTime()) / HOUR_MS;
  return { at: row.at.toISOString(), factor: row.factor, maxResidualPercent: row.maxResidualPercent, driftPercent: row.driftPercent, flags: row.flags, ageHours, isOld: ageHours > hoursMax };
}

const benchView = (b: typeof benches.$inferSelect, check: BenchView["check"]): BenchView => ({
  id: b.id, name: b.name, kind: b.kind, scale: b.scale as BenchScale, ranges: b.ranges as BenchRange[], waterUnit: b.waterUnit as WaterUnit, nominalPressuresInH2O: b.nominalPressuresInH2O,
  maxFlowCfm: b.maxFlowCfm, pressureUncertaintyInH2O: b.pressureUncertaintyInH2O, readingUncertaintyCfm: b.readingUncertaintyCfm, altitudeM: b.altitudeM, active: b.active, version: b.version, check,
});

/** All gear of the bench room with its state. Put-away gear comes last. */
export async function gearRoom(ctx: ShopContext): Promise<GearRoom> {
  mustBeAble(ctx, "flow.see");
  const s = ctx.shop.id;
  return inShop(ctx, async (tx) => {
    const { benchCheckHours, flowLimits, version } = await settingsOf({ ...ctx, tx });
    const checks = await tx.selectDistinctOn([benchChecks.benchId]).from(benchChecks).where(and(eq(benchChecks.shopId, s), standingCheck)).orderBy(benchChecks.benchId, desc(benchChecks.at));
    const today = localDate(ctx.now, ctx.shop.zone);
    const [b, p, f, d, c, fam] = [
      await tx.select().from(benches).where(eq(benches.shopId, s)).orderBy(desc(benches.active), asc(benches.name)),
      await tx.select().from(checkPlates).where(eq(checkPlates.shopId, s)).orderBy(desc(checkPlates.active), asc(checkPlates.referenceFlowCfm)),
      await tx.select().from(fixtures).where(eq(fixtures.shopId, s)).orderBy(desc(fixtures.active), asc(fixtures.boreMm), asc(fixtures.name)),
      await tx.select().from(liftDevices).where(eq(liftDevices.shopId, s)).orderBy(desc(liftDevices.active), asc(liftDevices.name)),
      await tx.select().from(camshafts).where(eq(camshafts.shopId, s)).orderBy(desc(camshafts.active), asc(camshafts.label), desc(camshafts.side)),
      await tx.select().from(engineFamilies).where(eq(engineFamilies.shopId, s)).orderBy(asc(engineFamilies.name)),
    ];
    return {
      benches: b.map((x) => benchView(x, checkOf(checks.find((k) => k.benchId === x.id), ctx.now, benchCheckHours))),
      plates: p.map((x) => ({ id: x.id, serial: x.serial, referenceFlowCfm: x.referenceFlowCfm, atPressureInH2O: x.atPressureInH2O, certificate: x.certificate, dueOn: x.dueOn, isOverdue: x.dueOn !== null && x.dueOn < today, active: x.active, version: x.version })),
      fixtures: f.map(({ shopId: _, createdAt: __, ...x }) => x),
      liftDevices: d.map(({ shopId: _, createdAt: __, ...x }) => x),
      camshafts: c.map((x) => ({ id: x.id, label: x.label, side: x.side as PortSide, maxLiftUm: x.maxLiftUm, durationDeg: x.durationDeg, profile: x.profile as CamPoint[], dataSource: x.dataSource, active: x.active, version: x.version })),
      families: fam.map(({ shopId: _, createdAt: __, valves, ...x }) => ({ ...x, valves: valves as ValveOfFamily[] })),
      benchCheckHours, canSetUp: ableTo(ctx, "flow.set-up"), canRecord: ableTo(ctx, "flow.record"),
      limits: { own: ownLimits(flowLimits), version, maySet: ableTo(ctx, "settings.write") },
    };
  });
}

export interface BenchHistory { bench: BenchView; checks: BenchCheckView[]; plates: PlateView[]; tests: number; benchCheckHours: number; canRecord: boolean; canSetUp: boolean }

/** One bench with its factor over time, newest first; at most the last 200 checks. @throws NotFound */
export async function benchHistory(ctx: ShopContext, benchId: string): Promise<BenchHistory> {
  const room = await gearRoom(ctx);
  const bench = room.benches.find((b) => b.id === benchId);
  if (!bench) throw new NotFound("bench");
  return inShop(ctx, async (tx) => {
    const later = alias(benchChecks, "later");
    const striker = alias(people, "striker");
    const rows = await tx.select({ c: benchChecks, by: people.shortName, struckAt: later.at, struckBy: striker.shortName, struckReason: later.reason }).from(benchChecks)
      .leftJoin(people, and(eq(people.shopId, benchChecks.shopId), eq(people.id, benchChecks.personId)))
      .leftJoin(later, and(eq(later.shopId, benchChecks.shopId), eq(later.strikes, benchChecks.id)))
      .leftJoin(striker, and(eq(striker.shopId, later.shopId), eq(striker.id, later.personId)))
      .where(and(eq(benchChecks.shopId, ctx.shop.id), eq(benchChecks.benchId, benchId), isNull(benchChecks.strikes))).orderBy(desc(benchChecks.at)).limit(200);
    const [{ n } = { n: 0 }] = await tx.select({ n: sql<number>`count(*)::int` }).from(flowTests).where(and(eq(flowTests.shopId, ctx.shop.id), eq(flowTests.benchId, benchId)));
    return {
      bench, tests: n, plates: room.plates.filter((p) => p.active), benchCheckHours: room.benchCheckHours, canRecord: room.canRecord, canSetUp: room.canSetUp,
      checks: rows.map(({ c, by, struckAt, struckBy, struckReason }) => ({
        id: c.id, at: c.at.toISOString(), by, factor: c.factor, maxResidualPercent: c.maxResidualPercent, driftPercent: c.driftPercent, flags: c.flags, note: c.note, reason: c.reason,
        struck: struckAt === null ? null : { at: struckAt.toISOString(), by: struckBy, reason: struckReason ?? "" },
        plates: (c.plateReadings as BenchCheckView["plates"]).map(({ serial, referenceCfm, indicatedText, rangeLabel, indicatedCfm }) => ({ serial, referenceCfm, indicatedText, rangeLabel: rangeLabel ?? null, indicatedCfm })),
      })),
    };
  });
}
