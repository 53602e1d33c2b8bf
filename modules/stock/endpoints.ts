import "server-only";
import { defineEndpoint } from "@/modules/access/api";
import { ok } from "@/modules/kernel/result";
import { findPartsInput, ledgerInput, partInput } from "./input";
import { getPart } from "./queries/get-part";
import { findParts } from "./queries/find-parts";
import { ledgerOf } from "./queries/ledger";

export const findPartsEndpoint = defineEndpoint({
  method: "GET", path: "/api/v1/s/{shop}/parts", summary: "Parts by number, words or family, with what is on the shelf, promised, free, short and on order", input: findPartsInput, by: ["person"],
  run: async (ctx, input) => ok(await findParts(ctx, input)),
});

export const ledgerEndpoint = defineEndpoint({
  method: "GET", path: "/api/v1/s/{shop}/parts/{part}/movements", summary: "Ledger of one part, newest first, with the quantity after each row", input: ledgerInput, by: ["person"],
  run: async (ctx, input) => ok(await ledgerOf(ctx, input)),
});

export const partEndpoint = defineEndpoint({
  method: "GET", path: "/api/v1/s/{shop}/parts/{part}", summary: "One part with its lots, kit, what waits for it and what is on order", input: partInput, by: ["person"],
  run: async (ctx, input) => ok(await getPart(ctx, input.part)),
});
