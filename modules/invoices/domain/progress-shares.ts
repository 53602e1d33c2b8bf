import { allocate, minor, type Minor } from "@/modules/kernel/money";
import { ok, refuse, type Result } from "@/modules/kernel/result";

/**
 * Amounts of the stages of an agreed total, by percent in basis points; they always add up to the total.
 * Refuses `STAGES_NOT_WHOLE` with the difference when the stages are not 100 %. Source: largest remainder method.
 */
export function progressShares(totalMinor: Minor, stagesBp: readonly number[]): Result<Minor[]> {
  const sum = stagesBp.reduce((a, b) => a + b, 0);
  if (stagesBp.some((b) => !Number.isInteger(b) || b < 0) || sum !== 10_000) {
    return refuse("STAGES_NOT_WHOLE", `The stages come to ${sum / 100} %. They must come to 100 %.`, { field: "stages", data: { differenceBp: sum - 10_000 } });
  }
  return ok(allocate(totalMinor, stagesBp).map((a) => minor(a)));
}
