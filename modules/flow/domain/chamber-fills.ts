import { ok, type Result } from "@/modules/kernel/result";
import type { FlowFlag } from "./flow-flags";
import { refuseFlow, refuseNotFinite } from "./flow-refusal";

/** Largest difference between fills before they are done again. Common practice, no source. */
export const FILL_SPREAD_MAX_CC = 0.2;

/** Mean of at least three burette fills of a chamber, cc; flag FILL_SPREAD_LARGE. Errors: TOO_FEW_POINTS, READING_OUT_OF_RANGE. */
export function chamberFromFills(fillsCc: readonly number[]): Result<{ chamberCc: number; spreadCc: number; flags: readonly FlowFlag[] }> {
  const bad = refuseNotFinite({ fillsCc });
  if (bad) return bad;
  if (fillsCc.length < 3) return refuseFlow("TOO_FEW_POINTS", "fillsCc", { min: 3 });
  if (fillsCc.some((v) => v <= 0)) return refuseFlow("READING_OUT_OF_RANGE", "fillsCc");
  const spreadCc = Math.max(...fillsCc) - Math.min(...fillsCc);
  const chamberCc = fillsCc.reduce((a, b) => a + b, 0) / fillsCc.length;
  return ok({ chamberCc, spreadCc, flags: spreadCc > FILL_SPREAD_MAX_CC + 1e-9 ? ["FILL_SPREAD_LARGE"] : [] });
}
