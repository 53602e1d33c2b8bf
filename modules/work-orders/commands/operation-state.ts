import "server-only";
import { and, eq, isNull, sql } from "drizzle-orm";
import { operations, timeEntries, workPieces } from "@/db/schema";
import { changedMeanwhile, defineCommand } from "@/modules/access/command";
import { ableTo, personIdOf } from "@/modules/access/context";
import { ok, refuse } from "@/modules/kernel/result";
import { operationStateInput } from "../input";

/** Marks an operation done, skips it with a reason, or takes the skip back. Skipping is for the lead; a finished one is opened again by `reopenOperation`, which keeps why. */
export const markOperation = defineCommand({
  name: "operations.mark",
  act: "work.record",
  input: operationStateInput,
  async run(ctx, input) {
    const at = and(eq(operations.shopId, ctx.shop.id), eq(operations.id, input.operationId));
    const [row] = await ctx.tx.select({ o: operations, released: workPieces.releasedAt, bookedIn: workPieces.bookedInAt }).from(operations)
      .innerJoin(workPieces, and(eq(workPieces.shopId, operations.shopId), eq(workPieces.id, operations.pieceId))).where(at).for("update", { of: operations });
    if (!row || row.o.removedAt) return refuse("NOT_FOUND", "This operation is not on the order any more.");
    const { o } = row;
    if (row.released) return refuse("RELEASED", "This piece is released and read only. Open it again first.");
    if (!row.bookedIn) return refuse("NOT_BOOKED_IN", "This piece is not booked in. Nothing can be done on it yet.");
    if (o.version !== input.version) return changedMeanwhile("This operation");
    if (input.to !== "done" && !ableTo(ctx, "work.override")) return refuse("LEAD_ONLY", "Only the lead or a manager skips an operation or opens it again.");
    if (input.to !== "done" && o.doneAt) return refuse("DONE_ALREADY", "This operation is done. Open it again with a reason first: time on it is rework from then on.");
    if (input.to === "done" && o.doneAt) return refuse("DONE_ALREADY", "This operation is done already.");
    const [running] = await ctx.tx.select({ id: timeEntries.id }).from(timeEntries)
      .where(and(eq(timeEntries.shopId, ctx.shop.id), eq(timeEntries.operationId, o.id), eq(timeEntries.clock, "bench"), isNull(timeEntries.endedAt), isNull(timeEntries.voidedAt))).limit(1);
    if (running && input.to !== "open") return refuse("CLOCK_RUNNING", "A bench clock runs on this operation. Stop it first.");
    const set = input.to === "done" ? { doneAt: ctx.now, doneBy: personIdOf(ctx), startedAt: o.startedAt ?? ctx.now, skippedAt: null, skipReason: null }
      : input.to === "skipped" ? { skippedAt: ctx.now, skipReason: input.reason, doneAt: null, doneBy: null }
      : { doneAt: null, doneBy: null, skippedAt: null, skipReason: null };
    const [changed] = await ctx.tx.update(operations).set({ ...set, version: sql`${operations.version} + 1` }).where(at).returning({ version: operations.version });
    return ok({ operationId: o.id, version: changed?.version ?? o.version, pieceId: o.pieceId });
  },
  subject: (_, value) => ({ kind: "piece", id: value.pieceId }),
});
