import "server-only";
import { defineEndpoint } from "@/modules/access/api";
import { ok } from "@/modules/kernel/result";
import { findOrdersInput } from "./input";
import { findOrders } from "./queries/orders";

export const findPurchaseOrdersEndpoint = defineEndpoint({
  method: "GET", path: "/api/v1/s/{shop}/purchases", summary: "Purchase orders by number, supplier or part, with how far they have come in", input: findOrdersInput, by: ["person"],
  run: async (ctx, input) => ok(await findOrders(ctx, input)),
});
