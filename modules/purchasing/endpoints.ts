import "server-only";
import { defineEndpoint } from "@/modules/access/api";
import { ok } from "@/modules/kernel/result";
import { z } from "@/modules/kernel/zod";
import { findOrdersInput } from "./input";
import { findOrders } from "./queries/orders";
import { openWorkOrders } from "./queries/open-work-orders";

export const findPurchaseOrdersEndpoint = defineEndpoint({
  method: "GET", path: "/api/v1/s/{shop}/purchases", summary: "Purchase orders by number, supplier or part, with how far they have come in", input: findOrdersInput, by: ["person"],
  run: async (ctx, input) => ok(await findOrders(ctx, input)),
});

export const openWorkOrdersEndpoint = defineEndpoint({
  method: "GET", path: "/api/v1/s/{shop}/purchases/work-orders", summary: "Open work orders that a line of a purchase order can be bought for", input: z.strictObject({}), by: ["person"],
  run: async (ctx) => ok({ rows: await openWorkOrders(ctx) }),
});
