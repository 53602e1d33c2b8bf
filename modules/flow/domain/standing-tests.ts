import type { PortSide } from "./comparison-reasons";
import type { RawTest } from "./raw-test";

export interface Standing {
  readonly before: RawTest | null;
  readonly after: RawTest | null;
  /** Passes in between, oldest first. */
  readonly interim: readonly RawTest[];
}

/** The camshaft a comparison is told for: that of the newer test, else of the older. */
export const camIdOf = ({ before, after }: Standing): string | null => after?.camshaft?.id ?? before?.camshaft?.id ?? null;

/**
 * The tests that count for one side of one port: the newest of each purpose that is neither void nor replaced by a finished
 * correction. @param with "complete": what may be handed out; "draft": the sheet in work as well.
 */
export function standingTests(tests: readonly RawTest[], side: PortSide, which: "complete" | "draft"): Standing {
  const live = tests.filter((t) => t.side === side && (t.state === "complete" || (which === "draft" && t.state === "draft")));
  const replaced = new Set(live.map((t) => t.correctsTestId).filter((id): id is string => id !== null));
  const counting = live.filter((t) => !replaced.has(t.id)).sort((a, b) => a.startedAt.localeCompare(b.startedAt) || a.runNo - b.runNo);
  const newest = (purpose: RawTest["purpose"]) => counting.filter((t) => t.purpose === purpose).at(-1) ?? null;
  return { before: newest("baseline"), after: newest("after"), interim: counting.filter((t) => t.purpose === "interim") };
}
