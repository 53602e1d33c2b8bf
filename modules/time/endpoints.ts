import "server-only";
import { defineEndpoint } from "@/modules/access/api";
import { ok } from "@/modules/kernel/result";
import { z } from "@/modules/kernel/zod";
import { findOperations } from "./queries/find-operations";
import { peopleAt } from "./queries/people-at";

export const peopleAtEndpoint = defineEndpoint({
  method: "GET", path: "/api/v1/s/{shop}/time/now", summary: "Who is in, on what, since when", input: z.object({}), by: ["person"],
  run: async (ctx) => ok(await peopleAt(ctx)),
});

export const findOperationsEndpoint = defineEndpoint({
  method: "GET", path: "/api/v1/s/{shop}/time/operations", summary: "Operations by a scrap of tag, order number or name", input: z.object({ q: z.string().trim().max(80).default("") }), by: ["person"],
  run: async (ctx, input) => ok(await findOperations(ctx, input)),
});
