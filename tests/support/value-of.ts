import type { Refusal, Result } from "@/modules/kernel/result";

/** The value of a result that must be one; a refusal fails the test with its code. */
export function valueOf<T>(result: Result<T>): T {
  if (!result.ok) throw new Error(`refused: ${result.refusal.code}${result.refusal.field ? ` (${result.refusal.field})` : ""}`);
  return result.value;
}

/** The refusal of a result that must be one; a value fails the test. */
export function refusalOf<T>(result: Result<T>): Refusal {
  if (result.ok) throw new Error(`not refused: ${JSON.stringify(result.value)}`);
  return result.refusal;
}
