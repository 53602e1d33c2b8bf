import "server-only";
import { defineEndpoint } from "@/modules/access/api";
import { ok } from "@/modules/kernel/result";
import { findCustomersInput } from "./input";
import { findCustomers } from "./queries";

export const findCustomersEndpoint = defineEndpoint({
  method: "GET", path: "/api/v1/s/{shop}/customers", summary: "Customers by any scrap of name, mail or telephone", input: findCustomersInput, by: ["person"],
  run: async (ctx, input) => ok(await findCustomers(ctx, input)),
});
