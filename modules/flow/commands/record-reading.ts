import "server-only";
import { randomUUID } from "node:crypto";
import { and, eq } from "drizzle-orm";
import { flowReadings, flowTests } from "@/db/schema";
import { defineCommand } from "@/modules/access/command";
import { personIdOf, type TxContext } from "@/modules/access/context";
import { ok, refuse, type Result } from "@/modules/kernel/result";
import type { z } from "@/modules/kernel/zod";
import { heldInH2O, SCALE_UNIT } from "../domain/computed-reading";
import { mayBeKept } from "../domain/entry-questions";
import { parseLiftUm } from "../domain/lift-ladder";
import type { RawCell, RawTest } from "../domain/raw-test";
import { figuresOfTest } from "../domain/test-figures";
import { typedNumber } from "../domain/typed-number";
import { readingInput } from "../input";
import { rawTests } from "../queries/tests-of-head";
import { draftTest, type TestRow } from "./change-test";
import { latestCheck } from "./gear";

export type TypedCell = Omit<z.output<typeof readingInput>, "testId">;
export interface SavedReading { testId: string; liftUm: number; repeatNo: number; revision: number; valueText: string; flowCfm: number | null; flags: string[]; takenAt: string }

/** A reading may have been typed without a link; so old it may be. */
const KEPT_DAYS = 14;

function whenTaken(ctx: TxContext, text: string | undefined): Date {
  const taken = text === undefined ? ctx.now : new Date(text);
  const age = ctx.now.getTime() - taken.getTime();
  return age < 0 || age > KEPT_DAYS * 86_400_000 ? ctx.now : taken;
}

/** The first reading of a test fixes the check it relies on: one made after the sheet was opened counts. */
async function takeLatestCheck(ctx: TxContext, test: TestRow): Promise<void> {
  const check = await latestCheck(ctx, test.benchId);
  if (!check || (test.benchCheckedAt && check.at <= test.benchCheckedAt)) return;
  await ctx.tx.update(flowTests).set({ benchFactor: check.factor, benchCheckedAt: check.at, startedAt: ctx.now }).where(and(eq(flowTests.shopId, ctx.shop.id), eq(flowTests.id, test.id)));
}

/** Judges the cell as it would stand among the others; null = fine, or accepted with a reason. */
function judged(test: RawTest, cell: RawCell) {
  const others = test.cells.filter((c) => c.liftUm !== cell.liftUm || c.repeatNo !== cell.repeatNo);
  const computed = figuresOfTest({ ...test, cells: [...others, cell] }).cells.find((c) => c.liftUm === cell.liftUm && c.repeatNo === cell.repeatNo);
  const hasReason = (cell.acceptedReason ?? "") !== "";
  if (computed?.question && !hasReason) return { computed, refused: refuse(computed.question.code, computed.question.words, { field: "value", data: { askReason: true } }) };
  const refusal = computed?.refusal ?? null;
  const negativeKept = computed?.question?.code === "FLOW_NEGATIVE" && hasReason;
  if (refusal && !negativeKept) {
    const mayKeep = mayBeKept(refusal.code);
    if (!mayKeep || !hasReason) return { computed, refused: refuse(refusal.code, refusal.message, { field: refusal.field ?? "value", data: { askReason: mayKeep } }) };
  }
  return { computed, refused: null };
}

/**
 * Writes one cell as its next revision; what stood there stays in the ledger. An empty value clears the cell.
 * Inner: joins the caller's transaction, the test is locked by it. `test` saves the read when many are written.
 */
export async function writeReading(ctx: TxContext, testId: string, input: TypedCell, source = "typed"): Promise<Result<SavedReading>> {
  const draft = await draftTest(ctx, testId);
  if (!draft.ok) return draft;
  const lift = parseLiftUm(input.lift, input.liftUnit);
  if (!lift.ok) return lift;
  let [test] = await rawTests(ctx, { testIds: [testId] });
  if (!test) return refuse("NOT_FOUND", "This test is not here.");
  if (test.cells.length === 0) {
    await takeLatestCheck(ctx, draft.value);
    [test = test] = await rawTests(ctx, { testIds: [testId] });
  }
  const standing = test.cells.find((c) => c.liftUm === lift.value && c.repeatNo === input.repeatNo);
  const revision = standing?.revision ?? 0;
  if (revision !== input.revisionSeen) {
    return refuse("CHANGED_MEANWHILE", `This cell was written somewhere else meanwhile: it says ${standing?.valueText || "nothing"}. What you typed is still here.`, { field: "value", data: { revision, valueText: standing?.valueText ?? "" } });
  }
  const cleared = input.value === "";
  if (cleared && revision === 0) return refuse("NOTHING_THERE", "There is nothing in this cell to clear.", { field: "value" });
  const cell: RawCell = {
    liftUm: lift.value, repeatNo: input.repeatNo, revision: revision + 1, valueText: input.value, valueUnit: input.valueUnit ?? SCALE_UNIT[test.bench.scale],
    rangeLabel: input.range ?? null, pressureText: input.pressure || String(test.nominalInH2O), pressureUnit: input.pressure ? input.pressureUnit : "inH2O",
    ...(input.portTemperature ? { portTemperatureText: input.portTemperature } : {}), ...(input.orificeTemperature ? { orificeTemperatureText: input.orificeTemperature } : {}),
    acceptedReason: input.acceptedReason || null, excludedReason: input.excludedReason || null, takenAt: whenTaken(ctx, input.takenAt).toISOString(),
  };
  const value = cleared ? null : typedNumber(input.value);
  if (value && !value.ok) return value;
  const held = heldInH2O(cell.pressureText, cell.pressureUnit, test.bench.waterUnit);
  if (!held.ok) return held;
  const { computed, refused } = cleared ? { computed: undefined, refused: null } : judged(test, cell);
  if (refused) return refused;
  await ctx.tx.insert(flowReadings).values({
    shopId: ctx.shop.id, id: randomUUID(), testId, liftUm: cell.liftUm, liftText: input.lift, liftUnit: input.liftUnit, repeatNo: cell.repeatNo, revision: cell.revision,
    valueText: cell.valueText, valueUnit: cell.valueUnit, rangeLabel: cell.rangeLabel, pressureText: cell.pressureText, pressureUnit: cell.pressureUnit,
    portTemperatureText: cell.portTemperatureText ?? null, orificeTemperatureText: cell.orificeTemperatureText ?? null, acceptedReason: cell.acceptedReason, excludedReason: cell.excludedReason,
    clearedAt: cleared ? ctx.now : null, takenAt: new Date(cell.takenAt), personId: personIdOf(ctx), source,
  });
  return ok({
    testId, liftUm: cell.liftUm, repeatNo: cell.repeatNo, revision: cell.revision, valueText: cell.valueText, flowCfm: computed?.flowCfm ?? null, flags: [...(computed?.flags ?? [])], takenAt: cell.takenAt,
  });
}

export const recordReading = defineCommand({
  name: "flow.record-reading",
  act: "flow.record",
  input: readingInput,
  run: (ctx, { testId, ...cell }) => writeReading(ctx, testId, cell, ctx.actor.kind === "device" ? "bench" : "typed"),
  subject: (input) => ({ kind: "flow-test", id: input.testId }),
});
