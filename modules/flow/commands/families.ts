import "server-only";
import { randomUUID } from "node:crypto";
import { and, eq, sql } from "drizzle-orm";
import { camshafts, engineFamilies, flowTests, heads } from "@/db/schema";
import { defineCommand } from "@/modules/access/command";
import { ok, refuse, type Result } from "@/modules/kernel/result";
import type { z } from "@/modules/kernel/zod";
import { camTable, type CamPoint } from "../domain/cam-table";
import type { ValveOfFamily } from "../domain/valve-list";
import { camshaftEditInput, camshaftInput, familyEditInput, familyInput, headWorkInput, ownHeadInput } from "../gear-input";
import { staleOrGone } from "./stale";

/** The greatest lift of a table is the table's own; the typed one must agree with it to 0.05 mm. */
function camColumns(c: z.output<typeof camshaftInput>): Result<{ label: string; side: string; maxLiftUm: number; durationDeg: number | null; profile: readonly CamPoint[]; dataSource: string; active: boolean }> {
  const rest = { label: c.label, side: c.side, durationDeg: c.duration, dataSource: c.dataSource, active: c.active };
  if (c.profile.trim() === "") return ok({ ...rest, maxLiftUm: c.maxLift, profile: [] });
  const table = camTable(c.profile, c.profileUnit);
  if (!table.ok) return table;
  const peakUm = Math.max(...table.value.map((p) => p.liftUm));
  if (Math.abs(peakUm - c.maxLift) > 50) {
    return refuse("CAM_LIFT_DIFFERS", `The table reaches ${(peakUm / 1000).toFixed(3)} mm and the maximum typed is ${(c.maxLift / 1000).toFixed(3)} mm. Make them agree; check the unit of the table.`, { field: "maxLift" });
  }
  return ok({ ...rest, maxLiftUm: peakUm, profile: table.value });
}

export const addCamshaft = defineCommand({
  name: "flow.add-camshaft", act: "flow.set-up", input: camshaftInput,
  async run(ctx, input) {
    const values = camColumns(input);
    if (!values.ok) return values;
    const id = randomUUID();
    await ctx.tx.insert(camshafts).values({ shopId: ctx.shop.id, id, ...values.value });
    return ok({ id, points: values.value.profile.length });
  },
  subject: (_, value) => ({ kind: "camshaft", id: value.id }),
});

/** Lift and table stay once a test names the cam; what is written about it may change. */
export const changeCamshaft = defineCommand({
  name: "flow.change-camshaft", act: "flow.set-up", input: camshaftEditInput,
  subject: (input) => ({ kind: "camshaft", id: input.id }),
  async run(ctx, { id, version, ...input }) {
    const values = camColumns(input);
    if (!values.ok) return values;
    const at = and(eq(camshafts.shopId, ctx.shop.id), eq(camshafts.id, id));
    const [now] = await ctx.tx.select().from(camshafts).where(at);
    if (!now) return refuse("NOT_FOUND", "This camshaft is not here any more.");
    const table = (p: unknown) => JSON.stringify((p as CamPoint[]).map((x) => [x.angleDeg, x.liftUm]));
    const moved = now.maxLiftUm !== values.value.maxLiftUm || now.durationDeg !== values.value.durationDeg || now.side !== values.value.side || table(now.profile) !== table(values.value.profile);
    if (moved) {
      const used = await ctx.tx.select({ id: flowTests.id }).from(flowTests).where(and(eq(flowTests.shopId, ctx.shop.id), eq(flowTests.camshaftId, id))).limit(1);
      if (used.length > 0) return refuse("CAMSHAFT_IN_USE", "Tests name this camshaft, so its lift stays. Add the other one under its own label.", { field: "maxLift" });
    }
    const [row] = await ctx.tx.update(camshafts).set({ ...values.value, version: sql`${camshafts.version} + 1` }).where(and(at, eq(camshafts.version, version))).returning({ version: camshafts.version });
    return row ? ok({ id, version: row.version }) : staleOrGone(ctx, camshafts, id, "This camshaft");
  },
});

const familyColumns = (f: z.output<typeof familyInput>) => ({
  name: f.name, cylinders: f.cylinders, boreMm: f.bore, strokeMm: f.stroke, camLiftIntakeUm: f.camLiftIntake, camLiftExhaustUm: f.camLiftExhaust, notes: f.notes,
  valves: f.valves.map((v): ValveOfFamily => ({ side: v.side, position: v.position, headMm: v.head, stemMm: v.stem, seatAngleDeg: v.seatAngle })),
});

export const setUpFamily = defineCommand({
  name: "flow.set-up-family", act: "flow.set-up", input: familyInput,
  async run(ctx, input) {
    const id = randomUUID();
    await ctx.tx.insert(engineFamilies).values({ shopId: ctx.shop.id, id, ...familyColumns(input) });
    return ok({ id });
  },
  subject: (_, value) => ({ kind: "engine-family", id: value.id }),
});

export const changeFamily = defineCommand({
  name: "flow.change-family", act: "flow.set-up", input: familyEditInput,
  subject: (input) => ({ kind: "engine-family", id: input.id }),
  async run(ctx, { id, version, ...input }) {
    const at = and(eq(engineFamilies.shopId, ctx.shop.id), eq(engineFamilies.id, id));
    const [now] = await ctx.tx.select({ name: engineFamilies.name }).from(engineFamilies).where(at);
    // Heads and limits know their family by its name.
    if (now && now.name !== input.name) {
      const used = await ctx.tx.select({ id: heads.id }).from(heads).where(and(eq(heads.shopId, ctx.shop.id), eq(heads.family, now.name))).limit(1);
      if (used.length > 0) return refuse("FAMILY_IN_USE", `Heads are filed under ${now.name}. Keep the name, or add the other family beside it.`, { field: "name" });
    }
    const [row] = await ctx.tx.update(engineFamilies).set({ ...familyColumns(input), version: sql`${engineFamilies.version} + 1` })
      .where(and(at, eq(engineFamilies.version, version))).returning({ version: engineFamilies.version });
    return row ? ok({ id, version: row.version }) : staleOrGone(ctx, engineFamilies, id, "This family");
  },
});

/** The shop's own casting, for development. It has no customer and no order. Sheets are found by the mark, so no two heads carry one. */
export const addOwnHead = defineCommand({
  name: "flow.add-own-head", act: "flow.record", input: ownHeadInput,
  async run(ctx, input) {
    // Two of one mark at the same moment: the second waits and then sees the first.
    await ctx.tx.execute(sql`select pg_advisory_xact_lock(hashtextextended(${`${ctx.shop.id}:mark:${input.mark.toLowerCase()}`}, 2))`);
    const taken = await ctx.tx.select({ id: heads.id }).from(heads).where(and(eq(heads.shopId, ctx.shop.id), sql`lower(${heads.mark}) = lower(${input.mark})`)).limit(1);
    if (taken[0]) return refuse("MARK_TAKEN", "A head of this mark is here already: open it, or give this one another mark.", { field: "mark", data: { headId: taken[0].id } });
    const [family] = await ctx.tx.select().from(engineFamilies).where(and(eq(engineFamilies.shopId, ctx.shop.id), eq(engineFamilies.name, input.family)));
    const id = randomUUID();
    await ctx.tx.insert(heads).values({
      shopId: ctx.shop.id, id, ownerKind: "development", mark: input.mark, family: input.family, castingNumber: input.castingNumber, cylinders: input.cylinders ?? family?.cylinders ?? 1,
      boreMm: input.bore ?? family?.boreMm ?? null, strokeMm: input.stroke ?? family?.strokeMm ?? null, seatMaterial: input.seatMaterial, workDone: input.workDone, notes: input.notes,
      camLiftIntakeUm: family?.camLiftIntakeUm ?? null, camLiftExhaustUm: family?.camLiftExhaustUm ?? null,
    });
    return ok({ id, mark: input.mark });
  },
  subject: (_, value) => ({ kind: "head", id: value.id }),
});

/** What was done to a head, as the library looks for it. */
export const changeHeadWork = defineCommand({
  name: "flow.change-head-work", act: "flow.record", input: headWorkInput,
  subject: (input) => ({ kind: "head", id: input.id }),
  async run(ctx, input) {
    const [row] = await ctx.tx.update(heads).set({ workDone: input.workDone, notes: input.notes, version: sql`${heads.version} + 1` })
      .where(and(eq(heads.shopId, ctx.shop.id), eq(heads.id, input.id), eq(heads.version, input.version))).returning({ version: heads.version });
    return row ? ok({ id: input.id, version: row.version }) : staleOrGone(ctx, heads, input.id, "This head");
  },
});
