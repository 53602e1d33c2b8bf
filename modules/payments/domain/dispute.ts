/**
 * How a dispute of a card charge stands. `inquiry`: the customer's bank only asks, no money has moved. `taken`: it took
 * the money back and waits for the shop's evidence. `won`: the money came back. `lost`: it stays away.
 */
const DISPUTE_PHASES = ["inquiry", "inquiry over", "taken", "won", "lost"] as const;
export type DisputePhase = (typeof DISPUTE_PHASES)[number];

/** The payment provider's published states of a dispute. */
const PHASE_OF_STATUS: Readonly<Record<string, DisputePhase>> = {
  warning_needs_response: "inquiry", warning_under_review: "inquiry", warning_closed: "inquiry over",
  needs_response: "taken", under_review: "taken", won: "won", lost: "lost",
};

/** Null for a state we do not know: then a person has to look. */
export const phaseOfDispute = (status: string): DisputePhase | null => PHASE_OF_STATUS[status] ?? null;

/** Does the money of the charge lie with the customer's bank, or did it? */
export const tookMoney = (phase: DisputePhase): boolean => phase === "taken" || phase === "won" || phase === "lost";

/** The furthest of the phases told: messages come twice, late and in any order. An inquiry may still become a dispute. */
export const furthestPhase = (told: readonly DisputePhase[]): DisputePhase | null =>
  told.reduce<DisputePhase | null>((a, b) => (a === null || DISPUTE_PHASES.indexOf(b) > DISPUTE_PHASES.indexOf(a) ? b : a), null);

export const DISPUTE_WORDS: Readonly<Record<DisputePhase, string>> = {
  inquiry: "the customer’s bank asks about it, no money has moved", "inquiry over": "the bank’s question is over, no money moved",
  taken: "taken back by the customer’s bank, answer with evidence", won: "won, the money came back", lost: "lost, the money stays away",
};
