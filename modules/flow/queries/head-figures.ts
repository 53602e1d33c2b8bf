import "server-only";
import { and, asc, eq } from "drizzle-orm";
import { camshafts, engineFamilies, heads } from "@/db/schema";
import { ableTo, inShop, mustBeAble, NotFound, settingsOf, type ShopContext } from "@/modules/access/context";
import type { CamPoint } from "../domain/cam-table";
import { coefficientTable, type CoefficientTable } from "../domain/coefficient-rows";
import { comparisonMeans, type ComparisonMeans, type NamedCam } from "../domain/comparison-means";
import type { PortSide } from "../domain/comparison-reasons";
import type { CamFacts } from "../domain/cam-opening";
import type { LiftUnit } from "../domain/lift-ladder";
import type { BenchHistory } from "../domain/noise";
import type { NoiseRow } from "../domain/noise-rows";
import type { RawTest } from "../domain/raw-test";
import type { LiftReading } from "../domain/repeats";
import { ratiosOfPort, type PortRatio } from "../domain/port-ratios";
import type { SanityLimits } from "../domain/sanity-limits";
import { sideGain, type SideGain } from "../domain/side-gain";
import { camIdOf, standingTests } from "../domain/standing-tests";
import { figuresOfTest } from "../domain/test-figures";
import { headDiametersMm, valvesOfTest, type ValveOfFamily } from "../domain/valve-list";
import { camsOf } from "./cams-of-tests";
import { issuedReports, type IssuedReport } from "./issued-reports";
import { withRepeatHistory } from "./repeat-history";
import { rawTests } from "./tests-of-head";

export interface PortFigures {
  cylinder: number; side: PortSide; liftUnit: LiftUnit; atInH2O: number; camLiftUm: number | null;
  /** Sizes the coefficients rest on, in words; empty = unknown, so there are none. */
  valves: string;
  before: CoefficientTable | null; after: CoefficientTable | null;
  /** Every reading that counts, for a side with one test only. */
  readings: { before: readonly LiftReading[]; after: readonly LiftReading[] };
  gain: SideGain;
  /** Null when the two may not be compared. */
  means: ComparisonMeans | null;
  /** Null when the two may not be compared. */
  noise: readonly NoiseRow[] | null;
  withheld: string[];
  /** Uncertainties nobody stated; they count as nothing in the verdict. */
  notStated: readonly string[];
  /** Repeats of the bench up to the newer test. */
  history?: BenchHistory | undefined;
  /** What the flags of coefficients were held against, where the shop set it. */
  limits?: SanityLimits | undefined;
}
export interface EstimateFacts { cylinders: number; boreMm: number | null; strokeMm: number | null; cams: (CamFacts & { id: string; label: string })[]; ports: { cylinder: number; when: "before" | "after"; atInH2O: number; readings: LiftReading[] }[] }
export interface HeadFigures {
  head: { id: string; mark: string; family: string };
  ports: PortFigures[];
  ratios: { cylinder: number; ratios: PortRatio[] }[];
  reports: IssuedReport[];
  /** Null while the shop has them off. */
  estimates: EstimateFacts | null;
  settingsVersion: number; maySwitch: boolean;
}

type Test = RawTest & { headId: string; cylinder: number };

function portFigures(cylinder: number, side: PortSide, tests: readonly Test[], valves: readonly ValveOfFamily[], hoursMax: number, cams: ReadonlyMap<string, NamedCam>): PortFigures | null {
  const standing = standingTests(tests.filter((t) => t.cylinder === cylinder), side, "complete");
  const newest = standing.after ?? standing.before;
  if (!newest) return null;
  const listed = headDiametersMm(valves, side);
  const sizes = (test: RawTest): number[] => valvesOfTest(test.valveMm, listed);
  const table = (test: RawTest | null): CoefficientTable | null => {
    const diameters = test ? sizes(test) : [];
    // One valve open is not the whole list.
    if (!test || diameters.length === 0 || test.valvesOpen !== "all") return null;
    return coefficientTable({ readings: figuresOfTest(test).readings, side, valveDiametersMm: diameters, atInH2O: test.nominalInH2O, limits: test.limits });
  };
  const gain = sideGain(standing, side, hoursMax);
  // Figures that cannot be computed count as absent, as they do on the order.
  const told: SideGain = gain.ok ? gain.value : { state: "absent", comparable: false, side, absent: "both" };
  const readingsOf = (test: RawTest | null): LiftReading[] => (test ? figuresOfTest(test).readings.map(({ liftUm, flowCfm }) => ({ liftUm, flowCfm })) : []);
  const noise = gain.ok && gain.value.comparable ? (gain.value.noise ?? null) : null;
  return {
    cylinder, side, liftUnit: newest.liftUnit, atInH2O: newest.nominalInH2O, camLiftUm: newest.camLiftUm, valves: sizes(newest).map((d) => `${d} mm`).join(" + "),
    before: table(standing.before), after: table(standing.after),
    readings: { before: readingsOf(standing.before), after: readingsOf(standing.after) }, gain: told, means: told.comparable ? comparisonMeans(told, cams.get(camIdOf(standing) ?? "") ?? null) : null,
    noise: noise?.rows ?? null,
    withheld: gain.ok && gain.value.state === "withheld" ? gain.value.reasons.map((r) => r.words) : gain.ok && gain.value.state === "absent" ? ["One of the two tests is missing."] : [],
    notStated: noise?.notStated ?? [], history: noise?.history, limits: newest.limits,
  };
}

/** Coefficients, speeds, the change against the noise, and estimates where the shop shows them, of one head. @throws NotFound */
export async function headFigures(ctx: ShopContext, headId: string): Promise<HeadFigures> {
  mustBeAble(ctx, "flow.see");
  const s = ctx.shop.id;
  return inShop(ctx, async (tx) => {
    const inner = { ...ctx, tx };
    const [head] = await tx.select().from(heads).where(and(eq(heads.shopId, s), eq(heads.id, headId)));
    if (!head) throw new NotFound("head");
    const settings = await settingsOf(inner);
    const [family] = await tx.select().from(engineFamilies).where(and(eq(engineFamilies.shopId, s), eq(engineFamilies.name, head.family)));
    const valves = (family?.valves ?? []) as ValveOfFamily[];
    const tests = await withRepeatHistory(inner, (await rawTests(inner, { headIds: [headId] })).filter((t) => t.state === "complete"));
    const cams = await camsOf(inner, tests);
    const ports = Array.from({ length: head.cylinders }, (_, i) => i + 1).flatMap((cylinder) => (["intake", "exhaust"] as const).flatMap((side) => portFigures(cylinder, side, tests, valves, settings.benchCheckHours, cams) ?? []));
    const ratios = [...new Set(ports.map((p) => p.cylinder))].map((cylinder) => {
      const here = tests.filter((t) => t.cylinder === cylinder);
      return { cylinder, ratios: ratiosOfPort(standingTests(here, "intake", "complete"), standingTests(here, "exhaust", "complete")) };
    });
    const reports = await issuedReports(inner, [headId]);
    let estimates: EstimateFacts | null = null;
    if (settings.showFlowEstimates) {
      const intakeCams = await tx.select().from(camshafts).where(and(eq(camshafts.shopId, s), eq(camshafts.side, "intake"), eq(camshafts.active, true))).orderBy(asc(camshafts.label));
      const intake = ports.filter((p) => p.side === "intake").flatMap((p) => {
        const standing = standingTests(tests.filter((t) => t.cylinder === p.cylinder), "intake", "complete");
        return ([["before", standing.before], ["after", standing.after]] as const).flatMap(([when, test]) => (test ? [{ cylinder: p.cylinder, when, atInH2O: test.nominalInH2O, readings: figuresOfTest(test).readings.map(({ liftUm, flowCfm }) => ({ liftUm, flowCfm })) }] : []));
      });
      estimates = {
        cylinders: head.cylinders, boreMm: head.boreMm ?? family?.boreMm ?? null, strokeMm: head.strokeMm ?? family?.strokeMm ?? null, ports: intake,
        cams: intakeCams.map((c) => ({ id: c.id, label: c.label, maxLiftUm: c.maxLiftUm, durationDeg: c.durationDeg, profile: c.profile as CamPoint[] })),
      };
    }
    return { head: { id: head.id, mark: head.mark, family: head.family }, ports, ratios, reports, estimates, settingsVersion: settings.version, maySwitch: ableTo(ctx, "settings.write") };
  });
}
