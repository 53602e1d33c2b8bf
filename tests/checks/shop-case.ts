import { expect } from "vitest";
import { z } from "@/modules/kernel/zod";
import { compareFractions, fraction, plus, times } from "@/modules/kernel/fraction";
import { parseMinor, type Minor } from "@/modules/kernel/money";
import { milli, parseMilli, type Milli } from "@/modules/kernel/quantity";
import type { Result } from "@/modules/kernel/result";

export const shopCase = z.object({
  id: z.string(),
  area: z.string(),
  title: z.string(),
  inputs: z.record(z.string(), z.unknown()),
  expected: z.record(z.string(), z.unknown()),
  tolerance: z.string(),
  source: z.string(),
  source_status: z.enum(["verified", "computed", "from_memory"]),
  note: z.string().optional(),
});
export type ShopCase = z.infer<typeof shopCase>;

/** Takes the inputs of a case, gives our answer under the names the case uses for what it expects. */
export type Adapter = (inputs: Record<string, unknown>) => Record<string, unknown>;

/** Money, quantity and percent as the case file writes them: decimal text. */
export const moneyText = z.string().transform((t, ctx): Minor => {
  const m = parseMinor(t);
  if (m !== null) return m;
  ctx.addIssue(`not money: ${t}`);
  return z.NEVER;
});
export const qtyText = z.string().transform((t, ctx): Milli => {
  const q = parseMilli(t);
  if (q !== null) return q;
  ctx.addIssue(`not a quantity: ${t}`);
  return z.NEVER;
});
/** Percent text to whole basis points. */
export const percentBp = z.string().transform((t) => Number(milli(Number(t) * 100_000)) / 1000);

export function valueOf<T>(r: Result<T>): T {
  if (!r.ok) throw new Error(`${r.refusal.code}: ${r.refusal.message}`);
  return r.value;
}

/** An adapter that reads its inputs strictly: one that the case has and we do not read is an error. */
export const reads =
  <T extends z.ZodRawShape>(shape: T, answer: (i: z.output<z.ZodObject<T>>) => Record<string, unknown>): Adapter =>
  (inputs) =>
    answer(z.strictObject(shape).parse(inputs));

const DECIMAL = /^-?\d+(\.\d+)?$/;

/**
 * Compares to the last leaf. Decimal texts are compared by value, `allowed` apart at most (0 = exactly); everything
 * else must be the same. A name we give no answer for fails.
 */
export function agreeWith(actual: unknown, expected: unknown, allowed: string, path: string): void {
  if (Array.isArray(expected)) {
    expect(actual, path).toHaveLength(expected.length);
    expected.forEach((e, i) => agreeWith((actual as unknown[])[i], e, allowed, `${path}[${i}]`));
  } else if (typeof expected === "object" && expected !== null) {
    for (const [k, e] of Object.entries(expected)) agreeWith(Reflect.get(actual as object, k), e, allowed, `${path}.${k}`);
  } else if (typeof expected === "string" && DECIMAL.test(expected)) {
    expect(String(actual), `${path} is a number`).toMatch(DECIMAL);
    const difference = plus(fraction(String(actual)), times(fraction(expected), fraction("-1")));
    const size = difference.num < 0n ? times(difference, fraction("-1")) : difference;
    expect(compareFractions(size, fraction(allowed)), `${path}: ${String(actual)} against ${expected}`).toBeLessThanOrEqual(0);
  } else {
    expect(actual, path).toBe(expected);
  }
}

