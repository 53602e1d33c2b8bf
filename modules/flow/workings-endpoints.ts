import "server-only";
import { defineEndpoint } from "@/modules/access/api";
import { ok, refuse } from "@/modules/kernel/result";
import { z } from "@/modules/kernel/zod";
import { flagWords } from "./workings/flag-words";
import { workingsListing } from "./workings/listing";
import { runWorking, workingOf } from "./workings/registry";
import { workingInput } from "./workings-input";
import { workingsShop } from "./workings-queries";

export const workingsEndpoint = defineEndpoint({
  method: "GET", path: "/api/v1/s/{shop}/flow/workings", summary: "Every function of the bench with its inputs, outputs, source and caution", input: z.strictObject({}), by: ["person", "device"],
  run: async (ctx) => ok({ groups: workingsListing(await workingsShop(ctx)) }),
});
/** Keeps nothing: the same inputs give the same answer for ever. */
export const runWorkingEndpoint = defineEndpoint({
  method: "POST", path: "/api/v1/s/{shop}/flow/workings/{function}", summary: "One function of the bench, computed from the inputs sent; nothing is kept", input: workingInput, by: ["person", "device"],
  run: async (ctx, input) => {
    const shop = await workingsShop(ctx);
    const working = workingOf(input.function);
    if (!working) return refuse("NO_SUCH_FUNCTION", "There is no function of this name.", { field: "function" });
    const made = runWorking(working, input.inputs, shop);
    if (!made.ok) {
      const { field, fields, ...refusal } = made.refusal;
      const inBody = (path: string): string => (path === "" ? "inputs" : `inputs.${path}`);
      return { ok: false, refusal: { ...refusal, ...(field === undefined ? {} : { field: inBody(field) }), ...(fields ? { fields: fields.map((f) => ({ path: inBody(f.path), message: f.message })) } : {}) } };
    }
    return ok({
      function: working.name, values: made.value.values, flags: made.value.flags.map((code) => ({ code, words: flagWords(code) })),
      outputs: working.outputs, source: working.source, caution: working.caution ?? null,
    });
  },
});
