import { expect } from "vitest";

/** One check case as written in the check file. */
export interface CheckCase {
  readonly id: string;
  readonly function: string;
  readonly title: string;
  readonly inputs: Readonly<Record<string, unknown>>;
  readonly expected: Readonly<Record<string, unknown>>;
  readonly tolerance: Readonly<Partial<Record<"rel" | "abs" | "abs_percent", number>>> & { readonly exact?: boolean };
  readonly source: string;
}

/** Compares to the last leaf; a leaf that was not compared cannot be: every branch ends in an `expect`. */
export function agree(actual: unknown, expected: unknown, c: CheckCase, key: string): void {
  if (typeof expected === "number") {
    expect(typeof actual, `${key} is a number`).toBe("number");
    const { rel, abs, abs_percent } = c.tolerance;
    const percent = key.includes("percent") ? abs_percent : undefined;
    const allowed = percent ?? (rel !== undefined ? Math.abs(expected) * rel : (abs ?? 0));
    expect(Math.abs(Number(actual) - expected), `${key}: ${String(actual)} against ${expected}`).toBeLessThanOrEqual(allowed);
  } else if (key === "flags") {
    expect(Array.isArray(actual), "flags are a list").toBe(true);
    expect(new Set(actual as string[])).toEqual(new Set(expected as string[]));
  } else if (Array.isArray(expected)) {
    expect(actual, key).toHaveLength(expected.length);
    expected.forEach((e, n) => agree((actual as unknown[])[n], e, c, key));
  } else if (typeof expected === "object" && expected !== null) {
    for (const [k, e] of Object.entries(expected)) agree(Reflect.get(actual as object, k), e, c, k);
  } else {
    expect(actual, key).toBe(expected);
  }
}
