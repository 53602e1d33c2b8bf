import type { SideGain } from "../domain/side-gain";

const SIDE_WORDS = { intake: "Intake", exhaust: "Exhaust" } as const;
const ABSENT_WORDS = { before: "no test before", after: "no test after yet", both: "not tested" } as const;

/** Why no difference is shown, for the place where it would stand. Null when it is shown. */
export function withheldWords(gain: SideGain): string | null {
  if (gain.state === "comparable") return null;
  if (gain.state === "absent") return `${SIDE_WORDS[gain.side]}: ${ABSENT_WORDS[gain.absent]}.`;
  return `${SIDE_WORDS[gain.side]}: the two tests cannot be compared. ${gain.reasons.map((r) => r.words).join(" ")}`;
}
