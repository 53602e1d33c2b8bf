import { ok, refuse, type Result } from "@/modules/kernel/result";
import { FLOW_FLAGS } from "./flow-flags";
import type { LiftUnit } from "./lift-ladder";
import { SANITY_LIMITS, type SanityLimits } from "./sanity-limits";
import { typedNumber } from "./typed-number";

/** A gauge that shows more than this, micrometres, on a closed seat was not read: 5 mm. Our choice. */
const ZERO_UM_MAX = 5_000;
const UM_PER_UNIT: Readonly<Record<LiftUnit, number>> = { in: 25_400, mm: 1_000 };

/**
 * What the lift indicator shows on the closed seat after the last lift, as typed (`0`, `-.002`, `0,05 mm`), in whole micrometres;
 * null when nothing was typed. A unit written behind the number wins over the field's. Errors: NUMBER_NOT_FINITE, READING_OUT_OF_RANGE.
 */
export function zeroReturnUm(text: string, fieldUnit: LiftUnit): Result<number | null> {
  const m = /^(.*?)\s*(in|mm|"|″)?$/i.exec(text.trim());
  if (text.trim() === "") return ok(null);
  const typed = typedNumber(m?.[1] ?? "");
  if (!typed.ok) return refuse("NUMBER_NOT_FINITE", "What the indicator shows, such as 0 or -.002 in or 0.05 mm. Leave it empty when it was not looked at.", { field: "zeroReturn" });
  const suffix = m?.[2]?.toLowerCase();
  const um = Math.round(typed.value * UM_PER_UNIT[suffix === undefined ? fieldUnit : suffix === "mm" ? "mm" : "in"]);
  return Math.abs(um) <= ZERO_UM_MAX ? ok(um) : refuse("READING_OUT_OF_RANGE", "More than 5 mm off its zero is no zero. Look at the indicator again.", { field: "zeroReturn" });
}

/** Did the indicator drift by more than the limit (0.05 mm, or the shop's)? */
export const isZeroDrift = (um: number, limits: SanityLimits = SANITY_LIMITS): boolean => Math.abs(um) / 1000 > limits.zeroDriftMm;

/** What is said beside the field while it is typed: the refusal, the doubt, or nothing. */
export function zeroReturnWords(text: string, unit: LiftUnit, limits?: SanityLimits): string | null {
  const read = zeroReturnUm(text, unit);
  if (!read.ok) return read.refusal.message;
  return read.value !== null && isZeroDrift(read.value, limits) ? FLOW_FLAGS.LIFT_ZERO_DRIFT : null;
}
