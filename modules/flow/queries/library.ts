import "server-only";
import { and, asc, desc, eq, inArray, sql, type SQL } from "drizzle-orm";
import { benches, engineFamilies, flowTests, flowTestSummaries, heads, people } from "@/db/schema";
import type { Tx } from "@/db/scope";
import { inShop, mustBeAble, type ShopContext } from "@/modules/access/context";
import { addDays, startOfDay } from "@/modules/kernel/instant";
import type { PortSide } from "../domain/comparison-reasons";
import type { LiftUnit } from "../domain/lift-ladder";
import type { Purpose } from "../domain/raw-test";
import { typedNumber } from "../domain/typed-number";
import type { LibraryAsk } from "../library-input";
import { standsInLibrary } from "../library-sql";

export interface LibraryRow {
  testId: string; headId: string; cylinder: number; mark: string; family: string; side: PortSide; purpose: Purpose; runNo: number; ownerKind: string; workDone: string[];
  valveMm: number | null; seatNote: string; startedAt: string; benchName: string; operator: string; atInH2O: number; liftUnit: LiftUnit; lifts: number;
  peakCfm: number | null; peakLiftUm: number | null; meanToCamCfm: number | null; doubts: number; isConverted: boolean; importedFrom: string | null;
}

const literal = (s: string) => s.replace(/[\\%_]/g, (c) => `\\${c}`);
/** Half the width within which two valve sizes are one, mm. */
const VALVE_WITHIN_MM = 0.25;

function filters(ctx: ShopContext, ask: LibraryAsk): SQL[] {
  const has = (text: string) => `%${literal(text.toLowerCase())}%`;
  const valve = typedNumber(ask.valve);
  return [
    ask.family ? sql`${heads.family} = ${ask.family}` : null,
    ask.side ? sql`${flowTests.side} = ${ask.side}` : null,
    ask.purpose ? sql`${flowTests.purpose} = ${ask.purpose}` : null,
    ask.owner ? (ask.owner === "development" ? sql`${heads.ownerKind} = 'development'` : sql`${heads.ownerKind} <> 'development'`) : null,
    ask.work ? sql`${ask.work} = any(${heads.workDone})` : null,
    ask.valve === "" ? null : valve.ok ? sql`${flowTests.valveMm} between ${valve.value - VALVE_WITHIN_MM} and ${valve.value + VALVE_WITHIN_MM}` : sql`false`,
    ask.seat ? sql`lower(${flowTests.seatNote}) like ${has(ask.seat)}` : null,
    ask.from ? sql`${flowTests.startedAt} >= ${startOfDay(ask.from, ctx.shop.zone).toISOString()}::timestamptz` : null,
    ask.to ? sql`${flowTests.startedAt} < ${startOfDay(addDays(ask.to, 1), ctx.shop.zone).toISOString()}::timestamptz` : null,
    ask.q ? sql`(lower(${heads.mark}) like ${has(ask.q)} or lower(${heads.castingNumber}) like ${has(ask.q)} or lower(${heads.family}) like ${has(ask.q)})` : null,
  ].filter((x) => x !== null);
}

/** Every finished test of every head, newest first, one index range a page: the figures come from the kept summaries. */
export async function libraryTests(ctx: ShopContext, ask: LibraryAsk): Promise<{ rows: LibraryRow[]; next: string | null }> {
  mustBeAble(ctx, "flow.see");
  const [afterAt, afterId] = (ask.after ?? "").split("|");
  const isPaged = Boolean(afterAt && afterId && !Number.isNaN(Date.parse(afterAt)) && /^[0-9a-f-]{36}$/.test(afterId));
  return inShop(ctx, async (tx) => {
    // First the page, from the tests and their heads alone; only its rows are then looked up in full.
    const found = await tx.select({ id: flowTests.id, key: sql<string>`to_char(${flowTests.startedAt} at time zone 'UTC', 'YYYY-MM-DD"T"HH24:MI:SS.US"Z"')` }).from(flowTests)
      .innerJoin(heads, and(eq(heads.shopId, flowTests.shopId), eq(heads.id, flowTests.headId)))
      .where(and(
        eq(flowTests.shopId, ctx.shop.id), standsInLibrary(ctx.shop.id), ...filters(ctx, ask),
        isPaged ? sql`(${flowTests.startedAt}, ${flowTests.id}) < (${afterAt}::timestamptz, ${afterId}::uuid)` : undefined,
      ))
      .orderBy(desc(flowTests.startedAt), desc(flowTests.id)).limit(ask.limit + 1);
    const page = found.slice(0, ask.limit);
    const last = page.at(-1);
    return { rows: await rowsOf(ctx, tx, page.map((p) => p.id)), next: found.length > ask.limit && last ? `${last.key}|${last.id}` : null };
  });
}

async function rowsOf(ctx: ShopContext, tx: Tx, ids: readonly string[]): Promise<LibraryRow[]> {
  if (ids.length === 0) return [];
  const rows = await tx.select({
    testId: flowTests.id, headId: flowTests.headId, cylinder: flowTests.cylinder, mark: heads.mark, family: heads.family, side: flowTests.side, purpose: flowTests.purpose, runNo: flowTests.runNo,
    ownerKind: heads.ownerKind, workDone: heads.workDone, valveMm: flowTests.valveMm, seatNote: flowTests.seatNote, startedAt: flowTests.startedAt, benchName: benches.name, operator: people.shortName,
    atInH2O: flowTests.nominalPressureInH2O, liftUnit: flowTests.liftUnit, importedFrom: flowTests.importedFrom,
    lifts: sql<number>`coalesce(cardinality(${flowTestSummaries.liftsUm}), 0)`, peakCfm: flowTestSummaries.peakCfm, peakLiftUm: flowTestSummaries.peakLiftUm, meanToCamCfm: flowTestSummaries.meanToCamCfm,
    doubts: sql<number>`coalesce(${flowTestSummaries.doubts}, 0)`, isConverted: sql<boolean>`coalesce(${flowTestSummaries.isConverted}, false)`,
  }).from(flowTests)
    .innerJoin(heads, and(eq(heads.shopId, flowTests.shopId), eq(heads.id, flowTests.headId)))
    .innerJoin(benches, and(eq(benches.shopId, flowTests.shopId), eq(benches.id, flowTests.benchId)))
    .innerJoin(people, and(eq(people.shopId, flowTests.shopId), eq(people.id, flowTests.operatorId)))
    .leftJoin(flowTestSummaries, and(eq(flowTestSummaries.shopId, flowTests.shopId), eq(flowTestSummaries.testId, flowTests.id)))
    .where(and(eq(flowTests.shopId, ctx.shop.id), inArray(flowTests.id, [...ids])))
    .orderBy(desc(flowTests.startedAt), desc(flowTests.id));
  return rows.map(({ startedAt, side, purpose, liftUnit, ...r }) => ({ ...r, startedAt: startedAt.toISOString(), side: side as PortSide, purpose: purpose as Purpose, liftUnit: liftUnit as LiftUnit }));
}

export interface FamilyName { name: string; heads: number; isSetUp: boolean; /** Of a head, as the shop set it up; null where it did not. */ cylinders: number | null }

/** Families as the shop set them up, and those only written on heads; with how many heads stand in each. */
export async function familyNames(ctx: ShopContext): Promise<FamilyName[]> {
  mustBeAble(ctx, "flow.see");
  return inShop(ctx, async (tx) => {
    const made = await tx.select({ name: engineFamilies.name, cylinders: engineFamilies.cylinders }).from(engineFamilies).where(eq(engineFamilies.shopId, ctx.shop.id)).orderBy(asc(engineFamilies.name));
    const used = await tx.select({ name: heads.family, n: sql<number>`count(*)::int` }).from(heads).where(eq(heads.shopId, ctx.shop.id)).groupBy(heads.family).orderBy(asc(heads.family));
    const counts = new Map(used.map((u) => [u.name, u.n]));
    return [...new Set([...made.map((m) => m.name), ...used.map((u) => u.name)])].sort((a, b) => a.localeCompare(b))
      .map((name) => ({ name, heads: counts.get(name) ?? 0, isSetUp: made.some((m) => m.name === name), cylinders: made.find((m) => m.name === name)?.cylinders ?? null }));
  });
}
