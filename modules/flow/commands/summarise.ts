import "server-only";
import { and, eq, isNull, lt, or } from "drizzle-orm";
import { flowTests, flowTestSummaries, heads } from "@/db/schema";
import type { TxContext } from "@/modules/access/context";
import { FLOW_CONSTANTS_VERSION, summaryOfTest } from "../domain/test-summary";
import { rawTests } from "../queries/tests-of-head";

/** Makes or remakes the library's row about one finished test. Inner: joins the caller's transaction. False = no such test. */
export async function summariseTest(ctx: TxContext, testId: string): Promise<boolean> {
  const [test] = await rawTests(ctx, { testIds: [testId] });
  if (!test) return false;
  const [head] = await ctx.tx.select({ family: heads.family }).from(heads).where(and(eq(heads.shopId, ctx.shop.id), eq(heads.id, test.headId)));
  if (!head) return false;
  const s = summaryOfTest(test);
  const row = {
    headId: test.headId, benchId: test.bench.id, family: head.family, side: test.side, purpose: test.purpose, startedAt: new Date(test.startedAt), atInH2O: test.nominalInH2O,
    liftsUm: [...s.liftsUm], flowsCfm: [...s.flowsCfm], peakCfm: s.peakCfm, peakLiftUm: s.peakLiftUm, meanToCamCfm: s.meanToCamCfm, doubts: s.doubts, isConverted: s.isConverted,
    repeatSquaresCfm2: s.repeats.squaresCfm2, repeatDof: s.repeats.dof,
    constantsVersion: FLOW_CONSTANTS_VERSION, madeAt: ctx.now,
  };
  await ctx.tx.insert(flowTestSummaries).values({ shopId: ctx.shop.id, testId, ...row })
    .onConflictDoUpdate({ target: [flowTestSummaries.shopId, flowTestSummaries.testId], set: row });
  return true;
}

/** Finished tests whose row is missing or made under older constants, some at a time. Returns how many were made. */
export async function summariseMissing(ctx: TxContext, atMost = 200): Promise<number> {
  const due = await ctx.tx.select({ id: flowTests.id }).from(flowTests)
    .leftJoin(flowTestSummaries, and(eq(flowTestSummaries.shopId, flowTests.shopId), eq(flowTestSummaries.testId, flowTests.id)))
    .where(and(eq(flowTests.shopId, ctx.shop.id), eq(flowTests.state, "complete"), or(isNull(flowTestSummaries.testId), lt(flowTestSummaries.constantsVersion, FLOW_CONSTANTS_VERSION))))
    .limit(atMost);
  for (const test of due) await summariseTest(ctx, test.id);
  return due.length;
}
