import "server-only";
import { randomUUID } from "node:crypto";
import { and, eq, isNotNull, isNull, sql } from "drizzle-orm";
import { customers, operations, promises, workOrderParts, workOrders } from "@/db/schema";
import { changedMeanwhile, defineCommand } from "@/modules/access/command";
import { personIdOf } from "@/modules/access/context";
import { queueMail } from "@/modules/documents/mail";
import { longDay } from "@/modules/kernel/format";
import { localDate } from "@/modules/kernel/instant";
import { ok, refuse } from "@/modules/kernel/result";
import { cancelOrderInput, changeOrderInput, promiseInput } from "../input";
import { releaseReservations } from "../reserve";

/** Words, use and reference of an order. */
export const changeOrder = defineCommand({
  name: "orders.change",
  act: "orders.open",
  input: changeOrderInput,
  async run(ctx, { id, version, ...values }) {
    const [row] = await ctx.tx.update(workOrders).set({ ...values, version: sql`${workOrders.version} + 1` })
      .where(and(eq(workOrders.shopId, ctx.shop.id), eq(workOrders.id, id), eq(workOrders.version, version))).returning({ version: workOrders.version });
    return row ? ok({ version: row.version }) : changedMeanwhile("This order");
  },
  subject: (input) => ({ kind: "work-order", id: input.id }),
});

/** Moves the promise; each has its reason, the old ones stay readable, and the customer is told. */
export const movePromise = defineCommand({
  name: "orders.promise",
  act: "orders.open",
  input: promiseInput,
  async run(ctx, input) {
    if (input.promisedOn < localDate(ctx.now, ctx.shop.zone)) return refuse("PROMISE_IN_THE_PAST", "The promise is in the past. Give today or a later day.", { field: "promisedOn" });
    const [row] = await ctx.tx.update(workOrders).set({ promisedOn: input.promisedOn, version: sql`${workOrders.version} + 1` })
      .where(and(eq(workOrders.shopId, ctx.shop.id), eq(workOrders.id, input.workOrderId), eq(workOrders.version, input.version), isNull(workOrders.closedAt), isNull(workOrders.cancelledAt)))
      .returning({ version: workOrders.version, number: workOrders.number, customerId: workOrders.customerId });
    if (!row) return changedMeanwhile("This order");
    const [{ before } = { before: 0 }] = await ctx.tx.select({ before: sql<number>`count(*)::int` }).from(promises).where(and(eq(promises.shopId, ctx.shop.id), eq(promises.workOrderId, input.workOrderId)));
    await ctx.tx.insert(promises).values({ shopId: ctx.shop.id, id: randomUUID(), workOrderId: input.workOrderId, promisedOn: input.promisedOn, reason: input.reason, at: ctx.now, personId: personIdOf(ctx) });
    const [customer] = await ctx.tx.select({ name: customers.name, email: customers.email }).from(customers).where(and(eq(customers.shopId, ctx.shop.id), eq(customers.id, row.customerId)));
    const told = before > 0 && Boolean(customer?.email);
    if (told && customer?.email) {
      await queueMail(ctx, {
        kind: "promise-moved", to: customer.email, toName: customer.name, subject: `${row.number}: a new day, ${longDay(input.promisedOn, ctx.shop.locale)}`,
        paragraphs: [`Your order ${row.number} is now promised for ${longDay(input.promisedOn, ctx.shop.locale)}.`, `Why: ${input.reason}`, "Call us if that day does not suit you."],
        workOrderId: input.workOrderId, about: { kind: "work-order", id: input.workOrderId },
      });
    }
    return ok({ version: row.version, told });
  },
  subject: (input) => ({ kind: "work-order", id: input.workOrderId }),
});

/** Calls an order off before any work was done on it; its reservations are free again. */
export const cancelOrder = defineCommand({
  name: "orders.cancel",
  act: "approval.enter",
  input: cancelOrderInput,
  async run(ctx, input) {
    const [started] = await ctx.tx.select({ name: operations.name }).from(operations)
      .where(and(eq(operations.shopId, ctx.shop.id), eq(operations.workOrderId, input.workOrderId), isNotNull(operations.startedAt), isNull(operations.removedAt))).limit(1);
    if (started) return refuse("WORK_STARTED", `${started.name} was started. Bill what was done and hand the piece back; an order with work on it is not called off.`);
    const [issued] = await ctx.tx.select({ id: workOrderParts.id }).from(workOrderParts)
      .where(and(eq(workOrderParts.shopId, ctx.shop.id), eq(workOrderParts.workOrderId, input.workOrderId), sql`${workOrderParts.issuedMilli} > 0`)).limit(1);
    if (issued) return refuse("PARTS_ISSUED", "Parts are issued to this order. Return them to the shelf first.");
    const [row] = await ctx.tx.update(workOrders).set({ cancelledAt: ctx.now, cancelReason: input.reason, version: sql`${workOrders.version} + 1` })
      .where(and(eq(workOrders.shopId, ctx.shop.id), eq(workOrders.id, input.workOrderId), eq(workOrders.version, input.version), isNull(workOrders.closedAt), isNull(workOrders.cancelledAt)))
      .returning({ version: workOrders.version });
    if (!row) return changedMeanwhile("This order");
    await releaseReservations(ctx, input.workOrderId);
    return ok({ version: row.version });
  },
  subject: (input) => ({ kind: "work-order", id: input.workOrderId }),
});
