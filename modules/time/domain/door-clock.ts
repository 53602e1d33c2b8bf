import { ok, refuse, type Result } from "@/modules/kernel/result";
import { CLOCK_AHEAD_SECONDS_MAX } from "./bench-clock";

export const DOOR_PUNCHES = ["in", "out", "meal out", "meal in"] as const;
export type DoorPunchKind = (typeof DOOR_PUNCHES)[number];

export type DoorState = "out" | "in" | "at meal";

export type DoorFlag = "in missing" | "meal out missing" | "meal in missing";

/**
 * What a door punch does. Work done is work time, so an early, late or incomplete punch is never refused: a missing
 * one before it is flagged and asked about. Only a repeat of the same state (`ALREADY_IN`, `ALREADY_OUT`,
 * `ALREADY_AT_MEAL`, with since when) and a time that has not come (`FUTURE_TIME`) are.
 * Source: 29 CFR 785.11 to 785.13 (work suffered or permitted).
 */
export function punchDoor(
  current: { readonly state: DoorState; readonly since: Date | null },
  punch: { readonly kind: DoorPunchKind; readonly at: Date },
  now: Date,
): Result<{ readonly state: DoorState; readonly flags: readonly DoorFlag[] }> {
  if (punch.at.getTime() > now.getTime() + CLOCK_AHEAD_SECONDS_MAX * 1000) {
    return refuse("FUTURE_TIME", "This time has not come yet. Type a time up to now.", { field: "at", data: { now: now.toISOString() } });
  }
  const since = { data: { since: current.since?.toISOString() ?? null } };
  switch (punch.kind) {
    case "in":
      if (current.state === "in") return refuse("ALREADY_IN", "You are already in.", since);
      return ok({ state: "in", flags: current.state === "at meal" ? ["meal in missing"] : [] });
    case "meal in":
      if (current.state === "in") return refuse("ALREADY_IN", "You are already in.", since);
      return ok({ state: "in", flags: current.state === "out" ? ["meal out missing"] : [] });
    case "meal out":
      if (current.state === "at meal") return refuse("ALREADY_AT_MEAL", "You are already at your meal.", since);
      return ok({ state: "at meal", flags: current.state === "out" ? ["in missing"] : [] });
    case "out":
      // Nobody out for the first time today has a state before it: out without in is accepted and asked about.
      if (current.state === "out" && current.since !== null && sameMoment(current.since, punch.at)) {
        return refuse("ALREADY_OUT", "You are already out.", since);
      }
      if (current.state === "out") return ok({ state: "out", flags: ["in missing"] });
      return ok({ state: "out", flags: current.state === "at meal" ? ["meal in missing"] : [] });
  }
}

/** Two taps within a minute are one act. */
const sameMoment = (a: Date, b: Date): boolean => Math.abs(a.getTime() - b.getTime()) < 60_000;
