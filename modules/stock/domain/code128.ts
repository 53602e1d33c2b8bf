import { ok, refuse, type Result } from "@/modules/kernel/result";

/**
 * Check character of a Code 128 symbol in one code set: (start + sum of i * value_i) mod 103.
 * Set B: printable ASCII 32 to 126. Set C: an even count of digits, read in pairs.
 * Source: ISO/IEC 15417 symbol check character; published worked example `abcdef` in set B -> 97.
 * Refuses `NOT_IN_SET` naming what is accepted.
 */
export function code128Check(set: "B" | "C", data: string): Result<number> {
  const values = set === "B" ? valuesOfB(data) : valuesOfC(data);
  if (!values) {
    return refuse("NOT_IN_SET", set === "B" ? "A code may hold letters, digits and signs of plain ASCII." : "This code set holds an even count of digits.");
  }
  const start = set === "B" ? 104 : 105;
  return ok(values.reduce((sum, v, i) => sum + (i + 1) * v, start) % 103);
}

const valuesOfB = (data: string): number[] | null =>
  /^[\x20-\x7e]+$/.test(data) ? [...data].map((c) => c.charCodeAt(0) - 32) : null;

const valuesOfC = (data: string): number[] | null =>
  /^(\d\d)+$/.test(data) ? (data.match(/\d\d/g) ?? []).map(Number) : null;
