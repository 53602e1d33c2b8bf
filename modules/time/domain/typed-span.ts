import { ok, refuse, type Result } from "@/modules/kernel/result";
import { LONG_ENTRY_MINUTES } from "./bench-clock";
import { elapsedMinutes } from "./elapsed";
import { typedInstant } from "./typed-time";

export interface TypedSpan {
  /** `YYYY-MM-DDTHH:mm` on the shop's wall clock; `which` answers when a time came twice. */
  readonly start: string;
  readonly end: string;
  readonly startWhich?: "first" | "second" | undefined;
  readonly endWhich?: "first" | "second" | undefined;
}

/**
 * A stretch of time as somebody typed it. Refuses at the field: what `typedInstant` refuses, `END_BEFORE_START`,
 * `FUTURE_TIME`, and `LONG_ENTRY` over 16 h, which is entered in parts so that nobody does it by a slip.
 */
export function typedSpan(t: TypedSpan, zone: string, now: Date): Result<{ startedAt: Date; endedAt: Date }> {
  const from = typedInstant(t.start, zone, t.startWhich);
  if (!from.ok) return at(from, "start");
  const to = typedInstant(t.end, zone, t.endWhich);
  if (!to.ok) return at(to, "end");
  if (to.value <= from.value) return refuse("END_BEFORE_START", "The end lies before the start. Type an end after it.", { field: "end" });
  if (to.value > now) return refuse("FUTURE_TIME", "This time has not come yet. Type a time up to now.", { field: "end" });
  if (elapsedMinutes(from.value, to.value) > LONG_ENTRY_MINUTES) return refuse("LONG_ENTRY", "That is more than 16 hours. Put it right, or enter it in two parts.", { field: "end" });
  return ok({ startedAt: from.value, endedAt: to.value });
}

const at = (r: Extract<ReturnType<typeof typedInstant>, { ok: false }>, field: string) => refuse(r.refusal.code, r.refusal.message, { field, ...(r.refusal.data ? { data: r.refusal.data } : {}) });
