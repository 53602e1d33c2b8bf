import type { FieldError } from "./form-trouble";

const isLeaf = (node: Record<string, unknown>): boolean => typeof node.type === "string" || typeof node.message === "string";

/** Flattens the nested error tree of a form to paths and messages, in the order of the fields. */
export function flattenErrors(tree: unknown, prefix = ""): FieldError[] {
  if (typeof tree !== "object" || tree === null) return [];
  return Object.entries(tree).flatMap(([key, node]: [string, unknown]) => {
    if (typeof node !== "object" || node === null || key === "ref") return [];
    const path = prefix === "" ? key : `${prefix}.${key}`;
    const record = node as Record<string, unknown>;
    if (isLeaf(record)) return [{ path, message: typeof record.message === "string" ? record.message : "" }];
    return flattenErrors(record, path);
  });
}

/** The error of one dotted path, or undefined. */
export function errorAt(tree: unknown, path: string): string | undefined {
  return flattenErrors(tree).find((e) => e.path === path)?.message;
}
