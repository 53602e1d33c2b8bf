import "server-only";
import { defineEndpoint } from "@/modules/access/api";
import { ok } from "@/modules/kernel/result";
import { findInput, findOrdersInput, noInput } from "./input";
import { findAnything } from "./queries/find";
import { floorOf } from "./queries/floor";
import { menuOf } from "./queries/menu";
import { findOrders } from "./queries/orders";

export const floorEndpoint = defineEndpoint({
  method: "GET", path: "/api/v1/s/{shop}/floor", summary: "Every head at its station, and what needs a hand today", input: noInput, by: ["person"], run: async (ctx) => ok(await floorOf(ctx)),
});
export const findOrdersEndpoint = defineEndpoint({
  method: "GET", path: "/api/v1/s/{shop}/orders", summary: "Work orders of a saved view, filtered, sorted and paged", input: findOrdersInput, by: ["person"], run: async (ctx, input) => ok(await findOrders(ctx, input)),
});
export const findEndpoint = defineEndpoint({
  method: "GET", path: "/api/v1/s/{shop}/find", summary: "Orders, tags, customers and parts by any scrap", input: findInput, by: ["person"], run: async (ctx, input) => ok(await findAnything(ctx, input.q)),
});
export const menuEndpoint = defineEndpoint({
  method: "GET", path: "/api/v1/s/{shop}/menu", summary: "The priced menu of operations", input: noInput, by: ["person"], run: async (ctx) => ok({ rows: await menuOf(ctx) }),
});
