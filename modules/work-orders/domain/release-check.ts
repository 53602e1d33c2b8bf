/** What final inspection looks at before a piece may leave. */
export const CHECKLIST = [
  { key: "identity", words: "Casting and serial match the receiving photos" },
  { key: "readings", words: "Flow and measurements are recorded, or the job has none" },
  { key: "torque", words: "Torque and lash are recorded where asked" },
  { key: "clean", words: "Clean, dry, no chips or compound in passages" },
  { key: "tray", words: "Parts accounted for: came in = fitted + returned + scrapped by agreement" },
  { key: "photos", words: "Final photos are taken" },
] as const;
export type CheckKey = (typeof CHECKLIST)[number]["key"];

export interface ReleaseFacts {
  readonly isBookedIn: boolean;
  readonly isReleased: boolean;
  readonly openOperations: readonly { readonly code: string; readonly name: string }[];
  readonly holds: readonly string[];
  /** Names of flow operations on the piece without a finished reading set of their purpose. */
  readonly flowMissing: readonly string[];
  /** Counts that came in against what the inspector says was fitted, returned and scrapped, by kind. */
  readonly tray: readonly { readonly kind: string; readonly came: number; readonly accounted: number }[];
  readonly unchecked: readonly string[];
  /** The one who releases did bench work at Porting on this piece. */
  readonly isOwnPorting: boolean;
  /** There is nobody else in the shop who could do it. */
  readonly isAlone: boolean;
}

/**
 * What still stands between a piece and its release, in words; empty when nothing does. The releaser did not port it,
 * unless the shop has one person: then it is allowed and marked "alone".
 */
export function missingForRelease(f: ReleaseFacts): string[] {
  const missing: string[] = [];
  if (f.isReleased) return ["This piece is released already."];
  if (!f.isBookedIn) missing.push("It is not booked in.");
  if (f.holds.length > 0) missing.push(`On hold: ${f.holds.join(", ")}. End the hold first.`);
  for (const o of f.openOperations) missing.push(`${o.name} (${o.code}) is not done. Finish it, or skip it with a reason.`);
  for (const name of f.flowMissing) missing.push(`${name}: no finished reading set.`);
  for (const t of f.tray) {
    if (t.came !== t.accounted) missing.push(`${t.kind}: ${t.came} came in, ${t.accounted} accounted for.`);
  }
  for (const words of f.unchecked) missing.push(`Not ticked: ${words}.`);
  if (f.isOwnPorting && !f.isAlone) missing.push("You ported this piece. Somebody else must release it.");
  return missing;
}
