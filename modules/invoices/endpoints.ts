import "server-only";
import { defineEndpoint } from "@/modules/access/api";
import { ok } from "@/modules/kernel/result";
import { findInvoicesInput } from "./input";
import { findInvoices } from "./queries";

export const findInvoicesEndpoint = defineEndpoint({
  method: "GET", path: "/api/v1/s/{shop}/invoices", summary: "Invoices of a view, by number, order, name or sum", input: findInvoicesInput, by: ["person"],
  run: async (ctx, input) => ok(await findInvoices(ctx, input)),
});
