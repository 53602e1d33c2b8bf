import path from "node:path";
import { COMMAND_MARK, type Command } from "@/modules/access/command";
import type { Endpoint } from "@/modules/access/api";
import { z } from "@/modules/kernel/zod";
import { ROOT, sources, textOf } from "@/tests/architecture/sources";

type AnyCommand = Command<z.ZodType, unknown>;
export interface Found<T> { file: string; name: string; value: T }

const isTest = (file: string) => /\.test\.tsx?$/.test(file);
const serverFiles = (holds: RegExp) => sources("modules", /\.ts$/).filter((f) => !isTest(f) && holds.test(textOf(f)) && !/^\s*["']use (client|server)["']/.test(textOf(f)));

async function exportsOf(file: string): Promise<[string, unknown][]> {
  return Object.entries((await import(path.join(ROOT, file))) as Record<string, unknown>);
}

/** Every exported command, wherever it stands. */
export async function allCommands(): Promise<Found<AnyCommand>[]> {
  const found: Found<AnyCommand>[] = [];
  for (const file of serverFiles(/\bdefineCommand\(/)) {
    if (file === "modules/access/command.ts") continue;
    for (const [name, value] of await exportsOf(file)) {
      if (typeof value === "function" && COMMAND_MARK in value) found.push({ file, name, value: value as unknown as AnyCommand });
    }
  }
  return found;
}

/** Every exported endpoint. */
export async function allEndpoints(): Promise<Found<Endpoint<z.ZodType, unknown>>[]> {
  const found: Found<Endpoint<z.ZodType, unknown>>[] = [];
  for (const file of serverFiles(/\b(defineEndpoint|commandEndpoint)\(/)) {
    if (file === "modules/access/api.ts") continue;
    for (const [name, value] of await exportsOf(file)) {
      if (typeof value === "object" && value !== null && "method" in value && "path" in value && "run" in value) found.push({ file, name, value: value as Endpoint<z.ZodType, unknown> });
    }
  }
  return found;
}

/** Every function exported by a file of queries. */
export async function allQueries(): Promise<Found<(...args: never[]) => unknown>[]> {
  const found: Found<(...args: never[]) => unknown>[] = [];
  for (const file of sources("modules", /\.ts$/).filter((f) => !isTest(f) && /\/queries(\/|\.ts$)|-queries\.ts$/.test(f))) {
    for (const [name, value] of await exportsOf(file)) if (typeof value === "function" && !(COMMAND_MARK in value)) found.push({ file, name, value: value as (...args: never[]) => unknown });
  }
  return found;
}

/** Paths in a schema at which an id stands: `lines[].partId`. */
export function idPaths(schema: z.ZodType): string[] {
  const paths = new Set<string>();
  const walk = (node: unknown, at: string): void => {
    if (typeof node !== "object" || node === null) return;
    const n = node as Record<string, unknown>;
    if (n.format === "uuid") paths.add(at);
    for (const [key, child] of Object.entries((n.properties ?? {}) as Record<string, unknown>)) walk(child, at ? `${at}.${key}` : key);
    if (n.items) walk(n.items, `${at}[]`);
    for (const list of ["anyOf", "oneOf", "allOf"]) for (const child of (n[list] ?? []) as unknown[]) walk(child, at);
  };
  walk(z.toJSONSchema(schema, { io: "input", unrepresentable: "any" }), "");
  return [...paths].sort();
}

/** Paths of an input at which one of these ids stands. */
export function pathsOf(input: unknown, ids: ReadonlySet<string>, at = ""): string[] {
  if (typeof input === "string") return ids.has(input) ? [at] : [];
  if (Array.isArray(input)) return [...new Set(input.flatMap((v) => pathsOf(v, ids, `${at}[]`)))];
  if (typeof input !== "object" || input === null) return [];
  return Object.entries(input).flatMap(([k, v]) => pathsOf(v, ids, at ? `${at}.${k}` : k));
}
