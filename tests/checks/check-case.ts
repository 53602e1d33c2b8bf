import { expect } from "vitest";
import type { Result } from "@/modules/kernel/result";

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
export type Answer = Result<Readonly<Record<string, unknown>>>;

/** Reads inputs by name and refuses to run on one that is missing or of another kind. */
export class Inputs {
  private readonly used = new Set<string>();
  constructor(private readonly raw: Readonly<Record<string, unknown>>) {}
  has = (key: string): boolean => key in this.raw;
  isList = (key: string): boolean => Array.isArray(this.raw[key]);
  private take(key: string): unknown {
    this.used.add(key);
    return this.raw[key];
  }
  num(key: string): number {
    const v = this.take(key);
    if (typeof v !== "number") throw new Error(`${key} is not a number`);
    return v;
  }
  opt = (key: string): number | undefined => (this.has(key) ? this.num(key) : undefined);
  nums(key: string): number[] {
    const v = this.take(key);
    if (!Array.isArray(v)) throw new Error(`${key} is not a list`);
    return v.map((x) => {
      if (typeof x !== "number") throw new Error(`${key} holds something else than numbers`);
      return x;
    });
  }
  text(key: string): string {
    const v = this.take(key);
    if (typeof v !== "string") throw new Error(`${key} is not a text`);
    return v;
  }
  bool(key: string): boolean {
    const v = this.take(key);
    if (typeof v !== "boolean") throw new Error(`${key} is not yes or no`);
    return v;
  }
  inner(key: string): Inputs {
    const v = this.take(key);
    if (typeof v !== "object" || v === null) throw new Error(`${key} is not a record`);
    return new Inputs(Object.fromEntries(Object.entries(v)));
  }
  unread = (): string[] => Object.keys(this.raw).filter((k) => !this.used.has(k));
}

/** Gives a value of ours the names of the check file. */
export const named = <T>(r: Result<T>, name: (value: T) => Readonly<Record<string, unknown>>): Answer => (r.ok ? { ok: true, value: name(r.value) } : r);

export type Adapters = Readonly<Record<string, (i: Inputs) => Answer>>;

export function oneOf<T extends string>(text: string, list: readonly T[]): T {
  const found = list.find((x) => x === text);
  if (!found) throw new Error(`${text} is none of ${list.join(", ")}`);
  return found;
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
