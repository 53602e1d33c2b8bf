import { z } from "@/modules/kernel/zod";
import { WORKING_GROUPS, WORKINGS } from "./registry";
import type { Field, Fields } from "./field";
import type { Working } from "./working";

const inputsOf = (fields: Fields): object[] => Object.entries(fields).map(([name, f]: [string, Field]) => ({
  name, label: f.label, unit: f.unit, kind: f.kind, optional: f.optional, ...(f.fields ? { inputs: inputsOf(f.fields) } : { example: f.example }),
  ...(f.options ? { choices: f.options } : {}), ...(f.hint ? { hint: f.hint } : {}),
}));

/** Every function for a program: inputs, outputs, source and caution. */
export const workingsListing = (shop: { readonly estimatesOn: boolean }) => WORKING_GROUPS.map((g) => ({
  group: g.label,
  functions: g.workings.map((w: Working) => ({
    name: w.name, title: w.title, purpose: w.purpose, source: w.source, caution: w.caution ?? null, isEstimate: w.isEstimate === true, switchedOn: !w.isEstimate || shop.estimatesOn,
    inputs: inputsOf(w.fields), oneOf: w.either.map((e) => ({ sets: e.of, needed: !e.optional })), outputs: w.outputs,
  })),
}));

/** JSON Schema of the inputs of every function, for the document of the API. */
export const inputSchemas = (): object[] => WORKINGS.map((w) => {
  const { $schema: _, ...schema } = z.toJSONSchema(w.schema, { io: "input", unrepresentable: "any" }) as Record<string, unknown>;
  return { title: w.name, description: w.purpose, ...schema };
});
