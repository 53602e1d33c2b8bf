import "server-only";
import { and, desc, eq } from "drizzle-orm";
import { heads } from "@/db/schema";
import { defineCommand } from "@/modules/access/command";
import { ok, refuse } from "@/modules/kernel/result";
import { isIncreasing } from "../domain/neighbours";
import { parseLiftUm } from "../domain/lift-ladder";
import { wholeTestInput } from "../input";
import { completeTest } from "./finish-test";
import { writeReading, type SavedReading } from "./record-reading";
import { openTest } from "./start-test";

/** A whole test at once, from a bench computer or a program: all of it is kept, or nothing. */
export const postWholeTest = defineCommand({
  name: "flow.post-test",
  act: "flow.record",
  input: wholeTestInput,
  async run(ctx, { headId: givenId, tag, readings, complete, zeroReturn, ...input }) {
    const [head] = await ctx.tx.select({ id: heads.id }).from(heads)
      .where(and(eq(heads.shopId, ctx.shop.id), givenId ? eq(heads.id, givenId) : eq(heads.mark, tag ?? ""))).orderBy(desc(heads.createdAt)).limit(1);
    if (!head) return refuse("NOT_FOUND", "No head of that tag is here.", { field: givenId ? "headId" : "tag" });
    const ums: number[] = [];
    for (const [i, r] of readings.entries()) {
      const um = parseLiftUm(r.lift, input.liftUnit);
      if (!um.ok) return refuse(um.refusal.code, um.refusal.message, { field: `readings.${i}.lift` });
      ums.push(um.value);
    }
    const first = readings.flatMap((r, i) => (r.repeatNo === 1 ? [ums[i] ?? 0] : []));
    if (!isIncreasing(first) && input.liftsReason === "") {
      return refuse("LIFTS_NOT_ASCENDING", "Each lift should be higher than the one before. Check the order, or send liftsReason.", { field: "readings" });
    }
    const opened = await openTest(ctx, { ...input, headId: head.id, lifts: readings.filter((r) => r.repeatNo === 1).map((r) => r.lift) }, { importedFrom: ctx.actor.kind === "device" ? ctx.actor.name : "api" });
    if (!opened.ok) return opened;
    const { testId } = opened.value;
    const saved: SavedReading[] = [];
    const times = new Map<number, number>();
    for (const [i, r] of readings.entries()) {
      // A lift sent twice without a number of its own is a repeat.
      const repeatNo = Math.max(r.repeatNo, (times.get(ums[i] ?? 0) ?? 0) + 1);
      times.set(ums[i] ?? 0, repeatNo);
      const one = await writeReading(ctx, testId, { ...r, repeatNo, liftUnit: input.liftUnit, revisionSeen: 0 }, ctx.actor.kind === "device" ? "bench" : "api");
      if (!one.ok) return refuse(one.refusal.code, one.refusal.message, { field: `readings.${i}${one.refusal.field ? `.${one.refusal.field}` : ""}`, ...(one.refusal.data ? { data: one.refusal.data } : {}) });
      saved.push(one.value);
    }
    if (!complete) return ok({ testId, version: 1, state: "draft", readings: saved });
    const done = await completeTest(ctx, { testId, version: 1, zeroReturn });
    if (!done.ok) return done;
    return ok({ testId, version: done.value.version, state: "complete", readings: saved });
  },
  subject: (_, value) => ({ kind: "flow-test", id: value.testId }),
});
