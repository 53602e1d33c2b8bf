import "server-only";
import { randomUUID } from "node:crypto";
import { and, eq, sql } from "drizzle-orm";
import { benches, checkPlates, fixtures, flowTests, liftDevices } from "@/db/schema";
import { defineCommand } from "@/modules/access/command";
import type { TxContext } from "@/modules/access/context";
import { ok, refuse } from "@/modules/kernel/result";
import type { z } from "@/modules/kernel/zod";
import type { BenchRange } from "../domain/raw-test";
import {
  benchEditInput, benchInput, fixtureEditInput, fixtureInput, liftDeviceEditInput, liftDeviceInput, plateEditInput, plateInput,
} from "../gear-input";
import { staleOrGone } from "./stale";

type BenchIn = z.output<typeof benchInput>;
const benchColumns = (b: BenchIn) => ({
  name: b.name, kind: b.kind, scale: b.scale, waterUnit: b.waterUnit, nominalPressuresInH2O: b.nominalPressures, maxFlowCfm: b.maxFlow,
  ranges: b.ranges.map((r): BenchRange => ({ label: r.label, fullScaleCfm: r.fullScaleCfm, ...(r.fullScaleHead === null || b.scale !== "orifice_head" ? {} : { fullScaleHead: r.fullScaleHead }) })),
  pressureUncertaintyInH2O: b.uPressure, readingUncertaintyCfm: b.uReading, altitudeM: b.altitude, active: b.active,
});

export const setUpBench = defineCommand({
  name: "flow.set-up-bench", act: "flow.set-up", input: benchInput,
  async run(ctx, input) {
    const id = randomUUID();
    await ctx.tx.insert(benches).values({ shopId: ctx.shop.id, id, ...benchColumns(input) });
    return ok({ id, name: input.name });
  },
  subject: (_, value) => ({ kind: "bench", id: value.id }),
});

const readOn = (ctx: TxContext, at: ReturnType<typeof eq>) => ctx.tx.select({ id: flowTests.id }).from(flowTests).where(and(eq(flowTests.shopId, ctx.shop.id), at)).limit(1);
/** The head at full scale counts on a manometer only. */
const sameRange = (scale: string, a: BenchRange, b: BenchRange) => a.label === b.label && a.fullScaleCfm === b.fullScaleCfm && (scale !== "orifice_head" || (a.fullScaleHead ?? null) === (b.fullScaleHead ?? null));

/** Scale, ranges and water unit turn raw readings into flow, so once a test was read on the bench they stay; ranges may be added. */
export const changeBench = defineCommand({
  name: "flow.change-bench", act: "flow.set-up", input: benchEditInput,
  subject: (input) => ({ kind: "bench", id: input.id }),
  async run(ctx, { id, version, ...input }) {
    const at = and(eq(benches.shopId, ctx.shop.id), eq(benches.id, id));
    const [now] = await ctx.tx.select().from(benches).where(at);
    if (!now) return refuse("NOT_FOUND", "This bench is not here any more.");
    const values = benchColumns(input);
    const kept = (now.ranges as BenchRange[]).every((old) => values.ranges.some((r) => sameRange(now.scale, old, r)));
    if (!kept || now.scale !== values.scale || now.kind !== values.kind || now.waterUnit !== values.waterUnit) {
      if ((await readOn(ctx, eq(flowTests.benchId, id))).length > 0) {
        return refuse("BENCH_IN_USE", "Tests were read on this bench, and their flow comes from its scale and ranges. Ranges may be added, not changed. Add a rebuilt bench under its own name.", { field: kept ? "scale" : "ranges" });
      }
    }
    const [row] = await ctx.tx.update(benches).set({ ...values, version: sql`${benches.version} + 1` }).where(and(at, eq(benches.version, version))).returning({ version: benches.version });
    return row ? ok({ id, version: row.version }) : staleOrGone(ctx, benches, id, "This bench");
  },
});

const plateColumns = (p: z.output<typeof plateInput>) => ({
  serial: p.serial, referenceFlowCfm: p.referenceFlow, atPressureInH2O: p.atPressure, certificate: p.certificate, dueOn: p.dueOn || null, active: p.active,
});
export const addCheckPlate = defineCommand({
  name: "flow.add-check-plate", act: "flow.set-up", input: plateInput,
  async run(ctx, input) {
    const id = randomUUID();
    await ctx.tx.insert(checkPlates).values({ shopId: ctx.shop.id, id, ...plateColumns(input) });
    return ok({ id });
  },
  subject: (_, value) => ({ kind: "check-plate", id: value.id }),
});
/** Earlier bench checks keep the flow the plate had on their day. */
export const changeCheckPlate = defineCommand({
  name: "flow.change-check-plate", act: "flow.set-up", input: plateEditInput,
  subject: (input) => ({ kind: "check-plate", id: input.id }),
  async run(ctx, { id, version, ...input }) {
    const [row] = await ctx.tx.update(checkPlates).set({ ...plateColumns(input), version: sql`${checkPlates.version} + 1` })
      .where(and(eq(checkPlates.shopId, ctx.shop.id), eq(checkPlates.id, id), eq(checkPlates.version, version))).returning({ version: checkPlates.version });
    return row ? ok({ id, version: row.version }) : staleOrGone(ctx, checkPlates, id, "This check plate");
  },
});

const fixtureColumns = (f: z.output<typeof fixtureInput>) => ({ name: f.name, boreMm: f.bore, lengthMm: f.length, headPattern: f.headPattern, plate: f.plate, active: f.active });
export const setUpFixture = defineCommand({
  name: "flow.set-up-fixture", act: "flow.set-up", input: fixtureInput,
  async run(ctx, input) {
    const id = randomUUID();
    await ctx.tx.insert(fixtures).values({ shopId: ctx.shop.id, id, ...fixtureColumns(input) });
    return ok({ id });
  },
  subject: (_, value) => ({ kind: "fixture", id: value.id }),
});
/** The bore stands on every test read through the fixture, so it stays once there is one. */
export const changeFixture = defineCommand({
  name: "flow.change-fixture", act: "flow.set-up", input: fixtureEditInput,
  subject: (input) => ({ kind: "fixture", id: input.id }),
  async run(ctx, { id, version, ...input }) {
    const at = and(eq(fixtures.shopId, ctx.shop.id), eq(fixtures.id, id));
    const [now] = await ctx.tx.select({ boreMm: fixtures.boreMm }).from(fixtures).where(at);
    if (now && now.boreMm !== input.bore && (await readOn(ctx, eq(flowTests.fixtureId, id))).length > 0) {
      return refuse("FIXTURE_IN_USE", `Tests were read through this fixture at ${now.boreMm} mm. Add a sleeve of another bore as a fixture of its own.`, { field: "bore" });
    }
    const [row] = await ctx.tx.update(fixtures).set({ ...fixtureColumns(input), version: sql`${fixtures.version} + 1` }).where(and(at, eq(fixtures.version, version))).returning({ version: fixtures.version });
    return row ? ok({ id, version: row.version }) : staleOrGone(ctx, fixtures, id, "This fixture");
  },
});

const deviceColumns = (d: z.output<typeof liftDeviceInput>) => ({ name: d.name, resolutionMm: d.resolution, uncertaintyMm: d.uncertainty, active: d.active });
export const addLiftDevice = defineCommand({
  name: "flow.add-lift-device", act: "flow.set-up", input: liftDeviceInput,
  async run(ctx, input) {
    const id = randomUUID();
    await ctx.tx.insert(liftDevices).values({ shopId: ctx.shop.id, id, ...deviceColumns(input) });
    return ok({ id });
  },
  subject: (_, value) => ({ kind: "lift-device", id: value.id }),
});
export const changeLiftDevice = defineCommand({
  name: "flow.change-lift-device", act: "flow.set-up", input: liftDeviceEditInput,
  subject: (input) => ({ kind: "lift-device", id: input.id }),
  async run(ctx, { id, version, ...input }) {
    const [row] = await ctx.tx.update(liftDevices).set({ ...deviceColumns(input), version: sql`${liftDevices.version} + 1` })
      .where(and(eq(liftDevices.shopId, ctx.shop.id), eq(liftDevices.id, id), eq(liftDevices.version, version))).returning({ version: liftDevices.version });
    return row ? ok({ id, version: row.version }) : staleOrGone(ctx, liftDevices, id, "This lift device");
  },
});
