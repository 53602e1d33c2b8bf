import { z } from "@/modules/kernel/zod";
import { inputSchemas } from "./workings/listing";
import { WORKINGS } from "./workings/registry";

/** A function by name and its inputs, which its own description checks strictly; the document of the API lists them all. */
export const workingInput = z.strictObject({
  function: z.enum(WORKINGS.map((w) => w.name), "There is no function of this name. GET …/flow/workings lists them."),
  inputs: z.record(z.string(), z.unknown(), "Needed: the inputs of the function, by their names.").meta({ anyOf: inputSchemas() }),
});
