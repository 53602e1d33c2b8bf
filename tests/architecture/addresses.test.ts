import { describe, expect, it } from "vitest";
import { ENDPOINTS } from "@/app/api/v1/openapi.json/endpoints";
import { openApiDocument } from "@/modules/access/openapi";
import { allEndpoints } from "@/tests/matrix/enumerate";
import { sources, textOf } from "./sources";

const found = await allEndpoints();
const files = sources("app/api/v1", /^route\.tsx?$/);

/** Routes of the API that are no endpoint of its document, each with the reason. */
const OWN: Record<string, string> = {
  "app/api/v1/openapi.json/route.ts": "the document itself",
  "app/api/v1/clock/enrol/route.ts": "a tablet that is nobody yet",
};
const usesEndpoint = (file: string) => /\bhandle\(/.test(textOf(file));
const routeOf = (path: string) => `app${path.replace(/\{(\w+)\}/g, "[$1]")}/route.ts`;

describe("addresses of the API", () => {
  it("are found", () => expect(found.length).toBeGreaterThan(15));
  it("stand in its document, each once, and nothing else does", () => {
    const keys = ENDPOINTS.map((e) => `${e.method} ${e.path}`);
    expect([...new Set(keys)].sort()).toEqual([...keys].sort());
    expect(keys.sort()).toEqual(found.map((f) => `${f.value.method} ${f.value.path}`).sort());
  });
  it("tell in the document that any of them may answer 503, and when to come again", () => {
    const { paths } = openApiDocument(ENDPOINTS, "http://localhost");
    const operations = Object.values(paths).flatMap((p) => Object.values(p));
    expect(operations).toHaveLength(ENDPOINTS.length);
    for (const operation of operations) expect(operation).toMatchObject({ responses: { 503: { headers: { "Retry-After": { required: true, schema: { type: "integer" } } } } } });
  });
  it.each(found.map((f) => [`${f.value.method} ${f.value.path}`, f] as const))("%s has its route", (_, { name, value }) => {
    const file = routeOf(value.path);
    expect(files).toContain(file);
    expect(textOf(file)).toMatch(new RegExp(`export const ${value.method} = handle\\(${name}\\)`));
  });
  it("have no route without an endpoint", () => {
    const known = new Set(found.map((f) => routeOf(f.value.path)));
    expect(files.filter((f) => !known.has(f) && usesEndpoint(f))).toEqual([]);
    expect(files.filter((f) => !usesEndpoint(f) && !/\bshopFile\(|shopContextOrNull\(|shopRoute\(/.test(textOf(f)) && !(f in OWN))).toEqual([]);
  });
});
