import "server-only";
import { and, asc, desc, eq, inArray, isNull } from "drizzle-orm";
import { benches, benchChecks, camshafts, customers, engineFamilies, fixtures, flowComparisons, heads, liftDevices, measurements, people, workOrders, workPieces } from "@/db/schema";
import { ableTo, inShop, mustBeAble, NotFound, personIdOf, settingsOf, type ShopContext } from "@/modules/access/context";
import { standingCheck } from "../bench-check-sql";
import type { PortSide } from "../domain/comparison-reasons";
import type { BenchRange, BenchScale, RawTest } from "../domain/raw-test";
import { SECTION_KINDS } from "../domain/measure-kinds";
import { rawTests } from "./tests-of-head";
import type { ValveOfFamily } from "../domain/valve-list";
import { withRepeatHistory } from "./repeat-history";
import { seesCustomers } from "./gain";
import { cautionsOfOwnHead, cautionsToShow } from "./job-cautions";

/** The step of a job at which the hazards of the bench are told. */
export const BENCH_STEP = "bench session";
const BENCH_HAZARDS = ["noise", "suction", "springs"] as const;

export interface SheetHead {
  id: string; mark: string; family: string; pieceId: string | null; workOrderId: string | null; orderNumber: string | null; customerName: string | null; castingNumber: string; seatMaterial: string;
  cylinders: number; boreMm: number | null; camLiftIntakeUm: number | null; camLiftExhaustUm: number | null;
  /** Of its family; empty when the shop has not listed them. */
  valves: ValveOfFamily[];
  version: number; workDone: string[]; notes: string;
}
export interface PortSection { side: PortSide; stage: "before" | "after"; mm2: number }
export interface PortMark { cylinder: number; state: "empty" | "part" | "done" }
/** Everything a flow sheet shows, raw. Figures are computed from it by `figuresOfTest` and `sideGain`, here and in the browser alike. */
export interface FlowSheet {
  head: SheetHead;
  cylinder: number;
  ports: PortMark[];
  tests: RawTest[];
  benchCheckHours: number;
  nominalInH2O: number;
  canRecord: boolean;
  canIssue: boolean;
  /** Whose readings these will be. */
  viewer: { id: string; name: string };
  /** Smallest section of each port as measured, mm2, before and after the work. */
  sections: PortSection[];
  /** Hazards this person has not yet confirmed for the job. */
  cautions: string[];
  comparisons: { id: string; comparisonNo: number; issuedAt: string; issuedBy: string }[];
}
export interface BenchGear {
  benches: { id: string; name: string; scale: BenchScale; ranges: BenchRange[]; nominalPressuresInH2O: number[]; checkedAt: string | null; factor: number }[];
  fixtures: { id: string; name: string; boreMm: number }[];
  liftDevices: { id: string; name: string }[];
  camshafts: { id: string; label: string; side: PortSide; maxLiftUm: number }[];
  operators: { id: string; name: string }[];
}

/** Benches with their newest check, fixtures, lift devices, camshafts and people: what a session is set up from. */
export async function gearOf(ctx: ShopContext): Promise<BenchGear> {
  mustBeAble(ctx, "flow.see");
  return inShop(ctx, async (tx) => {
    const s = ctx.shop.id;
    const b = await tx.select().from(benches).where(and(eq(benches.shopId, s), eq(benches.active, true))).orderBy(asc(benches.name));
    const f = await tx.select({ id: fixtures.id, name: fixtures.name, boreMm: fixtures.boreMm }).from(fixtures).where(and(eq(fixtures.shopId, s), eq(fixtures.active, true))).orderBy(asc(fixtures.name));
    const checks = await tx.selectDistinctOn([benchChecks.benchId], { benchId: benchChecks.benchId, at: benchChecks.at, factor: benchChecks.factor }).from(benchChecks)
      .where(and(eq(benchChecks.shopId, s), standingCheck)).orderBy(benchChecks.benchId, desc(benchChecks.at));
    const byBench = new Map(checks.map((c) => [c.benchId, c]));
    const devices = await tx.select({ id: liftDevices.id, name: liftDevices.name }).from(liftDevices).where(and(eq(liftDevices.shopId, s), eq(liftDevices.active, true))).orderBy(asc(liftDevices.name));
    const cams = await tx.select({ id: camshafts.id, label: camshafts.label, side: camshafts.side, maxLiftUm: camshafts.maxLiftUm }).from(camshafts).where(and(eq(camshafts.shopId, s), eq(camshafts.active, true))).orderBy(asc(camshafts.label));
    const operators = await tx.select({ id: people.id, name: people.shortName }).from(people).where(and(eq(people.shopId, s), isNull(people.leftAt))).orderBy(asc(people.shortName));
    return {
      benches: b.map((x) => ({
        id: x.id, name: x.name, scale: x.scale as BenchScale, ranges: x.ranges as BenchRange[], nominalPressuresInH2O: x.nominalPressuresInH2O,
        checkedAt: byBench.get(x.id)?.at.toISOString() ?? null, factor: byBench.get(x.id)?.factor ?? 1,
      })),
      fixtures: f, liftDevices: devices, camshafts: cams.map((c) => ({ ...c, side: c.side as PortSide })), operators,
    };
  });
}

function portMarks(cylinders: number, tests: readonly (RawTest & { cylinder: number })[]): PortMark[] {
  return Array.from({ length: cylinders }, (_, i) => {
    const here = tests.filter((t) => t.cylinder === i + 1 && t.state !== "void");
    const isDone = (["intake", "exhaust"] as const).every((side) => here.some((t) => t.side === side && t.purpose === "after" && t.state === "complete"));
    return { cylinder: i + 1, state: isDone ? "done" : here.some((t) => t.cells.some((c) => c.valueText !== "")) ? "part" : "empty" };
  });
}

/** The sheet of one port pair. @throws NotFound */
export async function flowSheetFor(ctx: ShopContext, headId: string, cylinder: number): Promise<FlowSheet> {
  mustBeAble(ctx, "flow.see");
  return inShop(ctx, async (tx) => {
    const inner = { ...ctx, tx };
    const s = ctx.shop.id;
    const [row] = await tx.select({ h: heads, familyBoreMm: engineFamilies.boreMm, valves: engineFamilies.valves, orderId: workOrders.id, orderNumber: workOrders.number, customerName: customers.name }).from(heads)
      .leftJoin(engineFamilies, and(eq(engineFamilies.shopId, heads.shopId), eq(engineFamilies.name, heads.family)))
      .leftJoin(workPieces, and(eq(workPieces.shopId, heads.shopId), eq(workPieces.id, heads.pieceId)))
      .leftJoin(workOrders, and(eq(workOrders.shopId, workPieces.shopId), eq(workOrders.id, workPieces.workOrderId)))
      .leftJoin(customers, and(eq(customers.shopId, workOrders.shopId), eq(customers.id, workOrders.customerId)))
      .where(and(eq(heads.shopId, s), eq(heads.id, headId)));
    if (!row || cylinder < 1 || cylinder > row.h.cylinders) throw new NotFound("head");
    const { h } = row;
    const all = await rawTests(inner, { headIds: [headId] });
    const tests = await withRepeatHistory(inner, all.filter((t) => t.cylinder === cylinder).map(({ headId: _, cylinder: __, ...t }) => t));
    const { benchCheckHours, nominalPressureInH2O } = await settingsOf(inner);
    const personId = personIdOf(ctx);
    const canRecord = ableTo(ctx, "flow.record");
    const isTold = canRecord && personId !== null;
    const cautions = !isTold ? [] : row.orderId ? await cautionsToShow(inner, { workOrderId: row.orderId, step: BENCH_STEP, hazards: BENCH_HAZARDS }) : await cautionsOfOwnHead(inner, { headId, step: BENCH_STEP, hazards: BENCH_HAZARDS });
    const measured = await tx.selectDistinctOn([measurements.kind, measurements.stage], { kind: measurements.kind, stage: measurements.stage, valueText: measurements.valueText, mm2: measurements.valueSi }).from(measurements)
      .where(and(eq(measurements.shopId, s), eq(measurements.headId, headId), eq(measurements.cylinder, cylinder), inArray(measurements.kind, Object.values(SECTION_KINDS))))
      .orderBy(measurements.kind, measurements.stage, desc(measurements.revision));
    const issued = await tx.select({ id: flowComparisons.id, comparisonNo: flowComparisons.comparisonNo, issuedAt: flowComparisons.issuedAt, issuedBy: people.shortName }).from(flowComparisons)
      .innerJoin(people, and(eq(people.shopId, flowComparisons.shopId), eq(people.id, flowComparisons.issuedBy)))
      .where(and(eq(flowComparisons.shopId, s), eq(flowComparisons.headId, headId), eq(flowComparisons.cylinder, cylinder))).orderBy(desc(flowComparisons.comparisonNo));
    return {
      head: {
        id: h.id, mark: h.mark, family: h.family, pieceId: h.pieceId, workOrderId: row.orderId, orderNumber: row.orderNumber, customerName: seesCustomers(ctx) ? row.customerName : null, castingNumber: h.castingNumber,
        seatMaterial: h.seatMaterial, cylinders: h.cylinders, boreMm: h.boreMm ?? row.familyBoreMm, camLiftIntakeUm: h.camLiftIntakeUm, camLiftExhaustUm: h.camLiftExhaustUm,
        valves: (row.valves ?? []) as ValveOfFamily[], version: h.version, workDone: h.workDone, notes: h.notes,
      },
      cylinder, ports: portMarks(h.cylinders, all), tests,
      benchCheckHours, nominalInH2O: nominalPressureInH2O, canRecord, canIssue: ableTo(ctx, "flow.issue"), viewer: { id: ctx.actor.id, name: ctx.actor.name },
      sections: measured.filter((m) => m.valueText !== "" && m.mm2 > 0).map((m) => ({ side: m.kind === SECTION_KINDS.intake ? "intake" : "exhaust", stage: m.stage === "after" ? "after" : "before", mm2: m.mm2 })),
      cautions,
      comparisons: issued.map((c) => ({ ...c, issuedAt: c.issuedAt.toISOString() })),
    };
  });
}
