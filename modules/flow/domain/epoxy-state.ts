import { ok, type Result } from "@/modules/kernel/result";
import type { FlowFlag } from "./flow-flags";
import { refuseFlow, refuseNotFinite } from "./flow-refusal";

/** `mixed`: may be applied. `cured`: may be ground and flowed. `hold`: a person decides; nothing is released by the clock. */
export type EpoxyState = "mixed" | "pot_expired" | "curing" | "hold" | "cured";

export interface EpoxyInput {
  readonly mixedAt: Date;
  readonly now: Date;
  /** All limits come from the product's data sheet. */
  readonly potLifeMin: number;
  readonly minCureH: number;
  readonly minTempC?: number;
  readonly maxTempC?: number;
  readonly loggedMinTempC?: number;
  readonly loggedMaxTempC?: number;
  /** When it went into the port; null = still in the pot; left out = not recorded, taken as applied in time. */
  readonly appliedAt?: Date | null;
}

const MINUTE_MS = 60_000;

/**
 * State of epoxy in a port. The cure clock starts at mixing; a warmer shop never shortens it.
 * Source: rule; limits from the data sheet of the product used. Errors: TIME_NOT_IN_ORDER, READING_OUT_OF_RANGE.
 */
export function epoxyState(input: EpoxyInput): Result<{ state: EpoxyState; mayGrind: boolean; flags: readonly FlowFlag[] }> {
  const { mixedAt, now, potLifeMin, minCureH, minTempC, maxTempC, loggedMinTempC, loggedMaxTempC, appliedAt } = input;
  const bad = refuseNotFinite({ mixedAt: mixedAt.getTime(), now: now.getTime(), potLifeMin, minCureH, minTempC, maxTempC, loggedMinTempC, loggedMaxTempC });
  if (bad) return bad;
  if (potLifeMin <= 0) return refuseFlow("READING_OUT_OF_RANGE", "potLifeMin");
  if (minCureH <= 0) return refuseFlow("READING_OUT_OF_RANGE", "minCureH");
  if (now < mixedAt) return refuseFlow("TIME_NOT_IN_ORDER", "mixedAt");
  if (appliedAt && (appliedAt < mixedAt || appliedAt > now)) return refuseFlow("TIME_NOT_IN_ORDER", "appliedAt");
  const sinceMixedMin = (now.getTime() - mixedAt.getTime()) / MINUTE_MS;
  const state = (s: EpoxyState, flags: readonly FlowFlag[] = []) => ok({ state: s, mayGrind: s === "cured", flags });

  if (appliedAt && (appliedAt.getTime() - mixedAt.getTime()) / MINUTE_MS > potLifeMin) return state("pot_expired", ["APPLIED_AFTER_POT_LIFE"]);
  if (!appliedAt && sinceMixedMin <= potLifeMin) return state("mixed");
  if (appliedAt === null) return state("pot_expired");

  const flags: FlowFlag[] = [];
  if (minTempC !== undefined && loggedMinTempC !== undefined && loggedMinTempC < minTempC) flags.push("CURE_TEMPERATURE_LOW");
  if (maxTempC !== undefined && loggedMaxTempC !== undefined && loggedMaxTempC > maxTempC) flags.push("CURE_TEMPERATURE_HIGH");
  if (flags.length > 0) return state("hold", flags);
  if ((minTempC !== undefined && loggedMinTempC === undefined) || (maxTempC !== undefined && loggedMaxTempC === undefined)) {
    flags.push("CURE_TEMPERATURE_NOT_LOGGED");
  }
  return state(sinceMixedMin < minCureH * 60 ? "curing" : "cured", flags);
}
