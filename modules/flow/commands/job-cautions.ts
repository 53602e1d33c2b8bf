import "server-only";
import { randomUUID } from "node:crypto";
import { and, eq } from "drizzle-orm";
import { cautionsSeen, workOrders } from "@/db/schema";
import { defineCommand } from "@/modules/access/command";
import { personIdOf } from "@/modules/access/context";
import { ok, refuse } from "@/modules/kernel/result";
import { seenInput } from "../caution-input";

/** A named person has read these cautions at this step of this job. Said twice, it is kept once; it never stops the work. */
export const markCautionsSeen = defineCommand({
  name: "flow.cautions-seen",
  act: "clock.use",
  input: seenInput,
  async run(ctx, { workOrderId, hazards, step }) {
    const personId = personIdOf(ctx);
    if (!personId) return refuse("PERSON_REQUIRED", "A caution is confirmed by a named person, not by a device.");
    const [order] = await ctx.tx.select({ id: workOrders.id }).from(workOrders).where(and(eq(workOrders.shopId, ctx.shop.id), eq(workOrders.id, workOrderId)));
    if (!order) return refuse("NOT_FOUND", "This order is not here.");
    const rows = await ctx.tx.insert(cautionsSeen).values([...new Set(hazards)].map((hazard) => ({ shopId: ctx.shop.id, id: randomUUID(), workOrderId, hazard, step, personId, at: ctx.now })))
      .onConflictDoNothing().returning({ hazard: cautionsSeen.hazard });
    return ok({ workOrderId, kept: rows.length });
  },
  subject: (input) => ({ kind: "work-order", id: input.workOrderId }),
});
