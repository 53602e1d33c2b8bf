import type { Refusal } from "@/modules/kernel/result";
import type { EntryQuestion } from "./entry-questions";
import { FLOW_REFUSALS } from "./flow-refusal";
import { typedNumber } from "./typed-number";

/** Can this text still become a number by typing on? `-`, `1,`, `.` can; `abc` and `1.2.3` cannot. */
export const mayBecomeNumber = (text: string): boolean => /^[+\-−]?\d*[.,]?\d*$/.test(text.trim());

/** Questions no further digit can settle. A jump from the neighbours is none: the first digit of a reading always jumps. */
const SURE: ReadonlySet<EntryQuestion["code"]> = new Set(["FLOW_NEGATIVE", "FLOW_OVER_2000"]);

export interface TypingDoubt { readonly kind: "asked" | "refused"; readonly words: string }

/**
 * What is wrong with a reading while it is being typed and stays wrong whatever is typed behind it: no number, beyond the end
 * of the scale, below zero, more than any port flows. Null: fine so far.
 */
export function typingDoubt(text: string, cell: { readonly refusal: Refusal | null; readonly question: EntryQuestion | null; readonly acceptedReason: string | null } | null): TypingDoubt | null {
  if (text.trim() === "") return null;
  if (!mayBecomeNumber(text)) return { kind: "refused", words: FLOW_REFUSALS.NUMBER_NOT_FINITE };
  if (!typedNumber(text).ok || cell === null) return null;
  if (cell.question && SURE.has(cell.question.code)) return cell.acceptedReason === null ? { kind: "asked", words: cell.question.words } : null;
  return cell.refusal?.code === "READING_OUT_OF_RANGE" ? { kind: "refused", words: cell.refusal.message } : null;
}
