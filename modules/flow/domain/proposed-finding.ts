/** What another page proposes to write as a finding, carried in the address. */
export interface ProposedFinding {
  readonly pieceId: string;
  readonly words: string;
  readonly position: string;
}

/** Lengths a finding takes. */
const WORDS_MAX = 1000;
const POSITION_MAX = 60;

/** Address of an order with a finding proposed: opens the dialog with it. Cut to what a finding takes. */
export const proposeFinding = (orderHref: string, { pieceId, words, position }: ProposedFinding): string =>
  `${orderHref}?${new URLSearchParams({ piece: pieceId, finding: words.slice(0, WORDS_MAX), ...(position === "" ? {} : { where: position.slice(0, POSITION_MAX) }) }).toString()}`;

/**
 * The proposal of an address, for a head of this order; null without one. A head that is not among `pieceIds` (gone by now, or of
 * another order) leaves the words with the first. Control characters are taken out: anybody can write an address.
 */
export function proposedFinding(params: { get(name: string): string | null } | null, pieceIds: readonly string[]): ProposedFinding | null {
  const text = (name: string, max: number) => (params?.get(name) ?? "").replace(/\p{Cc}+/gu, " ").trim().slice(0, max);
  const words = text("finding", WORDS_MAX);
  const [first] = pieceIds;
  if (words === "" || first === undefined) return null;
  const asked = params?.get("piece") ?? "";
  return { pieceId: pieceIds.includes(asked) ? asked : first, words, position: text("where", POSITION_MAX) };
}
