import "server-only";
import { randomUUID } from "node:crypto";
import { and, count, eq, isNull } from "drizzle-orm";
import { benchChecks, flowTests } from "@/db/schema";
import { defineCommand } from "@/modules/access/command";
import { personIdOf } from "@/modules/access/context";
import { ok, refuse } from "@/modules/kernel/result";
import { strikeCheckInput } from "../gear-input";
import { latestCheck } from "./gear";

/**
 * Puts a wrong bench check out of use: a row of its own beside it, with the reason, so the history stays whole. From then on
 * the check before it counts. Tests still open take that one's factor; finished ones are frozen and are only counted here.
 */
export const strikeBenchCheck = defineCommand({
  name: "flow.strike-bench-check",
  act: "flow.set-up",
  input: strikeCheckInput,
  async run(ctx, { checkId, reason }) {
    const { tx, shop } = ctx;
    const [check] = await tx.select().from(benchChecks).where(and(eq(benchChecks.shopId, shop.id), eq(benchChecks.id, checkId), isNull(benchChecks.strikes)));
    if (!check) return refuse("NOT_FOUND", "This check is not here.");
    const id = randomUUID();
    // Its own factor is no measurement and never read: the row only says which check it is about.
    await tx.insert(benchChecks).values({
      shopId: shop.id, id, benchId: check.benchId, at: ctx.now, personId: personIdOf(ctx), plateReadings: [], factor: check.factor, maxResidualPercent: 0, reason, strikes: checkId,
    });
    const standing = await latestCheck(ctx, check.benchId);
    const relied = and(eq(flowTests.shopId, shop.id), eq(flowTests.benchId, check.benchId), eq(flowTests.benchCheckedAt, check.at));
    const open = await tx.update(flowTests).set({ benchFactor: standing?.factor ?? 1, benchCheckedAt: standing?.at ?? null }).where(and(relied, eq(flowTests.state, "draft"))).returning({ id: flowTests.id });
    const [{ n } = { n: 0 }] = await tx.select({ n: count() }).from(flowTests).where(and(relied, eq(flowTests.state, "complete")));
    return ok({ id, benchId: check.benchId, factor: standing?.factor ?? null, openTests: open.length, finishedTests: n });
  },
  subject: (_, value) => ({ kind: "bench", id: value.benchId }),
});
