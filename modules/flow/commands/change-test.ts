import "server-only";
import { and, eq, sql } from "drizzle-orm";
import { benches, flowTests } from "@/db/schema";
import { changedMeanwhile, defineCommand } from "@/modules/access/command";
import type { TxContext } from "@/modules/access/context";
import { ok, refuse, type Result } from "@/modules/kernel/result";
import type { z } from "@/modules/kernel/zod";
import type { LiftUnit } from "../domain/lift-ladder";
import { addLiftInput, changeSheetInput, changeTestInput, removeLiftInput } from "../input";
import { cellsOf } from "../queries/tests-of-head";
import { conditionColumns, gearHere, ofSide, plannedLifts } from "./start-test";

export type TestRow = typeof flowTests.$inferSelect;

/** The test, locked, if it is a draft of the version that was looked at. `version` left out: any. */
export async function draftTest(ctx: TxContext, testId: string, version?: number): Promise<Result<TestRow>> {
  const [test] = await ctx.tx.select().from(flowTests).where(and(eq(flowTests.shopId, ctx.shop.id), eq(flowTests.id, testId))).for("update");
  if (!test) return refuse("NOT_FOUND", "This test is not here.");
  if (test.state === "complete") return refuse("TEST_FINISHED", "This test is finished and stays as it is. Correct it with a new one.");
  if (test.state === "void") return refuse("TEST_VOID", "This test is void. Start a new one.");
  if (version !== undefined && test.version !== version) return changedMeanwhile("This test");
  return ok(test);
}

async function changeOne(ctx: TxContext, { testId, version, ...input }: z.output<typeof changeTestInput>): Promise<Result<{ testId: string; version: number }>> {
  const test = await draftTest(ctx, testId, version);
  if (!test.ok) return test;
  const [bench] = await ctx.tx.select({ kind: benches.kind }).from(benches).where(and(eq(benches.shopId, ctx.shop.id), eq(benches.id, test.value.benchId)));
  const gear = await gearHere(ctx, input, test.value.side, bench?.kind ?? "");
  if (!gear.ok) return gear;
  const columns = conditionColumns(input, test.value.liftUnit as LiftUnit);
  if (!columns.ok) return columns;
  await ctx.tx.update(flowTests).set({ ...columns.value, camLiftUm: columns.value.camLiftUm ?? gear.value.camLiftUm, version: sql`${flowTests.version} + 1` }).where(and(eq(flowTests.shopId, ctx.shop.id), eq(flowTests.id, testId)));
  return ok({ testId, version: version + 1 });
}

/** Conditions of a draft. The bench stays: another bench is another test. */
export const changeTestConditions = defineCommand({
  name: "flow.change-conditions",
  act: "flow.record",
  input: changeTestInput,
  run: changeOne,
  subject: (input) => ({ kind: "flow-test", id: input.testId }),
});

/** Conditions of the drafts of a sheet, which share the session: both change, or neither. */
export const changeSheetConditions = defineCommand({
  name: "flow.change-sheet",
  act: "flow.record",
  input: changeSheetInput,
  async run(ctx, { intake, exhaust, ...session }) {
    const versions: { testId: string; version: number }[] = [];
    for (const [name, side] of [["intake", intake], ["exhaust", exhaust]] as const) {
      if (!side) continue;
      const changed = await changeOne(ctx, { ...session, ...side });
      if (!changed.ok) return ofSide(name, changed);
      versions.push(changed.value);
    }
    return ok({ versions });
  },
  subject: (input) => ({ kind: "flow-test", id: input.intake?.testId ?? input.exhaust?.testId ?? "" }),
});

type Changed = { testId: string; version: number };

async function addOneLift(ctx: TxContext, { testId, version }: Changed, lift: string, reason: string): Promise<Result<Changed>> {
  const test = await draftTest(ctx, testId, version);
  if (!test.ok) return test;
  const added = plannedLifts([lift], test.value.liftUnit as LiftUnit, reason);
  if (!added.ok) return refuse(added.refusal.code, added.refusal.message, { field: "lift" });
  if (added.value.some((l) => test.value.lifts.some((o) => o.liftUm === l.liftUm))) return refuse("LIFT_THERE", "That lift is on the sheet already.", { field: "lift" });
  const lifts = [...test.value.lifts, ...added.value].sort((a, b) => a.liftUm - b.liftUm);
  const all = plannedLifts(lifts.map((l) => l.text), test.value.liftUnit as LiftUnit, reason);
  if (!all.ok) return refuse(all.refusal.code, all.refusal.message, { field: all.refusal.field === "lifts" ? "reason" : "lift" });
  await ctx.tx.update(flowTests).set({ lifts, version: sql`${flowTests.version} + 1` }).where(and(eq(flowTests.shopId, ctx.shop.id), eq(flowTests.id, testId)));
  return ok({ testId, version: version + 1 });
}

/** One more lift on the ladder of a draft, and of the other side's draft where asked: on every one that lacks it, or on none. */
export const addLift = defineCommand({
  name: "flow.add-lift",
  act: "flow.record",
  input: addLiftInput,
  async run(ctx, { testId, version, lift, reason, also }) {
    const added: Changed[] = [];
    const sheet = [{ testId, version }, ...(also ? [also] : [])];
    for (const test of sheet) {
      const one = await addOneLift(ctx, test, lift, reason);
      if (one.ok) added.push(one.value);
      // One side may have it already; the other still gets it.
      else if (one.refusal.code !== "LIFT_THERE" || (test === sheet.at(-1) && added.length === 0)) return one;
    }
    return ok({ testId, version: added.find((a) => a.testId === testId)?.version ?? version, added });
  },
  subject: (input) => ({ kind: "flow-test", id: input.testId }),
});

/** Takes a lift off the ladder of a draft: only one that holds no reading, and never the last. The ledger of readings is not touched. */
export const removeLift = defineCommand({
  name: "flow.remove-lift",
  act: "flow.record",
  input: removeLiftInput,
  async run(ctx, { testId, version, liftUm, also }) {
    const changed: Changed[] = [];
    for (const seen of [{ testId, version }, ...(also ? [also] : [])]) {
      const test = await draftTest(ctx, seen.testId, seen.version);
      if (!test.ok) return test;
      const lifts = test.value.lifts.filter((l) => l.liftUm !== liftUm);
      if (lifts.length === test.value.lifts.length) return refuse("NOT_FOUND", "This lift is not on the ladder.");
      if (lifts.length === 0) return refuse("LAST_LIFT", "This is the only lift of the test. Add another first, or void the test.");
      const cells = (await cellsOf(ctx, [seen.testId])).get(seen.testId) ?? [];
      if (cells.some((c) => c.liftUm === liftUm && c.valueText !== "")) return refuse("LIFT_READ", "This lift was read. Clear its readings first, or leave it on the sheet.");
      await ctx.tx.update(flowTests).set({ lifts, version: sql`${flowTests.version} + 1` }).where(and(eq(flowTests.shopId, ctx.shop.id), eq(flowTests.id, seen.testId)));
      changed.push({ testId: seen.testId, version: seen.version + 1 });
    }
    return ok({ changed });
  },
  subject: (input) => ({ kind: "flow-test", id: input.testId }),
});
