import "server-only";
import { defineEndpoint } from "@/modules/access/api";
import { lookAtBankFileInput } from "./bank-input";
import { lookAtBankFile } from "./bank-import";

/** A file is sent to be looked at, so this is a POST although nothing is kept. */
export const lookAtBankFileEndpoint = defineEndpoint({
  method: "POST", path: "/api/v1/s/{shop}/bank-files/look", summary: "What a bank's file would bring, without keeping it", input: lookAtBankFileInput, by: ["person"],
  run: async (ctx, input) => lookAtBankFile(ctx, input),
});
