import type { Station } from "./floor-station";
import { stationOf, type RoutedOperation } from "./floor-station";

/** Dial of a state: shape, never hue, carries the meaning. */
export type StateDial = "draft" | "wait" | "queue" | "work" | "short" | "hold" | "ready" | "out" | "late";

export interface PieceStatusFacts {
  readonly isBookedIn: boolean;
  readonly isReleased: boolean;
  readonly isGone: boolean;
  readonly isApproved: boolean;
  /** An estimate version waits for the customer's answer since then (ISO), or null. */
  readonly waitingSince: string | null;
  readonly hasDraft: boolean;
  readonly operations: readonly (RoutedOperation & { readonly notBefore: string | null })[];
  readonly running: { readonly person: string; readonly since: string } | null;
  readonly hold: { readonly reason: string; readonly since: string } | null;
  /** Short name of a part that is not there, or null. */
  readonly shortOf: string | null;
  readonly isPaid: boolean;
  readonly promisedOn: string | null;
  readonly bookedInAt: string | null;
  readonly releasedAt: string | null;
}

export interface PieceStatus {
  /** Null when the piece is not in the house. */
  readonly station: Station | null;
  readonly dial: StateDial;
  /** The short word beside the dial. */
  readonly word: string;
  /** When this state began, as far as it is known: for "2 h", "3 d". */
  readonly since: string | null;
  /** Past or on the promised day and not yet released. */
  readonly due: "today" | "late" | null;
}

const dueOf = (promisedOn: string | null, today: string, isDone: boolean): PieceStatus["due"] =>
  promisedOn === null || isDone || promisedOn > today ? null : promisedOn === today ? "today" : "late";

/**
 * What one piece is doing now, from the facts. The first that applies: gone, ready, a clock running, on hold, waiting for
 * an answer, not in the house, parts short, curing, due, to inspect, just in, next.
 */
export function pieceStatus(f: PieceStatusFacts, today: string, nowIso: string): PieceStatus {
  const isStarted = f.operations.some((o) => o.state !== "open");
  const at = stationOf(f);
  // It stands at the counter until the first operation takes it away.
  const station = at !== null && !isStarted && !f.isReleased ? "Counter in" : at;
  const due = dueOf(f.promisedOn, today, f.isReleased || f.isGone);
  const say = (dial: StateDial, word: string, since: string | null = null): PieceStatus => ({ station, dial, word, since, due });
  if (f.isGone) return say("out", "Gone");
  if (f.isReleased) return say("ready", f.isPaid ? "Ready, paid" : "Ready, to pay", f.releasedAt);
  if (f.running) return say("work", f.running.person, f.running.since);
  if (f.hold) return say("hold", f.hold.reason === "customer answer" ? "Held, answer" : `Held, ${f.hold.reason}`, f.hold.since);
  if (f.waitingSince !== null) return say("wait", "Approval", f.waitingSince);
  if (!f.isApproved) return say(f.hasDraft ? "draft" : "queue", f.hasDraft ? "Estimate begun" : "To estimate", f.bookedInAt);
  if (!f.isBookedIn) return say("queue", "On its way in");
  if (f.shortOf !== null) return say("short", `${f.shortOf} short`);
  const next = [...f.operations].sort((a, b) => a.sequence - b.sequence).find((o) => o.state === "open");
  if (next?.notBefore && next.notBefore > nowIso) return say("wait", "Cures", next.notBefore);
  if (due === "late") return say("late", "Late");
  if (due === "today") return say("late", "Due today");
  if (!next) return say("queue", "To inspect");
  return isStarted ? say("queue", "Next") : say("queue", "Just in", f.bookedInAt);
}

const RANK: readonly StateDial[] = ["work", "late", "hold", "short", "wait", "draft", "queue", "ready", "out"];

/** The state of a whole order: that of the piece with the most to say. */
export function orderStatus(pieces: readonly PieceStatus[]): PieceStatus | null {
  return [...pieces].sort((a, b) => RANK.indexOf(a.dial) - RANK.indexOf(b.dial))[0] ?? null;
}
