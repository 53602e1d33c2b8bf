import "server-only";
import { and, eq, inArray, sql } from "drizzle-orm";
import { engineFamilies, flowTests, flowTestSummaries, heads } from "@/db/schema";
import { inShop, mustBeAble, NotFound, settingsOf, type ShopContext, type TxContext } from "@/modules/access/context";
import { comparisonMeans, type ComparisonMeans } from "../domain/comparison-means";
import { historyOfPair } from "../domain/bench-history";
import type { Reason, PortSide } from "../domain/comparison-reasons";
import { gainsByLift, portChange, type KeptFigures, type LiftGains } from "../domain/family-gains";
import type { LiftUnit } from "../domain/lift-ladder";
import { middleCurve, type MiddlePoint } from "../domain/family-middle";
import { noiseOfTests, type GainNoise } from "../domain/noise-rows";
import type { RawTest } from "../domain/raw-test";
import type { LiftReading } from "../domain/repeats";
import { compareSets, type ComparableSets, type ShopComparison } from "../domain/shop-comparison";
import { conditionWords } from "../domain/side-gain";
import { standingTests } from "../domain/standing-tests";
import { figuresOfTest, readingSetOf } from "../domain/test-figures";
import { FLOW_CONSTANTS_VERSION } from "../domain/test-summary";
import { valveListWords, type ValveOfFamily } from "../domain/valve-list";
import { standsInLibrary } from "../library-sql";
import { camsOf } from "./cams-of-tests";
import { withRepeatHistory } from "./repeat-history";
import { rawTests } from "./tests-of-head";

/** A family's middle curve is taken over so many of its newest tests, so that the answer takes as long in year ten as in year one. */
export const MEDIAN_OF_NEWEST = 20;

export interface PortOfFamily { headId: string; cylinder: number; mark: string; ownerKind: string; workDone: string[]; flowedAt: string; gain: "comparable" | "withheld" | "absent"; reasons: string[]; meanGainCfm: number | null; meanPercent: number | null; notes: string[] }
export interface FamilyPicture {
  family: string; side: PortSide; liftUnit: LiftUnit; atInH2O: number; camLiftUm: number | null; valves: string; bore: number | null; stroke: number | null; cylinders: number | null;
  tests: number; heads: number; otherPressure: number;
  /** Middle flow at each lift, over the newest tests of that purpose at the shop's pressure. */
  before: MiddlePoint[]; after: MiddlePoint[];
  /** Highest mean flow up to cam lift of all tests that reach it. */
  best: { testId: string; headId: string; mark: string; cylinder: number; startedAt: string; meanToCamCfm: number; readings: LiftReading[] } | null;
  /** Ports of the last heads flowed before and after, newest first. */
  ports: PortOfFamily[];
  gains: LiftGains[];
}

interface Kept extends Record<string, unknown> { purpose: string; lifts_um: number[]; flows_cfm: number[] }
interface Best extends Record<string, unknown> { test_id: string; head_id: string; mark: string; cylinder: number; started_at: string; mean: number; lifts_um: number[]; flows_cfm: number[] }

const readingsOf = (liftsUm: readonly number[], flowsCfm: readonly number[]): LiftReading[] => liftsUm.map((liftUm, i) => ({ liftUm, flowCfm: flowsCfm[i] ?? Number.NaN }));

function portLine(change: ShopComparison | null, head: { id: string; mark: string; ownerKind: string; workDone: string[] }, cylinder: number, flowedAt: string): PortOfFamily {
  const base = { headId: head.id, cylinder, mark: head.mark, ownerKind: head.ownerKind, workDone: head.workDone, flowedAt, meanGainCfm: null, meanPercent: null, reasons: [], notes: [] };
  if (change === null) return { ...base, gain: "absent" };
  const notes = change.notes.map((n) => n.words);
  return change.comparable ? { ...base, gain: "comparable", meanGainCfm: change.meanGainCfm, meanPercent: change.meanPercent, notes } : { ...base, gain: "withheld", reasons: change.reasons.map((r) => r.words), notes };
}

/** Figures of finished tests, by id: the kept ones, and from the cells where they are missing or were made by older rules. */
async function figuresOf(ctx: TxContext, testIds: readonly string[]): Promise<Map<string, KeptFigures>> {
  const kept = testIds.length === 0 ? [] : await ctx.tx.select({ testId: flowTestSummaries.testId, liftsUm: flowTestSummaries.liftsUm, flowsCfm: flowTestSummaries.flowsCfm, isConverted: flowTestSummaries.isConverted }).from(flowTestSummaries)
    .where(and(eq(flowTestSummaries.shopId, ctx.shop.id), inArray(flowTestSummaries.testId, [...testIds]), eq(flowTestSummaries.constantsVersion, FLOW_CONSTANTS_VERSION)));
  const figures = new Map<string, KeptFigures>(kept.map((k) => [k.testId, { readings: readingsOf(k.liftsUm, k.flowsCfm), isConverted: k.isConverted }]));
  const missing = await rawTests(ctx, { testIds: testIds.filter((id) => !figures.has(id)) });
  for (const test of missing) figures.set(test.id, figuresOfTest(test));
  return figures;
}

/** What a family did: middle curves, the best one, and the gains of the last heads at each lift. @throws NotFound */
export async function familyPicture(ctx: ShopContext, ask: { family: string; side: PortSide; last: number }): Promise<FamilyPicture> {
  mustBeAble(ctx, "flow.see");
  const s = ctx.shop.id;
  return inShop(ctx, async (tx) => {
    const inner = { ...ctx, tx };
    const settings = await settingsOf(inner);
    const atInH2O = settings.nominalPressureInH2O;
    const [family] = await tx.select().from(engineFamilies).where(and(eq(engineFamilies.shopId, s), eq(engineFamilies.name, ask.family)));
    const counted = await tx.execute<{ tests: number; heads: number; other: number }>(sql`
      select count(*)::int as tests, count(distinct s.head_id)::int as heads, count(*) filter (where s.at_inh2o <> ${atInH2O})::int as other
      from flow_test_summaries s where s.shop_id = ${s} and s.family = ${ask.family} and s.side = ${ask.side}`);
    const facts = counted.rows[0] ?? { tests: 0, heads: 0, other: 0 };
    if (!family && facts.tests === 0) {
      const known = await tx.select({ id: heads.id }).from(heads).where(and(eq(heads.shopId, s), eq(heads.family, ask.family))).limit(1);
      if (known.length === 0) throw new NotFound("family");
    }
    const newest = (purpose: string) => sql`(select s.lifts_um, s.flows_cfm, s.purpose, s.started_at from flow_test_summaries s join flow_tests on flow_tests.shop_id = s.shop_id and flow_tests.id = s.test_id
      where s.shop_id = ${s} and s.family = ${ask.family} and s.side = ${ask.side} and s.purpose = ${purpose} and s.at_inh2o = ${atInH2O} and ${standsInLibrary(s)}
      order by s.started_at desc limit ${MEDIAN_OF_NEWEST})`;
    const kept = await tx.execute<Kept>(sql`select x.purpose, x.lifts_um, x.flows_cfm from (${newest("baseline")} union all ${newest("after")}) x order by x.started_at desc`);
    const curve = (purpose: string): MiddlePoint[] => middleCurve(kept.rows.filter((k) => k.purpose === purpose).map((k) => readingsOf(k.lifts_um, k.flows_cfm)));
    const bests = await tx.execute<Best>(sql`
      select s.test_id, s.head_id, h.mark, flow_tests.cylinder, s.started_at, s.mean_to_cam_cfm as mean, s.lifts_um, s.flows_cfm
      from flow_test_summaries s join flow_tests on flow_tests.shop_id = s.shop_id and flow_tests.id = s.test_id join heads h on h.shop_id = s.shop_id and h.id = s.head_id
      where s.shop_id = ${s} and s.family = ${ask.family} and s.side = ${ask.side} and s.at_inh2o = ${atInH2O} and s.mean_to_cam_cfm is not null and ${standsInLibrary(s)}
      order by s.mean_to_cam_cfm desc limit 1`);
    const best = bests.rows[0];
    const lastHeads = await tx.execute<{ head_id: string; at: string }>(sql`
      select head_id, max(started_at) as at from (
        select s.head_id, s.started_at from flow_test_summaries s
        where s.shop_id = ${s} and s.family = ${ask.family} and s.side = ${ask.side} and s.purpose = 'after' order by s.started_at desc limit 400) x
      group by head_id order by at desc limit ${ask.last}`);
    const headIds = lastHeads.rows.map((r) => r.head_id);
    const headRows = headIds.length === 0 ? [] : await tx.select({ id: heads.id, mark: heads.mark, ownerKind: heads.ownerKind, workDone: heads.workDone }).from(heads).where(and(eq(heads.shopId, s), inArray(heads.id, headIds)));
    const sideTests = headIds.length === 0 ? [] : await tx.select({ id: flowTests.id }).from(flowTests)
      .where(and(eq(flowTests.shopId, s), inArray(flowTests.headId, headIds), eq(flowTests.side, ask.side), eq(flowTests.state, "complete"), inArray(flowTests.purpose, ["baseline", "after"])));
    const tests = await rawTests(inner, { testIds: sideTests.map((t) => t.id), cells: false });
    const standing = headIds.flatMap((headId) => {
      const ofHead = tests.filter((t) => t.headId === headId);
      return [...new Set(ofHead.map((t) => t.cylinder))].sort((x, y) => x - y).map((cylinder) => ({ headId, cylinder, ...standingTests(ofHead.filter((t) => t.cylinder === cylinder), ask.side, "complete") }));
    });
    const figures = await figuresOf(inner, standing.flatMap(({ before, after }) => [before, after].flatMap((t) => (t ? [t.id] : []))));
    const withFigures = (test: RawTest | null) => {
      const known = test && figures.get(test.id);
      return test && known ? { test, figures: known } : null;
    };
    const found = standing.flatMap(({ headId, cylinder, before, after: newest }) => {
      const head = headRows.find((h) => h.id === headId);
      const after = withFigures(newest);
      if (!head || !after) return [];
      const change = portChange({ before: withFigures(before), after, benchCheckHoursMax: settings.benchCheckHours });
      return change.ok ? [{ line: portLine(change.value, head, cylinder, after.test.startedAt), change: change.value }] : [];
    });
    const camLiftUm = (ask.side === "intake" ? family?.camLiftIntakeUm : family?.camLiftExhaustUm) ?? tests.at(-1)?.camLiftUm ?? null;
    return {
      family: ask.family, side: ask.side, liftUnit: tests.at(-1)?.liftUnit ?? "in", atInH2O, camLiftUm, valves: valveListWords((family?.valves ?? []) as ValveOfFamily[], ask.side),
      bore: family?.boreMm ?? null, stroke: family?.strokeMm ?? null, cylinders: family?.cylinders ?? null, tests: facts.tests, heads: facts.heads, otherPressure: facts.other,
      before: curve("baseline"), after: curve("after"),
      best: best ? {
        testId: best.test_id, headId: best.head_id, mark: best.mark, cylinder: best.cylinder, startedAt: new Date(best.started_at).toISOString(), meanToCamCfm: best.mean,
        readings: readingsOf(best.lifts_um, best.flows_cfm),
      } : null,
      ports: found.map((f) => f.line), gains: gainsByLift(found.map((f) => f.change)),
    };
  });
}

export interface OverlaySide { testId: string; headId: string; mark: string; family: string; cylinder: number; side: PortSide; purpose: string; startedAt: string; operator: string; conditions: string[]; readings: LiftReading[]; liftUnit: LiftUnit; atInH2O: number }
export interface OverlayRow { liftUm: number; a: number | null; b: number | null; difference: number | null }
export interface Overlay {
  a: OverlaySide; b: OverlaySide; camLiftUm: number | null;
  /** Same port of the same casting: only then a difference may be called a gain. */
  samePort: boolean;
  comparable: boolean;
  reasons: Reason<string>[]; notes: Reason<string>[];
  rows: OverlayRow[];
  meanDifferenceCfm: number | null;
  /** What the two come to, first and second; null where no difference is shown. */
  compared: { gain: ComparableSets; means: ComparisonMeans } | null;
  /** Each common lift against the noise; null where no difference is shown. */
  noise: GainNoise | null;
}

/** Two castings are not one port before and after: they are the first and the second. */
const asFirstAndSecond = <C extends string>(reasons: readonly Reason<C>[], samePort: boolean, daysApart: number): Reason<string>[] =>
  reasons.map((r) => {
    if (samePort) return r;
    // Which of the two castings came first says nothing here.
    if (r.code === "OLD_BASELINE") return { code: r.code, words: `The two were read ${daysApart} days apart.` };
    const word = (name: string) => (whole: string) => (/^[A-Z]/.test(whole) ? `The ${name}` : `the ${name}`);
    return { code: r.code, words: r.words.replace(/\b(the )?before\b/gi, word("first")).replace(/\b(the )?after\b/gi, word("second")) };
  });

/**
 * Any two tests over each other, and whether they may be compared. Figures of a difference exist only when they may.
 * @throws NotFound
 */
export async function overlayOf(ctx: ShopContext, ask: { a: string; b: string }): Promise<Overlay> {
  mustBeAble(ctx, "flow.see");
  return inShop(ctx, async (tx) => {
    const inner = { ...ctx, tx };
    const found = await withRepeatHistory(inner, await rawTests(inner, { testIds: [ask.a, ask.b] }));
    const [a, b] = [found.find((t) => t.id === ask.a), found.find((t) => t.id === ask.b)];
    if (!a || !b || a.state !== "complete" || b.state !== "complete") throw new NotFound("test");
    const { benchCheckHours } = await settingsOf(inner);
    const names = await tx.select({ id: heads.id, mark: heads.mark, family: heads.family }).from(heads).where(and(eq(heads.shopId, ctx.shop.id), inArray(heads.id, [a.headId, b.headId])));
    const sideOf = (t: typeof a): OverlaySide => {
      const head = names.find((n) => n.id === t.headId);
      return {
        testId: t.id, headId: t.headId, mark: head?.mark ?? "", family: head?.family ?? "", cylinder: t.cylinder, side: t.side, purpose: t.purpose, startedAt: t.startedAt, operator: t.operator.name,
        conditions: conditionWords(t), readings: figuresOfTest(t).readings.map(({ liftUm, flowCfm }) => ({ liftUm, flowCfm })), liftUnit: t.liftUnit, atInH2O: t.nominalInH2O,
      };
    };
    const camLiftUm = b.camLiftUm ?? a.camLiftUm;
    const compared = compareSets({ before: readingSetOf(a), after: readingSetOf(b), camLiftUm, benchCheckHoursMax: benchCheckHours });
    const base = { a: sideOf(a), b: sideOf(b), camLiftUm, samePort: a.headId === b.headId && a.cylinder === b.cylinder && a.side === b.side };
    const daysApart = Math.floor(Math.abs(Date.parse(b.startedAt) - Date.parse(a.startedAt)) / 86_400_000);
    if (!compared.ok) return { ...base, comparable: false, reasons: [{ code: compared.refusal.code, words: compared.refusal.message }], notes: [], rows: [], meanDifferenceCfm: null, compared: null, noise: null };
    const value = compared.value;
    if (!value.comparable) {
      return { ...base, comparable: false, reasons: asFirstAndSecond(value.reasons, base.samePort, daysApart), notes: asFirstAndSecond(value.notes, base.samePort, daysApart), rows: value.rows.map((r) => ({ liftUm: r.liftUm, a: r.beforeCfm, b: r.afterCfm, difference: null })), meanDifferenceCfm: null, compared: null, noise: null };
    }
    const rows = [...value.rows.map((r) => ({ liftUm: r.liftUm, a: r.beforeCfm, b: r.afterCfm, difference: r.gainCfm })), ...value.unpairedRows.map((r) => ({ liftUm: r.liftUm, a: r.beforeCfm, b: r.afterCfm, difference: null }))];
    const cam = (await camsOf(inner, [a, b])).get(b.camshaft?.id ?? a.camshaft?.id ?? "") ?? null;
    return { ...base, comparable: true, compared: { gain: value, means: comparisonMeans(value, cam) }, reasons: [], notes: asFirstAndSecond(value.notes, base.samePort, daysApart), rows: rows.sort((x, y) => x.liftUm - y.liftUm), meanDifferenceCfm: value.meanGainCfm, noise: noiseOfTests(figuresOfTest(a), figuresOfTest(b), b, historyOfPair(a, b)) };
  });
}
