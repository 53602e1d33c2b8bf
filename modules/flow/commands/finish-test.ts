import "server-only";
import { randomUUID } from "node:crypto";
import { and, eq, sql } from "drizzle-orm";
import { flowReadings, flowTests } from "@/db/schema";
import { changedMeanwhile, defineCommand } from "@/modules/access/command";
import { personIdOf, type TxContext } from "@/modules/access/context";
import { ok, refuse } from "@/modules/kernel/result";
import type { LiftUnit } from "../domain/lift-ladder";
import { zeroReturnUm } from "../domain/zero-return";
import { correctInput, finishInput, voidInput } from "../input";
import { rawTests } from "../queries/tests-of-head";
import { draftTest } from "./change-test";
import { summariseTest } from "./summarise";

const at = (ctx: TxContext, testId: string) => and(eq(flowTests.shopId, ctx.shop.id), eq(flowTests.id, testId));

/** Freezes a test. What was planned and not read stays visible as not read. */
export const completeTest = defineCommand({
  name: "flow.complete-test",
  act: "flow.record",
  input: finishInput,
  async run(ctx, { testId, version, zeroReturn }) {
    const draft = await draftTest(ctx, testId, version);
    if (!draft.ok) return draft;
    const zero = zeroReturnUm(zeroReturn, draft.value.liftUnit as LiftUnit);
    if (!zero.ok) return zero;
    const [test] = await rawTests(ctx, { testIds: [testId] });
    const read = test?.cells.filter((c) => c.valueText !== "").length ?? 0;
    if (read === 0) return refuse("NOTHING_READ", "Nothing has been read yet. Type at least one reading, or void the test.");
    await ctx.tx.update(flowTests).set({ state: "complete", completedAt: ctx.now, ...(zero.value === null ? {} : { zeroReturnUm: zero.value }), version: sql`${flowTests.version} + 1` }).where(at(ctx, testId));
    await summariseTest(ctx, testId);
    return ok({ testId, version: version + 1, read });
  },
  subject: (input) => ({ kind: "flow-test", id: input.testId }),
});

/** Puts a test out of use, with the reason. It stays in the record. */
export const voidTest = defineCommand({
  name: "flow.void-test",
  act: "flow.record",
  input: voidInput,
  async run(ctx, { testId, version, reason }) {
    const [test] = await ctx.tx.select().from(flowTests).where(at(ctx, testId)).for("update");
    if (!test) return refuse("NOT_FOUND", "This test is not here.");
    if (test.state === "void") return refuse("TEST_VOID", "This test is void already.");
    if (test.version !== version) return changedMeanwhile("This test");
    await ctx.tx.update(flowTests).set({ state: "void", voidReason: reason, version: sql`${flowTests.version} + 1` }).where(at(ctx, testId));
    return ok({ testId, version: version + 1 });
  },
  subject: (input) => ({ kind: "flow-test", id: input.testId }),
});

/** Corrects a finished test by a new one that names it and begins with its readings. The old one stays as it is. */
export const correctTest = defineCommand({
  name: "flow.correct-test",
  act: "flow.record",
  input: correctInput,
  async run(ctx, { testId, reason }) {
    const { tx, shop } = ctx;
    const [old] = await tx.select().from(flowTests).where(at(ctx, testId)).for("update");
    if (!old) return refuse("NOT_FOUND", "This test is not here.");
    if (old.state !== "complete") return refuse("NOT_FINISHED", "Only a finished test is corrected by a new one. Change this one directly.");
    const sameSide = and(eq(flowTests.shopId, shop.id), eq(flowTests.headId, old.headId), eq(flowTests.cylinder, old.cylinder), eq(flowTests.side, old.side));
    const open = await tx.select({ id: flowTests.id }).from(flowTests).where(and(sameSide, eq(flowTests.state, "draft")));
    if (open.length > 0) return refuse("TEST_OPEN", "A test of this port is still open. Finish or void it first.");
    const [{ n } = { n: 0 }] = await tx.select({ n: sql<number>`count(*)::int` }).from(flowTests).where(and(sameSide, eq(flowTests.purpose, old.purpose)));
    const id = randomUUID();
    await tx.insert(flowTests).values({
      ...old, id, runNo: n + 1, state: "draft", completedAt: null, correctsTestId: old.id, version: 1, createdAt: ctx.now, operatorId: personIdOf(ctx) ?? old.operatorId,
      notes: [`Corrects run ${old.runNo}: ${reason}`, old.notes].filter(Boolean).join("\n"),
    });
    const newest = await tx.selectDistinctOn([flowReadings.liftUm, flowReadings.repeatNo]).from(flowReadings)
      .where(and(eq(flowReadings.shopId, shop.id), eq(flowReadings.testId, old.id)))
      .orderBy(flowReadings.liftUm, flowReadings.repeatNo, sql`${flowReadings.revision} desc`);
    const kept = newest.filter((r) => r.clearedAt === null);
    if (kept.length > 0) {
      await tx.insert(flowReadings).values(kept.map((r) => ({ ...r, id: randomUUID(), testId: id, revision: 1, source: "copied", createdAt: ctx.now })));
    }
    return ok({ testId: id, version: 1 });
  },
  subject: (_, value) => ({ kind: "flow-test", id: value.testId }),
});
