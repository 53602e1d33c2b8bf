import "server-only";
import { z } from "@/modules/kernel/zod";
import type { Endpoint } from "./api";

type AnyEndpoint = Endpoint<z.ZodType, unknown>;

interface JsonSchema { type?: string; properties?: Record<string, unknown>; required?: string[]; [key: string]: unknown }

const schemaOf = (input: z.ZodType): JsonSchema => {
  const { $schema: _, ...schema } = z.toJSONSchema(input, { io: "input", unrepresentable: "any" }) as JsonSchema;
  return schema;
};

const PROBLEM = { "application/problem+json": { schema: { $ref: "#/components/schemas/Problem" } } };

function operationOf(endpoint: AnyEndpoint) {
  const { properties = {}, required = [], ...rest } = schemaOf(endpoint.input);
  const inPath = [...endpoint.path.matchAll(/\{(\w+)\}/g)].map((m) => m[1] ?? "");
  const pathParameters = inPath.map((name) => ({ name, in: "path", required: true, schema: properties[name] ?? { type: "string" } }));
  const others = Object.entries(properties).filter(([name]) => !inPath.includes(name));
  const parameters = endpoint.method === "GET"
    ? [...pathParameters, ...others.map(([name, schema]) => ({ name, in: "query", required: required.includes(name), schema }))]
    : [...pathParameters, { name: "Idempotency-Key", in: "header", required: true, description: "A UUID made once for this act; a repeat gets the first answer.", schema: { type: "string", format: "uuid" } }];
  return {
    summary: endpoint.summary,
    security: endpoint.by.map((by) => ({ [by]: [] })),
    parameters,
    ...(endpoint.method === "POST"
      ? { requestBody: { required: true, content: { "application/json": { schema: { ...rest, properties: Object.fromEntries(others), required: required.filter((r) => !inPath.includes(r)) } } } } }
      : {}),
    responses: {
      200: { description: "Done", content: { "application/json": {} } },
      401: { description: "Sign in first", content: PROBLEM }, 404: { description: "Not found, or not for this role", content: PROBLEM },
      422: { description: "Refused, with the field and the reason", content: PROBLEM },
      ...(endpoint.method === "POST" ? { 409: { description: "The record moved on meanwhile", content: PROBLEM } } : {}),
      503: {
        description: "The shop's data cannot be reached just now. Try again after the seconds in Retry-After, under the same Idempotency-Key: the same request is not carried out twice.",
        headers: { "Retry-After": { required: true, description: "Seconds to wait before the next try", schema: { type: "integer", minimum: 1 } } },
        content: PROBLEM,
      },
    },
  };
}

/** OpenAPI 3.1 document of the HTTP API, made from the schemas that check the requests. */
export function openApiDocument(endpoints: readonly AnyEndpoint[], serverUrl: string) {
  const paths: Record<string, Record<string, unknown>> = {};
  for (const e of endpoints) (paths[e.path] ??= {})[e.method.toLowerCase()] = operationOf(e);
  return {
    openapi: "3.1.0",
    info: { title: "Valvekeeper", version: "1", description: "Lists, clocks and bench readings of one shop. Refusals are RFC 9457 problem documents." },
    servers: [{ url: serverUrl }],
    paths,
    components: {
      securitySchemes: {
        person: { type: "apiKey", in: "cookie", name: "next-auth.session-token", description: "A signed-in member of the shop" },
        device: { type: "http", scheme: "bearer", description: "Token of an enrolled tablet, or of a bench computer as made under Shop settings, Tablets. Sent as `Authorization: Bearer <token>`; no cookie and no Origin are needed" },
      },
      schemas: {
        Problem: {
          type: "object", required: ["title", "status"],
          properties: {
            type: { type: "string" }, title: { type: "string" }, status: { type: "integer" }, code: { type: "string" }, field: { type: "string" }, reference: { type: "string" },
            fields: { type: "array", items: { type: "object", properties: { path: { type: "string" }, message: { type: "string" } } } },
          },
        },
      },
    },
  };
}
