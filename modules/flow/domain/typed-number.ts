import { ok, type Result } from "@/modules/kernel/result";
import { refuseFlow } from "./flow-refusal";

/**
 * A number as typed at the bench: digits with a point or a comma for decimals (`24.6`, `24,6`, `.5`, `-0.3`). No thousands signs.
 * Errors: NUMBER_NOT_FINITE.
 */
export function typedNumber(text: string, field = "value"): Result<number> {
  const m = /^([+\-−]?)(\d*[.,]?\d+|\d+[.,])$/.exec(text.trim());
  const value = m ? Number((m[2] ?? "").replace(",", ".")) : Number.NaN;
  if (!Number.isFinite(value)) return refuseFlow("NUMBER_NOT_FINITE", field);
  return ok(m?.[1] === "-" || m?.[1] === "−" ? -value || 0 : value);
}
