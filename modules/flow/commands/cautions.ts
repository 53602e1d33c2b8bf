import "server-only";
import { randomUUID } from "node:crypto";
import { and, eq } from "drizzle-orm";
import { cautionsSeen, heads, workPieces } from "@/db/schema";
import { defineCommand } from "@/modules/access/command";
import { personIdOf } from "@/modules/access/context";
import { ok, refuse } from "@/modules/kernel/result";
import { BENCH_STEP } from "../domain/bench-cautions";
import { cautionInput } from "../input";

/** A named person has read the cautions of the bench for this job. Said twice, it is kept once. */
export const dismissCautions = defineCommand({
  name: "flow.dismiss-cautions",
  act: "flow.record",
  input: cautionInput,
  async run(ctx, { headId, hazards }) {
    const personId = personIdOf(ctx);
    if (!personId) return refuse("PERSON_REQUIRED", "A caution is confirmed by a person who signed in, not by a device.");
    const [head] = await ctx.tx.select({ workOrderId: workPieces.workOrderId }).from(heads)
      .leftJoin(workPieces, and(eq(workPieces.shopId, heads.shopId), eq(workPieces.id, heads.pieceId))).where(and(eq(heads.shopId, ctx.shop.id), eq(heads.id, headId)));
    if (!head) return refuse("NOT_FOUND", "This head is not here.");
    if (!head.workOrderId) return ok({ headId, kept: 0 });
    const { workOrderId } = head;
    await ctx.tx.insert(cautionsSeen).values(hazards.map((hazard) => ({ shopId: ctx.shop.id, id: randomUUID(), workOrderId, hazard, step: BENCH_STEP, personId, at: ctx.now }))).onConflictDoNothing();
    return ok({ headId, kept: hazards.length });
  },
  subject: (input) => ({ kind: "head", id: input.headId }),
});
