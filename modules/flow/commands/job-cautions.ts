import "server-only";
import { randomUUID } from "node:crypto";
import { and, eq, isNull } from "drizzle-orm";
import { cautionsSeen, heads, workOrders } from "@/db/schema";
import { defineCommand } from "@/modules/access/command";
import { personIdOf } from "@/modules/access/context";
import { ok, refuse } from "@/modules/kernel/result";
import { seenInput } from "../caution-input";

/** Name of the confirmation in the audit trail, where that of a head without an order is looked up. */
export const CAUTIONS_SEEN = "flow.cautions-seen";

/**
 * A named person has read these cautions at this step of this job. Said twice, it is kept once; it never stops the work. On a head
 * of the shop's own, which has no order to write it on, the audit trail holds it for the head.
 */
export const markCautionsSeen = defineCommand({
  name: CAUTIONS_SEEN,
  act: "clock.use",
  input: seenInput,
  async run(ctx, { workOrderId, headId, hazards, step }) {
    const personId = personIdOf(ctx);
    if (!personId) return refuse("PERSON_REQUIRED", "A caution is confirmed by a named person, not by a device.");
    if (workOrderId === undefined) {
      const [head] = await ctx.tx.select({ id: heads.id }).from(heads).where(and(eq(heads.shopId, ctx.shop.id), eq(heads.id, headId ?? ""), isNull(heads.pieceId)));
      return head ? ok({ kept: new Set(hazards).size }) : refuse("NOT_FOUND", "This head is not here, or it belongs to an order.");
    }
    const [order] = await ctx.tx.select({ id: workOrders.id }).from(workOrders).where(and(eq(workOrders.shopId, ctx.shop.id), eq(workOrders.id, workOrderId)));
    if (!order) return refuse("NOT_FOUND", "This order is not here.");
    const rows = await ctx.tx.insert(cautionsSeen).values([...new Set(hazards)].map((hazard) => ({ shopId: ctx.shop.id, id: randomUUID(), workOrderId, hazard, step, personId, at: ctx.now })))
      .onConflictDoNothing().returning({ hazard: cautionsSeen.hazard });
    return ok({ workOrderId, kept: rows.length });
  },
  subject: (input) => (input.workOrderId === undefined ? { kind: "head", id: input.headId ?? "" } : { kind: "work-order", id: input.workOrderId }),
});
